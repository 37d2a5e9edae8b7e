/** Consequences of a change of types in one sentence. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { findParent } from "~/domain/address-space/browse";
import type { NodeKey } from "~/domain/address-space/node-id";
import type { Consequence } from "~/domain/instantiation/consequences";

const WORDS: readonly (readonly [Consequence["kind"], one: string, many: string])[] = [
  ["missing-member", "member is missing", "members are missing"],
  ["renamed-member", "member has the old name", "members have the old name"],
  ["removed-member", "member has gone from the type", "members have gone from the type"],
  ["changed-attribute", "attribute is as before", "attributes are as before"],
];

/** `2 members are missing, 4 attributes are as before (B1, B2).` */
export function describeConsequences(space: AddressSpace, consequences: readonly Consequence[]): string {
  const parts = WORDS.flatMap(([kind, one, many]) => {
    const count = consequences.filter((c) => c.kind === kind).length;
    return count === 0 ? [] : [`${count} ${count === 1 ? one : many}`];
  });
  const owners = [...new Set(consequences.map((c) => nameOwner(space, c.kind === "missing-member" ? c.instance : c.node)))];
  const shown = owners.length > 4 ? [...owners.slice(0, 3), `${owners.length - 3} more`] : owners;
  return `${parts.join(", ")} (${shown.join(", ")}).`;
}

/** The topmost own node above: the machine, or the type that overrides. */
function nameOwner(space: AddressSpace, key: NodeKey): string {
  const seen = new Set<NodeKey>();
  let at = key;
  for (let parent = findParent(space, at); parent !== undefined && space.isOwn(parent) && !seen.has(parent); parent = findParent(space, at)) {
    seen.add(parent);
    at = parent;
    if (space.getNode(at)?.nodeClass.endsWith("Type")) break;
  }
  return space.getNode(at)?.browseName.name ?? "";
}
