/** Texts of live values. Minus is U+2212 and thousands are parted by a thin space, so that figures read at arm's length. */
import type { LiveRange } from "./live-node";

const MINUS = "\u2212";
const THIN_SPACE = "\u2009";

/** Digits behind the point that tell a ten-thousandth of the range apart; from the size of the value where there is no range. */
export function chooseDecimals(value: number, range: LiveRange | null): number {
  if (Number.isInteger(value) && range === null) return 0;
  const span = range ? range.high - range.low : Math.max(Math.abs(value), 1e-9) * 10;
  return Math.min(6, Math.max(0, Math.ceil(-Math.log10(span / 10_000))));
}

/** A number with a fixed count of decimals; very large and very small ones with an exponent. */
export function formatNumber(value: number, decimals: number): string {
  if (Number.isNaN(value)) return "not a number";
  if (!Number.isFinite(value)) return value > 0 ? "∞" : `${MINUS}∞`;
  const size = Math.abs(value);
  if (size >= 1e12 || (size > 0 && size < 1e-6)) return value.toExponential(4).replace("-", MINUS).replace("e-", `e${MINUS}`);
  const [whole = "0", fraction] = size.toFixed(decimals).split(".");
  const grouped = whole.length > 4 ? whole.replace(/\B(?=(\d{3})+$)/g, THIN_SPACE) : whole;
  const isZero = Number(size.toFixed(decimals)) === 0;
  return `${value < 0 && !isZero ? MINUS : ""}${grouped}${fraction === undefined ? "" : `.${fraction}`}`;
}

/** The end of a range or scale, with as many decimals as it needs and no more. */
export function formatBound(value: number): string {
  const decimals = Number.isInteger(value) ? 0 : Math.min(6, (String(value).split(".")[1] ?? "").length);
  return formatNumber(value, decimals);
}

/** `0 … 400`, with the unit behind it when there is one. */
export function formatRange(range: LiveRange, unit?: string): string {
  return `${formatBound(range.low)} … ${formatBound(range.high)}${unit ? ` ${unit}` : ""}`;
}

/** An age: `0.4 s`, `12 s`, `3 min 12 s`, `2 h 05 min`. */
export function formatAge(milliseconds: number): string {
  const seconds = Math.max(0, milliseconds) / 1000;
  if (seconds < 9.95) return `${seconds.toFixed(1)} s`;
  if (seconds < 60) return `${Math.floor(seconds)} s`;
  const minutes = Math.floor(seconds / 60);
  if (minutes < 60) return `${minutes} min ${Math.floor(seconds % 60)} s`;
  return `${Math.floor(minutes / 60)} h ${String(minutes % 60).padStart(2, "0")} min`;
}
