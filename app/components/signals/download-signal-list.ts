import type { AddressSpace } from "~/domain/address-space/address-space";
import { listSignals, signalHeads } from "~/domain/editing/starters/list-signals";
import { writeXlsx } from "~/utils/write-xlsx";

/** Hands the model's signal list to the browser as a workbook. */
export async function downloadSignalList(space: AddressSpace, modelName: string): Promise<void> {
  const blob = await writeXlsx(modelName, signalHeads, listSignals(space));
  const link = document.createElement("a");
  link.href = URL.createObjectURL(blob);
  link.download = `${modelName.trim().toLowerCase().replace(/[^\p{L}\p{N}]+/gu, "-") || "model"}-signals.xlsx`;
  link.click();
  setTimeout(() => URL.revokeObjectURL(link.href), 10_000);
}
