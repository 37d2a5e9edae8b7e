import { data } from "react-router";
import type { Route } from "./+types/team.settings";
import { assertMay, mayDo, requireUser } from "~/auth/caller.server";
import { SettingsView } from "~/components/team/settings-view";
import { formatProblem } from "~/domain/core/problem-texts";
import { chooseOrganization } from "~/presenters/chosen-organization.server";
import { addWebhook, policySchema, removeWebhook, setMailRefusal, setReleasePolicy, webhookSchema } from "~/services/manage-outbox.server";
import { readSettings } from "~/services/read-outbox.server";
import { isMailKind } from "~/utils/mail-kinds";

export const meta: Route.MetaFunction = () => [{ title: "Approvals, webhooks, mail · Ferrule" }];

export async function loader({ request }: Route.LoaderArgs) {
  const caller = await requireUser(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "read", organizationId);
  const mayAdminister = mayDo(caller, "organization.administer", organizationId);
  const page = await readSettings(caller.userId, organizationId);
  return { page: mayAdminister ? page : { ...page, webhooks: [] }, mayAdminister };
}

type Answer = { errors: readonly string[]; secret?: string };

export async function action({ request }: Route.ActionArgs) {
  const caller = await requireUser(request);
  const { organizationId } = chooseOrganization(request, caller);
  const form = await request.formData();
  const intent = form.get("intent");
  assertMay(caller, intent === "mail" ? "read" : "organization.administer", organizationId);
  switch (intent) {
    case "mail": {
      const kind = String(form.get("kind"));
      if (isMailKind(kind)) await setMailRefusal(caller.userId, kind, form.get("wanted") === null);
      return data<Answer>({ errors: [] });
    }
    case "approvals": {
      const parsed = policySchema.safeParse({ approvals: form.get("approvals") });
      if (!parsed.success) return data<Answer>({ errors: parsed.error.issues.map((issue) => issue.message) }, { status: 400 });
      await setReleasePolicy(caller, organizationId, parsed.data.approvals);
      return data<Answer>({ errors: [] });
    }
    case "add-webhook": {
      const parsed = webhookSchema.safeParse({ url: form.get("url") });
      if (!parsed.success) return data<Answer>({ errors: parsed.error.issues.map((issue) => issue.message) }, { status: 400 });
      const added = await addWebhook(caller, organizationId, parsed.data.url);
      return added.ok
        ? data<Answer>({ errors: [], secret: added.value.secret })
        : data<Answer>({ errors: added.problems.map(formatProblem) }, { status: 422 });
    }
    default: {
      const removed = await removeWebhook(caller, organizationId, String(form.get("webhookId") ?? ""));
      return data<Answer>({ errors: removed.ok ? [] : removed.problems.map(formatProblem) }, { status: removed.ok ? 200 : 404 });
    }
  }
}

export default function Settings({ loaderData, actionData }: Route.ComponentProps) {
  return <SettingsView {...loaderData} errors={actionData?.errors ?? []} secret={actionData?.secret} />;
}
