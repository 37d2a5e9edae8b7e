import { parseWithZod } from "@conform-to/zod/v4";
import { data, redirect, useRouteLoaderData } from "react-router";
import type { Route } from "./+types/models.$modelId.about";
import { requireModelForPage } from "~/auth/require-model.server";
import { AboutModel } from "~/components/models/about-model";
import { formatProblem } from "~/domain/core/problem-texts";
import { deleteModel, renameModel } from "~/services/update-model.server";
import { modelParticularsSchema as schema } from "~/utils/model-forms";
import type { ModelWorkspace } from "~/presenters/model-workspace.server";

export async function loader({ request, params }: Route.LoaderArgs) {
  const { model } = await requireModelForPage(request, params.modelId, "read");
  return { name: model.name };
}

export const meta: Route.MetaFunction = ({ data: loaded }) => [{ title: `About ${loaded?.name ?? "model"} · Ferrule` }];

export async function action({ request, params }: Route.ActionArgs) {
  const { caller, model } = await requireModelForPage(request, params.modelId, "model.edit");
  const form = await request.formData();
  if (form.get("intent") === "delete") {
    const result = await deleteModel(caller, model);
    return result.ok ? redirect("/models") : data({ submission: null, refusal: result.problems.map(formatProblem).join(" ") }, { status: 409 });
  }
  const submission = parseWithZod(form, { schema });
  if (submission.status !== "success") return data({ submission: submission.reply(), refusal: undefined }, { status: 400 });
  await renameModel(caller, model, submission.value.name);
  return data({ submission: submission.reply(), refusal: undefined });
}

export default function About({ actionData }: Route.ComponentProps) {
  const workspace = useRouteLoaderData<ModelWorkspace>("routes/models.$modelId");
  if (!workspace) return null;
  return (
    <AboutModel
      workspace={workspace}
      lastResult={actionData?.submission ?? null}
      refusal={actionData?.refusal}
      editBlockedBy={workspace.permissions.includes("model.edit") ? undefined : "asks for the role engineer or administrator"}
    />
  );
}
