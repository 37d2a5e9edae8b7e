/** Every NodeId that a node of the model was taken away and what it got instead, the newest first. */
import { listRenumberingTransactions } from "../db/repositories/models.server";
import { formatNodeId, type NodeKey } from "../domain/address-space/node-id";
import { listGivenNodeIds } from "../domain/editing/given-node-ids";
import type { Operation } from "../domain/editing/operation";

export type Renumbering = {
  readonly seq: number;
  readonly author: string;
  /** ISO 8601. */
  readonly at: string;
  readonly changes: readonly { readonly key: NodeKey; readonly from: string; readonly to: string }[];
};

const MOST_LISTED = 200;

/** Who calls has asked for the permission. At most the newest 200 edits. */
export async function listRenumberings(modelId: string): Promise<readonly Renumbering[]> {
  const found = await listRenumberingTransactions(modelId, MOST_LISTED);
  return found.flatMap(({ seq, author, at, operations, inverse }) => {
    const before = collectIds(inverse);
    const changes = [...collectIds(operations)].flatMap(([key, to]) => {
      const from = before.get(key);
      return from === undefined || from === to ? [] : [{ key, from, to }];
    });
    return changes.length === 0 ? [] : [{ seq, author, at, changes }];
  });
}

function collectIds(operations: readonly Operation[]): Map<NodeKey, string> {
  const given = operations.flatMap(listGivenNodeIds).filter((one) => !one.node);
  return new Map(given.map(({ key, nodeId }) => [key, formatNodeId(nodeId)]));
}
