/** A NodeSet2 file becomes a model of the team (its own namespace editable), or part of the library (read only). */
import type { Caller } from "../auth/caller.server";
import { writeBatch, writeInTurn } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import { addBlobStatement, toBlob } from "../db/repositories/blobs.server";
import type { ModelRow } from "../db/repositories/models.server";
import { addUploadStatement, findUpload, listUploads, removeUploadStatement, type UploadRow } from "../db/repositories/uploads.server";
import type { ModelKind } from "../db/schema/models";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { writePack } from "../domain/nodeset/pack";
import { newId } from "../utils/ids.server";
import { addModel } from "./add-model.server";
import { describeHeader } from "./describe-header.server";
import { listLibraryConflicts, listModelConflicts, suggestKind, suggestName } from "./preview-import.server";
import { listRefusals, type Upload } from "./read-upload.server";
import { listDependents, resolveRequiredModels } from "./required-models.server";

/** Stores all of it or nothing. Problems: those of the file, missing required models, `model.namespace-taken`. */
export async function importModel(
  author: Caller,
  organizationId: string,
  upload: Upload,
  intent: { readonly name?: string; readonly kind?: ModelKind },
): Promise<Result<ModelRow>> {
  const { content } = upload;
  const { missing } = await resolveRequiredModels(organizationId, content.header);
  const refusals = [...listRefusals(upload), ...missing];
  if (refusals.length === 0) refusals.push(...(await listModelConflicts(organizationId, upload)));
  if (refusals.length > 0) return fail(...refusals);
  const added = await addModel(author, organizationId, {
    name: intent.name ?? suggestName(upload),
    kind: intent.kind ?? suggestKind(content.nodes),
    content,
    message: `Imported from ${upload.fileName}`,
    file: { name: upload.fileName, bytes: upload.bytes },
  });
  return added.ok ? ok(added.value, upload.problems) : added;
}

/** Problems: those of the file, missing required models, `library.entry-exists`. */
export async function addToLibrary(author: Caller, organizationId: string, upload: Upload): Promise<Result<UploadRow>> {
  const { content } = upload;
  const { missing } = await resolveRequiredModels(organizationId, content.header);
  const refusals = [...listRefusals(upload), ...missing];
  if (refusals.length > 0) return fail(...refusals);
  const now = new Date();
  const file = await toBlob(upload.bytes);
  const pack = await toBlob(writePack(content));
  const row: UploadRow = {
    id: newId(),
    organizationId,
    modelUri: upload.namespaceUri,
    ...describeHeader(content.header),
    fileName: upload.fileName,
    fileHash: file.hash,
    packHash: pack.hash,
    nodeCount: content.nodes.length,
    uploadedBy: author.name,
    at: now,
  };
  return writeInTurn(async (db) => {
    const conflicts = await listLibraryConflicts(organizationId, upload);
    if (conflicts.length > 0) return fail(...conflicts);
    await db.batch([
      addBlobStatement(file, now),
      addBlobStatement(pack, now),
      addUploadStatement(row),
      addAuditStatement({
        organizationId,
        userId: author.userId,
        userName: author.name,
        action: "library.add",
        subject: { kind: "library entry", id: row.id, name: row.modelUri },
        details: { version: row.version, file: row.fileName },
      }),
    ]);
    return ok(row, upload.problems);
  });
}

/** Takes an uploaded NodeSet out of the library. Problems: `request.not-found`, `library.entry-used`. */
export async function removeFromLibrary(author: Caller, organizationId: string, uploadId: string): Promise<Result<null>> {
  const row = await findUpload(uploadId);
  if (row?.organizationId !== organizationId) return fail(problem("request.not-found"));
  const others = (await listUploads(organizationId)).filter((u) => u.id !== row.id && u.modelUri === row.modelUri);
  const users = others.length > 0 ? [] : await listDependents(organizationId, row.modelUri);
  if (users.length > 0) return fail(problem("library.entry-used", { names: users.join(", ") }));
  await writeBatch([
    removeUploadStatement(row.id),
    addAuditStatement({
      organizationId,
      userId: author.userId,
      userName: author.name,
      action: "library.remove",
      subject: { kind: "library entry", id: row.id, name: row.modelUri },
      details: { version: row.version },
    }),
  ]);
  return ok(null);
}
