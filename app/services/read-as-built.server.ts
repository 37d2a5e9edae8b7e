/** As-built reports as pages and the API show them. */
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import { assertMay } from "../auth/caller.server";
import { findAsBuiltReport, listAsBuiltReports, type AsBuiltRow } from "../db/repositories/as-built.server";
import { findBlob } from "../db/repositories/blobs.server";
import type { AsBuiltReport } from "../domain/as-built/as-built-report";
import { toProblemJson } from "../utils/problem-response.server";
import type { AsBuiltRun } from "./make-as-built.server";

export const asBuiltSummarySchema = z
  .object({
    id: z.string(),
    number: z.int(),
    revision: z.int().nullable(),
    target: z.string(),
    endpointUrl: z.string(),
    verdict: z.enum(["as released", "differs", "not shown"]),
    counted: z.int(),
    ignored: z.int(),
    sha256: z.string(),
    signature: z.string().nullable().meta({ description: "Key id, a dot, and the Ed25519 signature of the hash in base64." }),
    madeBy: z.string(),
    at: z.iso.datetime(),
  })
  .meta({ id: "AsBuiltReport" });
export type AsBuiltSummary = z.infer<typeof asBuiltSummarySchema>;

export const asBuiltRunSchema = z
  .object({
    id: z.string(),
    state: z.enum(["running", "done", "failed"]),
    stage: z.enum(["connect", "browse", "watch", "compare", "done"]),
    done: z.int(),
    of: z.int(),
    reportId: z.string().nullable(),
    verdict: z.enum(["as released", "differs", "not shown"]).nullable(),
    problems: z.array(z.looseObject({ code: z.string(), severity: z.string(), message: z.string() })),
  })
  .meta({ id: "AsBuiltRun" });

export function describeRun({ id, state, stage, done, of, reportId, verdict, problems }: AsBuiltRun): z.infer<typeof asBuiltRunSchema> {
  return { id, state, stage, done: Math.round(done), of: Math.round(of), reportId, verdict, problems: problems.map(toProblemJson) };
}

export async function listAsBuilt(modelId: string): Promise<AsBuiltSummary[]> {
  return (await listAsBuiltReports(modelId)).map(describeRow);
}

function describeRow(row: AsBuiltRow): AsBuiltSummary {
  return {
    id: row.id,
    number: row.number,
    revision: row.revisionNumber < 0 ? null : row.revisionNumber,
    target: row.targetName,
    endpointUrl: row.endpointUrl,
    verdict: row.verdict as AsBuiltSummary["verdict"],
    counted: row.counted,
    ignored: row.ignored,
    sha256: row.bodyHash,
    signature: row.signature,
    madeBy: row.madeBy,
    at: row.at.toISOString(),
  };
}

export type OpenedReport = { readonly summary: AsBuiltSummary; readonly modelId: string; readonly body: AsBuiltReport; readonly text: string };

/** Throws 404 or 403 as assertMay does. */
export async function requireAsBuiltReport(caller: Caller, id: string | undefined): Promise<OpenedReport> {
  const row = id === undefined ? undefined : await findAsBuiltReport(id);
  assertMay(caller, "read", row?.organizationId);
  const { modelId, bodyHash } = row as AsBuiltRow;
  const text = (await findBlob(bodyHash))?.toString("utf8") ?? "";
  return { summary: describeRow(row as AsBuiltRow), modelId, body: JSON.parse(text) as AsBuiltReport, text };
}
