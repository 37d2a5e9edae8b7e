/**
 * Against the W3C's own JSON schema as the npm package wot-thing-description-types carries it. That package's newest plain
 * version is of September 2021: its schema knows the context of that time only, so the context is exchanged for the test and
 * checked by itself (W3C Recommendation "WoT Thing Description 1.1" §5.3.1.1: the 1.1 context comes first).
 */
import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import { Ajv } from "ajv";
import addFormats from "ajv-formats";
import { describe, expect, it } from "vitest";
import { getValue } from "~/domain/core/result";
import { makeMachineDocument, type KnownSource } from "~/domain/deliver/make-mapping-document";
import { writeMappingCsv } from "~/domain/deliver/mapping-csv";
import { makeThingDescription, TD_CONTEXT, writeThingDescription } from "~/domain/deliver/thing-description";
import { applyOperations } from "~/domain/editing/apply-operation";
import type { Operation } from "~/domain/editing/operation";
import { listMachines } from "~/domain/instantiation/list-machines";
import { makeHallSpace } from "../../../support/demo-mapping";

const path = createRequire(import.meta.url).resolve("wot-thing-description-types/schema/td-json-schema-validation.json");
const schema = JSON.parse(readFileSync(path, "utf8")) as object;
const ajv = new Ajv({ strict: false, allErrors: true });
(addFormats as unknown as (ajv: Ajv) => void)(ajv);
ajv.addFormat("iri-reference", true);
const validate = ajv.compile(schema);

const sources: KnownSource[] = [
  { id: "m1", name: "M1", kind: "rest-master", address: { url: "http://192.0.2.10", portCount: 8, timeoutMs: 2_000, periodMs: 500 } },
  { id: "m4", name: "M4", kind: "opc-ua-master", address: { url: "opc.tcp://192.0.2.14:4840", portCount: 8, timeoutMs: 2_000, periodMs: 500 } },
  { id: "plc", name: "Hall controllers", kind: "modbus-unit", address: { host: "192.0.2.20", port: 502, timeoutMs: 2_000, periodMs: 500 } },
];

const hall = makeHallSpace();
const b3 = listMachines(hall).find((m) => m.name === "B3");
if (!b3) throw new RangeError("B3");
const bind = (role: string, value: object): Operation => ({ kind: "setMapping", part: "binding", owner: b3.key, id: role, value });
const space = getValue(
  applyOperations(hall, [
    bind("creel sensor", { sourceId: "m1", port: 1, deviceAlias: "B3 creel" }),
    bind("condition monitor", { sourceId: "m4", port: 3 }),
    bind("controller", { sourceId: "plc", unitId: 13 }),
    bind("meter", { sourceId: "plc", unitId: 23 }),
  ]),
);
const document = getValue(makeMachineDocument(space, b3.key, sources));
const described = makeThingDescription(document);
type Affordance = { type?: string; unit?: string; minimum?: number; readOnly?: boolean; forms: Record<string, unknown>[]; [name: string]: unknown };
const thing = described.thing as { "@context": unknown[]; properties: Record<string, Affordance> };

describe("a Thing Description of a machine", () => {
  it("is valid by the W3C's schema", () => {
    const [first, ...rest] = thing["@context"];
    expect(first).toBe(TD_CONTEXT);
    const dated = { ...thing, "@context": ["https://www.w3.org/2019/wot/td/v1", ...rest] };
    expect(validate(dated) ? [] : validate.errors).toEqual([]);
    expect(validate({ ...dated, title: undefined, security: undefined })).toBe(false);
    const broken = structuredClone(dated) as { properties: Record<string, Affordance> };
    for (const property of Object.values(broken.properties)) property.type = "int32";
    expect(validate(broken)).toBe(false);
  });

  // Scenario: spindle speed is holding register 10 of unit 13, Float32, high word first, unit RPM, 0 … 180.
  it("says where a register is, zero-based, with type and orders, and which Variable it becomes", () => {
    const speed = thing.properties["Process_SpindleSpeed"];
    expect(speed).toMatchObject({ type: "number", unit: "RPM", minimum: 0, readOnly: true, "uav:mapToNodeId": document.nodes.find((n) => n.target === "Process/SpindleSpeed")?.nodeId });
    expect(speed?.forms).toEqual([
      {
        href: "modbus+tcp://192.0.2.20:502/13/10?quantity=2",
        op: ["readproperty", "observeproperty"],
        contentType: "application/octet-stream",
        "modv:entity": "HoldingRegister",
        "modv:type": "xsd:float",
        "modv:zeroBasedAddressing": true,
        "modv:mostSignificantByte": true,
        "modv:mostSignificantWord": true,
        "modv:pollingTime": 500,
      },
    ]);
  });

  it("tells scaled values raw, without unit and range", () => {
    const power = thing.properties["Energy_ActivePower_raw"];
    expect(power).toMatchObject({ type: "integer", "map:scale": 0.001 });
    expect(power?.unit).toBeUndefined();
    expect(power?.minimum).toBeUndefined();
  });

  it("describes process data by the master's answer and lists its fields", () => {
    const frame = thing.properties["creel_sensor_in"];
    expect(frame?.forms[0]).toMatchObject({ href: "http://192.0.2.10/iolink/v1/devices/B3%20creel/processdata/getdata/value?format=byteArray", op: "readproperty", "htv:methodName": "GET" });
    // Distance lies at bit 16, 16 bits (scenario); two Variables read it.
    expect(frame?.["map:fields"]).toMatchObject([{ name: "Process/CreelDistance", bitOffset: 16, bitLength: 16 }, { name: "Process/CreelFill" }]);
  });

  it("tells of each row what became of it", () => {
    expect(described.report.map((r) => r.target).sort()).toEqual(document.mapping.rows.map((r) => r.target).sort());
    expect(described.report.find((r) => r.target === "Process/CarriageDeviation")).toMatchObject({ state: "left-out" });
    expect(described.report.find((r) => r.target === "Process/CarriagePosition")).toMatchObject({ state: "left-out" });
  });

  it("is the same text each time, with names and hrefs that are unique and absolute", () => {
    expect(writeThingDescription(makeThingDescription(document))).toBe(writeThingDescription(described));
    for (const { forms } of Object.values(thing.properties)) for (const form of forms) expect(String(form["href"])).toMatch(/^(modbus\+tcp|http|opc\.tcp):\/\//);
    for (const name of Object.keys(thing.properties)) expect(name).toMatch(/^[A-Za-z0-9_]+$/);
  });
});

describe("the mapping as CSV", () => {
  it("has one line a row and no cell that a spreadsheet would run", () => {
    const lines = writeMappingCsv(document).trimEnd().split("\r\n");
    expect(lines).toHaveLength(document.mapping.rows.length + 1);
    expect(lines.find((l) => l.startsWith("Energy/Voltage"))).toContain("input register 4, UInt16");
    expect(lines.some((l) => /(^|,)[=+@]/.test(l))).toBe(false);
  });
});
