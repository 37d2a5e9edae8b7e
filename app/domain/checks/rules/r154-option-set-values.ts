import type { NodeKey } from "../../address-space/node-id";
import { StandardDataType as D } from "../../address-space/standard-ids";
import { findVariable, isBitMask, isOptionSet, listTexts, valueOf } from "../enumerations";
import type { ExampleModel } from "../example-model";
import { localizedTexts } from "../example-values";
import { findStandardProperty } from "../lookups";
import { clause, type NodeRule } from "../rule";

export const r154: NodeRule = {
  id: "R154",
  title: "An option set has OptionSetValues",
  severity: "error",
  clause: clause(3, "§5.8.3, Table 16, §8.40"),
  priority: 1,
  concerns: ["DataType"],
  condition:
    "Bit masks and concrete subtypes of OptionSet have OptionSetValues with an entry for each bit up to the highest; OptionSetLength stands on OptionSet subtypes only.",
  why: "Clients show the names of set bits from this list.",
  check(node, ctx, report) {
    if (node.nodeClass !== "DataType") return;
    const isMask = isBitMask(node, ctx);
    const isSet = isOptionSet(node, ctx);
    const name = node.browseName.name;
    const highest = Math.max(-1, ...(node.definition?.fields ?? []).map(valueOf));
    const facts = [
      `Fields: ${(node.definition?.fields ?? []).map((f) => `${f.name} (bit ${valueOf(f)})`).join(", ") || "none"}`,
    ];
    if (findStandardProperty(ctx, node.key, "OptionSetLength") && !isSet)
      report({ message: `${name} is no subtype of OptionSet and has OptionSetLength.`, facts });
    if (!isMask && !isSet) return;
    const property = findVariable(ctx, node.key, "OptionSetValues");
    if (!property) {
      report({ message: `The option set ${name} has no OptionSetValues.`, facts });
      return;
    }
    const texts = listTexts(property);
    if (texts && texts.length < highest + 1)
      report({
        message: `OptionSetValues of ${name} has ${texts.length} entries for bits up to ${highest}.`,
        facts: [...facts, `OptionSetValues: ${texts.join(", ")}`],
      });
  },
  examples: {
    good: { text: "Two bits, two texts.", build: (m) => addMask(m, ["Warm", "Empty"]) },
    bad: { text: "Two bits, one text.", build: (m) => addMask(m, ["Warm"]) },
  },
};

function addMask(m: ExampleModel, texts: readonly string[]): NodeKey {
  const fields = [
    { name: "Warm", value: 0 },
    { name: "Empty", value: 1 },
  ];
  const type = m.dataType("PumpFlags", { supertype: D.Byte, definition: { isOptionSet: true, fields } });
  m.property("0:OptionSetValues", {
    parent: type,
    dataType: D.LocalizedText,
    valueRank: 1,
    arrayDimensions: "0",
    value: localizedTexts(...texts),
  });
  return type;
}
