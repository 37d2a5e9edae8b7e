import { listUses } from "../../address-space/address-space";
import { keyOf, notPossible } from "../fixes";
import { ok } from "../../core/result";
import { getDataType } from "../../address-space/node";
import { standardKey, type NodeKey } from "../../address-space/node-id";
import { StandardDataType as D, StandardType as T } from "../../address-space/standard-ids";
import type { CheckContext } from "../check-context";
import { isNumeric, listFields } from "../data-types";
import { CELSIUS } from "../example-values";
import { findStandardProperty, findTypeDefinition, isChainLoaded, isKindOf } from "../lookups";
import { clause, type NodeRule } from "../rule";

const ArrayItemType = standardKey(12021);

const WITH_UNIT = [T.AnalogUnitType, T.AnalogUnitRangeType];

export const r123: NodeRule = {
  id: "R123",
  title: "EngineeringUnits only on numbers",
  severity: "error",
  clause: `${clause(3, "§5.6.2, Table 13")}, ${clause(8, "§5.3.4.1, Table 10, §5.3.4.3")}, ${clause(9, "§5.8.23")}`,
  priority: 1,
  concerns: ["Variable"],
  needs: ["children"],
  condition:
    "A Variable with EngineeringUnits has a numeric DataType, or a Structure of numbers only. BaseDataType and Structure, which may still become one, and Structures with other fields are a warning; array items are exempt.",
  why: "A unit on a text or a flag means nothing; conversions that trust it fail.",
  check(node, ctx, report) {
    if (node.nodeClass !== "Variable") return;
    const property = findStandardProperty(ctx, node.key, "EngineeringUnits");
    if (!property) return;
    const type = findTypeDefinition(ctx, node.key);
    if (type !== undefined && isKindOf(ctx, type, ArrayItemType)) return;
    const dataType = getDataType(node);
    const verdict = judge(ctx, dataType);
    if (verdict === "fits") return;
    const isDemanded = type !== undefined && WITH_UNIT.some((t) => isKindOf(ctx, type, t));
    report({
      ...(verdict === "warning" ? { severity: "warning" } : {}),
      attribute: "dataType",
      message: `${node.browseName.name} has EngineeringUnits, but its DataType ${ctx.nameOf(dataType)} is not a number.`,
      facts: [
        `DataType: ${ctx.describe(dataType)}`,
        `Property: ${ctx.describe(property.key)}`,
        "Units are for DataTypes below Number.",
      ],
      // A VariableType that demands a unit must be changed first, by hand.
      data: { property: isDemanded ? "" : property.key },
    });
  },
  fix: {
    label: "Remove the unit",
    apply(space, finding) {
      const key = keyOf(finding, "property");
      const property = key === undefined ? undefined : space.own.nodes.get(key);
      if (!property || listUses(space.own, property).length > 0) return notPossible(finding);
      return ok([{ kind: "removeNode", key: property.key }]);
    },
  },
  examples: {
    good: {
      text: "A unit on a Double.",
      build: (m) => {
        const parent = m.variable("Temperature", { parent: m.object("Tank1"), dataType: D.Double });
        m.property("0:EngineeringUnits", { parent, dataType: D.EUInformation, value: CELSIUS });
        return undefined;
      },
    },
    bad: {
      text: "A unit on a String.",
      build: (m) => {
        const parent = m.variable("Label", { parent: m.object("Tank1"), dataType: D.String });
        m.property("0:EngineeringUnits", { parent, dataType: D.EUInformation, value: CELSIUS });
        return parent;
      },
    },
  },
};

function judge(ctx: CheckContext, dataType: NodeKey): "fits" | "warning" | "error" {
  if (isNumeric(ctx, dataType) !== false) return "fits";
  if (dataType === D.BaseDataType || dataType === D.Structure) return "warning";
  if (!isKindOf(ctx, dataType, D.Structure)) return "error";
  const fields = listFields(ctx, dataType);
  const isKnown = fields.every((f) => isChainLoaded(ctx, getDataType(f)));
  return !isKnown || (fields.length > 0 && fields.every((f) => isNumeric(ctx, getDataType(f)) === true))
    ? "fits"
    : "warning";
}
