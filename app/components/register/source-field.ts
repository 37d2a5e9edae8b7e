/**
 * What feeds a member, from the mapping that the model or its types keep. The words for it come with the mapping's own code,
 * which is large, so they are loaded when a model is opened that has a mapping.
 */
import { useEffect, useSyncExternalStore } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { findMember, findParent, findTypeDefinition } from "~/domain/address-space/browse";
import { isTypeNode, type Node } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import type { QualifiedName } from "~/domain/address-space/qualified-name";
import { listSupertypes } from "~/domain/address-space/type-hierarchy";
import { listParts, readPart } from "~/domain/mapping/mapping-entries";
import type { RowContent } from "~/domain/mapping/mapping";
import type { describeSource, Roles } from "../mapping/describe-source";
import type { Feed } from "../notation/ferrule-badge";
import { isProperty } from "../model/member-facts";

export type SourceField = {
  readonly feed: Feed;
  /** The machine type whose mapping says it, and the name of the row there. */
  readonly type: NodeKey;
  readonly target: NodeKey;
  readonly row: RowContent | undefined;
  /** Why a machine differs from its type here. */
  readonly exception: string | undefined;
};

/** Undefined for what no mapping speaks of: Properties, Objects, members of a type without mapping. */
export function findSourceField(space: AddressSpace, node: Node): SourceField | undefined {
  if (node.nodeClass !== "Variable" || !hasMapping(space) || isProperty(space, node)) return undefined;
  const place = findPlace(space, node);
  if (!place || listParts(space, "row", place.type).length === 0) return undefined;
  const { type, target, machine } = place;
  const exception = machine === undefined ? undefined : readPart(space, "exception", machine, target);
  const common = readPart(space, "row", type, target);
  const row = exception?.isMissing ? undefined : common && exception?.row ? ({ ...common, ...exception.row } as RowContent) : common;
  return { feed: !row ? "open" : row.source.kind === "constant" ? "constant" : "fed", type, target, row, exception: exception?.reason };
}

export function hasMapping(space: AddressSpace): boolean {
  return space.layers.some((layer) => layer.mapping !== undefined && layer.mapping.size > 0);
}

type Place = { readonly type: NodeKey; readonly target: NodeKey; readonly machine: NodeKey | undefined };

/** In a type a member stands for itself; in a machine it is found in the type by the names on the way. */
function findPlace(space: AddressSpace, node: Node): Place | undefined {
  const names: QualifiedName[] = [node.browseName];
  const seen = new Set<NodeKey>([node.key]);
  let top: Node | undefined;
  for (let at = findParent(space, node.key); at !== undefined && !seen.has(at); at = findParent(space, at)) {
    const owner = space.getNode(at);
    if (!owner || (space.isOwn(node.key) && !space.isOwn(at))) break;
    if (isTypeNode(owner)) return { type: at, target: node.key, machine: undefined };
    seen.add(at);
    top = owner;
    names.unshift(owner.browseName);
  }
  const type = top && findTypeDefinition(space, top.key);
  const target = type === undefined ? undefined : findDeclaration(space, type, names.slice(1));
  return type !== undefined && target !== undefined && top ? { type, target, machine: top.key } : undefined;
}

function findDeclaration(space: AddressSpace, type: NodeKey, names: readonly QualifiedName[]): NodeKey | undefined {
  let at: NodeKey | undefined = type;
  for (const { name, namespaceUri } of names) {
    const owners: NodeKey[] = at === undefined ? [] : at === type ? [type, ...listSupertypes(space, type)] : [at];
    at = owners.map((owner) => findMember(space, owner, name, namespaceUri)?.key).find((key) => key !== undefined);
  }
  return at;
}

let words: typeof describeSource | undefined;
let loading: Promise<void> | undefined;
const listeners = new Set<() => void>();

function loadWords(): Promise<void> {
  return (loading ??= import("../mapping/describe-source").then((loaded) => {
    words = loaded.describeSource;
    for (const listener of [...listeners]) listener();
  }));
}

/** Brings the words where they are wanted, and draws again when they have come. */
export function useSourceWords(isWanted: boolean): boolean {
  useEffect(() => {
    if (isWanted) void loadWords();
  }, [isWanted]);
  const subscribe = (listener: () => void): (() => void) => {
    listeners.add(listener);
    return () => listeners.delete(listener);
  };
  return useSyncExternalStore(subscribe, () => words !== undefined, () => false);
}

/** `creel sensor · Distance`; empty where nothing feeds the member, or before the words have come. */
export function formatSourceField(space: AddressSpace, node: Node): string {
  const field = words && findSourceField(space, node);
  if (!field?.row || !words) return "";
  const roles: Roles = new Map(listParts(space, "role", field.type).map(({ id, value }) => [id, value]));
  return words(field.row.source, roles);
}
