import { requireModel } from "~/auth/require-model.server";
import { deliverMapping, deliverables } from "~/services/deliver-mapping.server";
import { toAttachment } from "~/utils/attachment.server";
import { requireFields } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import { z } from "zod";
import type { Route } from "./+types/model-deliver";

const querySchema = z.object({ of: z.string().max(5_000).optional(), template: z.string().max(50).optional() });

/** `GET /models/:modelId/deliver/:what?of=&template=`: document, csv, thing-description, signal-list, template. */
export async function loader({ request, params }: Route.LoaderArgs): Promise<Response> {
  const { model } = await requireModel(request, params.modelId, "read");
  const { what } = requireFields(z.object({ what: z.enum(deliverables) }), { what: params.what });
  const { of, template } = requireFields(querySchema, Object.fromEntries(new URL(request.url).searchParams));
  const made = await deliverMapping(model, { what, ...(of === undefined ? {} : { of }), ...(template === undefined ? {} : { templateId: template }) });
  return made.ok ? toAttachment(made.value.content, made.value.fileName, made.value.type) : problemResponse(422, made.problems);
}
