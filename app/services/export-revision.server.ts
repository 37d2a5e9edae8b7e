/** The NodeSet2 file of a frozen revision. */
import { findBlob } from "../db/repositories/blobs.server";
import { findRevisionByNumber, type ModelRow } from "../db/repositories/models.server";
import { buildLayer, type Layer } from "../domain/address-space/address-space";
import { readPack } from "../domain/nodeset/pack";
import { writeNodeSet } from "../domain/nodeset/write-nodeset";
import { toFileName } from "./export-model.server";

/** The own layer of a revision; undefined when the model has no such revision. */
export async function loadRevisionLayer(modelId: string, number: number): Promise<Layer | undefined> {
  const revision = await findRevisionByNumber(modelId, number);
  if (!revision) return undefined;
  const bytes = await findBlob(revision.packHash);
  const content = bytes ? readPack(bytes.toString("utf8")) : undefined;
  if (!content?.ok) throw new Error(`The contents ${revision.packHash} of revision ${number} of model ${modelId} cannot be read`);
  return buildLayer(content.value.header, content.value.nodes);
}

/** The same revision always gives the same bytes. */
export async function exportRevision(model: ModelRow, number: number): Promise<{ xml: string; fileName: string } | undefined> {
  const layer = await loadRevisionLayer(model.id, number);
  if (!layer) return undefined;
  const nodes = [...layer.nodes.values()].sort((a, b) => a.order - b.order);
  const { xml } = writeNodeSet({ header: layer.header, nodes });
  return { xml, fileName: `${toFileName(model.name)}.r${number}.NodeSet2.xml` };
}
