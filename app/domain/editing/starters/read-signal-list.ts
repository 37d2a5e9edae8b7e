/**
 * Signal lists: what a machine tells, one row a signal, as engineers keep it in a spreadsheet. The columns are matched by
 * their heads (a guess that people correct); units are recognised by name, symbol or code; groups become objects.
 */
import type { NodeKey } from "../../address-space/node-id";
import { StandardDataType as D } from "../../address-space/standard-ids";
import { problem, type Problem } from "../../core/result";
import { COMMON_CODES } from "../../units/common-units";
import { listSymbols, listUnits, unitByCode, type Unit } from "../../units/units";
import type { TextTable } from "./text-table";

export const signalFields = [
  "name",
  "group",
  "dataType",
  "unit",
  "low",
  "high",
  "description",
  "rule",
  "access",
] as const;
export type SignalField = (typeof signalFields)[number];

/** Index of the column for each field; a field without column is left out. */
export type ColumnChoice = Readonly<Partial<Record<SignalField, number>>>;

export type Signal = {
  readonly line: number;
  /** BrowseName made of the name's words. */
  readonly name: string;
  /** The name as written. */
  readonly title: string;
  /** Names of Objects, the outermost first, `/` between them. */
  readonly group: string | undefined;
  readonly dataType: NodeKey;
  readonly unit: Unit | undefined;
  readonly range: { readonly low: number; readonly high: number } | undefined;
  readonly description: string | undefined;
  readonly isOptional: boolean;
  readonly isWritable: boolean;
};

/** Heads by which a column is guessed, in English and German. */
const heads: Readonly<Record<SignalField, readonly string[]>> = {
  name: ["name", "signal", "tag", "variable", "symbol", "bezeichnung", "signalname"],
  group: ["group", "area", "section", "assembly", "gruppe", "bereich", "baugruppe"],
  dataType: ["datatype", "type", "datentyp", "typ", "format"],
  unit: ["unit", "engineeringunit", "engineeringunits", "eu", "einheit"],
  low: ["low", "min", "minimum", "rangelow", "from", "von", "lo"],
  high: ["high", "max", "maximum", "rangehigh", "to", "bis", "hi"],
  description: ["description", "comment", "remark", "text", "beschreibung", "kommentar", "bemerkung"],
  rule: ["rule", "optional", "mandatory", "modellingrule", "pflicht"],
  access: ["access", "accesslevel", "rw", "writable", "zugriff"],
};

export function guessColumns(head: readonly string[]): ColumnChoice {
  const folded = head.map((text) => text.toLowerCase().replace(/[^\p{L}]/gu, ""));
  const taken = new Set<number>();
  const choice: Partial<Record<SignalField, number>> = {};
  for (const exact of [true, false]) {
    for (const field of signalFields) {
      if (choice[field] !== undefined) continue;
      const index = folded.findIndex(
        (text, i) =>
          !taken.has(i) &&
          text !== "" &&
          heads[field].some((h) => (exact ? text === h : h.length > 2 && text.includes(h))),
      );
      if (index < 0) continue;
      choice[field] = index;
      taken.add(index);
    }
  }
  return choice;
}

/** Words of controllers and of OPC UA for data types; sizes after IEC 61131-3 Table 10 (INT has 16 bits, REAL 32). */
const dataTypes: Readonly<Record<string, NodeKey>> = {
  bool: D.Boolean,
  boolean: D.Boolean,
  bit: D.Boolean,
  digital: D.Boolean,
  sint: D.SByte,
  int8: D.SByte,
  sbyte: D.SByte,
  usint: D.Byte,
  uint8: D.Byte,
  byte: D.Byte,
  int: D.Int16,
  int16: D.Int16,
  short: D.Int16,
  uint: D.UInt16,
  uint16: D.UInt16,
  word: D.UInt16,
  dint: D.Int32,
  int32: D.Int32,
  udint: D.UInt32,
  uint32: D.UInt32,
  dword: D.UInt32,
  lint: D.Int64,
  int64: D.Int64,
  ulint: D.UInt64,
  uint64: D.UInt64,
  lword: D.UInt64,
  real: D.Float,
  float: D.Float,
  float32: D.Float,
  analog: D.Float,
  lreal: D.Double,
  double: D.Double,
  float64: D.Double,
  string: D.String,
  text: D.String,
  wstring: D.String,
  dt: D.DateTime,
  datetime: D.DateTime,
  dateandtime: D.DateTime,
};

/** A DataType of the loaded models by its name; asked before the words of controllers. */
export type FindDataType = (name: string) => NodeKey | undefined;

export type SignalList = { readonly signals: readonly Signal[]; readonly problems: readonly Problem[] };

/**
 * Reads the rows below the head. A row without a name, or with one that its group has already, is left out with a problem;
 * what else is not understood is told and the row taken without it. Codes: `signal-list.*`, at line and attribute.
 */
export function readSignalList(table: TextTable, columns: ColumnChoice, findDataType: FindDataType = () => undefined): SignalList {
  const problems: Problem[] = [];
  const signals: Signal[] = [];
  const taken = new Set<string>();
  if (columns.name === undefined) return { signals, problems: [problem("signal-list.no-name-column")] };
  for (const { line, fields } of table.rows.slice(1)) {
    const get = (field: SignalField): string => (columns[field] === undefined ? "" : (fields[columns[field]] ?? ""));
    const signal = readSignal(line, get, problems, findDataType);
    if (!signal) continue;
    const path = `${signal.group ?? ""}/${signal.name}`;
    if (taken.has(path)) problems.push(problem("signal-list.name-twice", { name: signal.name }, { line }));
    else signals.push(signal);
    taken.add(path);
  }
  return { signals, problems };
}

