import { data, redirect } from "react-router";
import type { Route } from "./+types/models.$modelId.revisions";
import { mayDo } from "~/auth/caller.server";
import { requireModelForPage } from "~/auth/require-model.server";
import { RevisionsView } from "~/components/revisions/revisions-view";
import { formatProblem } from "~/domain/core/problem-texts";
import { presentRevisions } from "~/presenters/revisions.server";
import { compareStates } from "~/services/compare-states.server";
import { freezeRevision, freezeSchema } from "~/services/freeze-revision.server";
import { parseStateName } from "~/services/load-revision.server";
import { toComparisonJson } from "~/utils/api-schemas";

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `Revisions of ${loaderData?.name ?? "the model"} · Ferrule` },
];

export async function loader({ request, params }: Route.LoaderArgs) {
  const { caller, model } = await requireModelForPage(request, params.modelId, "read");
  const revisions = await presentRevisions(model);
  const query = new URL(request.url).searchParams;
  const from = parseStateName(query.get("from")) ?? revisions[0]?.number ?? 0;
  const to = parseStateName(query.get("to")) ?? "working";
  const comparison = await compareStates(model, from, to);
  return {
    name: model.name,
    modelId: model.id,
    revisions,
    compared: comparison ? { from, to, ...toComparisonJson(comparison) } : null,
    mayFreeze: mayDo(caller, "revision.freeze", model.organizationId),
  };
}

export async function action({ request, params }: Route.ActionArgs) {
  const { caller, model } = await requireModelForPage(request, params.modelId, "revision.freeze");
  const form = freezeSchema.safeParse({ message: (await request.formData()).get("message") });
  if (!form.success) return data({ refusal: "Say in a line what this revision is for." }, { status: 400 });
  const frozen = await freezeRevision(caller, model, form.data.message);
  if (!frozen.ok) return data({ refusal: frozen.problems.map(formatProblem).join(" ") }, { status: 409 });
  return redirect(`/models/${model.id}/revisions`);
}

export default function Revisions({ loaderData, actionData }: Route.ComponentProps) {
  return <RevisionsView {...loaderData} refusal={actionData?.refusal} />;
}
