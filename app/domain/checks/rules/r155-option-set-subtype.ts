import type { NodeKey } from "../../address-space/node-id";
import { StandardDataType as D } from "../../address-space/standard-ids";
import { isOptionSet, valueOf } from "../enumerations";
import type { ExampleModel } from "../example-model";
import { localizedTexts } from "../example-values";
import { listSupertypes } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { addStructure } from "../structures";

export const r155: NodeRule = {
  id: "R155",
  title: "A subtype of an option set repeats the base bits",
  severity: "error",
  clause: clause(3, "§8.40"),
  priority: 2,
  concerns: ["DataType"],
  condition: "A subtype of a concrete option set lists all bits of it again and may add more.",
  why: "The subtype's list is taken as the whole: bits that are left out lose their names.",
  check(node, ctx, report) {
    const [supertype] = listSupertypes(ctx, node.key);
    const base = supertype === undefined ? undefined : ctx.node(supertype);
    if (
      node.nodeClass !== "DataType" ||
      base?.nodeClass !== "DataType" ||
      base.key === D.OptionSet ||
      !isOptionSet(base, ctx)
    )
      return;
    const bits = new Set((node.definition?.fields ?? []).map(valueOf));
    const missing = (base.definition?.fields ?? []).filter((f) => !bits.has(valueOf(f)));
    if (missing.length === 0) return;
    report({
      attribute: "definition",
      message: `${node.browseName.name} leaves out ${missing.length} bits of ${base.browseName.name}.`,
      facts: [
        `Left out: ${missing.map((f) => `${f.name} (bit ${valueOf(f)})`).join(", ")}`,
        `Here: bits ${[...bits].join(", ") || "none"}`,
      ],
    });
  },
  examples: {
    good: { text: "Bits 0 and 1 again, and 2.", build: (m) => addSets(m, [0, 1, 2]) },
    bad: { text: "Bit 2 only.", build: (m) => addSets(m, [2]) },
  },
};

function addSets(m: ExampleModel, bits: readonly number[]): NodeKey {
  const base = addStructure(
    m,
    "PumpFlags",
    [
      { name: "Warm", value: 0 },
      { name: "Empty", value: 1 },
    ],
    { supertype: D.OptionSet },
  );
  const sub = addStructure(
    m,
    "FastPumpFlags",
    bits.map((value) => ({ name: `Bit${value}`, value })),
    { supertype: base },
  );
  for (const parent of [base, sub]) {
    m.set(parent, { definition: { ...(m.get(parent) as { definition?: object }).definition, isOptionSet: true } });
    m.property("0:OptionSetValues", {
      parent,
      dataType: D.LocalizedText,
      valueRank: 1,
      arrayDimensions: "0",
      value: localizedTexts("a", "b", "c"),
    });
  }
  return sub;
}
