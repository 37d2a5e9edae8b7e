/**
 * Which frozen revisions a model of machines stands on. The types may be edited at any time; what the machines are made of
 * changes only when somebody takes a newer revision.
 */
import { findBlob } from "../db/repositories/blobs.server";
import { findModelByNamespace, findRevisionByNumber, listRevisions, type ModelRow } from "../db/repositories/models.server";
import type { PinRow } from "../db/schema/models";
import { buildLayer, type Layer } from "../domain/address-space/address-space";
import type { ModelHeader } from "../domain/address-space/model-header";
import { readPack } from "../domain/nodeset/pack";
import { listRequired } from "../library/describe-nodeset.server";
import { singleton } from "../utils/singleton.server";

const getPackedLayers = () => singleton("packed-layers", () => new Map<string, Promise<Layer>>());

/** The layer that a blob of our own holds: a revision, or an upload of the library. Throws when it cannot be read. */
export function loadPackedLayer(hash: string): Promise<Layer> {
  const layers = getPackedLayers();
  const loading = layers.get(hash) ?? readPackedLayer(hash);
  layers.set(hash, loading);
  loading.catch(() => layers.delete(hash));
  return loading;
}

async function readPackedLayer(hash: string): Promise<Layer> {
  const bytes = await findBlob(hash);
  const content = bytes ? readPack(bytes.toString("utf8")) : undefined;
  if (!content?.ok) throw new Error(`The stored contents ${hash} cannot be read`);
  return buildLayer(content.value.header, content.value.nodes, content.value.mapping);
}

/** A pin for each model of the team that the header requires: the known one, else the newest revision that is frozen. */
export async function choosePins(organizationId: string, header: ModelHeader, known: readonly PinRow[]): Promise<PinRow[]> {
  const pins: PinRow[] = [];
  for (const { modelUri } of listRequired(header)) {
    const kept = known.find((pin) => pin.modelUri === modelUri);
    if (kept) {
      pins.push(kept);
      continue;
    }
    const model = await findModelByNamespace(organizationId, modelUri);
    const [newest] = model ? await listRevisions(model.id) : [];
    if (model && newest) pins.push({ modelUri, modelId: model.id, number: newest.number, packHash: newest.packHash, behind: {} });
  }
  return pins;
}

/** The pin moved to another frozen revision; undefined when there is no such revision. */
export async function movePin(pin: PinRow, number: number): Promise<PinRow | undefined> {
  if (pin.number === number) return pin;
  const revision = await findRevisionByNumber(pin.modelId, number);
  return revision && { ...pin, number, packHash: revision.packHash };
}

export type PinSummary = {
  readonly modelUri: string;
  readonly modelId: string;
  readonly modelName: string;
  readonly number: number;
  readonly message: string;
  readonly author: string;
  readonly at: string;
  /** The newest revision there is, and how many edits the types have had since. */
  readonly newest: number;
  readonly editsSince: number;
  readonly behind: Readonly<Record<string, number>>;
  /** All revisions that can be taken, newest first. */
  readonly revisions: readonly { readonly number: number; readonly message: string }[];
};

/** What the pages tell of the pins of a model. */
export async function describePins(model: ModelRow): Promise<PinSummary[]> {
  const found: PinSummary[] = [];
  for (const pin of model.pins ?? []) {
    const types = await findModelByNamespace(model.organizationId, pin.modelUri);
    const revisions = types ? await listRevisions(types.id) : [];
    const revision = revisions.find((row) => row.number === pin.number);
    const [newest] = revisions;
    if (!types || !revision || !newest) continue;
    found.push({
      modelUri: pin.modelUri,
      modelId: types.id,
      modelName: types.name,
      number: pin.number,
      message: revision.message,
      author: revision.author,
      at: revision.at.toISOString(),
      newest: newest.number,
      editsSince: types.headSeq - newest.seq,
      behind: pin.behind,
      revisions: revisions.map(({ number, message }) => ({ number, message })),
    });
  }
  return found;
}
