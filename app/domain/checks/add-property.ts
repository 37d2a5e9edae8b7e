/** A standard Property for a node, as fixes make it. */
import type { AddressSpace } from "../address-space/address-space";
import type { VariableNode, XmlText } from "../address-space/node";
import { OPC_UA_NAMESPACE, toNodeKey, type NodeKey } from "../address-space/node-id";
import { StandardReferenceType as R, StandardType as T } from "../address-space/standard-ids";
import { ok, type Result } from "../core/result";
import type { NodeIdAllocator } from "../editing/allocate-node-id";
import type { Operation } from "../editing/operation";

type Parts = { readonly name: string; readonly dataType: NodeKey; readonly value: XmlText; readonly isList?: boolean };

/** Adds a Property named in namespace 0; one that hangs on a declaration gets its modelling rule. */
export function addProperty(
  space: AddressSpace,
  owner: NodeKey,
  ids: NodeIdAllocator,
  parts: Parts,
): Result<readonly Operation[]> {
  const allocated = ids.allocate("Variable");
  if (!allocated.ok) return allocated;
  const rule = space.edgesFrom(owner).find((e) => e.type === R.HasModellingRule)?.target;
  const node: VariableNode = {
    key: toNodeKey(allocated.value),
    nodeId: allocated.value,
    nodeClass: "Variable",
    order: space.own.nextOrder,
    browseName: { namespaceUri: OPC_UA_NAMESPACE, name: parts.name },
    displayName: [{ text: parts.name }],
    references: [
      { type: R.HasTypeDefinition, target: T.PropertyType, isForward: true },
      ...(rule === undefined ? [] : [{ type: R.HasModellingRule, target: rule, isForward: true }]),
      { type: R.HasProperty, target: owner, isForward: false },
    ],
    parent: owner,
    dataType: parts.dataType,
    ...(parts.isList ? { valueRank: 1, arrayDimensions: "0" } : {}),
    value: parts.value,
  };
  return ok([{ kind: "addNode", node }]);
}
