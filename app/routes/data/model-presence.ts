import { z } from "zod";
import { requireModel } from "~/auth/require-model.server";
import { tellPresence } from "~/services/presence.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import type { Route } from "./+types/model-presence";

const newsSchema = z.object({
  clientId: z.string().min(1).max(100),
  place: z.string().max(200).default(""),
  selection: z.array(z.string().max(4000)).max(100).default([]),
});

/** `POST /models/:modelId/presence`: where this window is and what it has selected. */
export async function action({ request, params }: Route.ActionArgs): Promise<Response> {
  const { caller, model } = await requireModel(request, params.modelId, "read");
  requireMethod(request, "POST");
  tellPresence(model.id, caller, await requireJson(request, newsSchema, 500_000));
  return new Response(null, { status: 204 });
}
