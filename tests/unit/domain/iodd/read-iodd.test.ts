import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { crc32 } from "../../../../app/domain/iodd/crc32";
import { findIoddUnit } from "../../../../app/domain/iodd/iodd-units";
import { readIodd } from "../../../../app/domain/iodd/read-iodd";
import type { DeviceDescription } from "../../../../app/domain/iodd/device-description";

function demoFile(product: string): Uint8Array {
  return readFileSync(`nodesets/demo/iodd/Quillon-${product}-20261102-IODD1.1.xml`);
}

function read(product: string): { device: DeviceDescription; codes: string[] } {
  const octets = demoFile(product);
  const result = readIodd(new TextDecoder().decode(octets), { octets });
  if (!result.ok) throw new Error(JSON.stringify(result.problems));
  return { device: result.value, codes: result.problems.map((p) => p.code) };
}

/** A small IODD around the parts that a test is about. */
function iodd(parts: {
  datatypes?: string;
  variables?: string;
  processData?: string;
  ui?: string;
  texts?: string;
  root?: string;
}): string {
  return `<?xml version="1.0"?>
<IODevice xmlns="${parts.root ?? "http://www.io-link.com/IODD/2010/10"}" xmlns:xsi="http://www.w3.org/2001/XMLSchema-instance">
<DocumentInfo version="V1.0" releaseDate="2026-01-01"/>
<ProfileBody><DeviceIdentity vendorId="65001" deviceId="7" vendorName="Quillon Sensing"/>
<DeviceFunction><DatatypeCollection>${parts.datatypes ?? ""}</DatatypeCollection>
<VariableCollection>${parts.variables ?? ""}</VariableCollection>
<ProcessDataCollection>${parts.processData ?? ""}</ProcessDataCollection>
<UserInterface>${parts.ui ?? ""}</UserInterface></DeviceFunction></ProfileBody>
<ExternalTextCollection><PrimaryLanguage xml:lang="en">${parts.texts ?? ""}</PrimaryLanguage></ExternalTextCollection></IODevice>`;
}

function codesOf(text: string): string[] {
  return readIodd(text).problems.map((p) => p.code);
}

