import { data } from "react-router";
import type { Route } from "./+types/team.outbox";
import { assertMay, requireUser } from "~/auth/caller.server";
import { OutboxView } from "~/components/team/outbox-view";
import { formatProblem } from "~/domain/core/problem-texts";
import { chooseOrganization } from "~/presenters/chosen-organization.server";
import { retryMail } from "~/services/manage-outbox.server";
import { readOutbox } from "~/services/read-outbox.server";

export const meta: Route.MetaFunction = () => [{ title: "Outbox · Ferrule" }];

/** Mails hold what reviewers write; the outbox is the administrators'. */
export async function loader({ request }: Route.LoaderArgs) {
  const caller = await requireUser(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "organization.administer", organizationId);
  return readOutbox(organizationId);
}

export async function action({ request }: Route.ActionArgs) {
  const caller = await requireUser(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "organization.administer", organizationId);
  const retried = await retryMail(organizationId, String((await request.formData()).get("id") ?? ""));
  return data({ errors: retried.ok ? [] : retried.problems.map(formatProblem) }, { status: retried.ok ? 200 : 404 });
}

export default function Outbox({ loaderData }: Route.ComponentProps) {
  return <OutboxView page={loaderData} />;
}
