import { describe, expect, it } from "vitest";
import { getValue } from "~/domain/core/result";
import { guessColumns, readTags, TAG_LIMITS, type TagReading, type TagTable } from "~/domain/mapping/read-tags";

const head = ["Tag name", "Address", "Type", "Factor", "Unit", "Comment"];
const reading: TagReading = {
  columns: { name: "Tag name", address: "Address", type: "Type", scale: "Factor", unit: "Unit", comment: "Comment" },
  addressing: "prefixed",
  table: "holding-register",
  order: "ABCD",
};
const table = (...rows: string[][]): TagTable => ({ head, rows: rows.map((fields, i) => ({ line: i + 2, fields })) });

describe("tag lists", () => {
  it("guess what columns mean by their names", () => {
    expect(guessColumns(head)).toEqual(reading.columns);
  });

  // MODBUS Application Protocol V1.1b3, addressing model: elements 1 … n travel as 0 … n − 1; 40001 is the custom of documentation.
  it("make wire addresses of documented ones", () => {
    const tags = getValue(readTags(table(["Speed", "40011", "REAL", "", "r/min", ""], ["Level", "30001", "INT", "0,1", "mm", "raw × 0.1"], ["Ready", "10008", "", "", "", ""], ["Bit", "40002.3", "WORD", "", "", ""]), reading));
    expect(tags.map((t) => t.reference)).toEqual([
      { kind: "register", table: "holding-register", address: 10, type: "Float32", order: "ABCD" },
      { kind: "register", table: "input-register", address: 0, type: "Int16", order: "ABCD" },
      { kind: "register", table: "discrete-input", address: 7 },
      { kind: "register", table: "holding-register", address: 1, bit: 3 },
    ]);
    expect(tags[1]).toMatchObject({ scale: 0.1, unit: "MMT", comment: "raw × 0.1", line: 3 });
    expect(getValue(readTags(table(["A", "0x10", "", "", "", ""]), { ...reading, addressing: "one-based" }))[0]?.reference).toMatchObject({ address: 16 });
    expect(getValue(readTags(table(["A", "16", "", "", "", ""]), { ...reading, addressing: "one-based" }))[0]?.reference).toMatchObject({ address: 15 });
  });

  it("know names, JSON paths and nodes", () => {
    const other = { head: ["Name", "Path", "Node"], rows: [{ line: 2, fields: ["A", "", ""] }, { line: 3, fields: ["B", "line.motors[2].speed", ""] }, { line: 4, fields: ["C", "", "nsu=http://x/;s=C"] }] };
    const tags = getValue(readTags(other, { ...reading, columns: { name: "Name", path: "Path", nodeId: "Node" } }));
    expect(tags.map((t) => t.reference)).toEqual([
      { kind: "tag", name: "A" },
      { kind: "json-path", path: ["line", "motors", 2, "speed"] },
      { kind: "opc-ua-node", nodeId: "nsu=http://x/;s=C" },
    ]);
  });

  it("name the line that cannot be read and keep the others", () => {
    const read = readTags(table(["Good", "40001", "INT", "", "", ""], ["Bad", "forty", "INT", "", "", ""], ["Odd", "40001", "TON", "", "", ""]), reading);
    expect(getValue(read).map((t) => t.name)).toEqual(["Good"]);
    expect(read.problems.map((p) => [p.code, p.at?.line])).toEqual([["tags.line", 3], ["tags.line", 4]]);
  });

  it("take 200 000 lines, name the limit beyond, and ask for the column of names", () => {
    const rows = Array.from({ length: TAG_LIMITS.rows }, (_, i) => ({ line: i + 2, fields: [`T${i}`, String(i % 60_000), "INT", "", "", ""] }));
    const wire = { ...reading, addressing: "wire" as const };
    expect(getValue(readTags({ head, rows }, wire))).toHaveLength(200_000);
    const more = readTags({ head, rows: [...rows, { line: 200_002, fields: ["more"] }] }, wire);
    expect(more.ok ? [] : more.problems).toMatchObject([{ code: "tags.too-many", data: { limit: 200_000 }, at: { line: 200_002 } }]);
    expect(readTags(table(["A"]), { ...reading, columns: {} }).problems.map((p) => p.code)).toEqual(["tags.no-name-column"]);
  });
});
