import { assertMay, requireCaller, requireOrganization } from "~/auth/caller.server";
import { presentReaders } from "~/presenters/readers.server";
import { readerSchema, saveReader } from "~/services/manage-readers.server";
import { handleApi } from "~/utils/api-handler.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/readers";

/** `GET /api/v1/readers` */
export const loader = handleApi(async ({ request }: Route.LoaderArgs) => {
  const caller = await requireCaller(request);
  const { organizationId } = requireOrganization(request, caller);
  assertMay(caller, "read", organizationId);
  return Response.json(await presentReaders(organizationId), { headers: { "cache-control": "no-store" } });
});

/** `PUT` one reader; without an id a new one. */
export const action = handleApi(async ({ request }: Route.ActionArgs) => {
  const caller = await requireCaller(request);
  const { organizationId } = requireOrganization(request, caller);
  assertMay(caller, "comment", organizationId);
  requireMethod(request, "PUT");
  const saved = await saveReader(caller, organizationId, await requireJson(request, readerSchema));
  if (!saved.ok) return problemResponse(422, saved.problems);
  return Response.json((await presentReaders(organizationId)).find((reader) => reader.id === saved.value.id));
});
