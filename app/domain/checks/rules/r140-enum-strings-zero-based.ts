import { addEnumeration, isEnumeration, valueOf } from "../enumerations";
import { enumerationPropertyFix } from "../enumeration-fixes";
import { findStandardProperty } from "../lookups";
import { clause, type NodeRule } from "../rule";

export const r140: NodeRule = {
  id: "R140",
  title: "EnumStrings for values 0 … n−1 only",
  severity: "error",
  clause: clause(3, "§5.8.2, §5.8.3, Table 16"),
  priority: 1,
  concerns: ["DataType"],
  condition:
    "An enumeration with EnumStrings has the values 0, 1, 2 … without gaps; else EnumValues is used. The order of the fields does not matter.",
  why: "The place in the list is the value: with a gap every text behind it stands for a wrong value.",
  check(node, ctx, report) {
    const fields = node.nodeClass === "DataType" ? (node.definition?.fields ?? []) : [];
    if (fields.length === 0 || !isEnumeration(ctx, node.key) || !findStandardProperty(ctx, node.key, "EnumStrings"))
      return;
    const values = fields.map(valueOf).sort((a, b) => a - b);
    if (values.every((value, i) => value === i)) return;
    report({
      attribute: "definition",
      message: `${node.browseName.name} has EnumStrings, but its values are ${values.join(", ").replace(/-/g, "−")}.`,
      facts: [`Values in order: ${values.join(", ").replace(/-/g, "−")}`, "EnumStrings stand for 0, 1, 2 …"],
    });
  },
  fix: enumerationPropertyFix,
  examples: {
    good: {
      text: "0 and 1.",
      build: (m) =>
        addEnumeration(m, "PumpStateEnum", [
          { name: "Off", value: 0 },
          { name: "On", value: 1 },
        ]),
    },
    bad: {
      text: "1, 2 and 4.",
      build: (m) =>
        addEnumeration(m, "PumpStateEnum", [
          { name: "Off", value: 1 },
          { name: "On", value: 2 },
          { name: "Fault", value: 4 },
        ]),
    },
  },
};
