import { findModel, listTransactions, type ModelRow } from "../db/repositories/models.server";
import type { Transaction } from "../domain/editing/operation";

export type TransactionPage = { readonly head: number; readonly transactions: readonly Transaction[] };

/** The transactions after `since`; when the last one is not the head there are more. */
export async function listModelTransactions(model: ModelRow, since: number, limit: number): Promise<TransactionPage> {
  const transactions = await listTransactions(model.id, since, limit);
  const head = (await findModel(model.id))?.headSeq ?? model.headSeq;
  return { head, transactions };
}
