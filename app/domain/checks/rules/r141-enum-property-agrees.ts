import {
  addEnumeration,
  fieldText,
  findVariable,
  isEnumeration,
  listEnumValues,
  listTexts,
  valueOf,
} from "../enumerations";
import { enumerationPropertyFix } from "../enumeration-fixes";
import { clause, type NodeRule } from "../rule";

export const r141: NodeRule = {
  id: "R141",
  title: "EnumStrings and EnumValues agree with the Definition",
  severity: "error",
  clause: `${clause(3, "§5.8.3, Table 16, §8.50, §8.52")} (inferred)`,
  priority: 1,
  concerns: ["DataType"],
  condition: "The Property has the same values as the fields of the Definition; another text is a hint.",
  why: "Old clients read the Property, newer ones the Definition: the two then show different states.",
  check(node, ctx, report) {
    const fields = node.nodeClass === "DataType" ? (node.definition?.fields ?? []) : [];
    if (fields.length === 0 || !isEnumeration(ctx, node.key)) return;
    const pairs = findPairs(node.key, ctx);
    if (!pairs) return;
    const name = node.browseName.name;
    const here = fields.map((f) => String(valueOf(f))).sort();
    const there = pairs.map((p) => p.value).sort();
    const facts = [`Definition: ${here.join(", ")}`, `Property: ${there.join(", ")}`];
    if (here.join() !== there.join()) {
      report({
        attribute: "definition",
        message: `The Property of ${name} has ${there.length} values, its Definition ${here.length}${here.length === there.length ? " others" : ""}.`,
        facts,
      });
      return;
    }
    const other = fields.find((f) => pairs.find((p) => p.value === String(valueOf(f)))?.text !== fieldText(f));
    if (!other) return;
    const text = pairs.find((p) => p.value === String(valueOf(other)))?.text ?? "";
    report({
      severity: "hint",
      attribute: "definition",
      message: `The value ${valueOf(other)} of ${name} is “${text}” in the Property and “${fieldText(other)}” in the Definition.`,
      facts: [`Property: “${text}”`, `Definition: “${fieldText(other)}”`],
    });
  },
  fix: enumerationPropertyFix,
  examples: {
    good: {
      text: "The same two values.",
      build: (m) =>
        addEnumeration(m, "PumpStateEnum", [
          { name: "Off", value: 0 },
          { name: "On", value: 1 },
        ]),
    },
    bad: {
      text: "Three texts for two fields.",
      build: (m) =>
        addEnumeration(
          m,
          "PumpStateEnum",
          [
            { name: "Off", value: 0 },
            { name: "On", value: 1 },
          ],
          ["Off", "On", "Fault"],
        ),
    },
  },
};

function findPairs(
  key: Parameters<typeof findVariable>[1],
  ctx: Parameters<typeof findVariable>[0],
): { value: string; text: string }[] | undefined {
  const strings = findVariable(ctx, key, "EnumStrings");
  if (strings) return listTexts(strings)?.map((text, i) => ({ value: String(i), text }));
  const values = findVariable(ctx, key, "EnumValues");
  return values?.value ? listEnumValues(values) : undefined;
}
