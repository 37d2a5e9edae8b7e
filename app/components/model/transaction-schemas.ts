/** Transactions as the server sends them. Loaded when the first one of another window comes, or one was left behind. */
import { z } from "zod";
import { operationsSchema } from "~/domain/editing/operation-schema";

export const transactionSchema = z.object({
  seq: z.int(),
  base: z.int(),
  clientId: z.string(),
  clientSeq: z.int(),
  author: z.string(),
  at: z.string(),
  label: z.string(),
  operations: operationsSchema,
  inverse: z.array(z.unknown()),
});

export const staleSchema = z.object({ head: z.int(), between: z.array(transactionSchema) });
export const pageSchema = z.object({ head: z.int(), transactions: z.array(transactionSchema) });

export function areOperations(value: unknown): boolean {
  return operationsSchema.safeParse(value).success;
}
