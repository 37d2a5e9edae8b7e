/**
 * Turns NodeId texts and aliases of one file into keys. Each different text is resolved once: published files repeat
 * `i=40` or `HasProperty` tens of thousands of times.
 */
import {
  OPC_UA_NAMESPACE,
  parseNodeId,
  standardKey,
  toNodeKey,
  type NodeId,
  type NodeKey,
  unescapeUri,
} from "../address-space/node-id";
import { parseQualifiedName, type QualifiedName } from "../address-space/qualified-name";
import { fail, ok, problem, type Problem, type Result } from "../core/result";
import { STANDARD_ALIASES } from "./standard-aliases";

export type Target = { readonly key: NodeKey; readonly serverUri?: string };

const NO_PROBLEMS: readonly Problem[] = [];

export class IdTable {
  /** With the OPC UA namespace at index 0. */
  readonly namespaceUris: readonly string[];
  readonly #serverUris: readonly string[];
  readonly #aliases: ReadonlyMap<string, string>;
  readonly #keys = new Map<string, NodeKey>();
  readonly #aliasEnds = new Map<string, string | undefined>();
  readonly #reportedAliases = new Set<string>();

  /** What stands before the identifier in a key, by namespace index. */
  readonly #keyHeads: readonly string[];

  constructor(namespaceUris: readonly string[], serverUris: readonly string[], aliases: ReadonlyMap<string, string>) {
    this.namespaceUris = [OPC_UA_NAMESPACE, ...namespaceUris];
    this.#keyHeads = this.namespaceUris.map((uri) =>
      toNodeKey({ namespaceUri: uri, type: "s", identifier: "" }).slice(0, -2),
    );
    this.#serverUris = serverUris;
    this.#aliases = aliases;
  }

  /** The key that the text was resolved to before; the quick way for what repeats. */
  findKnown(text: string): NodeKey | undefined {
    return this.#keys.get(text);
  }

  /** The key of a NodeId or alias. Problems: those of `parseNodeId`, `nodeset.alias-unknown`, `-undefined`, `-cycle`. */
  resolve(text: string): Result<NodeKey> {
    const known = this.#keys.get(text);
    if (known !== undefined) return ok(known, NO_PROBLEMS);
    const numeric = findNumericId(text);
    if (numeric && !this.#aliases.has(text)) {
      const head = this.#keyHeads[numeric.index];
      if (head !== undefined) {
        const key = (head + text.slice(numeric.start)) as NodeKey;
        this.#keys.set(text, key);
        return ok(key, NO_PROBLEMS);
      }
    }
    const result = this.#resolveText(trimId(text));
    if (result.ok) this.#keys.set(text, result.value);
    return result;
  }

  /** The target of a reference, which may stand on another server: `svr=1;i=85` (OPC 10000-6 §5.1.12). */
  resolveTarget(text: string): Result<Target> {
    const first = text.charCodeAt(0);
    // `svr=` and `svu=` begin with an s, as string identifiers and some aliases do; nothing else need be looked at.
    const trimmed = first === 115 || first <= 32 ? trimId(text) : "";
    const match = /^(?:svr=(\d{1,9})|svu=([^;]+));/.exec(trimmed);
    if (!match) {
      const result = this.resolve(text);
      return result.ok ? ok({ key: result.value }, result.problems) : result;
    }
    const serverUri = match[1] === undefined ? unescapeUri(match[2] ?? "") : this.#serverUriAt(Number(match[1]));
    if (serverUri === undefined) {
      return fail(
        problem("nodeset.server-index", { text: trimmed, index: Number(match[1]), count: this.#serverUris.length }),
      );
    }
    const result = this.#resolveText(trimmed.slice(match[0].length));
    if (!result.ok) return result;
    return ok(serverUri === "" ? { key: result.value } : { key: result.value, serverUri }, result.problems);
  }

  /** The NodeId of a node that is defined here: no alias, no other server. */
  parseOwn(text: string): Result<NodeId> {
    const numeric = findNumericId(text);
    const namespaceUri = numeric && this.namespaceUris[numeric.index];
    if (numeric && namespaceUri !== undefined) {
      return ok({ namespaceUri, type: "i", identifier: Number(text.slice(numeric.start + 2)) }, NO_PROBLEMS);
    }
    return parseNodeId(trimId(text), this.namespaceUris);
  }

  /** A BrowseName. A name of namespace 0, the usual case of nothing before the name, costs no pattern. */
  parseName(text: string): Result<QualifiedName> {
    const first = text.charCodeAt(0);
    if (!(first >= 48 && first <= 57)) return ok({ namespaceUri: OPC_UA_NAMESPACE, name: text }, NO_PROBLEMS);
    return parseQualifiedName(text, this.namespaceUris);
  }

  /** The server behind an index; "" is the server of the file itself. */
  #serverUriAt(index: number): string | undefined {
    return index === 0 ? "" : this.#serverUris[index - 1];
  }

  #resolveText(text: string): Result<NodeKey> {
    const end = this.#aliases.has(text) ? this.#followAliases(text) : text;
    if (end === undefined) return fail(problem("nodeset.alias-cycle", { alias: text }));
    if (/^(?:ns=|nsu=|[isgb]=)/.test(end)) {
      const result = parseNodeId(end, this.namespaceUris);
      return result.ok ? ok(toNodeKey(result.value)) : result;
    }
    return this.#resolveStandardName(end);
  }

  /** What a chain of aliases ends at, undefined for a circle; remembered for each alias that was passed. */
  #followAliases(alias: string): string | undefined {
    const passed = new Set<string>();
    let at: string | undefined = alias;
    while (at !== undefined && !this.#aliasEnds.has(at)) {
      const meaning = this.#aliases.get(at);
      if (meaning === undefined) break;
      passed.add(at);
      at = passed.has(meaning) ? undefined : meaning;
    }
    const end = at !== undefined && this.#aliasEnds.has(at) ? this.#aliasEnds.get(at) : at;
    for (const one of passed) this.#aliasEnds.set(one, end);
    return end;
  }

  #resolveStandardName(alias: string): Result<NodeKey> {
    const identifier = STANDARD_ALIASES.get(alias);
    if (identifier === undefined) return fail(problem("nodeset.alias-unknown", { alias }));
    const key = standardKey(identifier);
    if (this.#reportedAliases.has(alias)) return ok(key);
    this.#reportedAliases.add(alias);
    return ok(key, [problem.warning("nodeset.alias-undefined", { alias, nodeId: key })]);
  }
}

