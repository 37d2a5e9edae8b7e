/**
 * Tag lists of controllers: a table whose columns a person has matched, made into tags. Four kinds of place: a Modbus
 * register or bit, a name, a path in a JSON answer, a node of an OPC UA server. A line that cannot be read is a problem
 * with its line; the others are read all the same, and who imports decides.
 */
import { fail, ok, problem, type Problem, type Result } from "../core/result";
import { findUnits, unitByCode } from "../units/units";
import { octetOrders, type registerTypes } from "./mapping";
import type { Tag } from "./tag";

export const tagColumns = ["name", "address", "table", "type", "order", "bit", "scale", "offset", "unit", "path", "nodeId", "comment"] as const;
export type TagColumn = (typeof tagColumns)[number];

/** Header of the column that holds it. */
export type ColumnMatch = Readonly<Partial<Record<TagColumn, string>>>;

export type TagReading = {
  readonly columns: ColumnMatch;
  /**
   * How addresses are written: as on the wire from 0, from 1 within their table, or with the table's digit before them
   * (40001 = holding register 0). The digit is a custom of documentation, no part of the specification.
   */
  readonly addressing: "wire" | "one-based" | "prefixed";
  /** For lists that do not say it. */
  readonly table: "coil" | "discrete-input" | "holding-register" | "input-register";
  readonly order: (typeof octetOrders)[number];
};

export const TAG_LIMITS = { rows: 200_000, problems: 200, columns: 200, characters: 50_000_000 } as const;

export type TagTable = { readonly head: readonly string[]; readonly rows: readonly { readonly line: number; readonly fields: readonly string[] }[] };

/** Which column is likely to mean what, by its name. */
export function guessColumns(head: readonly string[]): ColumnMatch {
  const match: Partial<Record<TagColumn, string>> = {};
  for (const column of tagColumns) {
    const words = WORDS[column];
    const found = head.find((name) => words.test(name.trim()) && !Object.values(match).includes(name));
    if (found !== undefined) match[column] = found;
  }
  return match;
}

/** Common practice in lists of controllers; no source. */
const WORDS: Readonly<Record<TagColumn, RegExp>> = {
  name: /^(name|tag|tag ?name|symbol|variable|signal)$/i,
  address: /^(address|addr|register|adresse|offset ?address|modbus ?address)$/i,
  table: /^(table|area|register ?type|function|object ?type)$/i,
  type: /^(type|data ?type|datentyp|format)$/i,
  order: /^(order|byte ?order|word ?order|endian(ness)?)$/i,
  bit: /^(bit|bit ?(no|number|offset))$/i,
  scale: /^(scale|factor|gain|gradient|multiplier)$/i,
  offset: /^(offset|bias)$/i,
  unit: /^(unit|eu|engineering ?unit|einheit)$/i,
  path: /^(path|json ?path|field)$/i,
  nodeId: /^(node ?id|opc ?node|opc ?ua ?node)$/i,
  comment: /^(comment|description|remark|bemerkung|note)$/i,
};

/** Problems: `tags.no-name-column`, `tags.too-many` with the limit; for lines `tags.line` as warnings. */
export function readTags(table: TagTable, reading: TagReading): Result<Tag[]> {
  const { head, rows } = table;
  if (rows.length > TAG_LIMITS.rows) return fail(problem("tags.too-many", { limit: TAG_LIMITS.rows }, { line: TAG_LIMITS.rows + 2 }));
  const places = new Map<TagColumn, number>();
  for (const column of tagColumns) {
    const at = head.indexOf(reading.columns[column] ?? "\u0000");
    if (at >= 0) places.set(column, at);
  }
  if (!places.has("name")) return fail(problem("tags.no-name-column"));
  const tags: Tag[] = [];
  const problems: Problem[] = [];
  // Lists have few units and many lines.
  const units = new Map<string, string | undefined>();
  for (const { line, fields } of rows) {
    const cell = (column: TagColumn): string => (places.has(column) ? (fields[places.get(column) ?? -1] ?? "").trim() : "");
    if (cell("name") === "") continue;
    const tag = readTag(cell, line, reading, units);
    if (tag.ok) tags.push(tag.value);
    else if (problems.length < TAG_LIMITS.problems) problems.push(...tag.problems.map((p) => ({ ...p, severity: "warning" as const, at: { line } })));
  }
  return ok(tags, problems);
}

type Cell = (column: TagColumn) => string;

function readTag(cell: Cell, line: number, reading: TagReading, units: Map<string, string | undefined>): Result<Tag> {
  const reference = readPlace(cell, reading);
  if (!reference.ok) return reference;
  const scale = readNumber(cell("scale"));
  const offset = readNumber(cell("offset"));
  if (scale === "bad" || offset === "bad") return fail(problem("tags.line", { message: `“${cell("scale")} ${cell("offset")}” is no number` }));
  const unitText = cell("unit");
  if (!units.has(unitText)) units.set(unitText, readUnit(unitText));
  const unit = units.get(unitText);
  return ok({
    name: cell("name").slice(0, 1_000),
    reference: reference.value,
    line,
    ...(cell("type") === "" ? {} : { dataType: cell("type").slice(0, 200) }),
    ...(unit === undefined ? {} : { unit }),
    ...(scale === undefined ? {} : { scale }),
    ...(offset === undefined ? {} : { offset }),
    ...(cell("comment") === "" ? {} : { comment: cell("comment").slice(0, 2_000) }),
  });
}

