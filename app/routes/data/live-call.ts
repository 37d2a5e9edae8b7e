import { z } from "zod";
import { requireCaller } from "~/auth/caller.server";
import { callOnTestServer } from "~/services/act-on-endpoint.server";
import { requireTestServer } from "~/services/find-test-server.server";
import { handleApi } from "~/utils/api-handler.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/live-call";

const idSchema = z.string().min(1).max(4000);
const schema = z.strictObject({
  object: idSchema,
  method: idSchema,
  inputs: z.array(z.union([z.string().max(10_000), z.number(), z.boolean()])).max(50),
});

/** `POST /live/:testServerId/call`: one call of one Method. */
export const action = handleApi(async ({ request, params }: Route.ActionArgs) => {
  const caller = await requireCaller(request);
  const server = requireTestServer(caller, params.testServerId, "test-server.write");
  requireMethod(request, "POST");
  const { object, method, inputs } = await requireJson(request, schema, 200_000);
  const called = await callOnTestServer(server, caller, object, method, inputs);
  return called.ok ? Response.json(called.value) : problemResponse(422, called.problems);
});
