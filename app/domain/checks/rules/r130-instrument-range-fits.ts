import { getDataType } from "../../address-space/node";
import { StandardDataType as D, StandardType as T } from "../../address-space/standard-ids";
import { findAllowedBuiltIns } from "../data-types";
import { range } from "../example-values";
import { findStandardProperty } from "../lookups";
import { formatRange, isWithin, listRanges, type RangeValue } from "../ranges";
import { clause, type NodeRule } from "../rule";

const LIMITS: Readonly<Record<string, RangeValue>> = {
  SByte: { low: -128, high: 127 },
  Byte: { low: 0, high: 255 },
  Int16: { low: -32768, high: 32767 },
  UInt16: { low: 0, high: 65535 },
  Int32: { low: -2147483648, high: 2147483647 },
  UInt32: { low: 0, high: 4294967295 },
};

export const r130: NodeRule = {
  id: "R130",
  title: "InstrumentRange within the DataType",
  severity: "hint",
  clause: `${clause(8, "§5.3.2.2")}, example 2 (inferred)`,
  priority: 2,
  concerns: ["Variable"],
  needs: ["children"],
  condition: "The limits of InstrumentRange can be told in the DataType.",
  why: "Values beyond what the DataType holds wrap or are cut.",
  check(node, ctx, report) {
    const property = findStandardProperty(ctx, node.key, "InstrumentRange");
    if (node.nodeClass !== "Variable" || property?.nodeClass !== "Variable") return;
    const allowed = findAllowedBuiltIns(ctx, getDataType(node));
    const name = allowed === undefined || allowed === "any" || allowed.size !== 1 ? undefined : [...allowed][0];
    const limits = name === undefined ? undefined : LIMITS[name];
    const [possible] = listRanges(property.value);
    if (!limits || !possible || isWithin(possible, limits)) return;
    report({
      message: `The InstrumentRange of ${node.browseName.name} exceeds what ${name ?? ""} holds.`,
      facts: [`InstrumentRange: ${formatRange(possible)}`, `${name ?? ""}: ${formatRange(limits)}`],
    });
  },
  examples: {
    good: { text: "0 … 4095 in UInt16.", build: (m) => void addRange(m, 4095) },
    bad: { text: "0 … 70000 in UInt16.", build: (m) => addRange(m, 70000) },
  },
};

function addRange(
  m: Parameters<NodeRule["examples"]["good"]["build"]>[0],
  high: number,
): ReturnType<typeof m.variable> {
  const parent = m.variable("Raw", { parent: m.object("Tank1"), type: T.BaseAnalogType, dataType: D.UInt16 });
  m.property("0:InstrumentRange", { parent, dataType: D.Range, value: range(0, high) });
  return parent;
}
