/**
 * Variants: a branch of a model for a trial, with sheets, findings and revisions of its own, and merging between the two by
 * meaning. The state that both had in common last is kept, so that a later merge brings only what came since.
 */
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import { writeBatch } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import { addBlobStatement, toBlob } from "../db/repositories/blobs.server";
import { findModel, findRevisionByNumber, listVariants, updateModelStatement, type ModelRow } from "../db/repositories/models.server";
import { AddressSpace } from "../domain/address-space/address-space";
import type { MergeConflict, MergeSide } from "../domain/compare/merge/merge-conflict";
import { mergeModels } from "../domain/compare/merge/merge-models";
import { listStateOperations } from "../domain/compare/merge/state-operations";
import { fail, ok, problem, type Result } from "../domain/core/result";
import type { Operation } from "../domain/editing/operation";
import { toPackContent, writePack } from "../domain/nodeset/pack";
import { addModel } from "./add-model.server";
import { applyEdit } from "./apply-edit.server";
import { loadRevisionLayer } from "./load-revision.server";
import { loadPackedLayer } from "./pins.server";
import { forgetWorkingModel, loadWorkingModel } from "./working-model.server";

export const branchSchema = z.strictObject({ revision: z.number().int().min(0), name: z.string().trim().min(1).max(100) });

/** Problems: `request.not-found`, `variant.of-variant`. */
export async function branchModel(author: Caller, model: ModelRow, { revision, name }: z.infer<typeof branchSchema>): Promise<Result<ModelRow>> {
  if (model.variantOf !== null) return fail(problem("variant.of-variant"));
  const row = await findRevisionByNumber(model.id, revision);
  const layer = await loadRevisionLayer(model.id, revision);
  if (!row || !layer) return fail(problem("request.not-found"));
  return addModel(author, model.organizationId, {
    name,
    kind: model.kind,
    content: toPackContent(layer),
    message: `Variant of ${model.name}, revision ${revision}`,
    variant: { of: model, baseHash: row.packHash },
  });
}

/** `into-model` brings the variant's edits home, `into-variant` brings the model's edits to the trial. */
export type MergeDirection = "into-model" | "into-variant";

export const mergeSchema = z.strictObject({
  direction: z.enum(["into-model", "into-variant"]),
  /** Where both sides were when the choices were made. */
  seqs: z.strictObject({ ours: z.int().min(0), theirs: z.int().min(0) }),
  choices: z.record(z.string().max(10_000), z.enum(["ours", "theirs"])),
});

export type MergePreview = {
  readonly direction: MergeDirection;
  /** `ours` is the side that the edits are merged into. */
  readonly ours: { readonly id: string; readonly name: string; readonly seq: number };
  readonly theirs: { readonly id: string; readonly name: string; readonly seq: number };
  readonly conflicts: readonly MergeConflict[];
  readonly operations: readonly Operation[];
};

type Sides = { readonly variant: ModelRow; readonly ours: ModelRow; readonly theirs: ModelRow };

async function findSides(variant: ModelRow, direction: MergeDirection): Promise<Result<Sides>> {
  const main = variant.variantOf === null ? undefined : await findModel(variant.variantOf);
  if (!main || variant.variantBaseHash === null) return fail(problem("variant.none"));
  return ok(direction === "into-model" ? { variant, ours: main, theirs: variant } : { variant, ours: variant, theirs: main });
}

/** What merging would do. Problems: `variant.none`, `merge.node-id-twice`. */
export async function previewMerge(
  variant: ModelRow,
  direction: MergeDirection,
  choices: ReadonlyMap<string, MergeSide> = new Map(),
): Promise<Result<MergePreview>> {
  const sides = await findSides(variant, direction);
  if (!sides.ok) return sides;
  const [ours, theirs] = await Promise.all([loadWorkingModel(sides.value.ours.id), loadWorkingModel(sides.value.theirs.id)]);
  if (!ours || !theirs) return fail(problem("request.not-found"));
  const common = await loadPackedLayer(variant.variantBaseHash ?? "");
  const base = AddressSpace.of(ours.space.layers.slice(0, -1), common);
  const merged = mergeModels(base, ours.space, theirs.space, choices);
  if (merged.problems.length > 0) return fail(...merged.problems);
  return ok({
    direction,
    ours: { id: ours.model.id, name: ours.model.name, seq: ours.seq },
    theirs: { id: theirs.model.id, name: theirs.model.name, seq: theirs.seq },
    conflicts: merged.conflicts,
    operations: listStateOperations(ours.space, merged.state),
  });
}

/**
 * Merges with a choice at every conflict. Problems: `merge.open-conflicts`, `transactions.stale` where either side was
 * edited after the choices were made.
 */
export async function mergeVariant(author: Caller, variant: ModelRow, intent: z.infer<typeof mergeSchema>): Promise<Result<{ operations: number }>> {
  const choices = new Map(Object.entries(intent.choices));
  const preview = await previewMerge(variant, intent.direction, choices);
  if (!preview.ok) return preview;
  const { ours, theirs, conflicts, operations } = preview.value;
  if (ours.seq !== intent.seqs.ours || theirs.seq !== intent.seqs.theirs) return fail(problem("transactions.stale"));
  const open = conflicts.filter((conflict) => !choices.has(conflict.id));
  if (open.length > 0) return fail(problem("merge.open-conflicts", { count: open.length }));
  if (operations.length > 0) {
    const edited = await applyEdit(author, ours.id, { base: ours.seq, label: "merge", operations });
    if (!edited.ok) return edited;
  }
  await noteCommonState(author, variant, theirs.id, { direction: intent.direction, conflicts: conflicts.length, operations: operations.length });
  return ok({ operations: operations.length });
}

/** From now on both have in common what the other side was when it was merged. */
async function noteCommonState(author: Caller, variant: ModelRow, theirsId: string, details: Readonly<Record<string, unknown>>): Promise<void> {
  const theirs = await loadWorkingModel(theirsId);
  if (!theirs) return;
  const blob = await toBlob(writePack(toPackContent(theirs.space.own)));
  await writeBatch([
    addBlobStatement(blob, new Date()),
    updateModelStatement(variant.id, { variantBaseHash: blob.hash }),
    addAuditStatement({
      organizationId: variant.organizationId,
      userId: author.userId,
      userName: author.name,
      action: "model.merge",
      subject: { kind: "model", id: variant.id, name: variant.name },
      details,
    }),
  ]);
  forgetWorkingModel(variant.id);
}

export function listModelVariants(model: ModelRow): Promise<ModelRow[]> {
  return listVariants(model.id);
}

/** The model that a variant came from; null for a model that is none. */
export async function findOrigin(model: ModelRow): Promise<{ id: string; name: string } | null> {
  const origin = model.variantOf === null ? undefined : await findModel(model.variantOf);
  return origin ? { id: origin.id, name: origin.name } : null;
}
