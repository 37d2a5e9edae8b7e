/** Frozen states as address spaces, on the required models that they were frozen on. */
import { findRevisionByNumber, type ModelRow } from "../db/repositories/models.server";
import type { PinnedModelRow } from "../db/schema/models";
import { AddressSpace, type Layer } from "../domain/address-space/address-space";
import { getLibrary } from "../library/library.server";
import { loadPackedLayer } from "./pins.server";
import { resolveRequiredModels } from "./required-models.server";
import { loadWorkingModel } from "./working-model.server";

/** A state of a model: the number of a revision, or what the team works on now. */
export type StateName = number | "working";

/** Reads `3` or `working`; undefined for anything else. */
export function parseStateName(text: string | null): StateName | undefined {
  if (text === "working") return text;
  return text !== null && /^\d{1,9}$/.test(text) ? Number(text) : undefined;
}

/** Undefined when the model has no such state. */
export async function loadState(model: ModelRow, state: StateName): Promise<AddressSpace | undefined> {
  if (state === "working") return (await loadWorkingModel(model.id))?.space;
  const revision = await findRevisionByNumber(model.id, state);
  if (!revision) return undefined;
  const own = await loadPackedLayer(revision.packHash);
  // Revision 0 pins nothing: it stands on what the model requires, as far as that is there.
  if (!revision.pinned) {
    const { layers } = await resolveRequiredModels(model.organizationId, own.header, model.pins);
    return AddressSpace.of(layers.map((l) => l.layer), own);
  }
  return AddressSpace.of(await loadPinned(model.organizationId, own, revision.pinned), own);
}

/** The own layer of a revision alone. */
export async function loadRevisionLayer(modelId: string, number: number): Promise<Layer | undefined> {
  const revision = await findRevisionByNumber(modelId, number);
  return revision && loadPackedLayer(revision.packHash);
}

/** A published NodeSet may have been replaced by a newer one since; the nearest that is there stands in for it then. */
async function loadPinned(organizationId: string, own: Layer, pinned: readonly PinnedModelRow[]): Promise<Layer[]> {
  const library = getLibrary();
  const layers: Layer[] = [];
  for (const row of pinned) {
    if (row.kept === "blob") {
      layers.push(await loadPackedLayer(row.hash));
      continue;
    }
    const entry = library.list().find((candidate) => candidate.sha256 === row.hash);
    const layer = entry ? await library.load(entry) : undefined;
    if (layer?.ok) layers.push(layer.value);
    else return (await resolveRequiredModels(organizationId, own.header)).layers.map((l) => l.layer);
  }
  return layers;
}