describe("readIodd", () => {
  test("reads identity, layout and units of the distance sensor without a problem", () => {
    const { device, codes } = read("QS-U30");
    expect(codes).toEqual([]);
    expect(device).toMatchObject({
      vendorId: 65001,
      deviceId: 1030,
      vendorName: "Quillon Sensing",
      schemaVersion: "1.1",
    });
    expect(device.deviceName).toEqual({ en: "Ultrasonic distance sensor", de: "Ultraschall-Abstandssensor" });
    expect(device.languages).toEqual(["en", "de"]);
    const image = device.processData[0]?.in;
    expect(image).toMatchObject({ id: "PI_In", bitLength: 32, info: { 1: { gradient: 0.1, unitCode: 1013 } } });
    expect(image?.type.kind === "RecordT" ? image.type.items.map((i) => [i.subindex, i.bitOffset]) : []).toEqual([
      [1, 16],
      [2, 8],
      [3, 0],
      [4, 1],
    ]);
    expect(device.communication).toMatchObject({ bitrate: "COM2", minCycleTime: 4000, ioLinkRevision: "V1.1" });
  });

  test.each(["QS-P12", "QS-C04", "QS-L5"])("reads %s without a problem", (product) => {
    expect(read(product).codes).toEqual([]);
  });

  test("takes standard variables from the standard's table and lets the file restrict them", () => {
    const { device } = read("QS-U30");
    const command = device.variables.find((v) => v.id === "V_SystemCommand");
    expect(command).toMatchObject({ index: 2, accessRights: "wo", isStandard: true });
    expect(command?.type.kind === "UIntegerT" ? command.type.singleValues.map((s) => s.value) : []).toEqual([128, 130]);
    // Index 37 holds 64 entries of 3 octets in the standard; the file's fixedLengthRestriction says 4.
    expect(device.variables.find((v) => v.index === 37)?.type).toMatchObject({ kind: "ArrayT", count: 4 });
    expect(device.events.map((e) => [e.code, e.type])).toEqual([[0x5010, "Error"]]);
  });

  test("says when the stamp's CRC does not fit the octets", () => {
    const octets = demoFile("QS-U30");
    const changed = new TextDecoder().decode(octets).replace("4000", "4001");
    const result = readIodd(changed, { octets: new TextEncoder().encode(changed) });
    expect(result.problems.map((p) => p.code)).toEqual(["iodd.crc"]);
  });

  test("the CRC is that of zlib (check value of the text 123456789: CBF43926, published with the polynomial)", () => {
    expect(crc32(new TextEncoder().encode("123456789"))).toBe(0xcbf43926);
  });

  test("names the unit ids of OPC 30120 Annex C", () => {
    expect(findIoddUnit(1001)).toMatchObject({ code: "CEL", unitId: 4408652, symbol: "°C" });
    expect(findIoddUnit(1013)).toMatchObject({ code: "MMT", unitId: 5066068 });
    expect(findIoddUnit(1062)).toMatchObject({ code: "C16", unitId: 4403510 });
    expect(findIoddUnit(1342)).toMatchObject({ code: "P1", unitId: 20529 });
    expect(findIoddUnit(999)).toBeUndefined();
  });

  test("reads IODD 1.0.1 by its own namespace and refuses any other root", () => {
    expect(readIodd(iodd({ root: "http://www.io-link.com/IODD/2009/11" }))).toMatchObject({
      ok: true,
      value: { schemaVersion: "1.0.1" },
    });
    expect(codesOf(iodd({ root: "http://www.io-link.com/IODD/2099/01" }))).toEqual(["iodd.wrong-root"]);
    expect(codesOf("<UANodeSet/>")).toEqual(["iodd.wrong-root"]);
  });

  const image = (items: string, bits = 16): string =>
    `<ProcessData id="P"><ProcessDataIn id="PI" bitLength="${bits}"><Datatype xsi:type="RecordT" bitLength="${bits}">${items}</Datatype></ProcessDataIn></ProcessData>`;
  const item = (subindex: number, offset: number, type: string): string =>
    `<RecordItem subindex="${subindex}" bitOffset="${offset}"><SimpleDatatype ${type}/></RecordItem>`;

  test.each([
    [
      "overlapping fields",
      image(item(1, 0, 'xsi:type="UIntegerT" bitLength="9"') + item(2, 8, 'xsi:type="UIntegerT" bitLength="8"')),
      "iodd.field-overlap",
    ],
    ["a field outside the block", image(item(1, 12, 'xsi:type="UIntegerT" bitLength="8"')), "iodd.field-outside"],
    [
      "one subindex twice",
      image(item(1, 0, 'xsi:type="BooleanT"') + item(1, 1, 'xsi:type="BooleanT"')),
      "iodd.duplicate-subindex",
    ],
    ["more than 32 octets", image(item(1, 0, 'xsi:type="BooleanT"'), 264), "iodd.process-data-too-long"],
    ["a wrong bit length", image(item(1, 0, 'xsi:type="UIntegerT" bitLength="65"')), "iodd.bad-number"],
    ["an unknown datatype", image(item(1, 0, 'xsi:type="Float64T"')), "iodd.unknown-datatype"],
  ])("reports %s with its place", (_, processData, code) => {
    const found = readIodd(iodd({ processData })).problems.find((p) => p.code === code);
    expect(found?.at?.line).toBeGreaterThan(0);
  });

  test("follows chains of named datatypes and reports references to nowhere and circles", () => {
    const record =
      '<Datatype id="A" xsi:type="RecordT" bitLength="8"><RecordItem subindex="1" bitOffset="0"><DatatypeRef datatypeId="B"/></RecordItem></Datatype>';
    const ok = readIodd(
      iodd({
        datatypes: `${record}<Datatype id="B" xsi:type="UIntegerT" bitLength="8"/>`,
        variables: '<Variable id="V" index="64" accessRights="ro"><DatatypeRef datatypeId="A"/></Variable>',
      }),
    );
    expect(ok).toMatchObject({
      ok: true,
      problems: [],
      value: { variables: [{ type: { items: [{ type: { kind: "UIntegerT" } }] } }] },
    });
    expect(
      codesOf(
        iodd({
          datatypes: record,
          variables: '<Variable id="V" index="64" accessRights="ro"><DatatypeRef datatypeId="A"/></Variable>',
        }),
      ),
    ).toContain("iodd.unresolved-datatype");
    const circle = '<Datatype id="A" xsi:type="ArrayT" count="2"><DatatypeRef datatypeId="A"/></Datatype>';
    expect(
      codesOf(
        iodd({
          datatypes: circle,
          variables: '<Variable id="V" index="64" accessRights="ro"><DatatypeRef datatypeId="A"/></Variable>',
        }),
      ),
    ).toContain("iodd.circular-datatype");
  });

  test("refuses document types, damage and depth", () => {
    expect(codesOf('<!DOCTYPE a [<!ENTITY b "c">]><a/>')).toEqual(["xml.doctype"]);
    expect(codesOf("<a><b></a>")).toEqual(["xml.syntax"]);
    expect(codesOf("<a>".repeat(100_000))).toEqual(["xml.depth"]);
    expect(codesOf("")).toEqual(["xml.syntax"]);
  });

  test("reports a text that is missing and keeps the rest", () => {
    const processData = image(
      '<RecordItem subindex="1" bitOffset="0"><SimpleDatatype xsi:type="UIntegerT" bitLength="16"/><Name textId="T_Gone"/></RecordItem>',
    );
    const result = readIodd(iodd({ processData }));
    expect(result.problems.map((p) => p.code)).toEqual(["iodd.missing-text"]);
    expect(result.ok).toBe(true);
  });
});
