import { data, redirect } from "react-router";
import type { Route } from "./+types/models.$modelId.merge";
import { requireModelForPage } from "~/auth/require-model.server";
import { MergeView } from "~/components/revisions/merge-view";
import { formatProblem } from "~/domain/core/problem-texts";
import { mergeVariant, previewMerge, type MergeDirection } from "~/services/branch-model.server";

export const meta: Route.MetaFunction = () => [{ title: "Merge · Ferrule" }];

const toDirection = (text: unknown): MergeDirection => (text === "into-variant" ? text : "into-model");

export async function loader({ request, params }: Route.LoaderArgs) {
  const { model } = await requireModelForPage(request, params.modelId, "read");
  const direction = toDirection(new URL(request.url).searchParams.get("direction"));
  const preview = await previewMerge(model, direction);
  if (!preview.ok)
    return { modelId: model.id, direction, preview: null, problems: preview.problems.map(formatProblem) };
  const { operations, ...rest } = preview.value;
  return { modelId: model.id, direction, preview: { ...rest, operations: operations.length }, problems: [] };
}

export async function action({ request, params }: Route.ActionArgs) {
  const { caller, model } = await requireModelForPage(request, params.modelId, "model.edit");
  const form = await request.formData();
  const choices: Record<string, "ours" | "theirs"> = {};
  for (const [name, value] of form)
    if (name.startsWith("choice ")) choices[name.slice("choice ".length)] = value === "theirs" ? "theirs" : "ours";
  const seqs = { ours: Number(form.get("ours")), theirs: Number(form.get("theirs")) };
  const direction = toDirection(form.get("direction"));
  const merged = await mergeVariant(caller, model, { direction, seqs, choices });
  if (!merged.ok) return data({ errors: merged.problems.map(formatProblem) }, { status: 409 });
  return redirect(`/models/${(direction === "into-model" ? model.variantOf : model.id) ?? model.id}/revisions`);
}

export default function Merge({ loaderData, actionData }: Route.ComponentProps) {
  return <MergeView {...loaderData} errors={actionData?.errors ?? []} />;
}
