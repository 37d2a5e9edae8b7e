/** Readers: consumers that the team names, with the nodes that they read. Reviews show what a change does to each. */
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import { writeBatch } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import { findReader, listReaders, removeReaderStatement, saveReaderStatement, type ReaderRow } from "../db/repositories/releases.server";
import { parseNodeId } from "../domain/address-space/node-id";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { newId } from "../utils/ids.server";

export const readerSchema = z.strictObject({
  id: z.string().max(100).optional(),
  name: z.string().trim().min(1).max(100),
  about: z.string().trim().max(1000).default(""),
  contact: z.string().trim().max(320).default(""),
  /** NodeId text with `nsu=`; nodes below a node count too. */
  nodeIds: z.array(z.string().trim().min(1).max(5000)).max(5000),
});

/** Problems: `reader.name-taken`, `node-id.syntax` for what is no NodeId, `request.not-found`. */
export async function saveReader(author: Caller, organizationId: string, intent: z.infer<typeof readerSchema>): Promise<Result<ReaderRow>> {
  const wrong = intent.nodeIds.flatMap((text) => {
    const parsed = parseNodeId(text, []);
    return parsed.ok ? [] : parsed.problems;
  });
  if (wrong.length > 0) return fail(...wrong);
  const known = intent.id === undefined ? undefined : await findReader(intent.id);
  if (intent.id !== undefined && known?.organizationId !== organizationId) return fail(problem("request.not-found"));
  const taken = (await listReaders(organizationId)).some((row) => row.name === intent.name && row.id !== known?.id);
  if (taken) return fail(problem("reader.name-taken", { name: intent.name }));
  const row: ReaderRow = {
    id: known?.id ?? newId(),
    organizationId,
    name: intent.name,
    about: intent.about,
    contact: intent.contact,
    nodeIds: [...new Set(intent.nodeIds)],
    updatedBy: author.name,
    updatedAt: new Date(),
  };
  await writeBatch([saveReaderStatement(row), audit(author, row, known ? "reader.change" : "reader.add", { nodes: row.nodeIds.length })]);
  return ok(row);
}

/** Problem: `request.not-found`. */
export async function removeReader(author: Caller, organizationId: string, id: string): Promise<Result<null>> {
  const row = await findReader(id);
  if (row?.organizationId !== organizationId) return fail(problem("request.not-found"));
  await writeBatch([removeReaderStatement(id), audit(author, row, "reader.remove", {})]);
  return ok(null);
}

function audit(author: Caller, row: ReaderRow, action: `reader.${string}`, details: Readonly<Record<string, unknown>>) {
  return addAuditStatement({
    organizationId: row.organizationId,
    userId: author.userId,
    userName: author.name,
    action,
    subject: { kind: "reader", id: row.id, name: row.name },
    details,
  });
}
