import { StandardDataType as D } from "../../address-space/standard-ids";
import { addEnumeration, isEnumeration } from "../enumerations";
import { enumerationPropertyFix } from "../enumeration-fixes";
import { findStandardProperty } from "../lookups";
import { clause, type NodeRule } from "../rule";

export const r139: NodeRule = {
  id: "R139",
  title: "An enumeration has EnumStrings or EnumValues",
  severity: "error",
  clause: clause(3, "§5.8.3, Table 16"),
  priority: 1,
  concerns: ["DataType"],
  condition:
    "A DataType below Enumeration has exactly one of the Properties EnumStrings and EnumValues; no other DataType has either.",
  why: "Clients without the Definition find the texts of the values here; of two lists they take one.",
  check(node, ctx, report) {
    const found = ["EnumStrings", "EnumValues"].filter(
      (name) => findStandardProperty(ctx, node.key, name) !== undefined,
    );
    const facts = [`Found: ${found.join(", ") || "none"}`];
    if (!isEnumeration(ctx, node.key)) {
      if (found.length > 0)
        report({ message: `${node.browseName.name} is no enumeration and has ${found.join(" and ")}.`, facts });
      return;
    }
    if (found.length === 0 && ctx.subtypeEdges(node.key).length > 0 && node.nodeClass === "DataType" && node.isAbstract)
      return;
    if (found.length === 1) return;
    report({
      message: `The enumeration ${node.browseName.name} has ${found.length === 0 ? "neither EnumStrings nor EnumValues" : "both EnumStrings and EnumValues"}.`,
      facts,
    });
  },
  fix: enumerationPropertyFix,
  examples: {
    good: {
      text: "EnumStrings.",
      build: (m) =>
        addEnumeration(m, "PumpStateEnum", [
          { name: "Off", value: 0 },
          { name: "On", value: 1 },
        ]),
    },
    bad: {
      text: "Neither.",
      build: (m) =>
        m.dataType("PumpStateEnum", {
          supertype: D.Enumeration,
          definition: {
            fields: [
              { name: "Off", value: 0 },
              { name: "On", value: 1 },
            ],
          },
        }),
    },
  },
};
