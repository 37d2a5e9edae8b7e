import { useState, type MouseEvent, type ReactNode } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { findParent, findTypeDefinition, listMembers } from "~/domain/address-space/browse";
import { isTypeNode } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { listSupertypes } from "~/domain/address-space/type-hierarchy";
import { makeAddRequest } from "../model/add-request";
import { findMemberOwner } from "../model/member-owner";
import { getNodeName } from "../model/member-facts";
import { useOpenModel } from "../model/use-model";
import { NodeClassGlyph, type GlyphKind } from "../notation/node-class-glyph";
import { ContextMenu, type MenuEntry } from "../ui/menu";
import { alignCards, type Alignment } from "./align-cards";
import { listNeighbours, listUsers } from "./neighbours";
import type { SheetControl } from "./sheet-control";
import type { Rect } from "./sheet-geometry";
import type { Scene } from "./sheet-scene";

type Props = { space: AddressSpace; scene: Scene; rects: ReadonlyMap<NodeKey, Rect>; control: SheetControl; children: ReactNode };

/** The menu of what lies under the pointer: a member, a card, or the empty sheet. */
export function SheetMenu({ space, scene, rects, control, children }: Props) {
  const { view } = useOpenModel();
  const [key, setKey] = useState<NodeKey>();

  function onContextMenu(event: MouseEvent): void {
    const found = (event.target as Element).closest<HTMLElement>("[data-key]")?.dataset.key as NodeKey | undefined;
    const selected = view.getState().selection;
    const at = found ?? (event.detail === 0 ? selected.at(-1) : undefined);
    setKey(at);
    if (at !== undefined && !selected.includes(at)) view.select([at]);
  }

  const entries = useMenuEntries({ space, scene, rects, control }, key);
  return (
    <ContextMenu label={key === undefined ? "Sheet" : `Actions for ${getNodeName(space, key)}`} entries={entries}>
      <div className="contents" onContextMenuCapture={onContextMenu}>
        {children}
      </div>
    </ContextMenu>
  );
}

type Context = Omit<Props, "children">;

function useMenuEntries(context: Context, key: NodeKey | undefined): MenuEntry[] {
  const { actions, view } = useOpenModel();
  const { space, control, scene } = context;
  const node = key === undefined ? undefined : space.getNode(key);
  if (key === undefined || !node) return listSheetEntries(control, actions.canEdit);
  const entries: MenuEntry[] = [];
  const owner = actions.canEdit ? findMemberOwner(space, key) : undefined;
  if (owner !== undefined) {
    entries.push({ kind: "head", label: `Add to ${getNodeName(space, owner)}` });
    for (const kind of MEMBER_KINDS) entries.push(toAddEntry(kind, () => control.add(makeAddRequest(kind, { parent: owner }))));
    entries.push({ kind: "rule" });
  }
  if (actions.canEdit && isTypeNode(node)) {
    entries.push({ label: `Derive a type from ${node.browseName.name}`, onSelect: () => control.add(makeAddRequest(node.nodeClass, { base: key })) });
  }
  if (actions.mayChange(key)) {
    entries.push(
      { label: "Rename", keys: "F2", onSelect: () => view.startRenaming(key) },
      { label: "Duplicate", keys: "Ctrl D", onSelect: () => actions.duplicate([key]) },
      { label: "Move to …", onSelect: () => control.move(view.getState().selection.filter((k) => actions.mayChange(k))) },
      { label: "Connect to …", keys: "C", onSelect: () => control.connect({ source: key }) },
      { kind: "rule" },
    );
  }
  entries.push({ label: "Focus on this node", keys: "O", onSelect: () => control.focusOn(key) }, ...listViewEntries(context, key));
  const chosen = view.getState().selection.filter((k) => context.rects.has(k));
  if (chosen.length > 1) entries.push(...listAlignEntries(context, chosen));
  const placed = (chosen.length > 1 ? chosen : [key]).filter((k) => control.byHand.has(k));
  if (placed.length > 0) entries.push({ label: "Let the layout place it again", onSelect: () => control.release(placed) });
  if (scene.cards.some((card) => card.key === key)) entries.push({ label: "Take off this sheet", keys: "H", onSelect: () => control.hide(chosen.length > 1 ? chosen : [key]) });
  if (actions.mayChange(key)) {
    const many = view.getState().selection.length;
    entries.push({ kind: "rule" }, { label: many > 1 ? `Delete ${many} nodes` : "Delete", keys: "Del", danger: true, onSelect: () => actions.remove(view.getState().selection) });
  }
  return entries;
}

const MEMBER_KINDS: readonly GlyphKind[] = ["Variable", "Property", "Object", "Method"];
const TYPE_KINDS: readonly GlyphKind[] = ["ObjectType", "VariableType", "DataType", "ReferenceType"];

function toAddEntry(kind: GlyphKind, onSelect: () => void): MenuEntry {
  return { label: kind === "DataType" ? "Enumeration" : kind, glyph: <NodeClassGlyph kind={kind} />, onSelect };
}

function listSheetEntries(control: SheetControl, canEdit: boolean): MenuEntry[] {
  const add: MenuEntry[] = canEdit
    ? [{ kind: "head", label: "Add" }, ...TYPE_KINDS.map((kind) => toAddEntry(kind, () => control.add(makeAddRequest(kind)))), { kind: "rule" }]
    : [];
  return [...add, { label: "Arrange all cards", onSelect: control.arrange }];
}

function listViewEntries({ space, scene, control }: Context, key: NodeKey): MenuEntry[] {
  const drawn = new Set(scene.cards.map((card) => card.key));
  const node = space.requireNode(key);
  const offers: [string, NodeKey[]][] = [
    ["Draw as a node of its own", [key]],
    ["Show members", listMembers(space, key).map((member) => member.key)],
    ["Show neighbours", listNeighbours(space, key)],
    ["Show where used", listUsers(space, key)],
    ["Show supertypes", isTypeNode(node) ? listSupertypes(space, key) : []],
    ["Show its type", isTypeNode(node) ? [] : [findTypeDefinition(space, key)].filter((k) => k !== undefined)],
    ["Show its owner", [isTypeNode(node) ? undefined : findParent(space, key)].filter((k) => k !== undefined)],
  ];
  return offers.flatMap(([label, keys]) => {
    const missing = keys.filter((k) => !drawn.has(k) && space.getNode(k) !== undefined);
    if (missing.length === 0) return [];
    return [{ label, ...(missing.length > 1 ? { note: String(missing.length) } : {}), onSelect: () => control.show(missing) }];
  });
}

const ALIGNMENTS: readonly [Alignment, string][] = [
  ["left", "Align left edges"],
  ["right", "Align right edges"],
  ["top", "Align upper edges"],
  ["bottom", "Align lower edges"],
  ["columns", "Spread sideways"],
  ["rows", "Spread downwards"],
];

function listAlignEntries({ rects, control }: Context, keys: readonly NodeKey[]): MenuEntry[] {
  const chosen = new Map<NodeKey, Rect>();
  for (const key of keys) {
    const rect = rects.get(key);
    if (rect) chosen.set(key, rect);
  }
  const entries = ALIGNMENTS.map(([alignment, label]): MenuEntry => ({ label, onSelect: () => control.place(alignCards(chosen, alignment)) }));
  return [{ kind: "rule" }, { kind: "head", label: `${keys.length} cards` }, ...entries, { label: "Arrange these cards", onSelect: control.arrange }, { kind: "rule" }];
}
