/** Runs the checker over published NodeSets, each with the models that it requires. */
import { readFileSync } from "node:fs";
import { AddressSpace, type Layer } from "~/domain/address-space/address-space";
import { OPC_UA_NAMESPACE } from "~/domain/address-space/node-id";
import { getPublishedLayer } from "./published-layers";

type ManifestEntry = {
  readonly file: string;
  readonly modelUri: string;
  readonly requiredModels: readonly { readonly modelUri: string }[];
};

const manifest = JSON.parse(readFileSync(new URL("../../nodesets/manifest.json", import.meta.url), "utf8")) as {
  readonly nodesets: readonly ManifestEntry[];
};

export const PUBLISHED: readonly ManifestEntry[] = manifest.nodesets;

/** A model that is there in two editions is taken from the folder of the file that requires it, else the current one. */
function findEdition(modelUri: string, { file }: ManifestEntry): ManifestEntry | undefined {
  const editions = PUBLISHED.filter((e) => e.modelUri === modelUri);
  const folderOf = (path: string): string => path.slice(0, path.lastIndexOf("/") + 1);
  return editions.find((e) => folderOf(e.file) === folderOf(file)) ?? editions.find((e) => folderOf(e.file) === "");
}

/** The file as own model on top of all that it requires, directly or not; what is not published is left out. */
export function loadPublishedSpace(entry: ManifestEntry): AddressSpace {
  const order: ManifestEntry[] = [];
  const visit = (at: ManifestEntry): void => {
    if (order.includes(at)) return;
    for (const { modelUri } of [{ modelUri: OPC_UA_NAMESPACE }, ...at.requiredModels]) {
      const needed = findEdition(modelUri, entry);
      if (needed && needed !== at && modelUri !== at.modelUri) visit(needed);
    }
    order.push(at);
  };
  visit(entry);
  const required: Layer[] = order.filter((e) => e !== entry).map((e) => getPublishedLayer(e.file));
  return AddressSpace.of(required, getPublishedLayer(entry.file));
}
