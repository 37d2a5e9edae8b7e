/**
 * Makes app/domain/units/unit-table.ts from two published tables:
 *   1. UNECE_to_OPCUA.csv, OPC 10000-8 §5.6.3.4 (www.opcfoundation.org/UA/EngineeringUnits/UNECE/UNECE_to_OPCUA.csv):
 *      code, unitId, symbol, name;
 *   2. Annex I of UN/CEFACT Recommendation 20 as CSV: quantities and conversion factors;
 *   3. Annex II and III of the same: factors of units that Annex I does not list.
 * Usage: node app/cli/make-unit-table.mjs UNECE_to_OPCUA.csv rec20-annex-1.csv rec20-annex-2-3.csv "edition of the files"
 *
 * Conversion factors are texts ("1,745 329 × 10⁻² rad"). They are parsed into a number and powers of base units. A factor
 * that says something else than a product of numbers and units is left out: the unit then cannot be converted.
 */
import { readFileSync, writeFileSync } from "node:fs";

const [unitsFile, annex1File, annex23File, edition] = process.argv.slice(2);
if (!edition) {
  console.error("Usage: make-unit-table.mjs UNITS.csv ANNEX1.csv ANNEX23.csv EDITION");
  process.exit(2);
}

/** RFC 4180, with line breaks inside quotes. */
function readCsv(file) {
  const text = readFileSync(file, "utf8").replace(/^\uFEFF/, "");
  const rows = [[]];
  const cell = /("(?:[^"]|"")*"|[^,\r\n"]*)(,|\r?\n|$)/gy;
  for (let match = cell.exec(text); match && (match[0] !== "" || match.index < text.length); match = cell.exec(text)) {
    const raw = match[1];
    rows.at(-1).push(raw.startsWith('"') ? raw.slice(1, -1).replace(/""/g, '"') : raw);
    if (match[2] !== ",") rows.push([]);
  }
  return rows.filter((row) => row.length > 1);
}

const BASE = ["kg", "m", "s", "A", "K", "mol", "cd", "rad", "sr", "Np", "bit"];
const base = (powers, factor = 1) => ({ factor, powers });
/** Units that occur in factors, in base units (SI brochure, 9th edition, tables 4 and 8). */
const KNOWN = {
  kg: base({ kg: 1 }),
  m: base({ m: 1 }),
  s: base({ s: 1 }),
  A: base({ A: 1 }),
  K: base({ K: 1 }),
  mol: base({ mol: 1 }),
  cd: base({ cd: 1 }),
  rad: base({ rad: 1 }),
  sr: base({ sr: 1 }),
  Np: base({ Np: 1 }),
  bit: base({ bit: 1 }),
  Hz: base({ s: -1 }),
  N: base({ kg: 1, m: 1, s: -2 }),
  Pa: base({ kg: 1, m: -1, s: -2 }),
  J: base({ kg: 1, m: 2, s: -2 }),
  W: base({ kg: 1, m: 2, s: -3 }),
  C: base({ A: 1, s: 1 }),
  V: base({ kg: 1, m: 2, s: -3, A: -1 }),
  F: base({ kg: -1, m: -2, s: 4, A: 2 }),
  Ω: base({ kg: 1, m: 2, s: -3, A: -2 }),
  S: base({ kg: -1, m: -2, s: 3, A: 2 }),
  Wb: base({ kg: 1, m: 2, s: -2, A: -1 }),
  T: base({ kg: 1, s: -2, A: -1 }),
  H: base({ kg: 1, m: 2, s: -2, A: -2 }),
  lm: base({ cd: 1, sr: 1 }),
  lx: base({ cd: 1, sr: 1, m: -2 }),
  Bq: base({ s: -1 }),
  Gy: base({ m: 2, s: -2 }),
  Sv: base({ m: 2, s: -2 }),
  kat: base({ mol: 1, s: -1 }),
  h: base({ s: 1 }, 3600),
  l: base({ m: 3 }, 1e-3),
  g: base({ kg: 1 }, 1e-3),
  eV: base({ kg: 1, m: 2, s: -2 }, 1.602176634e-19),
};
const SUPERSCRIPTS = {
  "⁰": 0,
  "¹": 1,
  "²": 2,
  "³": 3,
  "⁴": 4,
  "⁵": 5,
  "⁶": 6,
  "⁷": 7,
  "⁸": 8,
  "⁹": 9,
  "⁻": "-",
  "⁺": "",
};
const toNumber = (text) => Number([...text].map((c) => SUPERSCRIPTS[c]).join(""));

