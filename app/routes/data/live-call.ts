import { z } from "zod";
import { requireCaller } from "~/auth/caller.server";
import { callOnTarget, requireActingTarget } from "~/services/act-on-endpoint.server";
import { handleApi } from "~/utils/api-handler.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/live-call";

const idSchema = z.string().min(1).max(4000);
const schema = z.strictObject({
  object: idSchema,
  method: idSchema,
  inputs: z.array(z.union([z.string().max(10_000), z.number(), z.boolean()])).max(50),
  confirm: z.string().max(100).optional(),
});

/** `POST /live/:testServerId/call`: one call of one Method. */
export const action = handleApi(async ({ request, params }: Route.ActionArgs) => {
  const caller = await requireCaller(request);
  const target = await requireActingTarget(caller, params.testServerId);
  requireMethod(request, "POST");
  const { object, method, inputs, confirm } = await requireJson(request, schema, 200_000);
  const called = await callOnTarget(target, caller, object, method, inputs, confirm);
  return called.ok ? Response.json(called.value) : problemResponse(422, called.problems);
});
