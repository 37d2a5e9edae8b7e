/**
 * A NodeId, once given, is never given to another node, also after deletion. What a transaction takes away is told by its
 * inverse; what it gives is asked for among everything that was ever taken away.
 */
import { findRetired, type RetiredNodeId } from "../db/repositories/node-ids.server";
import type { Node } from "../domain/address-space/node";
import { formatNodeId } from "../domain/address-space/node-id";
import type { QualifiedName } from "../domain/address-space/qualified-name";
import { problem, type Problem } from "../domain/core/result";
import { listGivenNodeIds } from "../domain/editing/given-node-ids";
import type { Operation, Transaction } from "../domain/editing/operation";

type Edit = Pick<Transaction, "operations" | "inverse">;

/** The NodeIds that these transactions take away, the latest holder of each. */
export function listRetired(edits: readonly Edit[]): RetiredNodeId[] {
  const retired = new Map<string, RetiredNodeId>();
  for (const { inverse } of edits) for (const operation of inverse) addHolders(retired, operation);
  return [...retired.values()];
}

function addHolders(holders: Map<string, RetiredNodeId>, operation: Operation): void {
  for (const holder of listHolders(operation)) holders.set(holder.nodeId, holder);
}

/** The nodes that an operation gives NodeIds to. */
function listHolders(operation: Operation): RetiredNodeId[] {
  return listGivenNodeIds(operation).map(({ key, nodeId, node }) =>
    node ? toRetired(node) : { nodeId: formatNodeId(nodeId), nodeKey: key, nodeClass: null, browseName: null },
  );
}

/** A node whose NodeId no other may get. */
export function toRetired({ key, nodeId, nodeClass, browseName }: Node): RetiredNodeId {
  return { nodeId: formatNodeId(nodeId), nodeKey: key, nodeClass, browseName: formatName(browseName) };
}

function formatName({ namespaceUri, name }: QualifiedName): string {
  return `${namespaceUri}\n${name}`;
}

/** Problems `operation.node-id-taken` for each NodeId that would be given to another node than the one that had it. */
export async function findGivenTwice(organizationId: string, edits: readonly Edit[]): Promise<Problem[]> {
  const given = edits.flatMap(({ operations }) => operations.flatMap(listHolders));
  if (given.length === 0) return [];
  const stored = await findRetired(organizationId, given.map((holder) => holder.nodeId));
  const retired = new Map(stored.map((row) => [row.nodeId, row] as const));
  const problems: Problem[] = [];
  for (const { operations, inverse } of edits) {
    const inUse = new Set(listRenumbered(inverse));
    for (const holder of operations.flatMap(listHolders)) {
      const before = retired.get(holder.nodeId);
      // What its holder gives up in the same edit is passed on by an explicit act.
      if (before && !inUse.has(holder.nodeId) && !isSameNode(before, holder)) {
        problems.push(problem("operation.node-id-taken", { nodeId: holder.nodeId }, { node: holder.nodeKey }));
      }
    }
    for (const operation of inverse) addHolders(retired, operation);
  }
  return problems;
}

function listRenumbered(inverse: readonly Operation[]): string[] {
  return inverse.flatMap((o) => (o.kind === "renumber" ? o.changes.map(({ nodeId }) => formatNodeId(nodeId)) : []));
}

/** A deleted node comes back as what it was; a renumbered one may take its own old number again. */
function isSameNode(before: RetiredNodeId, after: RetiredNodeId): boolean {
  if (before.nodeKey !== after.nodeKey) return false;
  if (before.nodeClass === null || after.nodeClass === null) return true;
  return before.nodeClass === after.nodeClass && before.browseName === after.browseName;
}
