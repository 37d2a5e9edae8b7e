import { requireSource } from "~/auth/require-row.server";
import { formatHex } from "~/domain/mapping/bits";
import { readSourceNow, toLivePort } from "~/services/live-sources.server";
import { findAlias } from "~/services/source-topics.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import { z } from "zod";
import type { SourceItem } from "~/domain/mapping/live-source";
import type { Route } from "./+types/source-read";

const port = z.int().min(1).max(255);
const bodySchema = z.union([
  z.strictObject({ port }),
  z.strictObject({ port, index: z.int().min(0).max(65_535), subindex: z.int().min(0).max(255).default(0) }),
  z.strictObject({ unitId: z.int().min(0).max(255), table: z.enum(["coil", "discrete-input", "holding-register", "input-register"]), address: z.int().min(0).max(65_535), count: z.int().min(1).max(125) }),
  z.strictObject({ nodeId: z.string().min(1).max(5_000) }),
  z.strictObject({ document: z.literal(true) }),
]);

/** `POST /sources/:sourceId/read`: one answer of the live source; it reads and never writes. 409 when it does not answer. */
export async function action({ request, params }: Route.ActionArgs): Promise<Response> {
  const { source } = await requireSource(request, params.sourceId, "read");
  requireMethod(request, "POST");
  const body = await requireJson(request, bodySchema);
  const alias = "port" in body ? await findAlias(source.organizationId, source.id, body.port) : undefined;
  const item = toItem(body, alias);
  const read = await readSourceNow(source.organizationId, source.id, item);
  if (!read.ok) return problemResponse(409, read.problems);
  const { value, time } = read.value;
  const at = new Date(time).toISOString();
  if (value.kind === "process-data" && item.kind === "process-data") return Response.json(toLivePort(item.port, { ok: true, value, time }));
  if (value.kind === "octets") return Response.json({ hex: formatHex(value.octets), time: at });
  return Response.json({ ...value, time: at }, { headers: { "cache-control": "no-store" } });
}

function toItem(body: z.infer<typeof bodySchema>, alias: string | undefined): SourceItem {
  const named = alias === undefined ? {} : { alias };
  if ("index" in body) return { kind: "parameter", port: body.port, index: body.index, subindex: body.subindex, ...named };
  if ("port" in body) return { kind: "process-data", port: body.port, ...named };
  if ("unitId" in body) return { kind: "registers", ...body };
  return "nodeId" in body ? { kind: "node", nodeId: body.nodeId } : { kind: "document" };
}
