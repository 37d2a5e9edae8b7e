/** Which NodeIds operations give to which nodes: what the ledger, its keeper on the server and the window's stock ask. */
import type { Node } from "../address-space/node";
import type { NodeId, NodeKey } from "../address-space/node-id";
import type { Operation } from "./operation";

/** `node` is there where the node comes with its NodeId; without it a node that was there gets another one. */
export type GivenNodeId = { readonly key: NodeKey; readonly nodeId: NodeId; readonly node?: Node };

export function listGivenNodeIds(operation: Operation): readonly GivenNodeId[] {
  switch (operation.kind) {
    case "addNode":
      return [{ key: operation.node.key, nodeId: operation.node.nodeId, node: operation.node }];
    case "renumber":
      return operation.changes;
    case "setAttribute":
      if (operation.attribute !== "nodeId" || operation.value === undefined) return [];
      return [{ key: operation.key, nodeId: operation.value as NodeId }];
    default:
      return [];
  }
}
