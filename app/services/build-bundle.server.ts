/** The files of a release and the bundle around them. Everything is made of the frozen revision, so that building again gives the same bytes. */
import type { ModelRow, RevisionRow } from "../db/repositories/models.server";
import { findRevisionByNumber } from "../db/repositories/models.server";
import type { ReleasedRequirement } from "../db/schema/reviews";
import type { AddressSpace, Layer } from "../domain/address-space/address-space";
import { getOwnNamespace } from "../domain/address-space/model-header";
import type { NodeKey } from "../domain/address-space/node-id";
import { compareModels } from "../domain/compare/compare-models";
import { makeMachineDocument, makeTypeDocument, type KnownSource } from "../domain/deliver/make-mapping-document";
import { writeMappingDocument } from "../domain/deliver/mapping-document";
import { makeThingDescription, writeThingDescription } from "../domain/deliver/thing-description";
import { listMachines } from "../domain/instantiation/list-machines";
import { listOwners } from "../domain/mapping/mapping-entries";

import { writeNodeIdsCsv } from "../domain/nodeset/node-ids-csv";
import { writeNodeSet } from "../domain/nodeset/write-nodeset";
import { makeManifest, packBundle, writeManifest, type BundleFile, type Manifest } from "../domain/release/bundle";
import { writeChangeReport } from "../domain/release/change-report-html";
import { makeInterfaceDocument } from "../domain/release/interface-document";
import { writeInterfaceHtml } from "../domain/release/interface-html";
import { writePythonConstants, writeTypeScriptConstants } from "../domain/release/node-id-constants";
import { sha256 } from "../utils/ids.server";
import { toFileName } from "./export-model.server";
import { loadState } from "./load-revision.server";
import { signManifest } from "./signing-keys.server";

export type BundleIntent = {
  readonly model: ModelRow;
  /** Its contents carry the version of the release already. */
  readonly revision: Pick<RevisionRow, "number" | "packHash" | "pinned">;
  readonly version: string;
  readonly modelVersion: string;
  readonly publicationDate: string;
  readonly rating: Manifest["model"]["rating"];
  /** The release before: its revision and version. */
  readonly previous: { readonly revision: number; readonly version: string } | undefined;
  readonly required: readonly ReleasedRequirement[];
  readonly keyId: string;
  /** The organisation's sources as they were at the release; they may change any day, so the bundle keeps them. */
  readonly sources: readonly KnownSource[];
};

/** Where the bundle keeps the sources that its mapping documents name. */
export const SOURCES_FILE = "mapping/sources.json";

export type BuiltBundle = { readonly bytes: Uint8Array; readonly hash: string; readonly manifest: Manifest; readonly fileName: string };

export async function buildBundle(intent: BundleIntent): Promise<BuiltBundle> {
  const { model, revision, version, modelVersion, publicationDate, rating, previous } = intent;
  const space = await loadState(model, revision.number);
  if (!space) throw new Error(`Model ${model.id} has no revision ${revision.number}`);
  const name = toFileName(model.name);
  const files = [...(await listFiles(intent, space, name)), ...listRequiredFiles(space, revision)];
  const about = {
    model: {
      name: model.name,
      namespaceUri: model.namespaceUri,
      version,
      modelVersion,
      publicationDate,
      revision: revision.number,
      contents: revision.packHash,
      previous: previous?.version ?? null,
      rating,
    },
    requiredModels: [...intent.required],
  };
  const manifest = makeManifest(about, files, sha256);
  const text = writeManifest(manifest);
  const bytes = packBundle(files, text, await signManifest(intent.keyId, text));
  return { bytes, hash: sha256(bytes), manifest, fileName: `${name}-${version}.zip` };
}

