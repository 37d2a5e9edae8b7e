import { z } from "zod";
import { requireCaller } from "~/auth/caller.server";
import { changeTopics } from "~/services/event-hub.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { failWith } from "~/utils/problem-response.server";
import type { Route } from "./+types/event-topics";

const topicsSchema = z.array(z.string().min(3).max(2000)).max(2000);
const changeSchema = z.strictObject({ streamId: z.string().max(100), add: topicsSchema.default([]), remove: topicsSchema.default([]) });

export async function action({ request }: Route.ActionArgs): Promise<Response> {
  const caller = await requireCaller(request);
  requireMethod(request, "POST");
  const { streamId, add, remove } = await requireJson(request, changeSchema);
  const refused = await changeTopics(caller, streamId, { add, remove });
  if (!refused) throw failWith(404, "events.stream-gone");
  return Response.json({ refused });
}
