/**
 * Copies of nodes with what they own, also between models: NodeIds are given anew, references inside the copy are kept,
 * those to nodes outside where these are loaded. The clipboard is plain JSON, so that another window can paste it.
 */
import type { AddressSpace, Edge } from "~/domain/address-space/address-space";
import { findModellingRule, findParent, listChildren } from "~/domain/address-space/browse";
import { getOwnNamespace } from "~/domain/address-space/model-header";
import { isTypeNode, type DeclaredReference, type Node } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { isSameQualifiedName, qualifiedName, type QualifiedName } from "~/domain/address-space/qualified-name";
import { StandardModellingRule, StandardReferenceType } from "~/domain/address-space/standard-ids";
import { isHierarchical } from "~/domain/address-space/type-hierarchy";
import type { Result } from "~/domain/core/result";
import { findDeletion } from "~/domain/editing/commands/delete-nodes";
import { EditDraft, type CommandContext, type Edit } from "~/domain/editing/edit-draft";
import { isDeclarationParent } from "~/domain/editing/placement";

export type NodeClipboard = {
  readonly format: "ferrule-nodes-1";
  readonly namespaceUri: string;
  /** Owners before what they own. */
  readonly nodes: readonly Node[];
  readonly edges: readonly Edge[];
  readonly roots: readonly NodeKey[];
};

const STORAGE_KEY = "ferrule-clipboard";
const R = StandardReferenceType;

/** Everything that a copy needs. Undefined where nothing can be copied: nodes of required models are instantiated instead. */
export function collectSubtrees(space: AddressSpace, keys: readonly NodeKey[]): NodeClipboard | undefined {
  const nodes = [...findDeletion(space, keys).nodes].reverse().map((key) => space.requireNode(key));
  if (nodes.length === 0) return undefined;
  const inside = new Set(nodes.map((node) => node.key));
  const roots = nodes.filter((node) => !hasOwnerInside(space, node, inside)).map((node) => node.key);
  const edges = nodes.flatMap((node) => [...space.edgesFrom(node.key), ...space.edgesTo(node.key).filter((edge) => !inside.has(edge.source) && roots.includes(node.key))]);
  return { format: "ferrule-nodes-1", namespaceUri: getOwnNamespace(space.own.header), nodes, edges, roots };
}

function hasOwnerInside(space: AddressSpace, node: Node, inside: ReadonlySet<NodeKey>): boolean {
  return space.edgesTo(node.key).some((edge) => inside.has(edge.source) && edge.type !== R.HasSubtype && (edge.type === R.HasEncoding || isHierarchical(space, edge.type)));
}

export function writeClipboard(space: AddressSpace, keys: readonly NodeKey[]): NodeClipboard | undefined {
  const clipboard = collectSubtrees(space, keys);
  if (clipboard) localStorage.setItem(STORAGE_KEY, JSON.stringify(clipboard));
  return clipboard;
}

export function readClipboard(): NodeClipboard | undefined {
  const text = localStorage.getItem(STORAGE_KEY);
  if (text === null) return undefined;
  const stored = JSON.parse(text) as Partial<NodeClipboard>;
  return stored.format === "ferrule-nodes-1" ? (stored as NodeClipboard) : undefined;
}

/** Without a parent each copy stands beside its original. The copies of the roots come first in `made`. */
export function copySubtrees(space: AddressSpace, context: CommandContext, clipboard: NodeClipboard, parent: NodeKey | undefined): Result<Edit> {
  const draft = new EditDraft(space, context);
  const copier = new Copier(draft, clipboard, parent);
  copier.copyAll();
  const finished = draft.finish();
  if (!finished.ok) return finished;
  const roots = clipboard.roots.flatMap((root) => copier.copies.get(root) ?? []);
  const made = [...roots, ...finished.value.made.filter((key) => !roots.includes(key))];
  return { ...finished, value: { ...finished.value, made } };
}

class Copier {
  readonly copies = new Map<NodeKey, NodeKey>();
  readonly #draft: EditDraft;
  readonly #clipboard: NodeClipboard;
  readonly #parent: NodeKey | undefined;
  readonly #inside: ReadonlySet<NodeKey>;

  constructor(draft: EditDraft, clipboard: NodeClipboard, parent: NodeKey | undefined) {
    this.#draft = draft;
    this.#clipboard = clipboard;
    this.#parent = parent;
    this.#inside = new Set(clipboard.nodes.map((node) => node.key));
  }

