/** The NodeSets of the npm package node-opcua-nodesets, as listed in nodesets/manifest.json. */
import { createRequire } from "node:module";
import { dirname, join } from "node:path";
import manifest from "../../nodesets/manifest.json";
import type { ModelEntry } from "../domain/address-space/model-header";
import type { LibraryEntry } from "./library-entry";

type ManifestModel = Omit<ModelEntry, "requiredModels">;
type ManifestEntry = ManifestModel & {
  readonly file: string;
  readonly key?: string;
  readonly nodeCount: number;
  readonly sha256: string;
  readonly requiredModels: readonly ManifestModel[];
};

/** The folder `nodesets` of the installed package. */
export function getPackageFolder(): string {
  const require = createRequire(import.meta.url);
  return join(dirname(require.resolve("node-opcua-nodesets")), "..", "nodesets");
}

export function listPublished(): LibraryEntry[] {
  const folder = getPackageFolder();
  const entries: readonly ManifestEntry[] = manifest.nodesets;
  return entries.map(({ file, requiredModels, ...rest }) => ({
    ...rest,
    origin: "published",
    title: toTitle(rest.modelUri),
    file,
    requiredModels: requiredModels.map((required) => ({ ...required, requiredModels: [] })),
    source: { kind: "file", path: join(folder, file) },
  }));
}

/** A short title from a model URI: what stands behind `/UA/`, words apart. */
export function toTitle(modelUri: string): string {
  const path = modelUri.replace(/^[a-z]+:\/\/[^/]+\//i, "").replace(/\/+$/, "");
  const tail = path.replace(/^UA(?:\/|$)/i, "").replace(/^\d{4}\/\d{2}\//, "");
  return tail === "" ? (path === "" ? modelUri : "OPC UA") : tail.replaceAll("/", " · ");
}
