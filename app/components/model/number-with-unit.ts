/** Figures that people write with a unit: `40 cm` in a cell of mm means 400. Needs the unit table (unit-lookup.ts). */
import type { Range } from "~/domain/nodeset/values/standard-values";
import { formatNumber, parseRange, type UnitFacts } from "./analog-facts";
import type { CellChange } from "./cell-change";
import { toNumber } from "./parse-phrase";
import { convertUnit, findSpokenUnit } from "./unit-lookup";

const WITH_UNIT = /^\s*([-−+]?\d+(?:[.,]\d+)?)\s*(\p{L}.*|[°%‰µΩ'"].*)$/u;
const RANGE_WITH_UNIT = /^(.*\d)\s*(\p{L}[^\d\s]*|[°%‰µΩ][^\d\s]*)$/u;

/** The figure in the unit of the node; the text itself where it names no unit, or one that does not fit. */
export function toOwnUnit(own: UnitFacts | undefined, text: string): string {
  const match = own && WITH_UNIT.exec(text);
  if (!match) return text;
  const factor = findScale(own, match[2] ?? "");
  return factor === undefined ? text : formatNumber(factor(toNumber(match[1] ?? "")));
}

/** A range, its ends in the unit of the node. */
export function parseRangeIn(own: UnitFacts | undefined, text: string): Range | undefined {
  const plain = parseRange(text);
  if (plain || !own) return plain;
  const match = RANGE_WITH_UNIT.exec(text.trim());
  const range = match && parseRange(match[1] ?? "");
  const scale = match && findScale(own, match[2] ?? "");
  return range && scale ? { low: scale(range.low), high: scale(range.high) } : undefined;
}

/** Whether the text cannot be understood before the unit table has come. */
export function namesUnit({ column, text }: CellChange): boolean {
  if (column === "unit") return text.trim() !== "";
  return (column === "range" || column === "value") && /[\p{L}°%‰µΩ]/u.test(text);
}

function findScale(own: UnitFacts, text: string): ((value: number) => number) | undefined {
  const written = text.trim();
  if (written === own.symbol || written === own.name) return (value) => value;
  const unit = findSpokenUnit(written);
  if (!unit || convertUnit(1, unit, own) === undefined) return undefined;
  return (value) => convertUnit(value, unit, own) ?? value;
}
