/**
 * The required models of a model, transitively and in loading order, from three shelves: the models that the organisation
 * works on, the NodeSets that it uploaded, and the published ones. The library chooses; here the organisation's own are
 * described to it and every layer gets the address from which a browser fetches it.
 */
import { listModels, findModel, findRevisionByNumber, type ModelRow } from "../db/repositories/models.server";
import { listUploads, type UploadRow } from "../db/repositories/uploads.server";
import type { PinRow, RequiredModelRow } from "../db/schema/models";
import type { Layer } from "../domain/address-space/address-space";
import { getOwnNamespace, type ModelHeader } from "../domain/address-space/model-header";
import { OPC_UA_NAMESPACE } from "../domain/address-space/node-id";
import type { Problem } from "../domain/core/result";
import { describeLayer, listRequired } from "../library/describe-nodeset.server";
import { getLibrary } from "../library/library.server";
import type { LibraryEntry } from "../library/library-entry";
import { loadNewestLayer } from "./own-layer.server";
import { loadPackedLayer } from "./pins.server";

export type RequiredLayer = {
  readonly modelUri: string;
  readonly version: string | undefined;
  readonly publicationDate: string | undefined;
  readonly layer: Layer;
  /** Where a browser gets the pack; the address changes whenever the contents do. */
  readonly packUrl: string;
  readonly entry: LibraryEntry;
  /** Set when the layer is the working state of a model of the organisation. */
  readonly from?: { readonly modelId: string; readonly seq: number };
};

export type RequiredModels = {
  readonly layers: readonly RequiredLayer[];
  /** Errors: what is missing or cannot be read, and who requires it. */
  readonly missing: readonly Problem[];
  /** Warnings: only an older version is there. */
  readonly warnings: readonly Problem[];
};

type OwnEntry = { readonly entry: LibraryEntry; readonly packUrl: string; readonly from?: RequiredLayer["from"] };

/**
 * What is there is answered also when something is missing, so that the caller may go on with it or refuse. A model that
 * is pinned is taken at that revision, with the models that it was frozen on.
 */
export async function resolveRequiredModels(
  organizationId: string,
  header: ModelHeader,
  pins: readonly PinRow[] | null = null,
): Promise<RequiredModels> {
  const ownUri = getOwnNamespace(header);
  if (ownUri === OPC_UA_NAMESPACE) return { layers: [], missing: [], warnings: [] };
  const required = listRequired(header);
  const pinned = await listPinnedEntries(pins ?? []);
  const exact = new Set(pinned.map(({ entry }) => entry.modelUri));
  const others = await listOwnEntries(organizationId, required, ownUri);
  const own = [...pinned, ...others.filter(({ entry }) => !exact.has(entry.modelUri))];
  const library = getLibrary();
  const choice = library.choose(required, { extra: own.map(({ entry }) => entry), requiredBy: ownUri, exact });
  const problems = [...choice.problems];
  const layers: RequiredLayer[] = [];
  for (const entry of choice.entries) {
    const found = await loadEntry(entry, own.find((o) => o.entry === entry));
    if ("layer" in found) layers.push(found);
    else problems.push(...found.problems);
  }
  return {
    layers,
    missing: problems.filter((p) => p.severity === "error"),
    warnings: problems.filter((p) => p.severity !== "error"),
  };
}

async function loadEntry(entry: LibraryEntry, own: OwnEntry | undefined): Promise<RequiredLayer | { problems: readonly Problem[] }> {
  const library = getLibrary();
  const layer = await library.load(entry);
  if (!layer.ok) return { problems: layer.problems };
  const about = { modelUri: entry.modelUri, version: entry.version, publicationDate: entry.publicationDate, layer: layer.value, entry };
  if (own) return { ...about, packUrl: own.packUrl, ...(own.from ? { from: own.from } : {}) };
  const pack = await library.packOf(entry);
  return pack.ok ? { ...about, packUrl: `/packs/${pack.value.hash}` } : { problems: pack.problems };
}