/**
 * The usual form of ids, `i=40` or `ns=1;i=6001` without leading zeros: namespace index and where `i=` starts. Undefined
 * for every other form, which then takes the slow way with all its checks.
 */
function findNumericId(text: string): { readonly index: number; readonly start: number } | undefined {
  let start = 0;
  let index = 0;
  if (text.charCodeAt(0) === 110) {
    start = text.indexOf(";") + 1;
    if (!text.startsWith("ns=") || start < 5 || start > 9) return undefined;
    for (let at = 3; at < start - 1; at++) {
      const digit = text.charCodeAt(at) - 48;
      if (digit < 0 || digit > 9) return undefined;
      index = index * 10 + digit;
    }
  }
  const digits = text.length - start - 2;
  // Nine digits are always in range; the tenth is left to the slow way.
  if (digits < 1 || digits > 9 || text.charCodeAt(start) !== 105 || text.charCodeAt(start + 1) !== 61) return undefined;
  if (digits > 1 && text.charCodeAt(start + 2) === 48) return undefined;
  for (let at = start + 2; at < text.length; at++) {
    const code = text.charCodeAt(at);
    if (code < 48 || code > 57) return undefined;
  }
  return { index, start };
}

/** Without the white space that exporters put around ids; spaces at the end of a string identifier are part of it. */
function trimId(text: string): string {
  const trimmed = text.trim();
  if (trimmed.length === text.length || !/^(?:[^;]*;){0,2}s=/.test(trimmed)) return trimmed;
  const tail = text.slice(text.indexOf(trimmed) + trimmed.length);
  return /[\r\n]/.test(tail) ? trimmed : trimmed + tail;
}
