import { zipSync, strToU8 } from "fflate";
import { describe, expect, it } from "vitest";
import { AddressSpace, buildLayer } from "~/domain/address-space/address-space";
import { getValue } from "~/domain/core/result";
import { BlockAllocator } from "~/domain/editing/allocate-node-id";
import { applyOperations } from "~/domain/editing/apply-operation";
import { createModel } from "~/domain/editing/commands/create-model";
import { addSignals } from "~/domain/editing/starters/add-signals";
import { listSignals, signalHeads } from "~/domain/editing/starters/list-signals";
import { guessColumns, readSignalList } from "~/domain/editing/starters/read-signal-list";
import { readXlsx } from "~/utils/read-xlsx";
import { writeXlsx } from "~/utils/write-xlsx";
import { getStandardLayer } from "../../support/published-layers";

async function toBytes(blob: Blob): Promise<Uint8Array> {
  return new Uint8Array(await blob.arrayBuffer());
}

/** A workbook by hand, after ECMA-376 Part 1 §12.3 and §18.3, with inline strings. */
function makeWorkbook(sheets: Readonly<Record<string, string>>): Uint8Array {
  const names = Object.keys(sheets);
  const main = "http://schemas.openxmlformats.org/spreadsheetml/2006/main";
  const relations = "http://schemas.openxmlformats.org/officeDocument/2006/relationships";
  const files: Record<string, string> = {
    "[Content_Types].xml": `<Types xmlns="http://schemas.openxmlformats.org/package/2006/content-types"><Default Extension="xml" ContentType="application/xml"/><Default Extension="rels" ContentType="application/vnd.openxmlformats-package.relationships+xml"/><Override PartName="/xl/workbook.xml" ContentType="application/vnd.openxmlformats-officedocument.spreadsheetml.sheet.main+xml"/></Types>`,
    "_rels/.rels": `<Relationships xmlns="http://schemas.openxmlformats.org/package/2006/relationships"><Relationship Id="r1" Type="${relations}/officeDocument" Target="xl/workbook.xml"/></Relationships>`,
    "xl/workbook.xml": `<workbook xmlns="${main}" xmlns:r="${relations}"><sheets>${names.map((name, i) => `<sheet name="${name}" sheetId="${i + 1}" r:id="s${i}"/>`).join("")}</sheets></workbook>`,
    "xl/_rels/workbook.xml.rels": `<Relationships xmlns="http://schemas.openxmlformats.org/package/2006/relationships">${names.map((_, i) => `<Relationship Id="s${i}" Type="${relations}/worksheet" Target="worksheets/sheet${i + 1}.xml"/>`).join("")}</Relationships>`,
  };
  names.forEach((name, i) => (files[`xl/worksheets/sheet${i + 1}.xml`] = `<worksheet xmlns="${main}"><sheetData>${sheets[name]}</sheetData></worksheet>`));
  return zipSync(Object.fromEntries(Object.entries(files).map(([path, xml]) => [path, strToU8(xml)])));
}

const text = (ref: string, value: string) => `<c r="${ref}" t="inlineStr"><is><t>${value}</t></is></c>`;

describe("readXlsx", () => {
  it("reads every sheet that holds something, cells as texts, rows with their numbers", async () => {
    const bytes = makeWorkbook({
      Signals: `<row r="1">${text("A1", "name")}${text("B1", "high")}</row><row r="3">${text("A3", " oil level ")}<c r="B3"><v>12.5</v></c></row>`,
      Empty: "",
      Notes: `<row r="1">${text("A1", "made by hand")}</row>`,
    });
    const sheets = getValue(await readXlsx(bytes));
    expect(sheets.map((sheet) => sheet.name)).toEqual(["Signals", "Notes"]);
    expect(sheets[0]?.table.rows).toEqual([
      { line: 1, fields: ["name", "high"] },
      { line: 3, fields: ["oil level", "12.5"] },
    ]);
  });

  it.each([
    ["no workbook", strToU8("name,unit\noil,%"), "workbook.unreadable"],
    ["another archive", zipSync({ "a.txt": strToU8("a") }), "workbook.unreadable"],
    ["the old format", new Uint8Array([0xd0, 0xcf, 0x11, 0xe0, 0xa1, 0xb1, 0x1a, 0xe1]), "workbook.old-format"],
    ["too large a file", new Uint8Array(5_000_001), "workbook.too-large"],
    ["a small file that unpacks to much", zipSync({ "xl/workbook.xml": new Uint8Array(61_000_000) }), "workbook.too-large"],
    ["no rows", makeWorkbook({ Empty: "" }), "signal-list.empty"],
  ])("refuses %s", async (_name, bytes, code) => {
    const read = await readXlsx(bytes);
    expect(read.problems.map((found) => found.code)).toEqual([code]);
    expect(read.ok).toBe(false);
  });

  it("refuses more rows than a list may have", async () => {
    const rows = Array.from({ length: 5_002 }, (_, i) => [`signal ${i}`]);
    const read = await readXlsx(await toBytes(await writeXlsx("Long", ["name"], rows)));
    expect(!read.ok && read.problems.map((found) => found.code)).toEqual(["signal-list.too-long"]);
  });
});

describe("the signal list of a model", () => {
  const uri = "http://merrow.example/UA/Winch/";
  const layers = [getStandardLayer()];
  const ids = () => new BlockAllocator(uri, [{ from: 1001, to: 4000 }]);

  function blank(): AddressSpace {
    const requiredModels = [{ modelUri: "http://opcfoundation.org/UA/", requiredModels: [] }];
    const content = getValue(createModel(layers, new BlockAllocator(uri, [{ from: 1, to: 100 }]), { namespaceUri: uri, version: "1.0.0", publicationDate: "2026-01-01T00:00:00Z", requiredModels }));
    return AddressSpace.of(layers, buildLayer(content.header, content.nodes));
  }

  it("comes back from a workbook as the same members in the same groups", async () => {
    const rows = [
      { line: 1, fields: ["group", "name", "data type", "unit", "low", "high", "rule", "access", "description"] },
      { line: 2, fields: ["Drive", "Speed", "REAL", "r/min", "-20", "180.5", "M", "R", "Speed of the drum"] },
      { line: 3, fields: ["Drive/Gearbox", "Oil", "REAL", "%", "", "", "O", "RW", ""] },
      { line: 4, fields: ["", "Recipe", "UINT", "", "", "", "M", "R", "Recipe & more"] },
    ];
    const make = (list: { rows: readonly { line: number; fields: readonly string[] }[] }) => {
      const { signals, problems } = readSignalList(list, guessColumns(list.rows[0]?.fields ?? []));
      expect(problems).toEqual([]);
      const space = blank();
      return getValue(applyOperations(space, getValue(addSignals(space, ids(), { type: { name: "WinchType" }, signals })).operations));
    };
    const first = listSignals(make({ rows }));
    expect(first).toEqual([
      ["WinchType", "Drive", "Speed", "Float", "r/min", -20, 180.5, "Mandatory", "R", "Speed of the drum", expect.any(String)],
      ["WinchType", "Drive/Gearbox", "Oil", "Float", "%", null, null, "Optional", "RW", "", expect.any(String)],
      ["WinchType", "", "Recipe", "UInt16", "", null, null, "Mandatory", "R", "Recipe & more", expect.any(String)],
    ]);
    const [sheet] = getValue(await readXlsx(await toBytes(await writeXlsx("Winch [1]", signalHeads, first))));
    expect(sheet?.name).toBe("Winch  1");
    expect(listSignals(make(sheet?.table ?? { rows: [] }))).toEqual(first);
  });
});
