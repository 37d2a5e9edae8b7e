/** What an uploaded file is and what an import would do, before anything is stored. */
import type { Caller } from "../auth/caller.server";
import { findModelByNamespace } from "../db/repositories/models.server";
import { listUploads } from "../db/repositories/uploads.server";
import type { ModelEntry } from "../domain/address-space/model-header";
import { OPC_UA_NAMESPACE } from "../domain/address-space/node-id";
import type { Node, NodeClass } from "../domain/address-space/node";
import { isTypeNode } from "../domain/address-space/node";
import { fail, ok, problem, type Problem, type Result } from "../domain/core/result";
import { toProblemJson, type ProblemJson } from "../utils/problem-response.server";
import { keepPendingUpload, findPendingUpload, removePendingUpload } from "./pending-uploads.server";
import { listRefusals, readUpload, type Upload, type UploadOptions } from "./read-upload.server";
import { resolveRequiredModels } from "./required-models.server";
import type { ModelKind } from "../db/schema/models";

export type PreviewedRequirement = {
  readonly modelUri: string;
  readonly version: string | null;
  readonly publicationDate: string | null;
  readonly state: "present" | "other-version" | "missing";
  /** What would be taken, when something is there. */
  readonly found: { readonly version: string | null; readonly publicationDate: string | null } | null;
};

export type ImportPreview = {
  /** Names the kept file in the second step. */
  readonly uploadId: string;
  readonly fileName: string;
  readonly bytes: number;
  readonly models: readonly { readonly modelUri: string; readonly version: string | null; readonly publicationDate: string | null }[];
  readonly required: readonly PreviewedRequirement[];
  readonly counts: { readonly nodes: number; readonly references: number; readonly byClass: Readonly<Partial<Record<NodeClass, number>>> };
  readonly problems: readonly ProblemJson[];
  readonly suggestedName: string;
  readonly suggestedKind: ModelKind;
  /** Why it cannot become a model of the team, or part of the library; empty when it can. */
  readonly againstModel: readonly ProblemJson[];
  readonly againstLibrary: readonly ProblemJson[];
};

/** Reads the file and keeps it for the import. Fails when it is no NodeSet2 file at all. */
export async function previewImport(
  caller: Caller,
  organizationId: string,
  bytes: Uint8Array,
  fileName: string,
  options: UploadOptions = {},
): Promise<Result<ImportPreview>> {
  const read = await readUpload(bytes, fileName, options);
  if (!read.ok) return read;
  const upload = read.value;
  const required = await resolveRequiredModels(organizationId, upload.content.header);
  const refusals = [...listRefusals(upload), ...required.missing];
  const uploadId = await keepPendingUpload({ organizationId, userId: caller.userId, fileName, bytes });
  const againstModel = [...refusals, ...(await listModelConflicts(organizationId, upload))];
  const againstLibrary = [...refusals, ...(await listLibraryConflicts(organizationId, upload))];
  return ok({
    uploadId,
    fileName,
    bytes: bytes.length,
    models: upload.content.header.models.map(toVersion),
    required: upload.entry.requiredModels.map((entry) => toRequirement(entry, required)),
    counts: countNodes(upload.content.nodes),
    problems: upload.problems.map(toProblemJson),
    suggestedName: suggestName(upload),
    suggestedKind: suggestKind(upload.content.nodes),
    againstModel: againstModel.map(toProblemJson),
    againstLibrary: againstLibrary.map(toProblemJson),
  });
}

/** The kept file, read again. Problem: `import.gone`. */
export async function takePendingUpload(
  caller: Caller,
  organizationId: string,
  uploadId: string,
  options: UploadOptions = {},
): Promise<Result<Upload>> {
  const pending = await findPendingUpload(uploadId, organizationId, caller.userId);
  if (!pending) return fail(problem("import.gone"));
  return readUpload(pending.bytes, pending.fileName, options);
}

export function dropPendingUpload(uploadId: string): void {
  if (/^[a-z0-9]{20}$/.test(uploadId)) removePendingUpload(uploadId);
}

export async function listModelConflicts(organizationId: string, upload: Upload): Promise<Problem[]> {
  const { namespaceUri } = upload;
  // As a model of the team it would be put beneath all others in place of the published one.
  if (namespaceUri === OPC_UA_NAMESPACE) return [problem("model.namespace-published", { namespaceUri })];
  const model = await findModelByNamespace(organizationId, namespaceUri);
  return model ? [problem("model.namespace-taken", { namespaceUri, name: model.name })] : [];
}

export async function listLibraryConflicts(organizationId: string, upload: Upload): Promise<Problem[]> {
  const { modelUri, version, publicationDate } = toVersion(upload.entry);
  const known = (await listUploads(organizationId)).some(
    (row) => row.modelUri === modelUri && row.version === version && row.publicationDate === publicationDate,
  );
  return known ? [problem("library.entry-exists", { modelUri, version: version ?? "?" })] : [];
}

function toVersion(entry: ModelEntry): { modelUri: string; version: string | null; publicationDate: string | null } {
  return { modelUri: entry.modelUri, version: entry.version ?? null, publicationDate: entry.publicationDate ?? null };
}

function toRequirement(
  entry: ModelEntry,
  required: Awaited<ReturnType<typeof resolveRequiredModels>>,
): PreviewedRequirement {
  const layer = required.layers.find((l) => l.modelUri === entry.modelUri);
  const asked = toVersion(entry);
  if (!layer) return { ...asked, state: "missing", found: null };
  const found = { version: layer.version ?? null, publicationDate: layer.publicationDate ?? null };
  const isOther = asked.publicationDate !== null && found.publicationDate !== asked.publicationDate;
  return { ...asked, state: isOther ? "other-version" : "present", found };
}

function countNodes(nodes: readonly Node[]): ImportPreview["counts"] {
  const byClass: Partial<Record<NodeClass, number>> = {};
  let references = 0;
  for (const node of nodes) {
    byClass[node.nodeClass] = (byClass[node.nodeClass] ?? 0) + 1;
    references += node.references.length;
  }
  return { nodes: nodes.length, references, byClass };
}

/** A model with types of its own is one of types; otherwise its instances are what it is for. */
export function suggestKind(nodes: readonly Node[]): ModelKind {
  return nodes.some(isTypeNode) ? "types" : "machines";
}

/** The last word of the namespace, spaced: `http://merrow.example/UA/RopeBraider/` → `Rope braider`. */
export function suggestName(upload: Pick<Upload, "namespaceUri" | "fileName">): string {
  const word = upload.namespaceUri.split(/[/:#]+/).filter((part) => part !== "").at(-1) ?? upload.fileName;
  const spaced = word.replace(/([a-z\d])([A-Z])/g, "$1 $2").replace(/[_-]+/g, " ").trim();
  const words = spaced.split(" ").map((w, i) => (i > 0 && /^[A-Z][a-z]+$/.test(w) ? w.toLowerCase() : w));
  return words.join(" ").slice(0, 100) || "Imported model";
}
