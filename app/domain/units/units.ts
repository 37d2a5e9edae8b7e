/**
 * Engineering units of UN/CEFACT Recommendation 20 as OPC 10000-8 §5.6.3 uses them.
 *
 * - `findUnits(query, limit?)`: units by code, symbol, name or what people type (`°C`, `degC`, `mm/s`, `CEL`), best first.
 * - `unitByCode("CEL")`, `unitById(4408652)`; `toUnitId(code)` and `toUnitCode(unitId)` are the standard's algorithm.
 * - `toEuInformation(unit)`: the value of EngineeringUnits. `convert(value, from, to)`: between units of one quantity.
 *
 * The table (some 80 kB) is parsed at the first question; a browser loads this module when the first unit is looked up.
 */
import { fail, ok, problem, type Result } from "../core/result";
import type { EUInformation } from "../nodeset/values/standard-values";
import { COMMON_CODES, UNIT_SYNONYMS } from "./common-units";
import { QUANTITY_NAMES, UNIT_ROWS } from "./unit-table";

/** OPC 10000-8 §5.6.3.4. */
export const UNECE_UNITS_URI = "http://www.opcfoundation.org/UA/units/un/cefact";

export type Unit = {
  /** Common code of Recommendation 20: two or three characters. */
  readonly code: string;
  readonly unitId: number;
  /** As in the published table; of `% or pct` the first alternative. */
  readonly symbol: string;
  readonly name: string;
  /** What it measures, in words of Recommendation 20; absent where that does not say. */
  readonly quantity?: string;
};

type Entry = Unit & {
  readonly group: string;
  readonly symbols: readonly string[];
  readonly factor: number | undefined;
  readonly folded: readonly string[];
};

let table: { entries: readonly Entry[]; byCode: ReadonlyMap<string, Entry> } | undefined;

function getTable(): NonNullable<typeof table> {
  if (!table) {
    const entries = UNIT_ROWS.trim().split("\n").map(parseRow);
    table = { entries, byCode: new Map(entries.map((e) => [e.code, e])) };
  }
  return table;
}

function parseRow(row: string): Entry {
  const [code = "", cell = "", name = "", group = "", factor = ""] = row.split("|");
  const symbols = cell.split(" or ");
  const quantity = group === "" ? undefined : QUANTITY_NAMES[Number(group)];
  return {
    code,
    unitId: toUnitId(code),
    symbol: symbols[0] ?? cell,
    symbols: symbols.length > 1 ? [...symbols, cell] : symbols,
    name,
    ...(quantity === undefined ? {} : { quantity }),
    group,
    factor: factor === "" ? undefined : Number(factor),
    folded: [...symbols, name].map(fold),
  };
}

/** Case, blanks and points do not matter; `µ` has two code points, `·` and `*` mean the same. */
function fold(text: string): string {
  return text
    .normalize("NFKC")
    .toLowerCase()
    .replace(/[\s.]+/g, "")
    .replace(/[*⋅]/g, "·")
    .replace(/metre/g, "meter")
    .replace(/litre/g, "liter");
}

/** The unit's code as a number: its characters, the first in the highest byte (OPC 10000-8 §5.6.3.4). */
export function toUnitId(code: string): number {
  let id = 0;
  for (const character of code) id = (id << 8) | character.charCodeAt(0);
  return id;
}

/** The code of a unitId; undefined where the number holds no code of two to four characters 0–9, A–Z. */
export function toUnitCode(unitId: number): string | undefined {
  let code = "";
  for (let rest = unitId; rest > 0; rest = Math.floor(rest / 256)) code = String.fromCharCode(rest % 256) + code;
  return /^[0-9A-Z]{2,4}$/.test(code) ? code : undefined;
}

export function unitByCode(code: string): Unit | undefined {
  return getTable().byCode.get(code.toUpperCase());
}

export function unitById(unitId: number): Unit | undefined {
  const code = toUnitCode(unitId);
  return code === undefined ? undefined : getTable().byCode.get(code);
}

/** The symbols that the published table allows for a unit: `%` and `pct`, and the cell `% or pct` as a whole. */
export function listSymbols(unit: Unit): readonly string[] {
  return getTable().byCode.get(unit.code)?.symbols ?? [unit.symbol];
}

