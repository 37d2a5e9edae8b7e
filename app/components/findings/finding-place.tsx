import type { ReactNode } from "react";
import { NodeClassGlyph } from "~/components/notation/node-class-glyph";
import { cx } from "~/components/ui/cx";
import { isProperty } from "~/components/model/member-facts";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { findParent, getDisplayName, listMembers } from "~/domain/address-space/browse";
import type { Node } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";

const isType = (node: Node) => node.nodeClass.endsWith("Type");

/** Where it is, drawn: the owner as a card with the node as a row, or the node alone. */
export function FindingPlace({ space, nodeKey }: { space: AddressSpace; nodeKey: NodeKey | undefined }) {
  const node = nodeKey === undefined ? undefined : space.getNode(nodeKey);
  if (!node) return <p className="text-small text-ink-2">The model’s header</p>;
  const parentKey = isType(node) ? undefined : findParent(space, node.key);
  const parent = parentKey === undefined ? undefined : space.getNode(parentKey);
  if (!parent) return <Card node={node} here />;
  const more = listMembers(space, parent.key).length - 1;
  return (
    <Card node={parent} foreign={!space.isOwn(parent.key)}>
      <div className="flex h-6 items-center gap-1.5 bg-copper-wash px-2 text-small outline-2 -outline-offset-1 outline-copper">
        <NodeClassGlyph kind={isProperty(space, node) ? "Property" : node.nodeClass} />
        <span className="truncate">{getDisplayName(node)}</span>
      </div>
      {more > 0 ? (
        <div className="flex h-6 items-center pl-8 text-small text-ink-3">
          {more} more {more === 1 ? "member" : "members"}
        </div>
      ) : null}
    </Card>
  );
}

function Card({
  node,
  here,
  foreign,
  children,
}: {
  node: Node;
  here?: boolean;
  foreign?: boolean;
  children?: ReactNode;
}) {
  return (
    <div
      className={cx(
        "w-52 border-[1.5px] bg-leaf",
        foreign ? "border-edge" : "border-ink",
        isType(node) && "shadow-[4px_4px_0_var(--shade)]",
        node.nodeClass.startsWith("Variable") && "rounded-variable",
        here && "outline-2 -outline-offset-2 outline-copper",
      )}
    >
      <div
        className={cx(
          "flex h-8 items-center gap-1.5 px-2.5 text-head font-semibold",
          isType(node) && "italic",
          children !== undefined && "border-b",
          foreign ? "border-edge text-ink-2" : "border-ink",
        )}
      >
        <span className="truncate">{getDisplayName(node)}</span>
      </div>
      {children}
    </div>
  );
}
