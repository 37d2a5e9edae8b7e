import { getDataType, getValueRank } from "../../address-space/node";
import { StandardDataType as D, StandardType as T } from "../../address-space/standard-ids";
import { checkProperties, findItemType } from "../discrete-items";
import { localizedTexts } from "../example-values";
import { findStandardProperty, isChainLoaded, isKindOf } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { findValueRoot } from "../value-xml";

export const r132: NodeRule = {
  id: "R132",
  title: "MultiStateDiscreteType complete",
  severity: "error",
  clause: clause(8, "§5.3.3.3, Table 8"),
  priority: 1,
  concerns: ["Variable"],
  types: [T.MultiStateDiscreteType],
  condition:
    "The DataType is UInteger or below; on instances EnumStrings, an array of LocalizedText, exists. A value beyond the texts is a hint.",
  why: "The value is the place of its text in the list: without the list only a number is shown.",
  check(node, ctx, report) {
    const type = findItemType(node, ctx, T.MultiStateDiscreteType);
    if (type === undefined || node.nodeClass !== "Variable") return;
    const dataType = getDataType(node);
    const name = node.browseName.name;
    if (isChainLoaded(ctx, dataType) && !isKindOf(ctx, dataType, D.UInteger)) {
      report({
        attribute: "dataType",
        message: `${name} is of ${ctx.nameOf(type)} and has the DataType ${ctx.nameOf(dataType)}.`,
        facts: [`DataType: ${ctx.describe(dataType)}`, "Asked for: UInteger or below"],
      });
    }
    checkProperties(node, type, [{ name: "EnumStrings", dataType: D.LocalizedText }], ctx, report);
    const strings = findStandardProperty(ctx, node.key, "EnumStrings");
    if (strings?.nodeClass !== "Variable") return;
    if (getValueRank(strings) !== 1)
      report({
        message: `EnumStrings of ${name} is no array.`,
        facts: [`ValueRank: ${String(getValueRank(strings)).replace("-", "−")}`, "Asked for: 1"],
      });
    const texts = findValueRoot(strings.value)?.children.length ?? 0;
    const value = findValueRoot(node.value)?.text.trim() ?? "";
    if (texts > 0 && /^\d+$/.test(value) && Number(value) >= texts) {
      report({
        severity: "hint",
        attribute: "value",
        message: `The Value ${value} of ${name} has no text.`,
        facts: [`EnumStrings: ${texts} texts`, `Value: ${value}`],
      });
    }
  },
  examples: {
    good: {
      text: "Three texts.",
      build: (m) => {
        const parent = m.variable("Mode", {
          parent: m.object("Pump1"),
          type: T.MultiStateDiscreteType,
          dataType: D.Byte,
        });
        m.property("0:EnumStrings", {
          parent,
          dataType: D.LocalizedText,
          valueRank: 1,
          arrayDimensions: "0",
          value: localizedTexts("Off", "Manual", "Automatic"),
        });
        return undefined;
      },
    },
    bad: {
      text: "No texts.",
      build: (m) => m.variable("Mode", { parent: m.object("Pump1"), type: T.MultiStateDiscreteType, dataType: D.Byte }),
    },
  },
};
