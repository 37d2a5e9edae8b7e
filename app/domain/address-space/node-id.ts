/**
 * NodeIds and node keys.
 *
 * A NodeId inside the domain is (namespace URI, identifier); indices exist only in files and on the wire. A node key is
 * the opaque identity of a node inside Ferrule: the text of the NodeId under which the node was first seen. It never
 * changes afterwards, not even when the NodeId is renumbered, and since a NodeId is never given twice, neither is a key.
 * References, layout, comments and mappings name keys. Code may compare keys and look them up, never take them apart;
 * the one exception is a reference to a node that is not loaded, where the key is all that is known of the NodeId.
 */
import { fail, ok, problem, type Result } from "../core/result";

export const OPC_UA_NAMESPACE = "http://opcfoundation.org/UA/";

export type IdentifierType = "i" | "s" | "g" | "b";

/** A NodeId after OPC 10000-3 §8.2. `identifier` is a number for "i" (0…4294967295), else text (GUID in lower case, base64). */
export type NodeId = {
  readonly namespaceUri: string;
  readonly type: IdentifierType;
  readonly identifier: number | string;
};

declare const nodeKeyBrand: unique symbol;
/** Opaque identity of a node; see the head of this file. */
export type NodeKey = string & { readonly [nodeKeyBrand]: true };

const GUID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/i;
const BASE64 = /^(?:[A-Za-z0-9+/]{4})*(?:[A-Za-z0-9+/]{2}==|[A-Za-z0-9+/]{3}=)?$/;
export const MAX_NUMERIC_IDENTIFIER = 4294967295;

export function numericNodeId(namespaceUri: string, identifier: number): NodeId {
  return { namespaceUri, type: "i", identifier };
}

/** Text with the namespace URI: `i=58` in namespace 0, else `nsu=URI;i=58` (OPC 10000-6 §5.1.12; `;` and `%` in the URI are escaped). */
export function formatNodeId(id: NodeId): string {
  const local = `${id.type}=${id.identifier}`;
  return id.namespaceUri === OPC_UA_NAMESPACE ? local : `nsu=${escapeUri(id.namespaceUri)};${local}`;
}

/** Text with a namespace index, as in files: `ns=1;i=58`, no prefix for index 0. */
export function formatNodeIdWithIndex(id: NodeId, indexOf: (namespaceUri: string) => number): string {
  const local = `${id.type}=${id.identifier}`;
  const index = indexOf(id.namespaceUri);
  return index === 0 ? local : `ns=${index};${local}`;
}

/** The key of a node first seen under this NodeId. */
export function toNodeKey(id: NodeId): NodeKey {
  return formatNodeId(id) as NodeKey;
}

/** Key of a node of namespace 0 by its numeric id, for the constants of `standard-ids.ts`. */
export function standardKey(identifier: number): NodeKey {
  return `i=${identifier}` as NodeKey;
}

/** The NodeId that a key was made from: what is known of a node that is not loaded. */
export function parseNodeKey(key: NodeKey): NodeId {
  const result = parseNodeId(key, []);
  if (!result.ok) throw new RangeError(`Not a node key: ${key}`);
  return result.value;
}

/**
 * Reads `[nsu=URI;|ns=N;]t=identifier` (OPC 10000-6 §5.1.12). `namespaceUris` is the file's table with the OPC UA
 * namespace at index 0. Problems: `node-id.syntax`, `node-id.namespace-index`, `node-id.numeric-range`.
 */
export function parseNodeId(text: string, namespaceUris: readonly string[]): Result<NodeId> {
  let rest = text;
  let namespaceUri = OPC_UA_NAMESPACE;
  if (rest.startsWith("ns=")) {
    const end = rest.indexOf(";");
    const digits = end < 0 ? "" : rest.slice(3, end);
    if (!/^\d{1,5}$/.test(digits)) return fail(problem("node-id.syntax", { text }));
    const index = Number(digits);
    const uri = index === 0 ? OPC_UA_NAMESPACE : namespaceUris[index];
    if (uri === undefined)
      return fail(problem("node-id.namespace-index", { text, index, count: namespaceUris.length }));
    namespaceUri = uri;
    rest = rest.slice(end + 1);
  } else if (rest.startsWith("nsu=")) {
    const end = rest.indexOf(";");
    if (end < 5) return fail(problem("node-id.syntax", { text }));
    namespaceUri = unescapeUri(rest.slice(4, end));
    rest = rest.slice(end + 1);
  }
  return parseIdentifier(rest, namespaceUri, text);
}

function parseIdentifier(rest: string, namespaceUri: string, text: string): Result<NodeId> {
  const value = rest.slice(2);
  if (rest[1] !== "=") return fail(problem("node-id.syntax", { text }));
  switch (rest[0]) {
    case "i": {
      if (!/^\d+$/.test(value)) return fail(problem("node-id.syntax", { text }));
      const identifier = Number(value);
      if (identifier > MAX_NUMERIC_IDENTIFIER) return fail(problem("node-id.numeric-range", { text }));
      return ok({ namespaceUri, type: "i", identifier });
    }
    case "s":
      return ok({ namespaceUri, type: "s", identifier: value });
    case "g":
      if (!GUID.test(value)) return fail(problem("node-id.syntax", { text }));
      return ok({ namespaceUri, type: "g", identifier: value.toLowerCase() });
    case "b":
      if (!BASE64.test(value)) return fail(problem("node-id.syntax", { text }));
      return ok({ namespaceUri, type: "b", identifier: value });
    default:
      return fail(problem("node-id.syntax", { text }));
  }
}

export function isSameNodeId(a: NodeId, b: NodeId): boolean {
  return a.namespaceUri === b.namespaceUri && a.type === b.type && a.identifier === b.identifier;
}

/** A null NodeId (OPC 10000-3 §8.2.4, Table 24): zero or empty identifier in namespace 0. */
export function isNullNodeId(id: NodeId): boolean {
  if (id.namespaceUri !== OPC_UA_NAMESPACE) return false;
  if (id.type === "i") return id.identifier === 0;
  return id.identifier === "" || id.identifier === "00000000-0000-0000-0000-000000000000";
}

/** A URI inside an id: `;` ends it and `%` begins an escape (OPC 10000-6 §5.1.12). */
export function escapeUri(uri: string): string {
  return uri.includes("%") || uri.includes(";") ? uri.replace(/%/g, "%25").replace(/;/g, "%3B") : uri;
}

export function unescapeUri(text: string): string {
  return text.includes("%") ? text.replace(/%3B/gi, ";").replace(/%25/g, "%") : text;
}
