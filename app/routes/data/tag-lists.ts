import { assertMay, requireCaller } from "~/auth/caller.server";
import { TAG_LIMITS } from "~/domain/mapping/read-tags";
import { chooseOrganization } from "~/presenters/chosen-organization.server";
import { importTags, listTags, previewTags, readTagList, tagImportSchema } from "~/services/import-tags.server";
import { requireFields, requireMethod } from "~/utils/parse-request.server";
import { problemResponse, toProblemJson } from "~/utils/problem-response.server";
import { readFileBody } from "~/utils/read-file-body.server";
import { z } from "zod";
import type { Route } from "./+types/tag-lists";

/** `GET /tag-lists`, or `?id=` for the tags of one. */
export async function loader({ request }: Route.LoaderArgs): Promise<Response> {
  const caller = await requireCaller(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "read", organizationId);
  const id = new URL(request.url).searchParams.get("id");
  if (id === null) return Response.json(await listTags(organizationId), { headers: { "cache-control": "no-store" } });
  const tags = await readTagList(organizationId, id);
  return tags.ok ? Response.json(tags.value) : problemResponse(404, tags.problems);
}

const querySchema = z.object({ act: z.enum(["preview", "import"]), name: z.string().max(200).default("tags.csv"), intent: z.string().max(20_000).optional() });

/** `POST /tag-lists?act=preview|import&name=&intent=` with the file as the body; `intent` is the JSON of the import. */
export async function action({ request }: Route.ActionArgs): Promise<Response> {
  const caller = await requireCaller(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "mapping.edit", organizationId);
  requireMethod(request, "POST");
  const { act, name, intent } = requireFields(querySchema, Object.fromEntries(new URL(request.url).searchParams));
  const body = await readFileBody(request, { name, limit: TAG_LIMITS.characters });
  if (!body.ok) return problemResponse(body.problems[0]?.code === "limit.file-size" ? 413 : 422, body.problems);
  const file = { bytes: body.value.bytes, fileName: body.value.name };
  if (act === "preview") {
    const preview = await previewTags(organizationId, file);
    return preview.ok ? Response.json(preview.value) : problemResponse(422, preview.problems);
  }
  const wanted = requireFields(tagImportSchema, parseJson(intent));
  const imported = await importTags(caller, organizationId, file, wanted);
  return imported.ok
    ? Response.json({ ...imported.value, problems: imported.value.problems.map(toProblemJson) }, { status: 201 })
    : problemResponse(422, imported.problems);
}

function parseJson(text: string | undefined): unknown {
  try {
    return JSON.parse(text ?? "");
  } catch {
    return undefined;
  }
}
