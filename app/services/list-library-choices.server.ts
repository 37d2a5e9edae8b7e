/** Everything that a model of this organisation may require, small enough to be sent to the browser as a whole. */
import { listModels } from "../db/repositories/models.server";
import { listUploads } from "../db/repositories/uploads.server";
import type { ModelEntry } from "../domain/address-space/model-header";
import type { LibraryEntry } from "../library/library-entry";
import { getLibrary } from "../library/library.server";
import { loadNewestLayer } from "./own-layer.server";

export type LibraryChoice = {
  /** Of the entry: for links and removal. */
  readonly id: string;
  readonly modelUri: string;
  readonly title: string;
  readonly fileName: string;
  readonly version: string | undefined;
  readonly publicationDate: string | undefined;
  readonly nodeCount: number | undefined;
  readonly origin: "published" | "added" | "team";
  readonly required: readonly { readonly modelUri: string; readonly version?: string | undefined }[];
  /** Who added it; absent for published ones. */
  readonly by: string | undefined;
};

export async function listLibraryChoices(organizationId: string): Promise<LibraryChoice[]> {
  const [models, uploads] = await Promise.all([listModels(organizationId), listUploads(organizationId)]);
  const ofTeam = await Promise.all(
    models.map(async (model): Promise<LibraryChoice> => {
      const { header } = await loadNewestLayer(model);
      return {
        id: model.id,
        modelUri: model.namespaceUri,
        title: model.name,
        fileName: "",
        version: model.version ?? undefined,
        publicationDate: model.publicationDate ?? undefined,
        nodeCount: model.nodeCount,
        origin: "team",
        required: header.models.flatMap((entry) => entry.requiredModels.map(toRequired)),
        by: model.createdBy,
      };
    }),
  );
  const added = uploads.map((row): LibraryChoice => ({
    id: row.id,
    modelUri: row.modelUri,
    title: toTitle(row.modelUri),
    fileName: row.fileName,
    version: row.version ?? undefined,
    publicationDate: row.publicationDate ?? undefined,
    nodeCount: row.nodeCount,
    origin: "added",
    required: row.requiredModels,
    by: row.uploadedBy,
  }));
  return [...ofTeam, ...added, ...getLibrary().list().map(fromPublished)];
}

function fromPublished(entry: LibraryEntry): LibraryChoice {
  return {
    id: entry.sha256,
    modelUri: entry.modelUri,
    title: entry.title,
    fileName: entry.file,
    version: entry.version,
    publicationDate: entry.publicationDate,
    nodeCount: entry.nodeCount,
    origin: "published",
    required: entry.requiredModels.map(toRequired),
    by: undefined,
  };
}

function toRequired({ modelUri, version }: ModelEntry): LibraryChoice["required"][number] {
  return version === undefined ? { modelUri } : { modelUri, version };
}

/** The last part of the URI stands for the name where a file gives none. */
function toTitle(modelUri: string): string {
  return (
    modelUri
      .split(/[/:#]+/)
      .filter(Boolean)
      .at(-1) ?? modelUri
  );
}
