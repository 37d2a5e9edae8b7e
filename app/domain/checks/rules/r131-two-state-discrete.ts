import { getDataType } from "../../address-space/node";
import { StandardDataType as D, StandardType as T } from "../../address-space/standard-ids";
import { checkProperties, findItemType } from "../discrete-items";
import { localizedText } from "../example-values";
import { isChainLoaded, isKindOf } from "../lookups";
import { clause, type NodeRule } from "../rule";

export const r131: NodeRule = {
  id: "R131",
  title: "TwoStateDiscreteType complete",
  severity: "error",
  clause: clause(8, "§5.3.3.2, Table 7"),
  priority: 1,
  concerns: ["Variable"],
  types: [T.TwoStateDiscreteType],
  condition: "The DataType is Boolean; on instances TrueState and FalseState of DataType LocalizedText exist.",
  why: "Displays show these texts instead of true and false; without them nobody knows which of the two is the dangerous one.",
  check(node, ctx, report) {
    const type = findItemType(node, ctx, T.TwoStateDiscreteType);
    if (type === undefined || node.nodeClass !== "Variable") return;
    const dataType = getDataType(node);
    if (isChainLoaded(ctx, dataType) && !isKindOf(ctx, dataType, D.Boolean)) {
      report({
        attribute: "dataType",
        message: `${node.browseName.name} is of ${ctx.nameOf(type)} and has the DataType ${ctx.nameOf(dataType)}.`,
        facts: [`DataType: ${ctx.describe(dataType)}`, "Asked for: Boolean"],
      });
    }
    checkProperties(
      node,
      type,
      [
        { name: "TrueState", dataType: D.LocalizedText },
        { name: "FalseState", dataType: D.LocalizedText },
      ],
      ctx,
      report,
    );
  },
  examples: {
    good: {
      text: "Run and Stop.",
      build: (m) => {
        const parent = m.variable("Running", {
          parent: m.object("Pump1"),
          type: T.TwoStateDiscreteType,
          dataType: D.Boolean,
        });
        m.property("0:TrueState", { parent, dataType: D.LocalizedText, value: localizedText("Run") });
        m.property("0:FalseState", { parent, dataType: D.LocalizedText, value: localizedText("Stop") });
        return undefined;
      },
    },
    bad: {
      text: "No FalseState.",
      build: (m) => {
        const parent = m.variable("Running", {
          parent: m.object("Pump1"),
          type: T.TwoStateDiscreteType,
          dataType: D.Boolean,
        });
        m.property("0:TrueState", { parent, dataType: D.LocalizedText, value: localizedText("Run") });
        return parent;
      },
    },
  },
};