/** All units in the order of the published table. */
export function listUnits(): readonly Unit[] {
  return getTable().entries;
}

/** The value of an EngineeringUnits Property, texts as in the table (OPC 10000-8 §5.6.3.4). */
export function toEuInformation(unit: Unit): EUInformation {
  return {
    namespaceUri: UNECE_UNITS_URI,
    unitId: unit.unitId,
    displayName: { text: unit.symbol },
    description: { text: unit.name },
  };
}

/** The unit that an EngineeringUnits value names; undefined for other namespaces and numbers that are not in the table. */
export function fromEuInformation(value: EUInformation): Unit | undefined {
  return value.namespaceUri === UNECE_UNITS_URI ? unitById(value.unitId) : undefined;
}

/** Units for what somebody typed, best first; an empty query answers the units that plants use most. */
export function findUnits(query: string, limit = 20): Unit[] {
  const { entries, byCode } = getTable();
  const wanted = fold(query);
  if (wanted === "") return COMMON_CODES.flatMap((code) => byCode.get(code) ?? []).slice(0, limit);
  const synonym = UNIT_SYNONYMS.get(wanted);
  const scored = entries
    .map((entry) => ({ entry, score: rate(entry, query.trim(), wanted, synonym) }))
    .filter(({ score }) => score > 0);
  scored.sort(
    (a, b) =>
      b.score - a.score || a.entry.name.length - b.entry.name.length || a.entry.name.localeCompare(b.entry.name, "en"),
  );
  return scored.slice(0, limit).map(({ entry }) => entry);
}

/** How well a unit fits; 0 not at all. An exact symbol counts more than a code, since symbols are what people type. */
function rate(entry: Entry, typed: string, wanted: string, synonym: string | undefined): number {
  const rank = COMMON_CODES.indexOf(entry.code);
  const bonus = rank < 0 ? 0 : 1 + (COMMON_CODES.length - rank) / COMMON_CODES.length;
  if (entry.symbol === typed) return 90 + bonus;
  if (synonym === entry.code) return 85 + bonus;
  if (entry.code === typed.toUpperCase()) return 80 + bonus;
  if (entry.folded.includes(wanted)) return 70 + bonus;
  const name = entry.folded.at(-1) ?? "";
  if (name.startsWith(wanted)) return 50 + bonus;
  if (entry.folded.some((text) => text.startsWith(wanted))) return 40 + bonus;
  if (wanted.length > 1 && name.includes(wanted)) return 20 + bonus;
  if (wanted.length > 1 && entry.folded.some((text) => text.includes(wanted))) return 10 + bonus;
  return 0;
}

/** Zero points of the temperature scales in kelvin: 0 °C = 273.15 K, 0 °F = 459.67 °R (SI brochure, 9th edition, §2.3.1). */
const OFFSETS: Readonly<Record<string, number>> = { CEL: 273.15, FAH: (459.67 * 5) / 9 };

/** Whether `convert` can convert between the two codes. */
export function canConvert(from: string, to: string): boolean {
  const a = getTable().byCode.get(from);
  const b = getTable().byCode.get(to);
  return (
    a !== undefined &&
    b !== undefined &&
    (a === b || (a.group !== "" && a.group === b.group && a.factor !== undefined && b.factor !== undefined))
  );
}

/**
 * A value in another unit of the same quantity. Temperatures are taken as points of a scale, not as differences. As exact
 * as Recommendation 20 gives the factors; units by definition (minute, degree, inch, psi …) are exact.
 * Problems: `unit.unknown`, `unit.other-quantity`.
 */
export function convert(value: number, from: string, to: string): Result<number> {
  const a = getTable().byCode.get(from);
  const b = getTable().byCode.get(to);
  if (!a || !b) return fail(problem("unit.unknown", { code: a ? to : from }));
  if (a === b) return ok(value);
  if (!canConvert(from, to)) return fail(problem("unit.other-quantity", { from: a.symbol, to: b.symbol }));
  const coherent = value * (a.factor ?? 1) + (OFFSETS[from] ?? 0);
  return ok((coherent - (OFFSETS[to] ?? 0)) / (b.factor ?? 1));
}
