/** The NodeSet2 file of a model, with the line of each node. */
import type { NodeKey } from "../domain/address-space/node-id";
import { writeNodeSet } from "../domain/nodeset/write-nodeset";
import { loadWorkingModel, type WorkingModel } from "./working-model.server";

export type ModelExport = {
  readonly working: WorkingModel;
  readonly xml: string;
  readonly lines: ReadonlyMap<NodeKey, number>;
  readonly fileName: string;
};

/** The working state as a file; undefined when the model is gone. */
export async function exportModel(modelId: string, options: { canonicalOrder?: boolean } = {}): Promise<ModelExport | undefined> {
  const working = await loadWorkingModel(modelId);
  if (!working) return undefined;
  const { space } = working;
  const content = { header: space.own.header, nodes: space.listOwnNodes() };
  const written = writeNodeSet(content, { ...options, findNodeId: (key) => space.getNode(key)?.nodeId });
  return { working, xml: written.xml, lines: written.lines, fileName: `${toFileName(working.model.name)}.NodeSet2.xml` };
}

/** A file name from a model's name: letters and digits of each word, words joined. */
export function toFileName(name: string): string {
  const words = name.split(/[^A-Za-z0-9]+/).filter((word) => word !== "");
  return words.map((word) => (word[0]?.toUpperCase() ?? "") + word.slice(1)).join("") || "Model";
}
