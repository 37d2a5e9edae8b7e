import { useId, useMemo, useState } from "react";
import type { ExpandedNodeId } from "~/domain/nodeset/values/variant";
import { findNodes, type NodeHit } from "../model/find-nodes";
import { formatPath, getNodeName, isProperty } from "../model/member-facts";
import { getNamespaceLabel } from "../model/namespace-label";
import { NodeClassGlyph } from "../notation/node-class-glyph";
import { Combobox } from "../ui/combobox";
import { Input } from "../ui/field";
import { Reason } from "./leaf-controls";
import { formatNodeIdLeaf, parseNodeIdLeaf } from "./leaf-text";
import { isUnfinished, type Unfinished } from "./value-draft";
import { useValueForm, type LeafProps } from "./value-form";

const MOST = 20;

/** A NodeId, written or found by the node's name; below it, which node that is. */
export function NodeIdLeaf({ label, id, item, onChange, autoFocus, isExpanded }: LeafProps & { isExpanded: boolean }) {
  const { space, readOnly } = useValueForm();
  const reasonId = useId();
  const [query, setQuery] = useState<string>();
  const value = isUnfinished(item) ? undefined : (item as ExpandedNodeId);
  const shown = isUnfinished(item) ? item.unfinished : formatNodeIdLeaf(item as ExpandedNodeId);
  const hits = useMemo(() => (query === undefined ? [] : findNodes(space, query, MOST)), [space, query]);

  function take(next: ExpandedNodeId | Unfinished): void {
    setQuery(undefined);
    const server = value?.serverIndex;
    onChange(isUnfinished(next) || server === undefined ? next : { ...next, serverIndex: server });
  }
  return (
    <div className="min-w-0">
      <div className="flex gap-1">
        {readOnly ? (
          <Input size="small" mono readOnly {...(id === undefined ? { "aria-label": label } : { id })} value={shown} />
        ) : (
          <Combobox<NodeHit>
            label={label}
            {...(id === undefined ? {} : { id })}
            {...(isUnfinished(item) ? { "aria-invalid": true, "aria-describedby": reasonId } : {})}
            size="small"
            mono
            autoFocus={autoFocus ?? false}
            query={query ?? shown}
            onQuery={setQuery}
            items={hits}
            itemKey={({ node }) => node.key}
            renderItem={({ node }) => (
              <span className="type-hit">
                <NodeClassGlyph kind={isProperty(space, node) ? "Property" : node.nodeClass} />
                <span className="truncate">{getNodeName(space, node.key)}</span>
                <code>
                  {space.isOwn(node.key) ? formatPath(space, node.key) : getNamespaceLabel(node.nodeId.namespaceUri)}
                </code>
              </span>
            )}
            onPick={({ node }) => take(node.nodeId)}
            onCancel={() => {
              if (query !== undefined && query !== shown) take(parseNodeIdLeaf(query));
            }}
            placeholder="Name, path or NodeId"
            none="No node of this name in the loaded models; a NodeId reads i=85 or nsu=URI;s=Name"
            panelClassName="w-115!"
          />
        )}
        {isExpanded ? <ServerIndex label={label} value={value} onChange={onChange} readOnly={readOnly} /> : null}
      </div>
      {value ? <Target value={value} /> : null}
      <Reason id={reasonId} item={item} />
    </div>
  );
}

function Target({ value }: { value: ExpandedNodeId }) {
  const { space } = useValueForm();
  if (value.serverIndex !== undefined)
    return <p className="mt-0.5 text-note text-ink-3">on another server, {value.serverIndex} of the server table</p>;
  if (value.identifier === 0 || value.identifier === "")
    return <p className="mt-0.5 text-note text-ink-3">null NodeId: no node</p>;
  const node = space.findByNodeId(value);
  return (
    <p className="mt-0.5 truncate text-note text-ink-3">
      {node
        ? `${node.nodeClass} ${getNodeName(space, node.key)} of ${getNamespaceLabel(node.nodeId.namespaceUri)}`
        : "not in the loaded models"}
    </p>
  );
}

function ServerIndex({
  label,
  value,
  onChange,
  readOnly,
}: {
  label: string;
  value: ExpandedNodeId | undefined;
  onChange: LeafProps["onChange"];
  readOnly: boolean;
}) {
  return (
    <Input
      size="small"
      mono
      className="w-20!"
      aria-label={`Server index of ${label}`}
      title="Index of another server in the server table; empty for this one"
      placeholder="svr="
      value={value?.serverIndex ?? ""}
      readOnly={readOnly || !value}
      inputMode="numeric"
      onChange={(event) => {
        if (!value) return;
        const { serverIndex: _old, ...id } = value;
        const text = event.currentTarget.value.trim();
        if (text === "") onChange(id);
        else if (/^\d{1,9}$/.test(text)) onChange({ ...id, serverIndex: Number(text) });
      }}
    />
  );
}
