/** The own layer of a model as a compressed pack, as browsers, workers and the test server load it. */
import { gzip } from "node:zlib";
import { promisify } from "node:util";
import { toPackContent, writePack } from "../domain/nodeset/pack";
import type { Layer } from "../domain/address-space/address-space";
import { singleton } from "../utils/singleton.server";
import { loadOwnLayer } from "./own-layer.server";
import { loadWorkingModel } from "./working-model.server";

export type ModelPack = { readonly seq: number; readonly gzip: Buffer };

const MAX_CACHED = 16;
const compress = promisify(gzip);
const getCache = () => singleton("model-packs", () => new Map<string, Promise<ModelPack>>());

/** The pack at `seq`, at the head when absent; undefined when the model is gone or `seq` lies beyond the head. */
export async function getModelPack(modelId: string, seq?: number): Promise<ModelPack | undefined> {
  const working = await loadWorkingModel(modelId);
  if (!working || (seq !== undefined && seq > working.seq)) return undefined;
  const at = seq ?? working.seq;
  const key = `${modelId}:${at}`;
  const cache = getCache();
  let pack = cache.get(key);
  if (!pack) {
    pack = at === working.seq ? makePack(working.space.own, at) : loadOwnLayer(modelId, at).then((own) => makePack(own, at));
    pack.catch(() => cache.delete(key));
  }
  cache.delete(key);
  cache.set(key, pack);
  for (const oldest of cache.keys()) {
    if (cache.size <= MAX_CACHED) break;
    cache.delete(oldest);
  }
  return pack;
}

async function makePack(own: Layer, seq: number): Promise<ModelPack> {
  const text = writePack(toPackContent(own));
  return { seq, gzip: await compress(text, { level: 5 }) };
}
