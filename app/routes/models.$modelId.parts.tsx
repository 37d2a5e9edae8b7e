import { data, redirect } from "react-router";
import type { Route } from "./+types/models.$modelId.parts";
import { requireModelForPage } from "~/auth/require-model.server";
import { PartsView } from "~/components/revisions/parts-view";
import { formatProblem } from "~/domain/core/problem-texts";
import type { Problem } from "~/domain/core/result";
import { listTargetVersions, previewRetarget, retargetModel, retargetSchema } from "~/services/retarget-model.server";
import { listSplitChoices, splitOffModel, splitSchema } from "~/services/split-off-model.server";

export const meta: Route.MetaFunction = () => [{ title: "Required versions, split · Ferrule" }];

export async function loader({ request, params }: Route.LoaderArgs) {
  const { model } = await requireModelForPage(request, params.modelId, "read");
  const query = new URL(request.url).searchParams;
  const intent = retargetSchema.safeParse({ modelUri: query.get("modelUri"), source: query.get("source") });
  const preview = intent.success ? await previewRetarget(model, intent.data) : undefined;
  return {
    namespaceUri: model.namespaceUri,
    versions: await listTargetVersions(model),
    preview: preview?.ok ? preview.value : null,
    types: await listSplitChoices(model),
  };
}

export async function action({ request, params }: Route.ActionArgs) {
  const { caller, model } = await requireModelForPage(request, params.modelId, "model.edit");
  const form = await request.formData();
  const refuse = (problems: readonly Problem[]) => data({ errors: problems.map(formatProblem) }, { status: 409 });
  if (form.get("intent") === "retarget") {
    const intent = retargetSchema.safeParse({ modelUri: form.get("modelUri"), source: form.get("source") });
    if (!intent.success) return data({ errors: ["Choose a version."] }, { status: 400 });
    const done = await retargetModel(caller, model, intent.data);
    return done.ok ? redirect(`/models/${model.id}/findings`) : refuse(done.problems);
  }
  const intent = splitSchema.safeParse({
    name: form.get("name"),
    namespaceUri: form.get("namespaceUri"),
    types: form.getAll("types"),
  });
  if (!intent.success)
    return data({ errors: ["Name the new model and its namespace, and choose its types."] }, { status: 400 });
  const done = await splitOffModel(caller, model, intent.data);
  return done.ok ? redirect(`/models/${done.value.id}/sheet`) : refuse(done.problems);
}

export default function Parts({ loaderData, actionData }: Route.ComponentProps) {
  return <PartsView {...loaderData} errors={actionData?.errors ?? []} />;
}