function readPlace(cell: Cell, reading: TagReading): Result<Tag["reference"]> {
  if (cell("nodeId") !== "") return ok({ kind: "opc-ua-node", nodeId: cell("nodeId").slice(0, 5_000) });
  if (cell("path") !== "") {
    const path = cell("path").split(/[./[\]]+/).filter((step) => step !== "" && step !== "$").map((step) => (/^\d+$/.test(step) ? Number(step) : step));
    return path.length === 0 || path.length > 32 ? fail(problem("tags.line", { message: `“${cell("path")}” is no path` })) : ok({ kind: "json-path", path });
  }
  if (cell("address") === "") return ok({ kind: "tag", name: cell("name").slice(0, 1_000) });
  return readRegister(cell, reading);
}

function readRegister(cell: Cell, reading: TagReading): Result<Tag["reference"]> {
  const place = readAddress(cell("address"), reading);
  const table = cell("table") === "" ? (place?.table ?? reading.table) : readTable(cell("table"));
  if (!place || place.address < 0 || place.address > 65_535) return fail(problem("tags.line", { message: `“${cell("address")}” is no register address` }));
  if (table === undefined) return fail(problem("tags.line", { message: `“${cell("table")}” is no Modbus table` }));
  const bitText = cell("bit") === "" ? place.bit : cell("bit");
  const bit = bitText === undefined ? undefined : Number(bitText);
  if (bit !== undefined && !(Number.isInteger(bit) && bit >= 0 && bit <= 15)) return fail(problem("tags.line", { message: `“${bitText}” is no bit of a word` }));
  const isWord = table === "holding-register" || table === "input-register";
  const type = isWord ? readType(cell("type")) : undefined;
  if (isWord && bit === undefined && type === undefined) return fail(problem("tags.line", { message: `“${cell("type")}” is no register type` }));
  const orderText = cell("order").toUpperCase();
  const order = orderText === "" ? reading.order : octetOrders.find((o) => o === orderText);
  if (!order) return fail(problem("tags.line", { message: `“${cell("order")}” is no order; write ABCD, CDAB, BADC or DCBA` }));
  const isFlag = type === "boolean";
  return ok({
    kind: "register",
    table,
    address: place.address,
    ...(isWord && bit === undefined && !isFlag ? { type: type as (typeof registerTypes)[number], order } : {}),
    ...(isWord && (bit !== undefined || isFlag) ? { bit: bit ?? 0 } : {}),
  });
}

const PREFIXES = { "0": "coil", "1": "discrete-input", "3": "input-register", "4": "holding-register" } as const;

function readAddress(text: string, { addressing }: TagReading): { address: number; table?: TagReading["table"]; bit?: string } | undefined {
  const [, digits, bit] = /^((?:0x[0-9a-f]+)|\d+)(?:\.(\d+))?$/i.exec(text) ?? [];
  if (digits === undefined) return undefined;
  const common = bit === undefined ? {} : { bit };
  // A hexadecimal address is nearly always that of the wire (public manuals).
  if (/^0x/i.test(digits)) return { address: Number(digits), ...common };
  if (addressing === "wire") return { address: Number(digits), ...common };
  if (addressing === "one-based") return { address: Number(digits) - 1, ...common };
  const padded = digits.padStart(5, "0");
  const table = PREFIXES[padded[0] as keyof typeof PREFIXES];
  return table === undefined ? undefined : { address: Number(padded.slice(1)) - 1, table, ...common };
}

function readTable(text: string): TagReading["table"] | undefined {
  const folded = text.toLowerCase().replace(/[^a-z0-9]/g, "");
  if (/^(coils?|do|0x?|fc1|q)$/.test(folded)) return "coil";
  if (/^(discreteinputs?|di|contact|1x?|fc2)$/.test(folded)) return "discrete-input";
  if (/^(inputregisters?|ir|ai|3x?|fc4)$/.test(folded)) return "input-register";
  return /^(holdingregisters?|hr|mw|4x?|fc3)$/.test(folded) ? "holding-register" : undefined;
}

/** IEC 61131-3 elementary types (OPC 30000 §9.2.1 Table 27) and the names used here. */
const TYPES: Readonly<Record<string, (typeof registerTypes)[number] | "boolean">> = {
  bool: "boolean",
  boolean: "boolean",
  byte: "UInt16",
  word: "UInt16",
  uint: "UInt16",
  uint16: "UInt16",
  int: "Int16",
  int16: "Int16",
  dword: "UInt32",
  udint: "UInt32",
  uint32: "UInt32",
  dint: "Int32",
  int32: "Int32",
  real: "Float32",
  float: "Float32",
  float32: "Float32",
  lword: "UInt64",
  ulint: "UInt64",
  uint64: "UInt64",
  lint: "Int64",
  int64: "Int64",
  lreal: "Float64",
  double: "Float64",
  float64: "Float64",
};

function readType(text: string): (typeof registerTypes)[number] | "boolean" | undefined {
  return text === "" ? "UInt16" : TYPES[text.toLowerCase().replace(/[^a-z0-9]/g, "")];
}

function readNumber(text: string): number | undefined | "bad" {
  if (text === "") return undefined;
  const value = Number(text.replace(",", "."));
  return Number.isFinite(value) ? value : "bad";
}

/** By code or by the very symbol; what is neither is left to the person. */
function readUnit(text: string): string | undefined {
  if (text === "") return undefined;
  const [hit] = findUnits(text, 1);
  return hit && (hit.symbol === text || hit.name.toLowerCase() === text.toLowerCase()) ? hit.code : /^[0-9A-Z]{2,3}$/.test(text) ? unitByCode(text)?.code : undefined;
}
