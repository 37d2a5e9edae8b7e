import { attributeFix, keyOf } from "../fixes";
import { getDataType, hasValueAttributes } from "../../address-space/node";
import { StandardDataType as D, StandardType as T } from "../../address-space/standard-ids";
import { isChainLoaded, isKindOf } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { listValueBases } from "../value-bases";

export const r097: NodeRule = {
  id: "R097",
  title: "DataType fits the VariableType and the declaration",
  severity: "error",
  clause: clause(3, "§6.2.8"),
  priority: 1,
  concerns: ["Variable", "VariableType"],
  condition:
    "The DataType equals, or is a subtype of, that of the VariableType, the supertype, the overridden declaration and the declaration in the type. BaseDataType on the wider side accepts all.",
  why: "Clients that know the type expect numbers, for example, and cannot take what they get.",
  check(node, ctx, report) {
    if (!hasValueAttributes(node)) return;
    const dataType = getDataType(node);
    for (const { base, role } of listValueBases(node, ctx)) {
      const wider = getDataType(base);
      if (
        wider === D.BaseDataType ||
        ctx.classOf(wider) === undefined ||
        isKindOf(ctx, dataType, wider) ||
        !isChainLoaded(ctx, dataType)
      )
        continue;
      report({
        attribute: "dataType",
        message: `The DataType ${ctx.nameOf(dataType)} of ${node.browseName.name} does not fit ${ctx.nameOf(wider)} of ${role} ${base.browseName.name}.`,
        facts: [
          `Here: ${ctx.describe(dataType)}${node.dataType === undefined ? " (the attribute is left out)" : ""}`,
          `${ctx.describe(base.key)}: ${ctx.describe(wider)}`,
          `${ctx.nameOf(dataType)} is not below ${ctx.nameOf(wider)}.`,
        ],
        data: { dataType: wider },
      });
    }
  },
  fix: attributeFix("Take the DataType of the base", "dataType", (node, finding) =>
    hasValueAttributes(node) && node.value === undefined ? keyOf(finding, "dataType") : undefined,
  ),
  examples: {
    good: {
      text: "Double below the type's Number.",
      build: (m) => m.variable("Speed", { parent: m.object("Pump1"), type: T.BaseAnalogType, dataType: D.Double }),
    },
    bad: {
      text: "String where the VariableType has Number.",
      build: (m) => m.variable("Speed", { parent: m.object("Pump1"), type: T.BaseAnalogType, dataType: D.String }),
    },
  },
};
