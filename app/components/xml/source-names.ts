/** What the NodeIds and aliases of the source text stand for. Pure. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { findTypeDefinition, getDisplayName } from "~/domain/address-space/browse";
import type { Node } from "~/domain/address-space/node";
import { OPC_UA_NAMESPACE, parseNodeId } from "~/domain/address-space/node-id";
import { findText } from "~/domain/address-space/qualified-name";
import { formatPath, getNodeName } from "../model/member-facts";
import { getNamespaceLabel } from "../model/namespace-label";

/** Namespace table and aliases of a text, as its head declares them. */
export type SourceTables = { readonly namespaceUris: readonly string[]; readonly aliases: ReadonlyMap<string, string> };

export function readTables(text: string): SourceTables {
  const head = text.slice(0, 200_000);
  const uris = /<NamespaceUris>([\s\S]*?)<\/NamespaceUris>/.exec(head)?.[1] ?? "";
  const aliases = /<Aliases>([\s\S]*?)<\/Aliases>/.exec(head)?.[1] ?? "";
  return {
    namespaceUris: [OPC_UA_NAMESPACE, ...[...uris.matchAll(/<Uri>([^<]*)<\/Uri>/g)].map((match) => decode(match[1] ?? ""))],
    aliases: new Map([...aliases.matchAll(/<Alias\s+Alias="([^"]*)"\s*>([^<]*)<\/Alias>/g)].map((match) => [decode(match[1] ?? ""), decode(match[2] ?? "")])),
  };
}

const ENTITIES: Readonly<Record<string, string>> = { amp: "&", lt: "<", gt: ">", quot: '"', apos: "'" };

function decode(text: string): string {
  return text.trim().replace(/&(amp|lt|gt|quot|apos);/g, (_, name: string) => ENTITIES[name] ?? "");
}

export type NamedPlace = { readonly node: Node; readonly from: number; readonly to: number };

/** The node that the text under the column (0-based) stands for: what is between two quotes, or between two tags. */
export function findNamed(space: AddressSpace, tables: SourceTables, line: string, column: number): NamedPlace | undefined {
  const from = Math.max(line.lastIndexOf('"', column - 1), line.lastIndexOf(">", column - 1)) + 1;
  const ends = [line.indexOf('"', column), line.indexOf("<", column)].filter((end) => end >= 0);
  const to = Math.min(...ends);
  if (from === 0 || ends.length === 0 || from >= to) return undefined;
  const text = decode(line.slice(from, to));
  const id = parseNodeId(tables.aliases.get(text) ?? text, tables.namespaceUris);
  const node = id.ok ? space.findByNodeId(id.value) : undefined;
  return node && { node, from, to };
}

/** A few lines in Markdown: name and class, where it stands, what it is, what its model says of it. */
export function describeNamed(space: AddressSpace, node: Node): string[] {
  const definition = findTypeDefinition(space, node.key);
  const place = space.isOwn(node.key) ? formatPath(space, node.key) : getNamespaceLabel(node.nodeId.namespaceUri);
  const description = findText(node.description ?? []);
  return [
    `**${escape(getDisplayName(node))}** · ${node.nodeClass}${definition === undefined ? "" : ` of type *${escape(getNodeName(space, definition))}*`}`,
    escape(place),
    ...(description ? [escape(description)] : []),
  ];
}

function escape(text: string): string {
  return text.replace(/[\\`*_{}[\]()#+\-.!<>|]/g, "\\$&");
}
