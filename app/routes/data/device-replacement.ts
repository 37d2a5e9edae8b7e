import { requireModel } from "~/auth/require-model.server";
import { previewDeviceReplacement, replaceDeviceOf, replacementSchema } from "~/services/replace-device.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import { z } from "zod";
import type { Route } from "./+types/device-replacement";

const bodySchema = z.discriminatedUnion("act", [
  z.strictObject({ act: z.literal("preview"), ...replacementSchema.omit({ serialNumber: true, reason: true }).shape }),
  z.strictObject({ act: z.literal("replace"), ...replacementSchema.shape }),
]);

/** `POST /models/:modelId/device-replacement`: `{act: "preview" | "replace", machine, role, deviceDescriptionId, serialNumber, reason}`. */
export async function action({ request, params }: Route.ActionArgs): Promise<Response> {
  const { caller, model } = await requireModel(request, params.modelId, "mapping.edit");
  requireMethod(request, "POST");
  const intent = await requireJson(request, bodySchema);
  const answer = intent.act === "preview" ? await previewDeviceReplacement(model, intent) : await replaceDeviceOf(caller, model, intent);
  return answer.ok ? Response.json(answer.value) : problemResponse(422, answer.problems);
}
