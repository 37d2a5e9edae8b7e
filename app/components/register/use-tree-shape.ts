import { useRef } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { listMembers } from "~/domain/address-space/browse";

/**
 * The model as far as the tree of rows depends on it: an older state as long as only contents of cells changed since. Most
 * edits do, and the rows of a large model are then not made anew.
 */
export function useTreeShape(space: AddressSpace): AddressSpace {
  const kept = useRef<{ space: AddressSpace; names: string }>(undefined);
  const old = kept.current;
  if (old?.space === space) return space;
  const names = listNames(space);
  if (old && old.names === names && hasSameTree(old.space, space)) return old.space;
  kept.current = { space, names };
  return space;
}

function hasSameTree(a: AddressSpace, b: AddressSpace): boolean {
  const isSameBelow = a.layers.length === b.layers.length && a.layers.every((layer, i) => layer === b.layers[i] || layer === a.own);
  return isSameBelow && a.own.outgoing === b.own.outgoing && a.own.incoming === b.own.incoming && a.own.nodes.size === b.own.nodes.size;
}

/** A member of a type that takes the name of an inherited one hides it. */
function listNames(space: AddressSpace): string {
  const names: string[] = [];
  for (const node of space.own.nodes.values()) {
    if (node.nodeClass !== "ObjectType" && node.nodeClass !== "VariableType") continue;
    for (const { browseName } of listMembers(space, node.key)) names.push(browseName.namespaceUri, browseName.name);
  }
  return names.join("\n");
}
