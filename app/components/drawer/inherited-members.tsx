import { useMemo, useState } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { findModellingRule, findParent } from "~/domain/address-space/browse";
import {
  listInstanceDeclarations,
  toPathKey,
  type InstanceDeclaration,
} from "~/domain/address-space/instance-declarations";
import { isTypeNode, type Node } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { StandardReferenceType } from "~/domain/address-space/standard-ids";
import { collectSubtypes } from "~/domain/address-space/type-hierarchy";
import { overrideMember } from "~/domain/editing/commands/override-member";
import { getNodeName } from "../model/member-facts";
import { useOpenModel } from "../model/use-model";
import { Button } from "../ui/button";
import { Input } from "../ui/field";
import { Fact } from "./particular";

const FEW = 10;
const MOST = 120;

/** What a type inherits, at any depth; each member can be declared anew here, so that it can differ (OPC 10000-3 §6.3.3.3). */
export function InheritedMembers({ space, type, readOnly }: { space: AddressSpace; type: NodeKey; readOnly: boolean }) {
  const [filter, setFilter] = useState("");
  const [isOpen, setOpen] = useState(false);
  const rows = useMemo(
    () => [...listInstanceDeclarations(space, type).values()].filter((row) => row.declaredBy !== type),
    [space, type],
  );
  if (rows.length === 0) return null;
  const text = filter.trim().toLowerCase();
  const found = rows.filter((row) => text === "" || formatPath(row).toLowerCase().includes(text));
  const shown = found.slice(0, isOpen || text !== "" ? MOST : FEW);
  return (
    <div className="mt-3">
      <h3>
        Inherited <span className="font-mono font-normal">{rows.length}</span>
      </h3>
      {rows.length > FEW ? (
        <Input
          type="search"
          size="small"
          className="mb-1"
          aria-label="Inherited members by name"
          placeholder="Name or path"
          value={filter}
          onChange={(event) => setFilter(event.currentTarget.value)}
        />
      ) : null}
      <ul className="grid gap-px">
        {shown.map((row) => (
          <InheritedRow key={toPathKey(row.path)} space={space} type={type} row={row} readOnly={readOnly} />
        ))}
      </ul>
      {found.length > shown.length ? (
        <Button size="small" tone="bare" className="-ml-2" onClick={() => setOpen(true)}>
          and {found.length - shown.length} more
        </Button>
      ) : null}
    </div>
  );
}

type RowProps = { space: AddressSpace; type: NodeKey; row: InstanceDeclaration; readOnly: boolean };

function InheritedRow({ space, type, row, readOnly }: RowProps) {
  const { view } = useOpenModel();
  const override = useOverride(space);
  const path = formatPath(row);
  return (
    <li className="reference-item text-ink-3">
      <button type="button" onClick={() => view.reveal(row.node.key)} aria-label={`Go to ${path}`}>
        <span>{path}</span>
      </button>
      <span className="shrink-0">
        from <em>{getNodeName(space, row.declaredBy)}</em>
      </span>
      {readOnly ? null : (
        <Button
          size="small"
          tone="bare"
          className="ml-auto h-5!"
          aria-label={`Override ${path} here`}
          onClick={() => override(type, row)}
        >
          Override here
        </Button>
      )}
    </li>
  );
}

/** Declares the member anew in the type and shows it. */
function useOverride(space: AddressSpace): (type: NodeKey, row: InstanceDeclaration) => void {
  const { actions, view } = useOpenModel();
  return (type, row) => {
    const path = toPathKey(row.path);
    const made = actions.apply("override-member", (current, context) =>
      overrideMember(current, context, { type, path }),
    );
    const last = made?.at(-1);
    if (last !== undefined && space.getNode(last) === undefined) view.reveal(last);
  };
}

/** On a member that own types inherit: the types in which it could be declared anew. */
export function OverrideRow({ space, node }: { space: AddressSpace; node: Node }) {
  const { actions } = useOpenModel();
  const override = useOverride(space);
  const heirs = useMemo(() => listHeirs(space, node), [space, node]);
  if (!actions.canEdit || heirs.length === 0) return null;
  return (
    <Fact label="Override">
      <span className="flex flex-wrap gap-1">
        {heirs.map(({ type, row }) => (
          <Button
            key={type}
            size="small"
            title="Declares the member anew in this subtype, so that it can differ there"
            onClick={() => override(type, row)}
          >
            in <em>{getNodeName(space, type)}</em>
          </Button>
        ))}
      </span>
    </Fact>
  );
}

const MOST_HEIRS = 4;

function listHeirs(space: AddressSpace, node: Node): { type: NodeKey; row: InstanceDeclaration }[] {
  if (isTypeNode(node) || findModellingRule(space, node.key) === undefined) return [];
  const owner = findOwnerType(space, node.key);
  if (owner === undefined) return [];
  const implementers = space
    .edgesTo(owner)
    .flatMap((e) => (e.type === StandardReferenceType.HasInterface ? [e.source] : []));
  const heirs = new Set([owner, ...implementers].flatMap((key) => [...collectSubtypes(space, key)]));
  heirs.delete(owner);
  const own = [...heirs].filter((key) => space.isOwn(key) && space.getNode(key)?.nodeClass.endsWith("Type"));
  return own.slice(0, MOST_HEIRS).flatMap((type) => {
    const row = [...listInstanceDeclarations(space, type).values()].find((r) => r.node.key === node.key);
    return row && row.declaredBy !== type ? [{ type, row }] : [];
  });
}

function findOwnerType(space: AddressSpace, key: NodeKey): NodeKey | undefined {
  const seen = new Set<NodeKey>();
  for (let at = findParent(space, key); at !== undefined && !seen.has(at); at = findParent(space, at)) {
    seen.add(at);
    const node = space.getNode(at);
    if (node && isTypeNode(node)) return at;
  }
  return undefined;
}

function formatPath(row: InstanceDeclaration): string {
  return row.path.map((name) => name.name).join(" / ");
}
