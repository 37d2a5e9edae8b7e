import { z } from "zod";
import { requireCaller } from "~/auth/caller.server";
import { writeOnTarget, requireActingTarget } from "~/services/act-on-endpoint.server";
import { handleApi } from "~/utils/api-handler.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/live-write";

const schema = z.strictObject({ node: z.string().min(1).max(4000), value: z.union([z.string().max(10_000), z.number(), z.boolean()]), confirm: z.string().max(100).optional() });

/** `POST /live/:testServerId/write`: one value of one Variable. */
export const action = handleApi(async ({ request, params }: Route.ActionArgs) => {
  const caller = await requireCaller(request);
  const target = await requireActingTarget(caller, params.testServerId);
  requireMethod(request, "POST");
  const { node, value, confirm } = await requireJson(request, schema, 50_000);
  const written = await writeOnTarget(target, caller, node, value, confirm);
  return written.ok ? Response.json(written.value) : problemResponse(422, written.problems);
});
