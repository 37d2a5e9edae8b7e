/** The history of one node: who changed what when, the newest first, in pages. */
import { listNodeTransactions } from "../db/repositories/models.server";
import type { NodeKey } from "../domain/address-space/node-id";
import { listNodeChanges, type NodeChange } from "../domain/editing/node-changes";

export type NodeHistoryEntry = {
  readonly seq: number;
  readonly author: string;
  /** ISO 8601. */
  readonly at: string;
  readonly label: string;
  readonly changes: readonly NodeChange[];
};

/** `next`: ask for what was before this number; absent on the last page. */
export type NodeHistoryPage = { readonly entries: readonly NodeHistoryEntry[]; readonly next?: number };

const PAGE = 20;
/** Longer values are told to have changed, not how. */
const MOST_CHARACTERS = 4_000;

/** Who calls has asked for the permission. */
export async function listNodeHistory(modelId: string, key: NodeKey, before: number): Promise<NodeHistoryPage> {
  const found = await listNodeTransactions(modelId, key, before, PAGE + 1);
  const entries = found.slice(0, PAGE).flatMap((transaction) => {
    const { seq, author, at, label } = transaction;
    const changes = listNodeChanges(transaction, key).map(shorten);
    return changes.length === 0 ? [] : [{ seq, author, at, label, changes }];
  });
  const last = found.length > PAGE ? found[PAGE - 1]?.seq : undefined;
  return { entries, ...(last === undefined ? {} : { next: last }) };
}

function shorten(change: NodeChange): NodeChange {
  const isLong = change.kind === "attribute" && JSON.stringify(change).length > MOST_CHARACTERS;
  return isLong ? { kind: "attribute", attribute: change.attribute } : change;
}
