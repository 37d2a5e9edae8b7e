import { parseWithZod } from "@conform-to/zod/v4";
import { data, redirect } from "react-router";
import type { Route } from "./+types/models.new";
import { assertMay, requireUser } from "~/auth/caller.server";
import { NewModelForm } from "~/components/models/new-model-form";
import { toNamespacePart } from "~/components/models/propose-namespace";
import { Page } from "~/components/ui/page";
import { formatProblem } from "~/domain/core/problem-texts";
import { retrofitRequiredModels } from "~/domain/editing/starters/retrofit-models";
import { chooseOrganization } from "~/presenters/chosen-organization.server";
import { readNewModelPage } from "~/presenters/new-model-page.server";
import { createModel } from "~/services/create-model.server";
import { listLibraryChoices } from "~/services/list-library-choices.server";
import { newModelSchema as schema } from "~/utils/model-forms";

export const meta: Route.MetaFunction = () => [{ title: "New model · Ferrule" }];

export async function loader({ request }: Route.LoaderArgs) {
  const caller = await requireUser(request);
  const organization = chooseOrganization(request, caller);
  assertMay(caller, "model.edit", organization.organizationId);
  const [page, choices] = await Promise.all([
    readNewModelPage(organization),
    listLibraryChoices(organization.organizationId),
  ]);
  return { ...page, choices };
}

export async function action({ request }: Route.ActionArgs) {
  const caller = await requireUser(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "model.edit", organizationId);
  const submission = parseWithZod(await request.formData(), { schema });
  if (submission.status !== "success") return data(submission.reply(), { status: 400 });
  const { required, start, ...intent } = submission.value;
  const requiredModels = start === "retrofit" ? [...new Set([...required, ...retrofitRequiredModels])] : required;
  const result = await createModel(caller, organizationId, {
    ...intent,
    requiredModels,
    ...(start === "retrofit" ? { retrofitOf: toNamespacePart(intent.name) || "Machine" } : {}),
  });
  if (!result.ok) return data(submission.reply({ formErrors: result.problems.map(formatProblem) }), { status: 422 });
  if (start === "signals") return redirect(`/models/${result.value.id}/signals`);
  return redirect(`/models/${result.value.id}/sheet`);
}

export default function NewModel({ loaderData, actionData }: Route.ComponentProps) {
  return (
    <Page title="New model" about="One namespace that your team writes. The namespace’s metadata is made with it.">
      <NewModelForm lastResult={actionData ?? null} {...loaderData} />
    </Page>
  );
}
