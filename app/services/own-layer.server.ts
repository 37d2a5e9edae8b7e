/** The own layer of a model at some point of its history, without what it requires. */
import { findBlob } from "../db/repositories/blobs.server";
import { findStoredState, listTransactions, type ModelRow } from "../db/repositories/models.server";
import { AddressSpace, buildLayer, type Layer } from "../domain/address-space/address-space";
import { applyOperations } from "../domain/editing/apply-operation";
import type { Operation } from "../domain/editing/operation";
import { readPack } from "../domain/nodeset/pack";
import { singleton } from "../utils/singleton.server";

const PAGE = 500;

/** The newest layer of each model that is in use, whether loaded for itself or for a model that requires it. */
const getNewest = () => singleton("own-layers", () => new Map<string, { seq: number; layer: Promise<Layer> }>());

/** The own layer at the head that the row tells of. */
export function loadNewestLayer(model: ModelRow): Promise<Layer> {
  const known = getNewest().get(model.id);
  if (known?.seq === model.headSeq) return known.layer;
  const layer = loadOwnLayer(model.id, model.headSeq);
  getNewest().set(model.id, { seq: model.headSeq, layer });
  layer.catch(() => getNewest().delete(model.id));
  return layer;
}

/** Told by whoever moves the head. */
export function keepNewestLayer(modelId: string, seq: number, layer: Layer): void {
  getNewest().set(modelId, { seq, layer: Promise.resolve(layer) });
}

export function forgetNewestLayer(modelId: string): void {
  getNewest().delete(modelId);
}

/** The model's own layer as it was at `seq`. Throws when the stored state cannot be read, which only damage can cause. */
export async function loadOwnLayer(modelId: string, seq: number): Promise<Layer> {
  const stored = await findStoredState(modelId, seq);
  if (!stored) throw new Error(`Model ${modelId} has no stored state at ${seq}`);
  const bytes = await findBlob(stored.packHash);
  const content = bytes ? readPack(bytes.toString("utf8")) : undefined;
  if (!content?.ok) throw new Error(`The state ${stored.packHash} of model ${modelId} cannot be read`);
  // Operations of the own layer were accepted once; replaying them needs no required models except to find what they name.
  let space = AddressSpace.of([], buildLayer(content.value.header, content.value.nodes, content.value.mapping));
  for (let at = stored.seq; at < seq; ) {
    const page = await listTransactions(modelId, at, Math.min(PAGE, seq - at));
    const last = page.at(-1);
    if (!last) throw new Error(`Model ${modelId} lacks transaction ${at + 1}`);
    const applied = applyOperations(space, page.flatMap((t) => t.operations.map(asDangling)));
    if (!applied.ok) throw new Error(`Model ${modelId} cannot be rebuilt after ${at}: ${applied.problems[0]?.code}`);
    space = applied.value;
    at = last.seq;
  }
  return space.own;
}

/** An accepted operation may name nodes of required models, which are not loaded while the own layer is rebuilt. */
function asDangling(operation: Operation): Operation {
  return operation.kind === "addNode" || operation.kind === "addReference" ? { ...operation, isDangling: true } : operation;
}