  copyAll(): void {
    const declared = new Set<Edge>();
    for (const node of this.#clipboard.nodes) {
      const parent = this.#clipboard.roots.includes(node.key) ? this.#findRootParent(node) : undefined;
      const references = this.#listReferences(node, parent, declared);
      const key = this.#draft.add({
        nodeClass: node.nodeClass,
        browseName: this.#findFreeName(node, parent),
        ...this.#listTexts(node, parent),
        references,
        attributes: this.#listAttributes(node, parent),
      });
      if (key === undefined) return;
      this.copies.set(node.key, key);
    }
    for (const edge of this.#clipboard.edges) {
      const source = this.copies.get(edge.source);
      const target = this.copies.get(edge.target);
      if (source === undefined || target === undefined || declared.has(edge)) continue;
      const copy = { source, type: this.copies.get(edge.type) ?? edge.type, target };
      if (!this.#draft.space.hasEdge(copy)) this.#draft.addReference(copy, "source");
    }
  }

  /** Types keep their supertype; instances go to the wished parent, or back to their own. */
  #findRootParent(node: Node): NodeKey | undefined {
    if (isTypeNode(node)) return undefined;
    if (this.#parent !== undefined) return this.#parent;
    const owner = findParent(this.#draft.space, node.key);
    return owner ?? this.#clipboard.edges.find((edge) => edge.target === node.key && this.#draft.space.getNode(edge.source))?.source;
  }

  #listReferences(node: Node, parent: NodeKey | undefined, declared: Set<Edge>): DeclaredReference[] {
    const { space } = this.#draft;
    const references: DeclaredReference[] = [];
    const place = parent === undefined ? undefined : space.getNode(parent);
    const keepsRules = place ? isDeclarationParent(space, place) : this.#keepsRulesInside(node);
    for (const edge of this.#clipboard.edges) {
      if (edge.target === node.key && this.copies.has(edge.source)) {
        declared.add(edge);
        references.push({ type: edge.type, target: this.copies.get(edge.source) as NodeKey, isForward: false });
      } else if (edge.source === node.key && !this.#inside.has(edge.target) && space.getNode(edge.target)) {
        if (edge.type !== R.HasModellingRule || keepsRules) references.push({ type: edge.type, target: edge.target, isForward: true });
      } else if (edge.target === node.key && edge.type === R.HasSubtype && space.getNode(edge.source)) {
        references.push({ type: edge.type, target: edge.source, isForward: false });
      }
    }
    if (parent !== undefined) references.unshift({ type: this.#findReferenceType(node), target: parent, isForward: false });
    const needsRule = keepsRules && place !== undefined && !references.some((r) => r.type === R.HasModellingRule);
    if (needsRule) references.push({ type: R.HasModellingRule, target: StandardModellingRule.Mandatory, isForward: true });
    return references;
  }

  /** Below a copy that became a plain instance no declaration keeps its rule. */
  #keepsRulesInside(node: Node): boolean {
    if (isTypeNode(node)) return true;
    const owner = this.#clipboard.edges.find((edge) => edge.target === node.key && this.copies.has(edge.source));
    const copy = owner && this.copies.get(owner.source);
    const copied = copy === undefined ? undefined : this.#draft.space.getNode(copy);
    return copied !== undefined && (isTypeNode(copied) || findModellingRule(this.#draft.space, copied.key) !== undefined);
  }

  #findReferenceType(node: Node): NodeKey {
    const { space } = this.#draft;
    const old = this.#clipboard.edges.find((edge) => edge.target === node.key && !this.#inside.has(edge.source) && edge.type !== R.HasSubtype && isHierarchical(space, edge.type));
    return old?.type ?? R.HasComponent;
  }

  /** Names of the model that was copied from become names of this one; a taken name gets the next number. */
  #findFreeName(node: Node, parent: NodeKey | undefined): QualifiedName {
    const { space } = this.#draft;
    const namespaceUri = node.browseName.namespaceUri === this.#clipboard.namespaceUri ? getOwnNamespace(space.own.header) : node.browseName.namespaceUri;
    const wished = qualifiedName(namespaceUri, node.browseName.name);
    const isTaken = (name: QualifiedName): boolean => {
      if (isTypeNode(node)) return [...space.own.nodes.values()].some((other) => other.nodeClass === node.nodeClass && isSameQualifiedName(other.browseName, name));
      return parent !== undefined && listChildren(space, parent).some((child) => isSameQualifiedName(child.browseName, name));
    };
    let name = wished;
    const stem = wished.name.replace(/\d+$/, "");
    for (let number = 2; isTaken(name); number++) name = qualifiedName(namespaceUri, `${stem}${number}`);
    return name;
  }

  #listTexts(node: Node, parent: NodeKey | undefined): Pick<Node, "displayName"> & Partial<Pick<Node, "description">> {
    const name = this.#findFreeName(node, parent).name;
    const displayName = node.displayName.map((text) => (text.text === node.browseName.name ? { ...text, text: name } : text));
    return { displayName, ...(node.description ? { description: node.description } : {}) };
  }

  #listAttributes(node: Node, parent: NodeKey | undefined): Record<string, unknown> {
    const { key: _key, nodeId: _id, nodeClass: _class, order: _order, browseName: _name, displayName: _display, description: _description, references: _references, symbolicName: _symbolic, ...rest } = node;
    const attributes: Record<string, unknown> = { ...rest };
    // A node that is not there in the model pasted into leaves its attribute out: the draft drops what is undefined.
    for (const name of ["dataType", "methodDeclaration", "parent"]) {
      const value = attributes[name];
      if (typeof value !== "string") continue;
      attributes[name] = this.copies.get(value as NodeKey) ?? (this.#draft.space.getNode(value as NodeKey) ? value : undefined);
    }
    if (parent !== undefined) attributes["parent"] = parent;
    return attributes;
  }
}
