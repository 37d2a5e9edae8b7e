/**
 * Whom a change touches: subtypes and instances of the type that it belongs to, machines of other models, the readers whose
 * nodes it meets. A member of a type is looked for in each instance by its browse path, as OPC 10000-3 §6.2.9 identifies it.
 */
import type { AddressSpace } from "../address-space/address-space";
import { findParent, getPath, listChildren, listEdgesTo } from "../address-space/browse";
import { hasValueAttributes, isTypeNode, type Node } from "../address-space/node";
import { formatNodeId, type NodeKey } from "../address-space/node-id";
import { isSameQualifiedName } from "../address-space/qualified-name";
import { StandardReferenceType } from "../address-space/standard-ids";
import { collectSubtypes } from "../address-space/type-hierarchy";
import type { Change } from "./change";

/** A model of the organisation that stands on the changed one. */
export type DependentModel = { readonly id: string; readonly name: string; readonly space: AddressSpace };

/** A consumer that the team names, with the nodes it reads as NodeId text with `nsu=`; what lies below them counts too. */
export type ReaderOfNodes = { readonly id: string; readonly name: string; readonly nodeIds: readonly string[] };

/** `stops`: it reads what breaks. `look`: it reads what changed otherwise. `may-use`: something new beside what it reads. */
export type ReaderEffect = "stops" | "look" | "may-use";

export type AffectedPlace = {
  readonly modelId: string | null;
  readonly model: string;
  readonly nodeId: string;
  readonly path: string;
};

export type AffectedReader = {
  readonly id: string;
  readonly name: string;
  readonly effect: ReaderEffect;
  /** Those of its nodes that the change meets. */
  readonly nodeIds: readonly string[];
};

export type Affected = {
  readonly subtypes: readonly AffectedPlace[];
  /** Instances in the model itself and in those that stand on it; machines are among the latter. */
  readonly instances: readonly AffectedPlace[];
  readonly readers: readonly AffectedReader[];
};

type Scope = { readonly id: string | null; readonly name: string; readonly space: AddressSpace };

/** Answers for many changes of one comparison; what all of them ask for is gathered once. */
export class AffectedFinder {
  readonly #scopes: readonly Scope[];
  readonly #before: AddressSpace;
  readonly #after: AddressSpace;
  readonly #readers: readonly ReaderOfNodes[];
  readonly #instances = new Map<NodeKey, readonly { scope: Scope; node: Node }[]>();

  constructor(
    states: { readonly before: AddressSpace; readonly after: AddressSpace },
    context: {
      readonly name: string;
      readonly dependents: readonly DependentModel[];
      readonly readers: readonly ReaderOfNodes[];
    },
  ) {
    this.#before = states.before;
    this.#after = states.after;
    this.#readers = context.readers;
    this.#scopes = [{ id: null, name: context.name, space: states.after }, ...context.dependents];
  }

