/**
 * Freezing: the working state becomes a revision that never changes, together with the required models that it stands on.
 * Contents are kept by hash, so that freezing twice costs nothing and two equal revisions are seen to be equal.
 */
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import { writeBatch, type Statement } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import { addBlobStatement, toBlob, type StoredBlob } from "../db/repositories/blobs.server";
import { addRevisionStatement, listRevisions, type ModelRow } from "../db/repositories/models.server";
import type { PinnedModelRow } from "../db/schema/models";
import type { AddressSpace, Layer } from "../domain/address-space/address-space";
import type { ChangeRating } from "../domain/compare/change";
import { compareModels } from "../domain/compare/compare-models";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { toPackContent, writePack } from "../domain/nodeset/pack";
import { newId } from "../utils/ids.server";
import { checkModel, countFindings } from "./check-model.server";
import { publish } from "./event-hub.server";
import { loadState } from "./load-revision.server";
import type { RequiredLayer } from "./required-models.server";
import { inModelTurn, loadWorkingModel } from "./working-model.server";

export const freezeSchema = z.strictObject({ message: z.string().trim().min(1).max(1000) });

export type FrozenRevision = { readonly id: string; readonly number: number; readonly seq: number };

/** Problems: `request.not-found`, `revision.unchanged`, missing required models. */
export async function freezeRevision(author: Caller, model: ModelRow, message: string): Promise<Result<FrozenRevision>> {
  const outcome = await inModelTurn(model.id, () => freeze(author, model, message));
  if (outcome.ok) publish(`models:${model.organizationId}`, { id: model.id, change: "frozen" });
  return outcome;
}

async function freeze(author: Caller, model: ModelRow, message: string): Promise<Result<FrozenRevision>> {
  const working = await loadWorkingModel(model.id);
  const checked = await checkModel(model.id);
  if (!working || !checked) return fail(problem("request.not-found"));
  if (working.missing.length > 0) return fail(...working.missing);
  const now = new Date();
  const own = await packLayer(working.space.own);
  const { pinned, blobs } = await pinLayers(working.layers);
  const [newest] = await listRevisions(model.id);
  if (newest && newest.packHash === own.hash && newest.pinned && JSON.stringify(newest.pinned) === JSON.stringify(pinned)) {
    return fail(problem("revision.unchanged", { number: newest.number }));
  }
  const frozen = { id: newId(), number: (newest?.number ?? -1) + 1, seq: working.seq };
  const statements: [Statement, ...Statement[]] = [addBlobStatement(own, now), ...blobs.map((blob) => addBlobStatement(blob, now))];
  statements.push(
    addRevisionStatement({
      ...frozen,
      modelId: model.id,
      packHash: own.hash,
      message,
      author: author.name,
      at: now,
      nodeCount: working.space.own.nodes.size,
      counts: countFindings(checked.findings),
      changes: newest ? await countChanges(model, newest.number, working.space) : null,
      pinned,
    }),
    addAuditStatement({
      organizationId: model.organizationId,
      userId: author.userId,
      userName: author.name,
      action: "revision.freeze",
      subject: { kind: "model", id: model.id, name: model.name },
      details: { number: frozen.number, seq: frozen.seq, hash: own.hash, message },
    }),
  );
  await writeBatch(statements);
  return ok(frozen);
}

/** How much changed by meaning since the revision before. */
async function countChanges(model: ModelRow, number: number, space: AddressSpace): Promise<Record<ChangeRating, number> | null> {
  const before = await loadState(model, number);
  if (!before) return null;
  const counts = { breaking: 0, additive: 0, neutral: 0 };
  for (const { rating } of compareModels(before, space).changes) counts[rating]++;
  return counts;
}

function packLayer(layer: Layer): Promise<StoredBlob> {
  return toBlob(writePack(toPackContent(layer)));
}

/** Published models are kept by the library under their own name; the organisation's may change or go, so they are copied. */
async function pinLayers(layers: readonly RequiredLayer[]): Promise<{ pinned: PinnedModelRow[]; blobs: StoredBlob[] }> {
  const pinned: PinnedModelRow[] = [];
  const blobs: StoredBlob[] = [];
  for (const { modelUri, version, publicationDate, entry, layer } of layers) {
    const about = {
      modelUri,
      ...(version === undefined ? {} : { version }),
      ...(publicationDate === undefined ? {} : { publicationDate }),
    };
    if (entry.origin === "published") {
      pinned.push({ ...about, kept: "published", hash: entry.sha256 });
    } else {
      const blob = await packLayer(layer);
      blobs.push(blob);
      pinned.push({ ...about, kept: "blob", hash: blob.hash });
    }
  }
  return { pinned, blobs };
}