/** The organisation's own models and uploads that can be reached from the required ones; only these are loaded. */
async function listOwnEntries(organizationId: string, required: readonly RequiredModelRow[], ownUri: string): Promise<OwnEntry[]> {
  const models = await listModels(organizationId);
  const uploads = await listUploads(organizationId);
  const requirements = new Map<string, RequiredModelRow[]>();
  const note = (uri: string, more: readonly RequiredModelRow[]) => requirements.set(uri, [...(requirements.get(uri) ?? []), ...more]);
  for (const row of models) note(row.namespaceUri, row.requiredModels);
  for (const row of uploads) note(row.modelUri, row.requiredModels);
  for (const entry of getLibrary().list()) note(entry.modelUri, entry.requiredModels);
  const reached = new Set<string>();
  const visit = (uri: string): void => {
    if (reached.has(uri)) return;
    reached.add(uri);
    for (const next of requirements.get(uri) ?? []) visit(next.modelUri);
  };
  for (const { modelUri } of required) visit(modelUri);
  const isReached = (uri: string) => reached.has(uri) && uri !== ownUri;
  return [
    ...(await Promise.all(models.filter((row) => isReached(row.namespaceUri)).map(fromModel))),
    ...(await Promise.all(uploads.filter((row) => isReached(row.modelUri)).map(fromUpload))),
  ];
}

async function fromModel(row: ModelRow): Promise<OwnEntry> {
  const from = { modelId: row.id, seq: row.headSeq };
  const entry = describeLayer(await loadNewestLayer(row), row.name, `${row.id}:${row.headSeq}`);
  return { entry, from, packUrl: `/models/${row.id}/pack?seq=${row.headSeq}` };
}

async function fromUpload(row: UploadRow): Promise<OwnEntry> {
  return fromPack(row.packHash, row.fileName, row.fileHash);
}

async function fromPack(packHash: string, file: string, contentId: string): Promise<OwnEntry> {
  return { entry: describeLayer(await loadPackedLayer(packHash), file, contentId), packUrl: `/packs/${packHash}` };
}

/** The revisions themselves, then what they were frozen on of the team's own; a direct pin beats an indirect one. */
async function listPinnedEntries(pins: readonly PinRow[]): Promise<OwnEntry[]> {
  const entries = new Map<string, OwnEntry>();
  for (const pin of pins) entries.set(pin.modelUri, await fromPack(pin.packHash, pin.modelUri, pin.packHash));
  for (const pin of pins) {
    const revision = await findRevisionByNumber(pin.modelId, pin.number);
    for (const { modelUri, kept, hash } of revision?.pinned ?? []) {
      if (kept === "blob" && !entries.has(modelUri)) entries.set(modelUri, await fromPack(hash, modelUri, hash));
    }
  }
  return [...entries.values()];
}

/** Whether the layers of models of the organisation are still at the state that they were taken from. */
export async function areLayersCurrent(layers: readonly RequiredLayer[]): Promise<boolean> {
  for (const { from } of layers) {
    if (from && (await findModel(from.modelId))?.headSeq !== from.seq) return false;
  }
  return true;
}

/** Whether the organisation's library, the published NodeSets among it, has a NodeSet of this namespace. */
export async function isInLibrary(organizationId: string, modelUri: string): Promise<boolean> {
  if (getLibrary().list().some((entry) => entry.modelUri === modelUri)) return true;
  return (await listUploads(organizationId)).some((row) => row.modelUri === modelUri);
}

/** Names of the organisation's models and uploads that require this URI directly. */
export async function listDependents(organizationId: string, modelUri: string): Promise<string[]> {
  const requires = (rows: readonly RequiredModelRow[]) => rows.some((row) => row.modelUri === modelUri);
  const models = (await listModels(organizationId)).filter((row) => row.namespaceUri !== modelUri && requires(row.requiredModels));
  const uploads = (await listUploads(organizationId)).filter((row) => requires(row.requiredModels));
  return [...models.map((row) => row.name), ...uploads.map((row) => row.modelUri)];
}
