import { getDataType, getValueRank } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import { StandardDataType as D } from "../../address-space/standard-ids";
import type { CheckContext } from "../check-context";
import { scalar } from "../example-values";
import { findStandardProperty, isChainLoaded, isKindOf, listSupertypes } from "../lookups";
import { clause, type NodeRule } from "../rule";

const PROPERTIES = ["MaxStringLength", "MaxCharacters", "MaxByteStringLength", "MaxArrayLength"];

export const r116: NodeRule = {
  id: "R116",
  title: "Properties of length where there is a length",
  severity: "error",
  clause: clause(3, "§5.6.2, Table 13, §5.6.4"),
  priority: 2,
  concerns: ["Variable"],
  needs: ["children"],
  condition:
    "MaxStringLength and MaxCharacters exclude each other and stand on texts; MaxByteStringLength on ByteString; MaxArrayLength where there may be an array.",
  why: "Clients cut their input after these; where two limits stand, or one without meaning, each client takes another.",
  check(node, ctx, report) {
    if (node.nodeClass !== "Variable") return;
    const has = new Set(PROPERTIES.filter((name) => findStandardProperty(ctx, node.key, name) !== undefined));
    if (has.size === 0) return;
    const name = node.browseName.name;
    const dataType = getDataType(node);
    const facts = [`DataType: ${ctx.describe(dataType)}`, `ValueRank: ${String(getValueRank(node)).replace("-", "−")}`];
    if (has.has("MaxStringLength") && has.has("MaxCharacters"))
      report({ message: `${name} has both MaxStringLength and MaxCharacters.`, facts });
    const isText = canBe(ctx, dataType, [D.String, D.LocalizedText]);
    for (const property of ["MaxStringLength", "MaxCharacters"]) {
      if (has.has(property) && !isText) report({ message: `${name} is no text and has ${property}.`, facts });
    }
    if (has.has("MaxByteStringLength") && !canBe(ctx, dataType, [D.ByteString]))
      report({ message: `${name} is no ByteString and has MaxByteStringLength.`, facts });
    if (has.has("MaxArrayLength") && getValueRank(node) === -1)
      report({ message: `${name} is a scalar and has MaxArrayLength.`, facts });
  },
  examples: {
    good: {
      text: "One limit for a text.",
      build: (m) =>
        m.property("0:MaxStringLength", {
          parent: m.variable("Label", { parent: m.object("Pump1"), dataType: D.String }),
          dataType: D.UInt32,
          value: scalar("UInt32", 50),
        }),
    },
    bad: {
      text: "A limit of characters for a number.",
      build: (m) => {
        const speed = m.variable("Speed", { parent: m.object("Pump1") });
        m.property("0:MaxStringLength", { parent: speed, dataType: D.UInt32, value: scalar("UInt32", 50) });
        return speed;
      },
    },
  },
};

/** Whether a value of the DataType may be one of the wanted: it is below one, above one, or not known. */
function canBe(ctx: CheckContext, dataType: NodeKey, wanted: readonly NodeKey[]): boolean {
  if (!isChainLoaded(ctx, dataType)) return true;
  return wanted.some((w) => isKindOf(ctx, dataType, w) || listSupertypes(ctx, w).includes(dataType));
}
