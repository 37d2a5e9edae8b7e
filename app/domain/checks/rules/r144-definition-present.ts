import { StandardDataType as D } from "../../address-space/standard-ids";
import { addEnumeration, isBitMask, isEnumeration, isOptionSet } from "../enumerations";
import { findStandardProperty, listSupertypes } from "../lookups";
import { clause, type NodeRule } from "../rule";

export const r144: NodeRule = {
  id: "R144",
  title: "A DataType has its Definition",
  severity: "error",
  clause: `${clause(3, "§5.8.3, Table 16")}, ${clause(6, "§F.11, §F.12")}`,
  priority: 1,
  concerns: ["DataType"],
  condition:
    "Enumerations, Unions, option sets and bit masks carry a Definition. A Structure without one is a warning: it may have no fields.",
  why: "Clients learn from it how to read values; without it they show bytes.",
  check(node, ctx, report) {
    if (node.nodeClass !== "DataType" || node.definition || node.isAbstract) return;
    const above = listSupertypes(ctx, node.key);
    const isNeeded = isEnumeration(ctx, node.key) || isOptionSet(node, ctx) || isBitMask(node, ctx);
    if (!isNeeded && !above.includes(D.Structure)) return;
    const hasMask = findStandardProperty(ctx, node.key, "OptionSetValues") !== undefined;
    report({
      ...(isNeeded ? {} : { severity: "warning" }),
      attribute: "definition",
      message: `The DataType ${node.browseName.name} has no Definition.`,
      facts: [
        `Supertypes: ${above.map((t) => ctx.nameOf(t)).join(", ")}`,
        ...(hasMask ? ["It has OptionSetValues."] : []),
      ],
    });
  },
  examples: {
    good: {
      text: "An enumeration with its fields.",
      build: (m) => addEnumeration(m, "PumpStateEnum", [{ name: "Off", value: 0 }]),
    },
    bad: { text: "An enumeration without.", build: (m) => m.dataType("PumpStateEnum", { supertype: D.Enumeration }) },
  },
};
