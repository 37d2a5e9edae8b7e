import { requireModel } from "~/auth/require-model.server";
import { parseStateName } from "~/services/load-revision.server";
import { writeReport } from "~/services/read-review-texts.server";
import { handleApi, refuseChanges } from "~/utils/api-handler.server";
import { htmlDocument } from "~/utils/html-document.server";
import { failWith } from "~/utils/problem-response.server";
import type { Route } from "./+types/change-report";

/** `GET /models/:modelId/change-report?from=1&to=working`: the changes as a page to print. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { model } = await requireModel(request, params.modelId, "read");
  const query = new URL(request.url).searchParams;
  const [from, to] = [parseStateName(query.get("from")), parseStateName(query.get("to"))];
  const report = from === undefined || to === undefined ? undefined : await writeReport(model, from, to);
  if (report === undefined) throw failWith(404, "request.not-found");
  return htmlDocument(report);
});

export const action = refuseChanges;