  find(change: Change): Affected {
    const { key } = change;
    if (key === undefined) return { subtypes: [], instances: [], readers: [] };
    const space = this.#after.isOwn(key) ? this.#after : this.#before;
    const owner = findOwningType(space, key);
    const type = owner === undefined ? undefined : space.getNode(owner);
    const subtypes = owner === undefined ? [] : this.#listSubtypes(space, owner);
    const instances = owner === undefined ? [] : [owner, ...subtypes].flatMap((t) => this.#listInstances(t));
    const ids = new Set(this.#listTouched(space, change, owner, instances));
    return {
      subtypes: subtypes.flatMap((t) =>
        this.#toPlace(
          this.#scopes.find((s) => s.space.isOwn(t)),
          t,
        ),
      ),
      instances:
        type?.nodeClass === "DataType" ? [] : instances.flatMap(({ scope, node }) => this.#toPlace(scope, node.key)),
      readers: this.#readers.flatMap((reader) => this.#findEffect(reader, change, ids)),
    };
  }

  #toPlace(scope: Scope | undefined, key: NodeKey): AffectedPlace[] {
    const node = scope?.space.getNode(key);
    if (!scope || !node) return [];
    return [
      { modelId: scope.id, model: scope.name, nodeId: formatNodeId(node.nodeId), path: getPath(scope.space, key) },
    ];
  }

  #listSubtypes(space: AddressSpace, type: NodeKey): NodeKey[] {
    const found = new Set<NodeKey>();
    for (const at of [space, ...this.#scopes.map((s) => s.space)])
      for (const sub of collectSubtypes(at, type)) found.add(sub);
    found.delete(type);
    return [...found];
  }

  /** Instances that are not part of a type, in every model, with Variables of a DataType among them. */
  #listInstances(type: NodeKey): readonly { scope: Scope; node: Node }[] {
    let found = this.#instances.get(type);
    if (!found) {
      found = this.#scopes.flatMap((scope) => {
        const nodes =
          scope.space.getNode(type)?.nodeClass === "DataType"
            ? listOfDataType(scope.space, type)
            : listOfType(scope.space, type);
        return nodes.map((node) => ({ scope, node }));
      });
      this.#instances.set(type, found);
    }
    return found;
  }

  /** NodeIds that the change meets: the node, its counterparts in instances, and what is below these. */
  #listTouched(
    space: AddressSpace,
    change: Change,
    owner: NodeKey | undefined,
    instances: readonly { scope: Scope; node: Node }[],
  ): string[] {
    const key = change.key as NodeKey;
    const ids: string[] = change.nodeId === undefined ? [] : [change.nodeId];
    // A node that came or went is met by whoever reads what stands beside it.
    const target = change.before === null && change.after !== null ? (findParent(space, key) ?? key) : key;
    ids.push(...listIdsBelow(space, target), ...listIdsAbove(space, target));
    const names = owner === undefined ? undefined : listNamesBelow(space, owner, target);
    if (names) {
      for (const { scope, node } of instances) {
        const member = followNames(scope.space, node, names);
        if (member) ids.push(...listIdsBelow(scope.space, member.key), ...listIdsAbove(scope.space, member.key));
      }
    }
    return ids;
  }

  #findEffect(reader: ReaderOfNodes, { rating }: Change, ids: ReadonlySet<string>): AffectedReader[] {
    const nodeIds = reader.nodeIds.filter((id) => ids.has(id));
    if (nodeIds.length === 0) return [];
    const effect: ReaderEffect = rating === "breaking" ? "stops" : rating === "additive" ? "may-use" : "look";
    return [{ id: reader.id, name: reader.name, effect, nodeIds }];
  }
}

/** The type that a node is or is part of; undefined for an instance that stands by itself. */
export function findOwningType(space: AddressSpace, key: NodeKey): NodeKey | undefined {
  const seen = new Set<NodeKey>();
  for (let at: NodeKey | undefined = key; at !== undefined && !seen.has(at); at = findParent(space, at)) {
    seen.add(at);
    const node = space.getNode(at);
    if (!node) return undefined;
    if (isTypeNode(node)) return at;
  }
  return undefined;
}

function listOfType(space: AddressSpace, type: NodeKey): Node[] {
  const edges = listEdgesTo(space, type, StandardReferenceType.HasTypeDefinition);
  return edges.flatMap(({ source }) => {
    const node = space.isOwn(source) ? space.getNode(source) : undefined;
    return node && findOwningType(space, source) === undefined ? [node] : [];
  });
}

function listOfDataType(space: AddressSpace, type: NodeKey): Node[] {
  return space.listOwnNodes().filter((node) => hasValueAttributes(node) && node.dataType === type);
}

/** Deeper than any model; ends the walk where owners go round in a circle. */
const MAX_DEPTH = 100;

/** BrowseNames from the owner down to the node, both ends of which are known to be related. */
function listNamesBelow(space: AddressSpace, owner: NodeKey, key: NodeKey): Node["browseName"][] | undefined {
  const names: Node["browseName"][] = [];
  let at: NodeKey | undefined = key;
  while (at !== owner) {
    const node: Node | undefined = at === undefined ? undefined : space.getNode(at);
    if (!node || names.length > MAX_DEPTH) return undefined;
    names.unshift(node.browseName);
    at = findParent(space, node.key);
  }
  return names;
}

function followNames(space: AddressSpace, from: Node, names: readonly Node["browseName"][]): Node | undefined {
  let at: Node | undefined = from;
  for (const name of names)
    at = at && listChildren(space, at.key).find((child) => isSameQualifiedName(child.browseName, name));
  return at;
}

/** Own owners of a node: whoever reads one of them reads the node. */
function listIdsAbove(space: AddressSpace, key: NodeKey): string[] {
  const found = new Set<NodeKey>();
  for (
    let at = findParent(space, key);
    at !== undefined && space.isOwn(at) && !found.has(at);
    at = findParent(space, at)
  )
    found.add(at);
  return [...found].map((at) => formatNodeId(space.requireNode(at).nodeId));
}

function listIdsBelow(space: AddressSpace, key: NodeKey): string[] {
  const found = new Set<NodeKey>([key]);
  for (const at of found) for (const child of listChildren(space, at)) if (space.isOwn(child.key)) found.add(child.key);
  return [...found].flatMap((at) => {
    const node = space.getNode(at);
    return node ? [formatNodeId(node.nodeId)] : [];
  });
}
