/**
 * Texts of ids and names in one file that is written. The namespace table is the file's own; a namespace that edits newly
 * need is added at its end, so that indices in the rest of the file stay.
 */
import type { ModelHeader } from "../address-space/model-header";
import type { Node } from "../address-space/node";
import {
  escapeUri,
  formatNodeId,
  formatNodeIdWithIndex,
  OPC_UA_NAMESPACE,
  parseNodeKey,
  standardKey,
  type NodeId,
  type NodeKey,
} from "../address-space/node-id";
import type { QualifiedName } from "../address-space/qualified-name";
import { STANDARD_ALIASES } from "./standard-aliases";

export class IdWriter {
  readonly namespaceUris: string[];
  readonly serverUris: readonly string[];
  readonly #indices = new Map<string, number>([[OPC_UA_NAMESPACE, 0]]);
  readonly #texts = new Map<NodeKey, string>();
  readonly #aliases: ReadonlyMap<NodeKey, string>;
  readonly #usedAliases: Map<string, NodeKey> | undefined;
  readonly #findNodeId: (key: NodeKey) => NodeId | undefined;

  constructor(header: ModelHeader, nodes: readonly Node[], findNodeId: (key: NodeKey) => NodeId | undefined) {
    this.namespaceUris = [...header.namespaceUris];
    this.serverUris = [...(header.serverUris ?? [])];
    this.namespaceUris.forEach((uri, i) => {
      if (!this.#indices.has(uri)) this.#indices.set(uri, i + 1);
    });
    this.#findNodeId = findNodeId;
    // A node's key is the id that it was first seen under; what is written is the id that it has now.
    for (const node of nodes) this.#texts.set(node.key, this.formatId(node.nodeId));
    this.#usedAliases = header.aliases ? undefined : new Map();
    this.#aliases = header.aliases ? invert(header.aliases) : standardAliases();
  }

  /** The index of a namespace; one that the table lacks is added. */
  indexOf(namespaceUri: string): number {
    const known = this.#indices.get(namespaceUri);
    if (known !== undefined) return known;
    const index = this.namespaceUris.push(namespaceUri);
    this.#indices.set(namespaceUri, index);
    return index;
  }

  formatId(id: NodeId): string {
    return formatNodeIdWithIndex(id, (uri) => this.indexOf(uri));
  }

  formatKey(key: NodeKey): string {
    const known = this.#texts.get(key);
    if (known !== undefined) return known;
    const text = this.formatId(this.#findNodeId(key) ?? parseNodeKey(key));
    this.#texts.set(key, text);
    return text;
  }

  /** The alias of a reference type or data type where there is one, else its id. */
  formatType(key: NodeKey): string {
    const alias = this.#aliases.get(key);
    if (alias === undefined) return this.formatKey(key);
    this.#usedAliases?.set(alias, key);
    return alias;
  }

  /**
   * A target on another server: `svr=1;…`. What the tables of the file do not have is spelled out (`svu=`, `nsu=`), so that
   * a reference to elsewhere adds nothing to them.
   */
  formatTarget(key: NodeKey, serverUri: string | undefined): string {
    if (serverUri === undefined) return this.formatKey(key);
    const index = this.serverUris.indexOf(serverUri) + 1;
    const server = index === 0 ? `svu=${escapeUri(serverUri)}` : `svr=${index}`;
    const id = this.#findNodeId(key) ?? parseNodeKey(key);
    return `${server};${this.#indices.has(id.namespaceUri) ? this.formatId(id) : formatNodeId(id)}`;
  }

  /** `N:Name`; without index in namespace 0, except where the name itself would then look as if it had one. */
  formatName(name: QualifiedName): string {
    const index = this.indexOf(name.namespaceUri);
    return index === 0 && !/^\d+:/.test(name.name) ? name.name : `${index}:${name.name}`;
  }

  /** The aliases that were used, by id, for a header that has none of its own. */
  listUsedAliases(): (readonly [string, NodeKey])[] {
    const numberOf = (key: NodeKey): number => Number(key.slice(2));
    return [...(this.#usedAliases ?? [])].sort((a, b) => numberOf(a[1]) - numberOf(b[1]));
  }
}

function invert(aliases: readonly (readonly [string, NodeKey])[]): Map<NodeKey, string> {
  const map = new Map<NodeKey, string>();
  for (const [alias, key] of aliases) if (!map.has(key)) map.set(key, alias);
  return map;
}

function standardAliases(): Map<NodeKey, string> {
  return new Map([...STANDARD_ALIASES].map(([alias, identifier]) => [standardKey(identifier), alias]));
}
