import { describe, expect, it } from "vitest";
import { listColumns, listLanguages } from "~/components/register/columns";
import { buildRows, type RegisterView } from "~/components/register/register-rows";
import { parseFilter } from "~/components/register/row-filter";
import { makeRowOrder, type SortRule } from "~/components/register/row-order";
import { StandardDataType } from "~/domain/address-space/standard-ids";
import { buildModel } from "../../../support/model-builder";
import { getStandardLayer } from "../../../support/published-layers";

const { space, made } = buildModel(
  (m) => {
    const type = m.objectType("PressType");
    const stroke = m.variable("Stroke10", { parent: type, rule: "Mandatory", dataType: StandardDataType.Double });
    m.variable("Stroke9", { parent: type, rule: "Optional", dataType: StandardDataType.Double });
    m.variable("Oil", { parent: type, rule: "Mandatory", dataType: StandardDataType.Float });
    m.set(stroke, { description: [{ locale: "en", text: "way of the ram" }, { locale: "de", text: "Weg des Stößels" }] });
    return type;
  },
  [getStandardLayer()],
);

function namesOf(view: Partial<RegisterView>): string[] {
  const rows = buildRows(space, { toggled: new Set(), showInherited: false, ...view });
  return rows.filter((row) => row.level === 2).map((row) => space.requireNode(row.key).browseName.name);
}

const orderBy = (rule: SortRule) => ({ order: makeRowOrder(() => space, rule, () => 0) });

describe("sorting the register", () => {
  it("puts siblings in order, figures in names by their size", () => {
    expect(namesOf({})).toEqual(["Stroke10", "Stroke9", "Oil"]);
    expect(namesOf(orderBy({ column: "name", isDescending: false }))).toEqual(["Oil", "Stroke9", "Stroke10"]);
    expect(namesOf(orderBy({ column: "name", isDescending: true }))).toEqual(["Stroke10", "Stroke9", "Oil"]);
  });

  it("leaves rows whose cell is empty at the end, either way", () => {
    for (const isDescending of [true, false])
      expect(namesOf(orderBy({ column: "description:de", isDescending }))[0]).toBe("Stroke10");
  });

  it("leaves the owner above its members", () => {
    const rows = buildRows(space, { toggled: new Set(), showInherited: false, ...orderBy({ column: "dataType", isDescending: true }) });
    expect(rows[0]?.key).toBe(made);
  });
});

describe("filtering the register", () => {
  const columns = listColumns(listLanguages(space));
  const answer = (text: string): string[] => {
    const question = parseFilter(text, columns);
    return namesOf(question ? { matches: (key) => question(space, space.requireNode(key)) } : {});
  };

  it("has a column for each language in which something is described", () => {
    expect(columns.map((column) => column.title)).toEqual(expect.arrayContaining(["Description en", "Description de"]));
  });

  it("looks anywhere in a row, or in one column, or for what is empty there", () => {
    expect(answer("stößel")).toEqual(["Stroke10"]);
    expect(answer("datatype: float")).toEqual(["Oil"]);
    expect(answer("description de:")).toEqual(["Stroke9", "Oil"]);
    expect(answer("float: 1")).toEqual([]);
  });
});
