import { addProperty } from "../add-property";
import { findSubject, notPossible } from "../fixes";
import { getDataType } from "../../address-space/node";
import { StandardDataType as D, StandardType as T } from "../../address-space/standard-ids";
import { range } from "../example-values";
import { findStandardProperty, findTypeAbove, findTypeDefinition, isKindOf } from "../lookups";
import { clause, type NodeRule } from "../rule";

export const r119: NodeRule = {
  id: "R119",
  title: "AnalogItemType has an EURange",
  severity: "error",
  clause: `${clause(8, "§5.3.2.3, Table 3")}, ${clause(3, "§6.4.4.4.1")}, ${clause(6, "§F.3")}`,
  priority: 1,
  concerns: ["Variable"],
  types: [T.AnalogItemType],
  condition:
    "A Variable of AnalogItemType or a subtype that is a real instance has the Property 0:EURange of DataType Range. A declaration may leave it to its type: there it is a hint.",
  why: "Displays, trends and deadbands in percent need the range; servers refuse percent deadbands without it.",
  check(node, ctx, report) {
    const type = findTypeDefinition(ctx, node.key);
    if (type === undefined || !isKindOf(ctx, type, T.AnalogItemType)) return;
    const property = findStandardProperty(ctx, node.key, "EURange");
    const isDeclared = findTypeAbove(ctx, node.key) !== undefined;
    if (!property) {
      report({
        ...(isDeclared ? { severity: "hint" } : {}),
        message: `${node.browseName.name} is of ${ctx.nameOf(type)} and has no EURange.`,
        facts: [`HasTypeDefinition: ${ctx.describe(type)}`, "Properties named EURange in namespace 0: 0"],
        data: { property: "EURange" },
      });
    } else if (property.nodeClass === "Variable" && !isKindOf(ctx, getDataType(property), D.Range)) {
      report({
        key: ctx.isOwn(property.key) ? property.key : node.key,
        attribute: "dataType",
        message: `The EURange of ${node.browseName.name} has the DataType ${ctx.nameOf(getDataType(property))} instead of Range.`,
        facts: [`DataType: ${ctx.describe(getDataType(property))}`, "Asked for: Range (i=884)"],
      });
    }
  },
  fix: {
    label: "Add an EURange with limits to be filled in",
    apply(space, finding, ids) {
      const node = findSubject(space, finding);
      if (!node || finding.data?.["property"] !== "EURange") return notPossible(finding);
      return addProperty(space, node.key, ids, { name: "EURange", dataType: D.Range, value: range("NaN", "NaN") });
    },
  },
  examples: {
    good: {
      text: "EURange 0 … 100.",
      build: (m) => {
        const parent = m.variable("Level", { parent: m.object("Tank1"), type: T.AnalogItemType });
        m.property("0:EURange", { parent, dataType: D.Range, value: range(0, 100) });
        return undefined;
      },
    },
    bad: {
      text: "No EURange.",
      build: (m) => m.variable("Level", { parent: m.object("Tank1"), type: T.AnalogItemType }),
    },
  },
};
