/** A roll-out on the server: it leases as many identifiers as the machines need and writes one transaction. */
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import type { ModelRow } from "../db/repositories/models.server";
import type { NodeKey } from "../domain/address-space/node-id";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { rollOutMachines } from "../domain/instantiation/roll-out-machines";
import { newId } from "../utils/ids.server";
import { makeWithIds } from "./lease-node-ids.server";
import { appendTransactions, loadWorkingModel } from "./working-model.server";

const key = z
  .string()
  .min(1)
  .max(1000)
  .transform((text) => text as NodeKey);

export const rollOutSchema = z.object({
  type: key,
  parent: key,
  optional: z.array(z.string().max(1000)).max(500),
  manufacturer: z.string().trim().max(200),
  rows: z
    .array(
      z.object({
        name: z.string().trim().min(1).max(200),
        serialNumber: z.string().trim().max(200),
        location: z.string().trim().max(200),
        optional: z.array(z.string().max(1000)).max(500).optional(),
      }),
    )
    .min(1)
    .max(100),
  nodeIds: z.discriminatedUnion("kind", [
    z.object({ kind: z.literal("numbers") }),
    z.object({ kind: z.literal("path"), pattern: z.string().trim().min(1).max(200), separator: z.enum([".", "/", "_"]) }),
  ]),
});
export type RollOutIntent = z.infer<typeof rollOutSchema>;

/** Answers the first machine. Problems: those of the command; nothing is made when one machine cannot be. */
export async function rollOut(
  author: Caller,
  model: ModelRow,
  intent: RollOutIntent,
): Promise<Result<{ first: NodeKey | undefined }>> {
  const clientId = `roll-out-${newId()}`;
  const working = await loadWorkingModel(model.id);
  if (!working) return fail(problem("request.not-found"));
  const edit = await makeWithIds(author, model, clientId, working.space, (ids, stock) =>
    rollOutMachines(working.space, ids, intent, stock.ledger),
  );
  if (!edit.ok) return edit;
  const outcome = await appendTransactions(model.id, author, {
    clientId,
    base: working.seq,
    transactions: [{ clientSeq: 1, label: "roll-out", operations: edit.value.operations }],
  });
  if (outcome.kind === "accepted") return ok({ first: edit.value.made[0] });
  return fail(...(outcome.kind === "refused" ? outcome.problems : [problem("transactions.stale")]));
}
