import { useMemo, useState } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { NodeClassGlyph } from "../notation/node-class-glyph";
import { Combobox } from "../ui/combobox";
import { findNodes, type NodeHit } from "./find-nodes";
import { formatPath, getNodeName, isProperty } from "./member-facts";
import { getNamespaceLabel } from "./namespace-label";

type Props = { label: string; space: AddressSpace; onPick: (key: NodeKey) => void; onCancel?: () => void };

/** Searches any node of the loaded models. */
export function NodeSearch({ label, space, onPick, onCancel }: Props) {
  const [query, setQuery] = useState("");
  const hits = useMemo(() => findNodes(space, query, 20), [space, query]);
  return (
    <Combobox<NodeHit>
      label={label}
      size="small"
      autoFocus
      query={query}
      onQuery={setQuery}
      items={hits}
      itemKey={({ node }) => node.key}
      renderItem={({ node }) => (
        <span className="type-hit">
          <NodeClassGlyph kind={isProperty(space, node) ? "Property" : node.nodeClass} />
          <span className="truncate">{getNodeName(space, node.key)}</span>
          <code>{space.isOwn(node.key) ? formatPath(space, node.key) : getNamespaceLabel(node.nodeId.namespaceUri)}</code>
        </span>
      )}
      onPick={({ node }) => onPick(node.key)}
      {...(onCancel ? { onCancel } : {})}
      placeholder="Name, NodeId, path"
      none={query === "" ? "Type a name" : "No node of this name in the loaded models"}
    />
  );
}
