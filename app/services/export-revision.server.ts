/** The NodeSet2 file of a frozen revision. */
import type { ModelRow } from "../db/repositories/models.server";
import { writeNodeSet } from "../domain/nodeset/write-nodeset";
import { toFileName } from "./export-model.server";
import { loadRevisionLayer } from "./load-revision.server";

/** The same revision always gives the same bytes. */
export async function exportRevision(model: ModelRow, number: number): Promise<{ xml: string; fileName: string } | undefined> {
  const layer = await loadRevisionLayer(model.id, number);
  if (!layer) return undefined;
  const nodes = [...layer.nodes.values()].sort((a, b) => a.order - b.order);
  const { xml } = writeNodeSet({ header: layer.header, nodes });
  return { xml, fileName: `${toFileName(model.name)}.r${number}.NodeSet2.xml` };
}
