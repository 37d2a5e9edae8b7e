import { getDataType } from "../../address-space/node";
import { StandardDataType as D, StandardType as T } from "../../address-space/standard-ids";
import { isNumeric } from "../data-types";
import { findStandardProperty, findTypeDefinition, isKindOf } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { StandardNode as N } from "../standard-nodes";

const WITHOUT_UNIT = [N.Duration, N.Counter, N.Index, N.IntegerId];

export const r122: NodeRule = {
  id: "R122",
  title: "Process value without unit",
  severity: "hint",
  clause: `${clause(8, "§5.3.2.2")} for analog items; others: common practice, no source`,
  priority: 1,
  concerns: ["Variable"],
  needs: ["no property", "no type above"],
  condition:
    "A floating-point DataVariable of an instance, and every analog item, has EngineeringUnits. Durations, counters and indexes need none.",
  why: "A number without its unit is read wrongly sooner or later.",
  check(node, ctx, report) {
    if (node.nodeClass !== "Variable") return;
    const dataType = getDataType(node);
    const type = findTypeDefinition(ctx, node.key);
    const isAnalog = type !== undefined && isKindOf(ctx, type, T.BaseAnalogType);
    // R120 asks the types that demand a unit.
    if (type !== undefined && (isKindOf(ctx, type, T.AnalogUnitType) || isKindOf(ctx, type, T.AnalogUnitRangeType)))
      return;
    const isPlain =
      type === T.BaseDataVariableType && (isKindOf(ctx, dataType, D.Float) || isKindOf(ctx, dataType, D.Double));
    if (
      !(isAnalog ? isNumeric(ctx, dataType) === true : isPlain) ||
      WITHOUT_UNIT.some((t) => isKindOf(ctx, dataType, t))
    )
      return;
    if (findStandardProperty(ctx, node.key, "EngineeringUnits") || ctx.parentEdges(node.key).length === 0) return;
    report({
      message: `${node.browseName.name} is a number without a unit.`,
      facts: [`DataType: ${ctx.describe(dataType)}`, "Properties named EngineeringUnits in namespace 0: 0"],
    });
  },
  examples: {
    good: {
      text: "A duration says its unit by its DataType.",
      build: (m) => m.variable("Delay", { parent: m.object("Pump1"), dataType: N.Duration }),
    },
    bad: { text: "A Float.", build: (m) => m.variable("Speed", { parent: m.object("Pump1"), dataType: D.Float }) },
  },
};
