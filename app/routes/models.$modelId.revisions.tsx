import { data, redirect } from "react-router";
import type { Route } from "./+types/models.$modelId.revisions";
import { assertMay, mayDo } from "~/auth/caller.server";
import { requireModelForPage } from "~/auth/require-model.server";
import { RevisionsView } from "~/components/revisions/revisions-view";
import { formatProblem } from "~/domain/core/problem-texts";
import type { Problem } from "~/domain/core/result";
import { presentRevisions } from "~/presenters/revisions.server";
import { branchModel, branchSchema, findOrigin, listModelVariants } from "~/services/branch-model.server";
import { compareStates } from "~/services/compare-states.server";
import { freezeRevision, freezeSchema } from "~/services/freeze-revision.server";
import { parseStateName } from "~/services/load-revision.server";
import { readModelReleases } from "~/services/read-release.server";
import { restoreRevision } from "~/services/restore-revision.server";
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
    releases: await readModelReleases(model),
    variants: (await listModelVariants(model)).map(({ id, name, headSeq, updatedBy, updatedAt }) => ({
      id,
      name,
      edits: headSeq,
      updatedBy,
      updatedAt: updatedAt.toISOString(),
    })),
    variantOf: await findOrigin(model),
    mayFreeze: mayDo(caller, "revision.freeze", model.organizationId),
    mayEdit: mayDo(caller, "model.edit", model.organizationId),
  };
}

export async function action({ request, params }: Route.ActionArgs) {
  const { caller, model } = await requireModelForPage(request, params.modelId, "read");
  const fields = await request.formData();
  const intent = fields.get("intent");
  assertMay(caller, intent === "freeze" ? "revision.freeze" : "model.edit", model.organizationId);
  const refuse = (problems: readonly Problem[]) => data({ refusal: problems.map(formatProblem).join(" ") }, { status: 409 });
  const number = Number(fields.get("number"));
  if (intent === "restore") {
    const restored = await restoreRevision(caller, model, number);
    return restored.ok ? redirect(`/models/${model.id}/revisions?from=${number}&to=working`) : refuse(restored.problems);
  }
  if (intent === "branch") {
    const form = branchSchema.safeParse({ revision: number, name: fields.get("name") });
    if (!form.success) return data({ refusal: "Give the variant a name." }, { status: 400 });
    const made = await branchModel(caller, model, form.data);
    return made.ok ? redirect(`/models/${made.value.id}/sheet`) : refuse(made.problems);
  }
  const form = freezeSchema.safeParse({ message: fields.get("message") });
  if (!form.success) return data({ refusal: "Say in a line what this revision is for." }, { status: 400 });
  const frozen = await freezeRevision(caller, model, form.data.message);
  return frozen.ok ? redirect(`/models/${model.id}/revisions`) : refuse(frozen.problems);
}

export default function Revisions({ loaderData, actionData }: Route.ComponentProps) {
  return <RevisionsView {...loaderData} refusal={actionData?.refusal} />;
}
