/**
 * The rows of the register: the model as a tree, flattened for a window that draws only what is in sight. A row's id is the
 * way to it, since an inherited member stands below every type that inherits it.
 */
import type { AddressSpace, Edge } from "~/domain/address-space/address-space";
import { listChildren } from "~/domain/address-space/browse";
import type { Node } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { listRoots } from "../model/list-roots";
import { listInheritedMembers } from "../model/member-facts";
import type { RowOrder } from "./row-order";

export type RegisterRow = {
  readonly id: string;
  readonly key: NodeKey;
  readonly level: number;
  readonly isExpandable: boolean;
  readonly isExpanded: boolean;
  /** The type from which an inherited member comes. */
  readonly origin?: NodeKey;
  readonly parentId?: string;
  /** Place among its siblings and their number, for readers of the tree. */
  readonly position: number;
  readonly siblings: number;
};

export type RegisterView = {
  /** Rows that stand against their class's habit: types and Objects are open, Variables closed. */
  readonly toggled: ReadonlySet<string>;
  readonly showInherited: boolean;
  /** Only rows that answer this question, with their owners; undefined shows all. */
  readonly matches?: (key: NodeKey) => boolean;
  /** Order of siblings; undefined leaves that of the model. */
  readonly order?: RowOrder;
};

const SEPARATOR = " ";
const DEEPEST = 24;

export function buildRows(space: AddressSpace, view: RegisterView): RegisterRow[] {
  const rows: RegisterRow[] = [];
  const roots = listRoots(space).map((key) => ({ key }));
  appendRows(space, view, rows, roots, 1, undefined, new Set());
  return rows;
}

type Child = { readonly key: NodeKey; readonly origin?: NodeKey };

function appendRows(
  space: AddressSpace,
  view: RegisterView,
  rows: RegisterRow[],
  children: readonly Child[],
  level: number,
  parentId: string | undefined,
  above: ReadonlySet<NodeKey>,
): boolean {
  let hasShown = false;
  const { order } = view;
  const ordered = order ? [...children].sort((a, b) => order(a.key, b.key)) : children;
  ordered.forEach(({ key, origin }, index) => {
    const node = space.getNode(key);
    if (!node) return;
    const id = parentId === undefined ? key : parentId + SEPARATOR + key;
    const below = above.has(key) || level > DEEPEST || origin !== undefined ? [] : listRowChildren(space, node, view.showInherited);
    const isFiltering = view.matches !== undefined;
    const isOpen = isFiltering || isOpenByHabit(node) !== view.toggled.has(id);
    const at = rows.length;
    const row: RegisterRow = {
      id,
      key,
      level,
      isExpandable: below.length > 0,
      isExpanded: below.length > 0 && isOpen,
      ...(origin === undefined ? {} : { origin }),
      ...(parentId === undefined ? {} : { parentId }),
      position: index + 1,
      siblings: children.length,
    };
    rows.push(row);
    const hasShownBelow = row.isExpanded && appendRows(space, view, rows, below, level + 1, id, new Set(above).add(key));
    if (view.matches && !hasShownBelow && !view.matches(key)) rows.length = at;
    else hasShown = true;
  });
  return hasShown;
}

function isOpenByHabit(node: Node): boolean {
  return node.nodeClass !== "Variable" && node.nodeClass !== "Method";
}

const childrenOfEdges = new WeakMap<readonly Edge[], readonly NodeKey[]>();

/** Children of an own node; the list of its edges is the same object as long as nothing about it changed. */
function listRowChildren(space: AddressSpace, node: Node, showInherited: boolean): Child[] {
  const edges = space.edgesFrom(node.key);
  let own = childrenOfEdges.get(edges);
  if (!own) {
    own = listChildren(space, node.key).map((child) => child.key);
    if (edges.length > 0) childrenOfEdges.set(edges, own);
  }
  const isType = node.nodeClass === "ObjectType" || node.nodeClass === "VariableType";
  const inherited = showInherited && isType ? listInheritedMembers(space, node.key) : [];
  return [...inherited.map((m) => ({ key: m.node.key, origin: m.origin })), ...own.filter((key) => space.isOwn(key)).map((key) => ({ key }))];
}
