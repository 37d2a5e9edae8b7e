/**
 * Inverse operations. They are made before the operation is applied, since only the old state knows what to restore.
 * Law: for an operation that applies, `apply(apply(space, op), invert(space, op))` has the own layer of `space`, exactly,
 * down to the places of references in their lists. (The next order number is not taken back: a number is used once.)
 */
import type { AddressSpace, Edge } from "../address-space/address-space";
import { toMappingKey } from "../address-space/mapping-entry";
import type { Node } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import { assertNever, fail, ok, type Result } from "../core/result";
import { applyOperation, declaresEdge, findDangling } from "./apply-operation";
import type { DeclaredAt, Operation } from "./operation";

/** The operations that take `operation` back. For one that does not apply to `space` the answer has no meaning. */
export function invertOperation(space: AddressSpace, operation: Operation): Operation[] {
  switch (operation.kind) {
    case "addNode":
      return [{ kind: "removeNode", key: operation.node.key }];
    case "removeNode":
      return invertRemoveNode(space, operation.key);
    case "setAttribute": {
      const { key, attribute } = operation;
      const node: (Node & { readonly [name: string]: unknown }) | undefined = space.getNode(key);
      const value = node?.[attribute];
      return [{ kind: "setAttribute", key, attribute, ...(value === undefined ? {} : { value }) }];
    }
    case "renumber": {
      const changes = operation.changes.flatMap(({ key }) => {
        const node = space.getNode(key);
        return node ? [{ key, nodeId: node.nodeId }] : [];
      });
      return [{ kind: "renumber", changes }];
    }
    case "addReference": {
      const { source, type, target } = operation;
      return [{ kind: "removeReference", source, type, target }];
    }
    case "removeReference":
      return [invertRemoveReference(space, operation)];
    case "setHeader": {
      const value = space.own.header[operation.field];
      return [{ kind: "setHeader", field: operation.field, ...(value === undefined ? {} : { value }) }];
    }
    case "setMapping":
      return [invertSetMapping(space, operation)];
    default:
      return assertNever(operation);
  }
}

function invertSetMapping(space: AddressSpace, operation: Extract<Operation, { kind: "setMapping" }>): Operation {
  const { kind, part, owner, id } = operation;
  const before = space.own.mapping?.get(toMappingKey(operation));
  if (!before) return { kind, part, owner, id };
  return { kind, part, owner, id, value: before.value, ...(space.isOwn(owner) ? {} : { isDangling: true }) };
}

function invertRemoveNode(space: AddressSpace, key: NodeKey): Operation[] {
  const node = space.getNode(key);
  if (!node) return [];
  return [{ kind: "addNode", node, ...(findDangling(space, node).length > 0 ? { isDangling: true } : {}) }];
}

function invertRemoveReference(space: AddressSpace, { source, type, target }: Edge): Operation {
  const edge = { source, type, target };
  const [sourceIndex, ...sourceRepeats] = listPlaces(space, source, edge, true);
  const [targetIndex, ...targetRepeats] = listPlaces(space, target, edge, false);
  const declaredAt: DeclaredAt = targetIndex === undefined ? "source" : sourceIndex === undefined ? "target" : "both";
  const sourceAttributes = findAttributes(space, source, sourceIndex);
  const targetAttributes = findAttributes(space, target, targetIndex);
  const isDangling = [source, type, target].some((key) => !space.getNode(key));
  return {
    kind: "addReference",
    ...edge,
    declaredAt,
    ...(sourceIndex === undefined ? {} : { sourceIndex }),
    ...(targetIndex === undefined ? {} : { targetIndex }),
    ...(sourceAttributes ? { sourceAttributes } : {}),
    ...(targetAttributes ? { targetAttributes } : {}),
    ...(sourceRepeats.length + targetRepeats.length > 0
      ? { repeats: { source: sourceRepeats, target: targetRepeats } }
      : {}),
    ...(isDangling ? { isDangling: true } : {}),
  };
}

function findAttributes(space: AddressSpace, key: NodeKey, index: number | undefined) {
  return index === undefined ? undefined : space.own.nodes.get(key)?.references[index]?.otherAttributes;
}

function listPlaces(space: AddressSpace, key: NodeKey, edge: Edge, isForward: boolean): number[] {
  const references = space.own.nodes.get(key)?.references ?? [];
  return references.flatMap((r, i) => (r.isForward === isForward && declaresEdge(key, r, edge) ? [i] : []));
}

/** A list of operations that applied as a whole: the new address space and the operations that take it all back. */
export type Applied = { readonly space: AddressSpace; readonly inverse: readonly Operation[] };

/** Applies all operations or none, and makes their inverse on the way. Problems as `applyOperations`. */
export function applyWithInverse(space: AddressSpace, operations: readonly Operation[]): Result<Applied> {
  let current = space;
  const inverses: Operation[][] = [];
  for (const [index, operation] of operations.entries()) {
    const result = applyOperation(current, operation);
    if (!result.ok) return fail(...result.problems.map((p) => ({ ...p, data: { ...p.data, operation: index } })));
    inverses.push(invertOperation(current, operation));
    current = result.value;
  }
  return ok({ space: current, inverse: inverses.reverse().flat() });
}
