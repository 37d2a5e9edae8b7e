import type { Route } from "./+types/source-changes";
import { assertMay, requireCaller } from "~/auth/caller.server";
import { chooseOrganization } from "~/presenters/chosen-organization.server";
import { changeSources, sourceIntentSchema } from "~/services/change-sources.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";

/** `POST /sources/changes` with one change of a source, a port, a gateway or what it publishes. */
export async function action({ request }: Route.ActionArgs): Promise<Response> {
  const caller = await requireCaller(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "mapping.edit", organizationId);
  requireMethod(request, "POST");
  const change = await requireJson(request, sourceIntentSchema);
  const result = await changeSources(caller, organizationId, change);
  return result.ok ? Response.json(result.value) : problemResponse(409, result.problems);
}
