/**
 * Moving a required model to another version of the library: first the list of what breaks, then the edit that names the
 * version. Of two versions of one model the library loads the newest, so the newest is what can be looked at and taken.
 */
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import { findBlob } from "../db/repositories/blobs.server";
import type { ModelRow } from "../db/repositories/models.server";
import { listUploads } from "../db/repositories/uploads.server";
import { buildLayer, type Layer } from "../domain/address-space/address-space";
import { getOwnNamespace, type ModelEntry } from "../domain/address-space/model-header";
import { listRetargetBreaks, type RetargetBreak } from "../domain/compare/list-retarget-breaks";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { BlockAllocator } from "../domain/editing/allocate-node-id";
import { toRequiredRow } from "../domain/editing/commands/create-model";
import { setRequiredModels } from "../domain/editing/commands/set-model-info";
import { readPack } from "../domain/nodeset/pack";
import { getLibrary } from "../library/library.server";
import { applyEdit } from "./apply-edit.server";
import { loadWorkingModel } from "./working-model.server";

export const retargetSchema = z.strictObject({ modelUri: z.string().min(1).max(400), source: z.string().min(1).max(200) });

/** A version of a required model that the organisation's library holds. */
export type TargetVersion = {
  readonly modelUri: string;
  /** Names it in requests: the hash of its file. */
  readonly source: string;
  readonly version: string | null;
  readonly publicationDate: string | null;
  /** Whether the model stands on it now. */
  readonly isNow: boolean;
};

/** Every version there is of the models that this one requires, those that it stands on now marked. */
export async function listTargetVersions(model: ModelRow): Promise<TargetVersion[]> {
  const working = await loadWorkingModel(model.id);
  if (!working) return [];
  const uploads = await listUploads(model.organizationId);
  return working.layers.flatMap(({ modelUri, entry, from }) => {
    if (from) return [];
    const published = getLibrary().list().filter((other) => other.modelUri === modelUri);
    const versions = [
      ...published.map(({ sha256, version, publicationDate }) => ({ source: sha256, version, publicationDate })),
      ...uploads.filter((row) => row.modelUri === modelUri).map((row) => ({ source: row.fileHash, version: row.version, publicationDate: row.publicationDate })),
    ];
    return versions.map(({ source, version, publicationDate }) => ({
      modelUri,
      source,
      version: version ?? null,
      publicationDate: publicationDate ?? null,
      isNow: source === entry.sha256,
    }));
  });
}

export type RetargetPreview = { readonly target: TargetVersion; readonly breaks: readonly RetargetBreak[] };

/** Problem: `request.not-found` for a version that the library does not hold. */
export async function previewRetarget(model: ModelRow, intent: z.infer<typeof retargetSchema>): Promise<Result<RetargetPreview>> {
  const working = await loadWorkingModel(model.id);
  const target = (await listTargetVersions(model)).find((row) => row.modelUri === intent.modelUri && row.source === intent.source);
  const layer = target && (await loadVersion(model.organizationId, target));
  if (!working || !target || !layer) return fail(problem("request.not-found"));
  const required = working.layers.map((known) => (known.modelUri === target.modelUri ? layer : known.layer));
  return ok({ target, breaks: listRetargetBreaks(working.space, required) });
}

async function loadVersion(organizationId: string, { modelUri, source }: TargetVersion): Promise<Layer | undefined> {
  const entry = getLibrary().list().find((other) => other.modelUri === modelUri && other.sha256 === source);
  const loaded = entry && (await getLibrary().load(entry));
  if (loaded?.ok) return loaded.value;
  const upload = (await listUploads(organizationId)).find((row) => row.modelUri === modelUri && row.fileHash === source);
  const bytes = upload && (await findBlob(upload.packHash));
  const content = bytes && readPack(bytes.toString("utf8"));
  return content?.ok ? buildLayer(content.value.header, content.value.nodes) : undefined;
}

/** Names the version in the header as one edit. Problems: as in the preview, and those of the edit. */
export async function retargetModel(author: Caller, model: ModelRow, intent: z.infer<typeof retargetSchema>): Promise<Result<null>> {
  const working = await loadWorkingModel(model.id);
  const target = (await listTargetVersions(model)).find((row) => row.modelUri === intent.modelUri && row.source === intent.source);
  const layer = target && (await loadVersion(model.organizationId, target));
  const entry = layer?.header.models.find((row) => row.modelUri === getOwnNamespace(layer.header));
  if (!working || !entry) return fail(problem("request.not-found"));
  const rows = (working.space.own.header.models[0]?.requiredModels ?? []).map((row): ModelEntry => (row.modelUri === entry.modelUri ? toRequiredRow(entry) : row));
  const edit = setRequiredModels(working.space, new BlockAllocator(model.namespaceUri, []), { requiredModels: rows });
  if (!edit.ok) return edit;
  const edited = await applyEdit(author, model.id, { base: working.seq, label: "retarget", operations: edit.value.operations });
  return edited.ok ? ok(null) : edited;
}