/** A recursive reader for `product := factor ((x | · | / | blank) factor)*`; throws a text where it meets something else. */
function parseFactor(source) {
  let rest = source
    .normalize("NFC")
    .replace(/\u00a0/g, " ")
    .trim();
  const take = (pattern) => {
    const match = pattern.exec(rest);
    if (!match) return undefined;
    rest = rest.slice(match[0].length);
    return match;
  };
  const combine = (a, b, sign) => ({
    factor: a.factor * b.factor ** sign,
    powers: Object.fromEntries(BASE.map((u) => [u, (a.powers[u] ?? 0) + sign * (b.powers[u] ?? 0)])),
  });
  const raise = (a, n) => ({
    factor: a.factor ** n,
    powers: Object.fromEntries(BASE.map((u) => [u, (a.powers[u] ?? 0) * n])),
  });
  const exponent = () => {
    const match = take(/^[⁰¹²³⁴⁵⁶⁷⁸⁹⁻⁺]+/);
    return match ? toNumber(match[0]) : 1;
  };
  const readPart = () => {
    if (take(/^\(/)) {
      const inner = readProduct();
      if (!take(/^\s*\)/)) throw new Error("bracket");
      return raise(inner, exponent());
    }
    const power = take(/^10(?=[⁰¹²³⁴⁵⁶⁷⁸⁹⁻⁺])/);
    if (power) return base({}, 10 ** exponent());
    const fraction = take(/^(\d+)\/(\d+)(?=\s*x)/);
    if (fraction) return base({}, Number(fraction[1]) / Number(fraction[2]));
    const number = take(/^\d+(?: \d{1,3}(?!\d))*(?:,\d+(?: \d{1,3}(?!\d))*)?/);
    if (number) return base({}, Number(number[0].replace(/ /g, "").replace(",", ".")));
    const name = take(/^(?:kg|mol|rad|bit|cd|sr|Np|Hz|Pa|Wb|lm|lx|Bq|Gy|Sv|kat|eV|[msAKNJWCVFΩSTHhlg])(?![A-Za-zΩ])/);
    if (!name) throw new Error(rest);
    return raise(KNOWN[name[0]], exponent());
  };
  const readProduct = () => {
    let value = take(/^\s*\//) ? raise(readPart(), -1) : readPart();
    for (;;) {
      const operator = take(/^\s*([x×·/])\s*/) ?? take(/^(\s+)(?=[^)\s])/);
      if (!operator) return value;
      value = combine(value, readPart(), operator[1] === "/" ? -1 : 1);
    }
  };
  const value = readProduct();
  if (rest.trim() !== "") throw new Error(rest);
  return value;
}

const units = readCsv(unitsFile)
  .slice(1)
  .map(([code, unitId, symbol, name]) => ({ code, unitId: Number(unitId), symbol, name }));
const quantities = new Map();
const factors = new Map();
for (const row of readCsv(annex1File).slice(1)) {
  const code = row[6].trim();
  const phrases = row[3]
    .toLowerCase()
    .replace(/\([^)]*\)/g, "")
    .split(",")
    .map((p) => p.trim().replace(/\s+/g, " "));
  quantities.set(code, [...(quantities.get(code) ?? []), ...phrases.filter((p) => p !== "")]);
  if (row[8].trim() !== "" && !factors.has(code)) factors.set(code, row[8]);
}
for (const row of readCsv(annex23File).slice(1)) {
  const code = row[1].trim();
  if ((row[6] ?? "").trim() !== "" && !factors.has(code)) factors.set(code, row[6]);
}

/**
 * Exact factors where the annex rounds, or has a slip (C94 lacks the "per"): by definition of minute, hour, degree, foot,
 * pound, gallon, knot (SI brochure, 9th edition, table 8; international yard and pound agreement, 1959).
 */
const FOOT = 0.3048;
const POUND = 0.45359237;
const POUND_FORCE = POUND * 9.80665;
const PERSECOND = "s-1";
const EXACT = {
  RPM: [1 / 60, PERSECOND],
  C94: [1 / 60, PERSECOND],
  M46: [Math.PI / 30],
  DD: [Math.PI / 180],
  KMH: [1 / 3.6],
  "2X": [1 / 60],
  H81: [1e-3 / 60],
  FR: [FOOT / 60],
  L2: [1e-3 / 60],
  E32: [1e-3 / 3600],
  MQH: [1 / 3600],
  G53: [1 / 60],
  E93: [1 / 3600],
  F31: [1 / 60],
  PS: [POUND_FORCE / 0.0254 ** 2],
  FOT: [FOOT],
  SMI: [1609.344],
  GLL: [3.785411784e-3],
  GLI: [4.54609e-3],
  ONZ: [POUND / 16],
  LBR: [POUND],
  C78: [POUND_FORCE],
  KNT: [1852 / 3600],
  FAH: [5 / 9],
  A48: [5 / 9],
  P1: [1e-2, ""],
  NX: [1e-3, ""],
  59: [1e-6, ""],
  61: [1e-9, ""],
  C62: [1, ""],
};
/** Quantities that Annex I leaves out, and those that must not be mixed up with others of their dimension. */
const RATIO = ["ratio"];
const FLOW = ["volume flow rate"];
const PHRASES = { E32: FLOW, G51: FLOW, P1: RATIO, NX: RATIO, 59: RATIO, 61: RATIO, C62: RATIO };

