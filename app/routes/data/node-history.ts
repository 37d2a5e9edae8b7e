import { z } from "zod";
import { requireModel } from "~/auth/require-model.server";
import { nodeKeySchema } from "~/domain/editing/node-schema";
import { listNodeHistory } from "~/presenters/node-history.server";
import { requireFields } from "~/utils/parse-request.server";
import type { Route } from "./+types/node-history";

const querySchema = z.object({
  node: nodeKeySchema,
  before: z.coerce.number().int().min(0).default(Number.MAX_SAFE_INTEGER),
});

/** `GET /models/:modelId/history?node=KEY&before=SEQ`: what was done to the node, the newest first. */
export async function loader({ request, params }: Route.LoaderArgs): Promise<Response> {
  const { model } = await requireModel(request, params.modelId, "read");
  const { node, before } = requireFields(querySchema, Object.fromEntries(new URL(request.url).searchParams));
  return Response.json(await listNodeHistory(model.id, node, before), { headers: { "cache-control": "no-store" } });
}