async function listFiles(intent: BundleIntent, space: AddressSpace, name: string): Promise<BundleFile[]> {
  const { model, revision, version, publicationDate } = intent;
  const title = `${model.name} ${version}`;
  const document = makeInterfaceDocument(space);
  const head = { modelName: model.name, version, publicationDate, revision: revision.number };
  const languages = document.languages.length > 0 ? document.languages : ["en"];
  return [
    toFile(`${name}.NodeSet2.xml`, writeLayer(space, space.own)),
    toFile(`${name}.NodeIds.csv`, writeNodeIdsCsv(space)),
    ...languages.map((language) => toFile(`interface/${name}.${language}.html`, writeInterfaceHtml(document, head, language))),
    toFile(`constants/${name}.ts`, writeTypeScriptConstants(space, title)),
    toFile(`constants/${name.toLowerCase()}.py`, writePythonConstants(space, title)),
    toFile("changes.html", await writeReport(intent, space)),
    ...listMappingFiles(intent, space),
  ];
}

/** The mapping document of each mapped machine type; of each machine its document and its Thing Description. */
function listMappingFiles({ revision, sources }: BundleIntent, space: AddressSpace): BundleFile[] {
  const options = { revision: String(revision.number) };
  const nameOf = (key: NodeKey): string => (space.getNode(key)?.browseName.name ?? key).replace(/[^\w.-]+/g, "-");
  const types = listOwners(space, "row").map((key) => toFile(`mapping/${nameOf(key)}.mapping.json`, writeMappingDocument(makeTypeDocument(space, key, options))));
  const machines = listMachines(space).flatMap(({ key }) => {
    const document = makeMachineDocument(space, key, sources, options);
    if (!document.ok) return [];
    const name = nameOf(key);
    return [
      toFile(`mapping/${name}.mapping.json`, writeMappingDocument(document.value)),
      toFile(`things/${name}.td.json`, writeThingDescription(makeThingDescription(document.value))),
    ];
  });
  const kept = machines.length > 0 ? [toFile(SOURCES_FILE, `${JSON.stringify(sources, null, 2)}\n`)] : [];
  return [...types, ...machines, ...kept];
}

/** Models of the team that this one stands on travel along, as they were frozen; published ones are to be had elsewhere. */
function listRequiredFiles(space: AddressSpace, { pinned }: BundleIntent["revision"]): BundleFile[] {
  return space.layers.slice(0, -1).flatMap((layer) => {
    const uri = getOwnNamespace(layer.header);
    const isOwn = pinned?.find((row) => row.modelUri === uri)?.kept === "blob";
    return isOwn ? [toFile(`required/${toPathName(uri)}.NodeSet2.xml`, writeLayer(space, layer))] : [];
  });
}

function toPathName(uri: string): string {
  return uri.replace(/^\w+:\/*/, "").replace(/[^A-Za-z0-9]+/g, "-").replace(/^-|-$/g, "");
}

function writeLayer(space: AddressSpace, layer: Layer): string {
  const nodes = [...layer.nodes.values()].sort((a, b) => a.order - b.order);
  return writeNodeSet({ header: layer.header, nodes }, { findNodeId: (key) => space.getNode(key)?.nodeId }).xml;
}

/** Readers may change any day, so the report of a bundle tells of the model alone. */
async function writeReport({ model, version, previous }: BundleIntent, space: AddressSpace): Promise<string> {
  const before = await loadState(model, previous?.revision ?? 0);
  const comparison = compareModels(before ?? space, space);
  return writeChangeReport(
    { ...comparison, changes: comparison.changes.map((change) => ({ ...change, readers: [] })) },
    {
      modelName: model.name,
      namespaceUri: model.namespaceUri,
      before: previous?.version ?? "the beginning",
      after: version,
      proposedVersion: undefined,
    },
  );
}

function toFile(path: string, text: string): BundleFile {
  return { path, bytes: Buffer.from(text, "utf8") };
}

/** The same bundle again, from what the release row and its revision say; for the proof that nothing has changed. */
export async function rebuildBundle(
  model: ModelRow,
  release: Pick<BundleIntent, "version" | "modelVersion" | "publicationDate" | "rating" | "required" | "keyId"> & { readonly revision: number },
  sources: readonly KnownSource[],
  previous: BundleIntent["previous"],
): Promise<BuiltBundle> {
  const revision = await findRevisionByNumber(model.id, release.revision);
  if (!revision) throw new Error(`Model ${model.id} has no revision ${release.revision}`);
  return buildBundle({ ...release, model, revision, previous, sources });
}