/** What one means by two words, so that units that measure the same can be converted. */
const SAME = new Map([
  ["thermodynamic", "temperature"],
  ["fahrenheit temperature", "temperature"],
  ["rotational frequency", "frequency"],
]);
const unparsed = [];
for (const unit of units) {
  unit.phrases = PHRASES[unit.code] ?? (quantities.get(unit.code) ?? []).map((p) => SAME.get(p) ?? p);
  if (unit.phrases.includes("moment of force") || unit.phrases.includes("torque")) unit.phrases = ["torque"];
  const text = factors.get(unit.code);
  const exact = EXACT[unit.code];
  if (text === undefined && !exact) continue;
  try {
    const { factor, powers } = exact?.[1] !== undefined ? { powers: {} } : parseFactor(text);
    unit.factor = exact ? exact[0] : Number(factor.toPrecision(15));
    unit.dimension =
      exact?.[1] ??
      BASE.filter((u) => powers[u])
        .map((u) => u + (powers[u] === 1 ? "" : powers[u]))
        .join(" ");
  } catch {
    unparsed.push(`${unit.code} ${text}`);
  }
}

/** Units of one dimension that share a quantity, directly or by way of others, form a group. */
const parents = new Map();
const find = (id) => {
  let at = id;
  while (parents.get(at) !== undefined && parents.get(at) !== at) at = parents.get(at);
  return at;
};
for (const unit of units) {
  if (unit.dimension === undefined) continue;
  const ids = unit.phrases.map((p) => `${unit.dimension}|${p}`);
  for (const id of ids) if (!parents.has(id)) parents.set(id, id);
  for (const id of ids.slice(1)) parents.set(find(id), find(ids[0]));
}
const counts = new Map();
for (const unit of units) {
  unit.group =
    unit.dimension === undefined || unit.phrases.length === 0 ? "" : find(`${unit.dimension}|${unit.phrases[0]}`);
  for (const phrase of new Set(unit.phrases)) {
    const key = `${unit.group}|${phrase}`;
    counts.set(key, (counts.get(key) ?? 0) + 1);
  }
}
const names = new Map();
for (const unit of units) {
  if (unit.group === "") continue;
  for (const phrase of unit.phrases) {
    const count = counts.get(`${unit.group}|${phrase}`);
    if (!names.get(unit.group) || count > names.get(unit.group).count) names.set(unit.group, { phrase, count });
  }
}
const groups = [...new Set(units.map((u) => u.group))].filter((g) => g !== "");
const rows = units.map((u) => {
  const group = u.group === "" ? "" : String(groups.indexOf(u.group));
  return [u.code, u.symbol, u.name, group, u.factor === undefined || u.group === "" ? "" : String(u.factor)].join("|");
});
for (const row of rows) if (row.split("|").length !== 5) throw new Error(`A cell holds the separator: ${row}`);

const file = `/**
 * @generated by app/cli/make-unit-table.mjs; do not edit.
 * ${edition}
 * Sources: UNECE_to_OPCUA.csv (OPC 10000-8 §5.6.3.4); UN/CEFACT Recommendation 20, Annexes I–III.
 * A row: code|symbol|name|number of the quantity|factor to the coherent unit of that quantity (empty: not given).
 */

export const QUANTITY_NAMES: readonly string[] = ${JSON.stringify(
  groups.map((g) => names.get(g).phrase),
  null,
  2,
)};

export const UNIT_ROWS = \`
${rows.join("\n").replace(/[\\`$]/g, "\\$&")}
\`;
`;
writeFileSync(new URL("../domain/units/unit-table.ts", import.meta.url), file);
console.error(
  `${units.length} units, ${rows.filter((r) => !r.endsWith("|")).length} with a factor, ${groups.length} quantities, ${unparsed.length} factors not parsed`,
);
if (process.env.VERBOSE) console.error(unparsed.join("\n"));
