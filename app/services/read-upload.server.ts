/** A file that somebody uploads, read within the limits that hold everywhere. */
import { getOwnNamespace, type ModelEntry } from "../domain/address-space/model-header";
import { ok, problem, type Problem, type Result } from "../domain/core/result";
import { READ_LIMITS } from "../domain/nodeset/limits";
import type { NodeSetContent } from "../domain/nodeset/nodeset-content";
import { listRequired } from "../library/describe-nodeset.server";
import { getLibrary } from "../library/library.server";
import { publish } from "./event-hub.server";

export const MAX_UPLOAD_BYTES = READ_LIMITS.maxBytes;

export type Upload = {
  readonly bytes: Uint8Array;
  readonly fileName: string;
  readonly content: NodeSetContent;
  /** The row of the Models table that the file is about. */
  readonly entry: ModelEntry;
  readonly namespaceUri: string;
  /** Warnings and hints, and errors that leave the file readable but keep it from being imported. */
  readonly problems: readonly Problem[];
};

export type UploadOptions = {
  /** The sender has left: the reading ends with `read.cancelled`. */
  readonly signal?: AbortSignal;
  /** Who listens to the topic `import:<progress>` is told how far the reading is, 0 … 1. */
  readonly progress?: string;
};

/** Fails only when nothing can be shown of the file; whether it may be imported is asked with `listRefusals`. */
export async function readUpload(
  bytes: Uint8Array,
  fileName: string,
  { signal, progress }: UploadOptions = {},
): Promise<Result<Upload>> {
  const tell = (done: number, total: number): void => publish(`import:${progress ?? ""}`, { done: done / total });
  const read = await getLibrary().read(bytes, {
    fileName,
    ...(signal ? { signal } : {}),
    ...(progress === undefined ? {} : { onProgress: tell }),
  });
  if (!read.ok) return read;
  const { header } = read.value;
  const namespaceUri = getOwnNamespace(header);
  const entry = header.models[0] ?? { modelUri: namespaceUri, requiredModels: listRequired(header) };
  return ok({ bytes, fileName, content: read.value, entry, namespaceUri, problems: read.problems });
}

/** Why the file cannot become a model or part of the library; empty when it can. */
export function listRefusals(upload: Upload): Problem[] {
  const refusals = upload.problems.filter((p) => p.severity === "error");
  const { models } = upload.content.header;
  if (models.length > 1) {
    const place = upload.problems.find((p) => p.code === "nodeset.several-models")?.at;
    const uris = models.map((m) => m.modelUri).join(", ");
    refusals.push(problem("model.several-own", { count: models.length, uris }, place));
  }
  return refusals;
}
