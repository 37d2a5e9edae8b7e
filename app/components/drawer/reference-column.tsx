import { X } from "lucide-react";
import { useState } from "react";
import type { AddressSpace, Edge } from "~/domain/address-space/address-space";
import type { Node } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { isSubtypeOf } from "~/domain/address-space/type-hierarchy";
import { StandardReferenceType } from "~/domain/address-space/standard-ids";
import { getNodeName, isProperty } from "../model/member-facts";
import { getNamespaceLabel } from "../model/namespace-label";
import { useOpenModel } from "../model/use-model";
import { NodeClassGlyph } from "../notation/node-class-glyph";
import { Button } from "../ui/button";

type Group = { readonly title: string; readonly items: { edge: Edge; other: NodeKey }[] };

const FEW = 24;
const MORE = 200;

/** References in both directions, grouped by what they mean for the node. */
export function ReferenceColumn({ space, node }: { space: AddressSpace; node: Node }) {
  const groups = listGroups(space, node.key);
  const count = groups.reduce((sum, group) => sum + group.items.length, 0);
  return (
    <section aria-label="References">
      <h3>
        References <span className="font-mono font-normal">{count}</span>
      </h3>
      {groups.map((group) => (
        <ReferenceGroup key={group.title} space={space} group={group} />
      ))}
    </section>
  );
}

function ReferenceGroup({ space, group }: { space: AddressSpace; group: Group }) {
  const [most, setMost] = useState(FEW);
  const rest = group.items.length - most;
  return (
    <div className="reference-group">
      <h4>
        {group.title} <span className="font-mono text-ink-3">{group.items.length}</span>
      </h4>
      <ul>
        {group.items.slice(0, most).map(({ edge, other }) => (
          <ReferenceItem key={`${edge.source} ${edge.type} ${edge.target}`} space={space} edge={edge} other={other} />
        ))}
      </ul>
      {rest > 0 ? (
        <Button size="small" tone="bare" className="-ml-2" onClick={() => setMost(most + MORE)}>
          {Math.min(rest, MORE)} more of {rest}
        </Button>
      ) : null}
    </div>
  );
}

function ReferenceItem({ space, edge, other }: { space: AddressSpace; edge: Edge; other: NodeKey }) {
  const { view, actions } = useOpenModel();
  const node = space.getNode(other);
  const type = getNodeName(space, edge.type);
  const name = getNodeName(space, other);
  return (
    <li className="reference-item">
      {node ? (
        <button type="button" onClick={() => view.reveal(other)} aria-label={`Go to ${name}`}>
          <NodeClassGlyph kind={isProperty(space, node) ? "Property" : node.nodeClass} />
          <span className={node.nodeClass.endsWith("Type") ? "italic" : ""}>{name}</span>
        </button>
      ) : (
        <span title={other}>{other}</span>
      )}
      {node && !space.isOwn(other) ? <code>{getNamespaceLabel(node.nodeId.namespaceUri)}</code> : null}
      <code>{type}</code>
      {actions.mayRemoveReference(edge) ? (
        <button
          type="button"
          className="reference-remove"
          aria-label={`Remove ${type} to ${name}`}
          onClick={() => actions.removeReference(edge)}
        >
          <X size={12} aria-hidden />
        </button>
      ) : null}
    </li>
  );
}

function listGroups(space: AddressSpace, key: NodeKey): Group[] {
  const groups: Record<string, Group["items"]> = {
    Type: [],
    "Belongs to": [],
    "Made of": [],
    "Used by": [],
    "Points to": [],
    "Pointed to by": [],
  };
  const { HasSubtype, HasTypeDefinition, HasInterface, HasModellingRule, HierarchicalReferences } =
    StandardReferenceType;
  const isMeaning = (type: NodeKey, wanted: NodeKey): boolean => type === wanted || isSubtypeOf(space, type, wanted);
  for (const edge of space.edgesFrom(key)) {
    if (edge.type === HasModellingRule) continue;
    const isType = edge.type === HasTypeDefinition || edge.type === HasInterface;
    const title = isType
      ? "Type"
      : edge.type === HasSubtype
        ? "Used by"
        : isMeaning(edge.type, HierarchicalReferences)
          ? "Made of"
          : "Points to";
    groups[title]?.push({ edge, other: edge.target });
  }
  for (const edge of space.edgesTo(key)) {
    const isUse = edge.type === HasTypeDefinition || edge.type === HasInterface || edge.type === HasModellingRule;
    const title =
      edge.type === HasSubtype
        ? "Type"
        : isUse
          ? "Used by"
          : isMeaning(edge.type, HierarchicalReferences)
            ? "Belongs to"
            : "Pointed to by";
    groups[title]?.push({ edge, other: edge.source });
  }
  return Object.entries(groups).flatMap(([title, items]) => (items.length === 0 ? [] : [{ title, items }]));
}
