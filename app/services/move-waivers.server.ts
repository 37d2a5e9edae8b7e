/** Waivers name nodes by their NodeIds: a renumbering takes them along, with the fingerprint that the node then has. */
import type { Statement } from "../db/client.server";
import { listWaiverRows, removeWaiverStatement, saveWaiverStatement } from "../db/repositories/waivers.server";
import type { AddressSpace } from "../domain/address-space/address-space";
import { formatNodeId, parseNodeId } from "../domain/address-space/node-id";
import { fingerprintOf } from "../domain/checks/waivers";
import { listGivenNodeIds } from "../domain/editing/given-node-ids";
import type { Operation } from "../domain/editing/operation";

/** What must be written along with an edit that led from `before` to `after`; nothing unless it renumbers nodes. */
export async function listMovedWaivers(
  modelId: string,
  before: AddressSpace,
  after: AddressSpace,
  operations: readonly Operation[],
): Promise<Statement[]> {
  if (!operations.some((operation) => listGivenNodeIds(operation).some((given) => !given.node))) return [];
  const rows = await listWaiverRows(modelId);
  const moved = rows.flatMap((row) => {
    const id = parseNodeId(row.nodeId, []);
    const key = id.ok ? before.findByNodeId(id.value)?.key : undefined;
    const node = key === undefined ? undefined : after.getNode(key);
    if (key === undefined || !node) return [];
    // Only what the renumbering itself changed may be taken over: a node that was edited besides is open again.
    const holds = row.fingerprint === fingerprintOf(before, key) && operations.every(isRenumbering);
    const next = { ...row, nodeId: formatNodeId(node.nodeId), fingerprint: holds ? fingerprintOf(after, key) : row.fingerprint };
    return next.nodeId === row.nodeId && next.fingerprint === row.fingerprint ? [] : [next];
  });
  // Nodes may have exchanged their NodeIds, so all go before any comes.
  return [...moved.map((row) => removeWaiverStatement(row.id)), ...moved.map(saveWaiverStatement)];
}

/** Values hold NodeIds, which are rewritten along. */
function isRenumbering(operation: Operation): boolean {
  if (operation.kind === "renumber") return true;
  return operation.kind === "setAttribute" && (operation.attribute === "nodeId" || operation.attribute === "value");
}
