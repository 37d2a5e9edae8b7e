/**
 * The files that a test server loads, the base first. Published NodeSets are loaded where the npm package put them (the
 * server's loader knows a quick form of these), everything else is written from the model that was checked and shown.
 */
import { mkdir, rm, writeFile } from "node:fs/promises";
import { join } from "node:path";
import { getLibrary } from "../library/library.server";
import type { AddressSpace, Layer } from "../domain/address-space/address-space";
import type { Node } from "../domain/address-space/node";
import { findText, type LocalizedText } from "../domain/address-space/qualified-name";
import { writeNodeSet } from "../domain/nodeset/write-nodeset";
import { getEnvironment } from "../utils/env.server";
import type { RequiredLayer } from "./required-models.server";

export type ServedModel = { readonly space: AddressSpace; readonly layers: readonly RequiredLayer[] };

/** The folder that belongs to one server alone. */
export function getTestServerFolder(id: string): string {
  return join(getEnvironment().dataFolder, "test-servers", id);
}

/** Writes into `folder` and answers the paths in the order of loading. */
export async function writeTestServerFiles(folder: string, { space, layers }: ServedModel, extra: readonly Layer[]): Promise<string[]> {
  await mkdir(folder, { recursive: true });
  const files: string[] = [];
  for (const required of layers) {
    const published = findPublishedFile(required);
    files.push(published ?? (await writeLayer(folder, files.length, required.layer, space)));
  }
  for (const layer of [space.own, ...extra]) files.push(await writeLayer(folder, files.length, layer, space));
  return files;
}

export async function removeTestServerFiles(folder: string): Promise<void> {
  // A file may be on its way into the folder while it is taken away.
  await rm(folder, { recursive: true, force: true, maxRetries: 5, retryDelay: 100 });
}

function findPublishedFile({ modelUri, version, publicationDate, from }: RequiredLayer): string | undefined {
  if (from) return undefined;
  const entry = getLibrary()
    .list()
    .find((e) => e.origin === "published" && e.modelUri === modelUri && e.version === version && e.publicationDate === publicationDate);
  return entry?.source.kind === "file" ? entry.source.path : undefined;
}

/** The loader of the server keeps one text of several, the last it meets: the one in the wanted language is put there. */
function withChosenTexts(node: Node): Node {
  if (node.displayName.length < 2 && (node.description?.length ?? 0) < 2) return node;
  return { ...node, displayName: putLast(node.displayName), ...(node.description ? { description: putLast(node.description) } : {}) };
}

function putLast(texts: readonly LocalizedText[]): readonly LocalizedText[] {
  const chosen = findText(texts);
  return [...texts].sort((a, b) => Number(a.text === chosen) - Number(b.text === chosen));
}

async function writeLayer(folder: string, index: number, layer: Layer, space: AddressSpace): Promise<string> {
  const file = join(folder, `${String(index).padStart(2, "0")}.NodeSet2.xml`);
  const { xml } = writeNodeSet(
    { header: layer.header, nodes: [...layer.nodes.values()].map(withChosenTexts) },
    { findNodeId: (key) => space.getNode(key)?.nodeId },
  );
  await writeFile(file, xml);
  return file;
}
