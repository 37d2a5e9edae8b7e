/** A model's findings in the form that is asked for. */
import { createHash } from "node:crypto";
import { z } from "zod";
import { formatReport } from "../domain/checks/format-report";
import { toSarif } from "../domain/checks/to-sarif";
import { reportModel } from "./check-model.server";

export const findingsQuerySchema = z.strictObject({
  format: z.enum(["json", "sarif", "text"]).default("json"),
  severity: z.enum(["error", "warning", "hint"]).optional(),
});

export type WrittenFindings = { readonly text: string; readonly mediaType: string };

/** Accepted findings are left out; SARIF tells them as suppressed. Undefined when the model is gone. */
export async function reportFindings(
  modelId: string,
  { format, severity }: z.infer<typeof findingsQuerySchema>,
): Promise<WrittenFindings | undefined> {
  const found = await reportModel(modelId, severity);
  if (!found) return undefined;
  const { report, waived } = found;
  if (format === "json") return { text: JSON.stringify(report), mediaType: "application/json" };
  if (format === "text") return { text: formatReport(report, true), mediaType: "text/plain; charset=utf-8" };
  const digest = (text: string): string => createHash("sha256").update(text).digest("hex");
  const log = toSarif([report], { version: "0.1.0", waived, digest });
  return { text: JSON.stringify(log), mediaType: "application/sarif+json" };
}
