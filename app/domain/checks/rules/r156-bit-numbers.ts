import { StandardDataType as D } from "../../address-space/standard-ids";
import { isBitMask, valueOf } from "../enumerations";
import { localizedTexts } from "../example-values";
import { isKindOf } from "../lookups";
import { clause, type NodeRule } from "../rule";
import type { ExampleModel } from "../example-model";
import type { NodeKey } from "../../address-space/node-id";

const WIDTHS = [
  [D.Byte, 8],
  [D.UInt16, 16],
  [D.UInt32, 32],
  [D.UInt64, 64],
] as const;

export const r156: NodeRule = {
  id: "R156",
  title: "Bit numbers within the base type",
  severity: "error",
  clause: clause(3, "§8.52, §5.8.2"),
  priority: 2,
  concerns: ["DataType"],
  condition: "The value of each field of a bit mask is a bit number that the base type has, each once.",
  why: "A bit beyond the width cannot be set.",
  check(node, ctx, report) {
    if (node.nodeClass !== "DataType" || !isBitMask(node, ctx)) return;
    const width = WIDTHS.find(([type]) => isKindOf(ctx, node.key, type))?.[1];
    const fields = node.definition?.fields ?? [];
    const bits = fields.map(valueOf);
    const wrong = fields.find(
      (f, i) => !(valueOf(f) >= 0) || (width !== undefined && valueOf(f) >= width) || bits.indexOf(valueOf(f)) !== i,
    );
    if (!wrong) return;
    const isTwice = bits.filter((b) => b === valueOf(wrong)).length > 1;
    report({
      attribute: "definition",
      message: `The bit ${valueOf(wrong)} of ${node.browseName.name} ${isTwice ? "stands twice" : "does not exist"}.`,
      facts: [`Field: ${wrong.name}`, `Bits: ${bits.join(", ")}`, `Width of the base type: ${width ?? "unknown"}`],
    });
  },
  examples: {
    good: { text: "Bit 7 of a Byte.", build: (m) => addMask(m, 7) },
    bad: { text: "Bit 9 of a Byte.", build: (m) => addMask(m, 9) },
  },
};

function addMask(m: ExampleModel, bit: number): NodeKey {
  const type = m.dataType("PumpFlags", {
    supertype: D.Byte,
    definition: { isOptionSet: true, fields: [{ name: "Warm", value: bit }] },
  });
  const texts = Array.from({ length: bit + 1 }, (_, i) => (i === bit ? "Warm" : ""));
  m.property("0:OptionSetValues", {
    parent: type,
    dataType: D.LocalizedText,
    valueRank: 1,
    arrayDimensions: "0",
    value: localizedTexts(...texts),
  });
  return type;
}
