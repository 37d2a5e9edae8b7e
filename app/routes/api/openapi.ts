import { makeOpenApiDocument } from "~/services/openapi.server";
import { handleApi, refuseChanges } from "~/utils/api-handler.server";

/** `GET /api/v1/openapi.json`: open to everybody, since it tells nothing of anybody's data. */
export const loader = handleApi(() => Response.json(makeOpenApiDocument(), { headers: { "cache-control": "no-cache" } }));

export const action = refuseChanges;
