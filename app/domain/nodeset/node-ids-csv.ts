/**
 * The NodeIds of a model as CSV, one line a node: symbol, identifier, node class (OPC 10000-6 §A.3). The symbol is the path
 * of symbolic names joined by `_` (`RopeBraiderType_Process_SpindleSpeed`), so another tool finds the node without its
 * NodeId. Numeric identifiers stand bare, others as `s=…`, `g=…`, `b=…`.
 */
import type { AddressSpace } from "../address-space/address-space";
import { findParent, listEdgesTo } from "../address-space/browse";
import { isTypeNode, type Node, type NodeClass } from "../address-space/node";
import { getOwnNamespace } from "../address-space/model-header";
import { formatNodeId, parseNodeId, type NodeId, type NodeKey } from "../address-space/node-id";
import { StandardReferenceType } from "../address-space/standard-ids";
import { ok, problem, type Problem, type Result } from "../core/result";

export type NodeIdRow = {
  readonly symbol: string;
  readonly nodeId: NodeId;
  readonly nodeClass: NodeClass;
  readonly line: number;
};

const CLASSES: ReadonlySet<string> = new Set<NodeClass>([
  "Object",
  "Variable",
  "Method",
  "View",
  "ObjectType",
  "VariableType",
  "DataType",
  "ReferenceType",
]);

/** The own nodes in their order; symbols that two nodes share get `_2`, `_3` … behind them. */
export function writeNodeIdsCsv(space: AddressSpace): string {
  const lines = [...listSymbols(space)].map(([key, symbol]) => {
    const node = space.requireNode(key);
    const { type, identifier } = node.nodeId;
    return [symbol, type === "i" ? String(identifier) : `${type}=${identifier}`, node.nodeClass].map(quote).join(",");
  });
  return lines.map((line) => `${line}\n`).join("");
}

/** Symbols of the own nodes, each once. */
export function listSymbols(space: AddressSpace): ReadonlyMap<NodeKey, string> {
  const symbols = new Map<NodeKey, string>();
  const counts = new Map<string, number>();
  for (const node of space.listOwnNodes()) {
    const symbol = makeSymbol(space, node);
    const count = (counts.get(symbol) ?? 0) + 1;
    counts.set(symbol, count);
    symbols.set(node.key, count === 1 ? symbol : `${symbol}_${count}`);
  }
  return symbols;
}

function makeSymbol(space: AddressSpace, node: Node): string {
  const parts: string[] = [];
  const seen = new Set<NodeKey>();
  for (let at: Node | undefined = node; at && !seen.has(at.key) && space.isOwn(at.key);) {
    seen.add(at.key);
    parts.unshift(at.symbolicName ?? at.browseName.name.replace(/[^A-Za-z0-9_]+/g, "_"));
    if (isTypeNode(at)) break;
    const encoded: NodeKey | undefined = listEdgesTo(space, at.key, StandardReferenceType.HasEncoding)[0]?.source;
    if (encoded !== undefined) parts.unshift("Encoding");
    const parent: NodeKey | undefined = encoded ?? findParent(space, at.key);
    at = parent === undefined ? undefined : space.getNode(parent);
  }
  return parts.join("_");
}

function quote(cell: string): string {
  return /[",\r\n]/.test(cell) ? `"${cell.replace(/"/g, '""')}"` : cell;
}

/**
 * Reads such a file; `namespaceUri` is that of its ids. Lines that cannot be read are told and left out. Problems:
 * `node-ids.columns`, `node-ids.class`, `node-ids.twice`, those of `parseNodeId`; each with its line.
 */
export function readNodeIdsCsv(text: string, namespaceUri: string): Result<readonly NodeIdRow[]> {
  const rows: NodeIdRow[] = [];
  const problems: Problem[] = [];
  const seen = new Map<string, number>();
  for (const { cells, line } of readCells(text)) {
    const [symbol = "", identifier = "", nodeClass = ""] = cells.map((cell) => cell.trim());
    const report = (code: string, data?: Problem["data"]): void =>
      void problems.push(problem(code, data, { line, column: 1 }));
    if (cells.length !== 3 || symbol === "") {
      report("node-ids.columns", { count: cells.length });
      continue;
    }
    if (!CLASSES.has(nodeClass)) {
      report("node-ids.class", { text: nodeClass });
      continue;
    }
    const parsed = parseNodeId(/^\d+$/.test(identifier) ? `i=${identifier}` : identifier, []);
    if (!parsed.ok) {
      problems.push(...parsed.problems.map((found) => ({ ...found, at: { line, column: 1 } })));
      continue;
    }
    const nodeId = { ...parsed.value, namespaceUri };
    for (const id of [symbol, formatNodeId(nodeId)]) {
      const first = seen.get(id);
      if (first !== undefined) report("node-ids.twice", { text: id, line: first });
      seen.set(id, first ?? line);
    }
    rows.push({ symbol, nodeId, nodeClass: nodeClass as NodeClass, line });
  }
  return ok(rows, problems);
}

function* readCells(text: string): Generator<{ cells: string[]; line: number }> {
  const cell = /("(?:[^"]|"")*"|[^,\r\n]*)(,|\r?\n|$)/gy;
  let cells: string[] = [];
  let line = 1;
  let start = 1;
  for (let match = cell.exec(text); match && match.index < text.length; match = cell.exec(text)) {
    const raw = match[1] ?? "";
    line += raw.split("\n").length - 1;
    cells.push(raw.startsWith('"') ? raw.slice(1, -1).replace(/""/g, '"') : raw);
    if (match[2] === ",") continue;
    if (cells.some((c) => c !== "")) yield { cells, line: start };
    cells = [];
    start = ++line;
  }
  if (cells.some((c) => c !== "")) yield { cells: [...cells, ""], line: start };
}

export type NodeIdPlan = {
  /** For `renumberNodes`. */
  readonly changes: readonly { readonly node: NodeKey; readonly nodeId: NodeId }[];
  /** Rows that name no node of the model, or one of another class. */
  readonly unknown: readonly NodeIdRow[];
  /** Own nodes that the file does not name. */
  readonly unnamed: readonly NodeKey[];
};

/** What the rows mean for the model: which nodes get which NodeIds. */
export function planNodeIds(space: AddressSpace, rows: readonly NodeIdRow[]): NodeIdPlan {
  const keys = new Map([...listSymbols(space)].map(([key, symbol]) => [symbol, key]));
  const changes: { node: NodeKey; nodeId: NodeId }[] = [];
  const unknown: NodeIdRow[] = [];
  for (const row of rows) {
    const key = keys.get(row.symbol);
    const node = key === undefined ? undefined : space.getNode(key);
    if (!node || node.nodeClass !== row.nodeClass) {
      unknown.push(row);
      continue;
    }
    keys.delete(row.symbol);
    const nodeId = { ...row.nodeId, namespaceUri: getOwnNamespace(space.own.header) };
    if (formatNodeId(nodeId) !== formatNodeId(node.nodeId)) changes.push({ node: node.key, nodeId });
  }
  return { changes, unknown, unnamed: [...keys.values()] };
}