function readSignal(
  line: number,
  get: (field: SignalField) => string,
  problems: Problem[],
  findDataType: FindDataType,
): Signal | undefined {
  const title = get("name");
  const name = toBrowseName(title);
  if (name === "") {
    problems.push(problem("signal-list.no-name", {}, { line }));
    return undefined;
  }
  const unit = readUnit(get("unit"), line, problems);
  const range = readRange(get("low"), get("high"), line, problems);
  const dataType =
    findDataType(get("dataType")) ?? readDataType(get("dataType"), unit !== undefined || range !== undefined, line, problems);
  const isNumeric = numeric.has(dataType);
  if (!isNumeric && (unit || range))
    problems.push(problem.warning("signal-list.not-numeric", { name }, { line, attribute: "unit" }));
  return {
    line,
    name,
    title,
    group: toGroupPath(get("group")) || undefined,
    dataType,
    unit: isNumeric ? unit : undefined,
    range: isNumeric ? range : undefined,
    description: get("description") || undefined,
    isOptional: /^(o|opt|optional|no|nein|false|0)$/i.test(get("rule")),
    isWritable: /w|schreib/i.test(get("access")) || /^(yes|true|1|ja)$/i.test(get("access")),
  };
}

const numeric: ReadonlySet<NodeKey> = new Set([
  D.SByte,
  D.Byte,
  D.Int16,
  D.UInt16,
  D.Int32,
  D.UInt32,
  D.Int64,
  D.UInt64,
  D.Float,
  D.Double,
]);

/** `creel distance` → `CreelDistance`; signs between words fall away. */
export function toBrowseName(text: string): string {
  return text
    .split(/[^\p{L}\p{N}]+/u)
    .filter(Boolean)
    .map((word) => word.charAt(0).toUpperCase() + word.slice(1))
    .join("");
}

/** `drive / gearbox` → `Drive/Gearbox`: groups inside of groups. */
function toGroupPath(text: string): string {
  return text.split(/[/\\]/).map(toBrowseName).filter(Boolean).join("/");
}

function readDataType(text: string, isMeasured: boolean, line: number, problems: Problem[]): NodeKey {
  const usual = isMeasured ? D.Float : D.String;
  if (text === "") return usual;
  const found =
    dataTypes[
      text
        .toLowerCase()
        .replace(/[^a-z0-9]/g, "")
        .replace(/^string\d+$/, "string")
    ];
  if (found === undefined)
    problems.push(
      problem.warning(
        "signal-list.unknown-data-type",
        { text, taken: isMeasured ? "Float" : "String" },
        { line, attribute: "dataType" },
      ),
    );
  return found ?? usual;
}

let unitsByText: ReadonlyMap<string, Unit> | undefined;

/** Units by code, symbol and name. A text that several units share names the one that plants use most. */
function getUnitsByText(): ReadonlyMap<string, Unit> {
  if (unitsByText) return unitsByText;
  const map = new Map<string, Unit>();
  const add = (text: string, unit: Unit): void => {
    if (!map.has(text)) map.set(text, unit);
  };
  const usual = COMMON_CODES.flatMap((code) => unitByCode(code) ?? []);
  for (const unit of [...usual, ...listUnits()]) for (const symbol of listSymbols(unit)) add(symbol, unit);
  for (const unit of listUnits()) add(unit.name.toLowerCase(), unit);
  for (const unit of listUnits()) add(unit.code, unit);
  return (unitsByText = map);
}

/** How plants write units that the table writes otherwise (common practice, no source). */
const plantWords: Readonly<Record<string, string>> = {
  rpm: "RPM",
  "1/min": "RPM",
  "u/min": "RPM",
  c: "CEL",
  degc: "CEL",
  kwh: "KWH",
  "m3/h": "MQH",
  "l/min": "L2",
  pct: "P1",
};

function readUnit(text: string, line: number, problems: Problem[]): Unit | undefined {
  const wanted = text.replace(/^\[(.*)\]$/, "$1").trim();
  if (wanted === "" || wanted === "-") return undefined;
  const units = getUnitsByText();
  const unit =
    units.get(wanted) ?? units.get(wanted.toLowerCase()) ?? units.get(plantWords[wanted.toLowerCase()] ?? "");
  if (!unit) problems.push(problem.warning("signal-list.unknown-unit", { text: wanted }, { line, attribute: "unit" }));
  return unit;
}

function readRange(low: string, high: string, line: number, problems: Problem[]): Signal["range"] {
  if (low === "" && high === "") return undefined;
  const range = { low: toNumber(low), high: toNumber(high) };
  if (Number.isFinite(range.low) && Number.isFinite(range.high) && range.low < range.high) return range;
  problems.push(
    problem.warning(
      "signal-list.range",
      { low: low || "nothing", high: high || "nothing" },
      { line, attribute: "low" },
    ),
  );
  return undefined;
}

/** Figures with point or comma, minus as hyphen or U+2212. */
function toNumber(text: string): number {
  const plain = text.replace(/[\s\u202f\u2009]/g, "").replace("\u2212", "-");
  if (plain === "") return Number.NaN;
  return Number(/^-?\d+,\d+$/.test(plain) ? plain.replace(",", ".") : plain);
}
