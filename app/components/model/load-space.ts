/** Packs to address space. Required models never change under their address, so their layers are kept for the whole tab. */
import { AddressSpace, buildLayer, type Layer } from "~/domain/address-space/address-space";
import { readPack } from "~/domain/nodeset/pack";
import type { ModelWorkspace } from "~/presenters/model-workspace.server";

const layers = new Map<string, Promise<Layer>>();

async function fetchLayer(url: string, signal?: AbortSignal): Promise<{ layer: Layer; seq: number }> {
  const answer = await fetch(url, signal ? { signal } : {});
  if (!answer.ok) throw new Error(`The server answered ${answer.status} for ${url}`);
  const pack = readPack(await answer.text());
  if (!pack.ok) throw new Error(`Not a pack: ${url}`);
  return { layer: buildLayer(pack.value.header, pack.value.nodes, pack.value.mapping), seq: Number(answer.headers.get("x-ferrule-seq") ?? 0) };
}

function loadRequiredLayer(url: string): Promise<Layer> {
  let loading = layers.get(url);
  if (!loading) {
    loading = fetchLayer(url).then(({ layer }) => layer);
    loading.catch(() => layers.delete(url));
    layers.set(url, loading);
  }
  return loading;
}

/** The model at its newest state with its required models beneath. */
export async function loadSpace(workspace: Pick<ModelWorkspace, "layers" | "workingPackUrl">, signal: AbortSignal): Promise<{ space: AddressSpace; seq: number }> {
  const [own, ...required] = await Promise.all([fetchLayer(workspace.workingPackUrl, signal), ...workspace.layers.map(({ packUrl }) => loadRequiredLayer(packUrl))]);
  return { space: AddressSpace.of(required, own.layer), seq: own.seq };
}

/** Stands in until the packs have come, so that the page can be drawn at once. */
export function makeEmptySpace(namespaceUri: string): AddressSpace {
  return AddressSpace.of([], buildLayer({ namespaceUris: [namespaceUri], models: [{ modelUri: namespaceUri, requiredModels: [] }] }, []));
}
