/** The NodeIds of a model's working state as CSV. */
import { writeNodeIdsCsv } from "../domain/nodeset/node-ids-csv";
import { toFileName } from "./export-model.server";
import { loadWorkingModel } from "./working-model.server";

/** Undefined when the model is gone. */
export async function exportNodeIds(modelId: string): Promise<{ csv: string; fileName: string } | undefined> {
  const working = await loadWorkingModel(modelId);
  if (!working) return undefined;
  return { csv: writeNodeIdsCsv(working.space), fileName: `${toFileName(working.model.name)}.NodeIds.csv` };
}
