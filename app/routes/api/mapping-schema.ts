import { requireCaller } from "~/auth/caller.server";
import { makeMappingDocumentSchema } from "~/domain/deliver/mapping-document";
import { handleApi, refuseChanges } from "~/utils/api-handler.server";
import type { Route } from "./+types/mapping-schema";

/** `GET /api/v1/mapping-document-schema`: the JSON Schema of mapping documents. */
export const loader = handleApi(async ({ request }: Route.LoaderArgs) => {
  await requireCaller(request);
  return new Response(`${JSON.stringify(makeMappingDocumentSchema(), null, 2)}\n`, { headers: { "content-type": "application/schema+json", "cache-control": "max-age=3600" } });
});

export const action = refuseChanges;
