import type { SubmissionResult } from "@conform-to/react";
import { parseWithZod } from "@conform-to/zod/v4";
import { data, redirect, useRouteLoaderData } from "react-router";
import type { Route } from "./+types/models.$modelId.about";
import type { Caller } from "~/auth/caller.server";
import { requireModelForPage, type ModelAccess } from "~/auth/require-model.server";
import { AboutModel } from "~/components/models/about-model";
import { formatProblem } from "~/domain/core/problem-texts";
import { ok, type Result } from "~/domain/core/result";
import type { ModelWorkspace } from "~/presenters/model-workspace.server";
import { listRenumberings } from "~/presenters/renumberings.server";
import { changeIdPolicy, changeRequiredModels, changeVersion } from "~/services/change-model-info.server";
import { listLibraryChoices } from "~/services/list-library-choices.server";
import { deleteModel, renameModel } from "~/services/update-model.server";
import { loadWorkingModel } from "~/services/working-model.server";
import { toIdPolicy } from "~/utils/id-policy-fields";
import { aboutModelSchema as schema, type AboutModelForm } from "~/utils/model-forms";

export async function loader({ request, params }: Route.LoaderArgs) {
  const { model } = await requireModelForPage(request, params.modelId, "read");
  const [working, choices, renumberings] = await Promise.all([
    loadWorkingModel(model.id),
    listLibraryChoices(model.organizationId),
    listRenumberings(model.id),
  ]);
  const header = working?.space.own.header;
  return {
    name: model.name,
    required: header?.models[0]?.requiredModels.map((entry) => entry.modelUri) ?? [],
    choices: choices.filter((choice) => choice.id !== model.id),
    idPolicy: header?.idPolicy,
    renumberings,
  };
}

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `About ${loaderData?.name ?? "the model"} · Ferrule` },
];

type Answer = {
  intent: AboutModelForm["intent"] | undefined;
  submission: SubmissionResult<string[]> | null;
  refusal: string | undefined;
};

export async function action({ request, params }: Route.ActionArgs) {
  const { caller, model } = await requireModelForPage(request, params.modelId, "model.edit");
  const form = await request.formData();
  const submission = parseWithZod(form, { schema });
  if (submission.status !== "success") {
    const asked = form.get("intent");
    const intent = asked === "set-version" || asked === "set-id-policy" ? asked : "rename";
    return data<Answer>({ intent, submission: submission.reply(), refusal: undefined }, { status: 400 });
  }
  const { value } = submission;
  const result = await act(caller, model, value);
  if (!result.ok)
    return data<Answer>(
      { intent: value.intent, submission: null, refusal: result.problems.map(formatProblem).join(" ") },
      { status: 409 },
    );
  return value.intent === "delete"
    ? redirect("/models")
    : data<Answer>({ intent: value.intent, submission: submission.reply(), refusal: undefined });
}

async function act(caller: Caller, model: ModelAccess["model"], form: AboutModelForm): Promise<Result<unknown>> {
  switch (form.intent) {
    case "rename":
      return ok(await renameModel(caller, model, form.name));
    case "set-version":
      return changeVersion(caller, model, form.version);
    case "set-required":
      return changeRequiredModels(caller, model, form.required);
    case "set-id-policy":
      return changeIdPolicy(caller, model, toIdPolicy(form));
    case "delete":
      return deleteModel(caller, model);
  }
}

export default function About({ loaderData, actionData }: Route.ComponentProps) {
  const workspace = useRouteLoaderData<ModelWorkspace>("routes/models.$modelId");
  if (!workspace) return null;
  return (
    <AboutModel
      workspace={workspace}
      required={loaderData.required}
      choices={loaderData.choices}
      idPolicy={loaderData.idPolicy}
      renumberings={loaderData.renumberings}
      answer={actionData}
      editBlockedBy={
        workspace.permissions.includes("model.edit") ? undefined : "asks for the role engineer or administrator"
      }
    />
  );
}
