/**
 * A NodeId, once given, is never given to another node, also after deletion. What a transaction takes away is told by its
 * inverse; what it gives is asked for among everything that was ever taken away.
 */
import { findRetired, type RetiredNodeId } from "../db/repositories/node-ids.server";
import { formatNodeId, type NodeId } from "../domain/address-space/node-id";
import type { QualifiedName } from "../domain/address-space/qualified-name";
import { problem, type Problem } from "../domain/core/result";
import type { Operation, Transaction } from "../domain/editing/operation";

type Edit = Pick<Transaction, "operations" | "inverse">;

/** The NodeIds that these transactions take away, the latest holder of each. */
export function listRetired(edits: readonly Edit[]): RetiredNodeId[] {
  const retired = new Map<string, RetiredNodeId>();
  for (const { inverse } of edits) for (const operation of inverse) addHolder(retired, operation);
  return [...retired.values()];
}

function addHolder(holders: Map<string, RetiredNodeId>, operation: Operation): void {
  const holder = toHolder(operation);
  if (holder) holders.set(holder.nodeId, holder);
}

/** The node that an operation gives a NodeId to. */
function toHolder(operation: Operation): RetiredNodeId | undefined {
  if (operation.kind === "addNode") {
    const { nodeId, key, nodeClass, browseName } = operation.node;
    return { nodeId: formatNodeId(nodeId), nodeKey: key, nodeClass, browseName: formatName(browseName) };
  }
  if (operation.kind !== "setAttribute" || operation.attribute !== "nodeId" || operation.value === undefined) return undefined;
  return { nodeId: formatNodeId(operation.value as NodeId), nodeKey: operation.key, nodeClass: null, browseName: null };
}

function formatName({ namespaceUri, name }: QualifiedName): string {
  return `${namespaceUri}\n${name}`;
}

/** Problems `operation.node-id-taken` for each NodeId that would be given to another node than the one that had it. */
export async function findGivenTwice(organizationId: string, edits: readonly Edit[]): Promise<Problem[]> {
  const given = edits.flatMap(({ operations }) => operations.flatMap((operation) => toHolder(operation) ?? []));
  if (given.length === 0) return [];
  const stored = await findRetired(organizationId, given.map((holder) => holder.nodeId));
  const retired = new Map(stored.map((row) => [row.nodeId, row] as const));
  const problems: Problem[] = [];
  for (const { operations, inverse } of edits) {
    for (const operation of operations) {
      const holder = toHolder(operation);
      const before = holder && retired.get(holder.nodeId);
      if (before && !isSameNode(before, holder)) {
        problems.push(problem("operation.node-id-taken", { nodeId: holder.nodeId }, { node: holder.nodeKey }));
      }
    }
    for (const operation of inverse) addHolder(retired, operation);
  }
  return problems;
}

/** A deleted node comes back as what it was; a renumbered one may take its own old number again. */
function isSameNode(before: RetiredNodeId, after: RetiredNodeId): boolean {
  if (before.nodeKey !== after.nodeKey) return false;
  if (before.nodeClass === null || after.nodeClass === null) return true;
  return before.nodeClass === after.nodeClass && before.browseName === after.browseName;
}
