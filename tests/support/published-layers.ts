/** The published NodeSets of the npm package node-opcua-nodesets as layers, each read once a process. */
import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import { dirname, join } from "node:path";
import { buildLayer, type Layer } from "~/domain/address-space/address-space";
import { getValue } from "~/domain/core/result";
import type { NodeSetContent } from "~/domain/nodeset/nodeset-content";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";

const folder = join(dirname(createRequire(import.meta.url).resolve("node-opcua-nodesets/package.json")), "nodesets");

const contents = new Map<string, NodeSetContent>();
const layers = new Map<string, Layer>();

export function readPublished(file: string): NodeSetContent {
  let content = contents.get(file);
  if (!content) {
    content = getValue(readNodeSet(readFileSync(join(folder, file), "utf8"), { fileName: file }));
    contents.set(file, content);
  }
  return content;
}

export function getPublishedLayer(file: string): Layer {
  let layer = layers.get(file);
  if (!layer) {
    const { header, nodes } = readPublished(file);
    layer = buildLayer(header, nodes);
    layers.set(file, layer);
  }
  return layer;
}

/** Namespace 0. */
export function getStandardLayer(): Layer {
  return getPublishedLayer("Opc.Ua.NodeSet2.xml");
}
