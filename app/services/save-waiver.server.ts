/** Accepting a finding with a reason, and taking that back. */
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import { writeBatch } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import type { ModelRow } from "../db/repositories/models.server";
import { findWaiver, removeWaiverStatement, saveWaiverStatement } from "../db/repositories/waivers.server";
import { makeWaiver } from "../domain/checks/waivers";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { newId } from "../utils/ids.server";
import { listAllFindings } from "./check-model.server";
import { publish } from "./event-hub.server";

export const waiverIntentSchema = z.strictObject({
  rule: z.string().max(10),
  nodeId: z.string().max(4000),
  attribute: z.string().max(100).optional(),
  reason: z.string().trim().min(1).max(1000),
});
export type WaiverIntent = z.infer<typeof waiverIntentSchema>;

/** The finding must be there now. Problem: `waiver.no-finding`. */
export async function saveWaiver(author: Caller, model: ModelRow, intent: WaiverIntent): Promise<Result<{ id: string }>> {
  const { rule, nodeId, attribute, reason } = intent;
  const checked = await listAllFindings(model.id);
  const finding = checked?.findings.find((f) => f.rule === rule && f.nodeId === nodeId && f.attribute === attribute);
  if (!checked || !finding) return fail(problem("waiver.no-finding"));
  const at = new Date();
  const { fingerprint } = makeWaiver(checked.space, finding, { reason, person: author.name, date: at.toISOString() });
  const id = newId();
  await writeBatch([
    saveWaiverStatement({ id, modelId: model.id, rule, nodeId, attribute: attribute ?? "", reason, person: author.name, at, fingerprint }),
    addAuditStatement({ ...describe(author, model), action: "finding.waive", details: { rule, nodeId, path: finding.path, reason } }),
  ]);
  publish(`waivers:${model.id}`, { saved: id });
  return ok({ id });
}

/** The finding is open again. Problem: `request.not-found`. */
export async function removeWaiver(author: Caller, model: ModelRow, id: string): Promise<Result<null>> {
  const waiver = await findWaiver(model.id, id);
  if (!waiver) return fail(problem("request.not-found"));
  const { rule, nodeId, reason } = waiver;
  await writeBatch([
    removeWaiverStatement(id),
    addAuditStatement({ ...describe(author, model), action: "finding.reopen", details: { rule, nodeId, reason } }),
  ]);
  publish(`waivers:${model.id}`, { removed: id });
  return ok(null);
}

function describe(author: Caller, model: ModelRow) {
  return {
    organizationId: model.organizationId,
    userId: author.userId,
    userName: author.name,
    subject: { kind: "model", id: model.id, name: model.name },
  };
}
