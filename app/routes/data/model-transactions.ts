import { z } from "zod";
import { assertMay } from "~/auth/caller.server";
import { requireModel } from "~/auth/require-model.server";
import { isMappingEdit } from "~/domain/editing/operation";
import { operationsSchema } from "~/domain/editing/operation-schema";
import { listModelTransactions } from "~/presenters/model-transactions.server";
import { appendTransactions } from "~/services/working-model.server";
import { requireFields, requireJson, requireMethod } from "~/utils/parse-request.server";
import { failWith, problemResponse } from "~/utils/problem-response.server";
import { problem } from "~/domain/core/result";
import type { Route } from "./+types/model-transactions";

const count = z.int().min(0);

const appendSchema = z.strictObject({
  clientId: z.string().min(1).max(100),
  base: count,
  transactions: z
    .array(z.strictObject({ clientSeq: count, label: z.string().min(1).max(200), operations: operationsSchema }))
    .min(1)
    .max(500),
});

const querySchema = z.object({ since: z.coerce.number().int().min(0).default(0), limit: z.coerce.number().int().min(1).max(1000).default(1000) });

/** `GET /models/:modelId/transactions?since=N`: what came after, oldest first. */
export async function loader({ request, params }: Route.LoaderArgs): Promise<Response> {
  const { model } = await requireModel(request, params.modelId, "read");
  const { since, limit } = requireFields(querySchema, Object.fromEntries(new URL(request.url).searchParams));
  return Response.json(await listModelTransactions(model, since, limit), { headers: { "cache-control": "no-store" } });
}

/** `POST /models/:modelId/transactions`: 200 accepted · 409 others were quicker · 422 refused. */
export async function action({ request, params }: Route.ActionArgs): Promise<Response> {
  const { caller, model } = await requireModel(request, params.modelId, "mapping.edit");
  requireMethod(request, "POST");
  const intent = await requireJson(request, appendSchema);
  if (intent.transactions.some((t) => !isMappingEdit(t.operations))) assertMay(caller, "model.edit", model.organizationId);
  const outcome = await appendTransactions(model.id, caller, intent);
  switch (outcome.kind) {
    case "accepted":
      return Response.json({ head: outcome.head, accepted: outcome.accepted });
    case "stale": {
      const { head, between, accepted } = outcome;
      return problemResponse(409, [problem("transactions.stale")], { members: { head, between, accepted } });
    }
    case "refused":
      return problemResponse(422, outcome.problems, { members: { head: outcome.head, accepted: outcome.accepted } });
    case "gone":
      throw failWith(404, "request.not-found");
  }
}
