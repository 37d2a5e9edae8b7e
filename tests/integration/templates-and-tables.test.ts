import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import readWorkbook from "read-excel-file/node";
import { getValue } from "~/domain/core/result";
import { makeTypeDocument } from "~/domain/deliver/make-mapping-document";
import { makeTemplateData } from "~/domain/deliver/template-data";
import { renderTemplate, TEMPLATE_LIMITS } from "~/services/render-template.server";
import { writeSignalList } from "~/services/write-signal-list.server";
import { readTable } from "~/utils/read-table.server";
import { surveySignalSchema } from "~/domain/mapping/mapping-parts";
import { braiderType, makeMappedBraiderSpace } from "../support/demo-mapping";

const document = makeTypeDocument(makeMappedBraiderSpace(), braiderType);
const data = makeTemplateData(document);
const code = async (template: string) => {
  const made = await renderTemplate(template, data);
  return made.ok ? made.value : made.problems.map((p) => `${p.code} ${p.at?.line ?? ""}`.trim()).join();
};

describe("export templates", () => {
  test("loop over the rows of a mapping", async () => {
    const template = "{% for row in rows %}{% if row.source.kind == 'register' %}{{ row.target }};{{ row.source.address }};{{ row.node.unit.code }}\n{% endif %}{% endfor %}";
    const text = getValue(await renderTemplate(template, data));
    // Scenario: table of Modbus registers.
    expect(text.split("\n")).toContain("Process/SpindleSpeed;10;RPM");
    expect(text.split("\n").filter((line) => line !== "")).toHaveLength(document.mapping.rows.filter((r) => r.source.kind === "register").length);
  });

  test("run no code, read no file and reach no prototype", async () => {
    expect(await code("{{ rows.constructor }}{{ rows.__proto__ }}{{ model.toString }}")).toBe("");
    expect(await code("{% include '/etc/passwd' %}")).toMatch(/^template\.(render|syntax)/);
    expect(await code("{% render 'package.json' %}")).toMatch(/^template\.(render|syntax)/);
    expect(await code("{{ 'x' | run }}")).toMatch(/^template\.(render|syntax)/);
  });

  test("are refused with their place when they cannot be read, and end when they would not", async () => {
    expect(await code("line one\n{% for row in rows %}")).toMatch(/^template\.syntax/);
    expect(await code("{% for a in (1..100000) %}{% for b in (1..100000) %}{{ a }}{% endfor %}{% endfor %}")).toMatch(/^template\.render/);
    expect(await code("x".repeat(TEMPLATE_LIMITS.characters + 1))).toBe("template.too-long");
  });
});

describe("workbooks and lists", () => {
  test("the signal list is a workbook that reads back", async () => {
    const { signals } = JSON.parse(readFileSync("nodesets/demo/rope-braider.signals.json", "utf8")) as { signals: unknown[] };
    const survey = signals.map((s) => surveySignalSchema.parse(s));
    const bytes = await writeSignalList("RopeBraiderType", survey, document);
    const table = getValue(await readTable(bytes, "signals.xlsx"));
    expect(table.head.slice(0, 3)).toEqual(["Signal", "Group", "State"]);
    expect(table.rows).toHaveLength(survey.length);
    expect((await readWorkbook(Buffer.from(bytes))).map((s) => s.sheet)).toEqual(["Signals", "Mapping"]);
  });

  test("a damaged workbook, an open quote and too many lines are problems", async () => {
    const codes = async (bytes: Uint8Array, name: string) => (await readTable(bytes, name)).problems.map((p) => `${p.code} ${p.at?.line ?? ""}`.trim());
    const text = (value: string) => new TextEncoder().encode(value);
    expect(await codes(Uint8Array.of(0x50, 0x4b, 3, 4, 0, 0), "a.xlsx")).toEqual(["tags.damaged"]);
    expect(await codes(text('Name,Address\n"open,1\n'), "a.csv")).toEqual(["tags.open-quote 2"]);
    expect(await codes(text("Name\n"), "a.csv")).toEqual(["tags.empty"]);
    expect(await codes(text(`Name\n${"x\n".repeat(200_001)}`), "a.csv")).toEqual(["tags.too-many 200002"]);
  });
});
