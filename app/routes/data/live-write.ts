import { z } from "zod";
import { requireCaller } from "~/auth/caller.server";
import { writeOnTestServer } from "~/services/act-on-endpoint.server";
import { requireTestServer } from "~/services/find-test-server.server";
import { handleApi } from "~/utils/api-handler.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/live-write";

const schema = z.strictObject({ node: z.string().min(1).max(4000), value: z.union([z.string().max(10_000), z.number(), z.boolean()]) });

/** `POST /live/:testServerId/write`: one value of one Variable. */
export const action = handleApi(async ({ request, params }: Route.ActionArgs) => {
  const caller = await requireCaller(request);
  const server = requireTestServer(caller, params.testServerId, "test-server.write");
  requireMethod(request, "POST");
  const { node, value } = await requireJson(request, schema, 50_000);
  const written = await writeOnTestServer(server, caller, node, value);
  return written.ok ? Response.json(written.value) : problemResponse(422, written.problems);
});
