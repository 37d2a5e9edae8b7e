import { StandardDataType as D, StandardType as T } from "../../address-space/standard-ids";
import type { NodeKey } from "../../address-space/node-id";
import type { CheckContext } from "../check-context";
import { range } from "../example-values";
import { findStandardProperty } from "../lookups";
import { formatRange, isWithin, listRanges, type RangeValue } from "../ranges";
import { clause, type NodeRule } from "../rule";

export const r129: NodeRule = {
  id: "R129",
  title: "EURange within InstrumentRange",
  severity: "hint",
  clause: `${clause(8, "§5.3.2.2")} (inferred from the meanings)`,
  priority: 2,
  concerns: ["Variable"],
  needs: ["children"],
  condition:
    "Where both have values, EURange (what is likely in normal operation) lies within InstrumentRange (what the instrument can return).",
  why: "Values that the instrument can never return are shown as normal.",
  check(node, ctx, report) {
    const possible = findRange(node.key, "InstrumentRange", ctx);
    const normal = possible && findRange(node.key, "EURange", ctx);
    if (!normal || !possible || isWithin(normal, possible)) return;
    report({
      message: `The EURange of ${node.browseName.name} exceeds its InstrumentRange.`,
      facts: [`EURange: ${formatRange(normal)}`, `InstrumentRange: ${formatRange(possible)}`],
    });
  },
  examples: {
    good: { text: "0 … 100 within −10 … 110.", build: (m) => void addRanges(m, 0, 100) },
    bad: { text: "0 … 200 within −10 … 110.", build: (m) => addRanges(m, 0, 200) },
  },
};

function findRange(key: NodeKey, name: string, ctx: CheckContext): RangeValue | undefined {
  const property = findStandardProperty(ctx, key, name);
  return property?.nodeClass === "Variable" ? listRanges(property.value)[0] : undefined;
}

function addRanges(
  m: Parameters<NodeRule["examples"]["good"]["build"]>[0],
  low: number,
  high: number,
): ReturnType<typeof m.variable> {
  const parent = m.variable("Level", { parent: m.object("Tank1"), type: T.AnalogItemType });
  m.property("0:EURange", { parent, dataType: D.Range, value: range(low, high) });
  m.property("0:InstrumentRange", { parent, dataType: D.Range, value: range(-10, 110) });
  return parent;
}
