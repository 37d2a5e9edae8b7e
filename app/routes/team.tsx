import type { SubmissionResult } from "@conform-to/react";
import { parseWithZod } from "@conform-to/zod/v4";
import { data } from "react-router";
import type { Route } from "./+types/team";
import { assertMay, requireUser, type Caller } from "~/auth/caller.server";
import { AddPersonForm } from "~/components/team/add-person-form";
import { AuditBlock } from "~/components/team/audit-block";
import { PeopleTable } from "~/components/team/people-table";
import { teamSchema, type TeamIntent } from "~/components/team/team-forms";
import { RoleLegend } from "~/components/team/role-boxes";
import { TokensBlock } from "~/components/team/tokens-block";
import { LinkButton } from "~/components/ui/button";
import { Notice } from "~/components/ui/notice";
import { Block, Page } from "~/components/ui/page";
import { formatProblem } from "~/domain/core/problem-texts";
import type { Result } from "~/domain/core/result";
import { chooseOrganization } from "~/presenters/chosen-organization.server";
import { readTeamPage } from "~/presenters/team-page.server";
import { addPerson, removePerson, setPassword, setRoles } from "~/services/manage-people.server";
import { createToken, listVisibleTokens, revokeToken } from "~/services/manage-tokens.server";

export const meta: Route.MetaFunction = () => [{ title: "Team · Ferrule" }];

export async function loader({ request }: Route.LoaderArgs) {
  const caller = await requireUser(request);
  const organization = chooseOrganization(request, caller);
  assertMay(caller, "read", organization.organizationId);
  const [page, tokens] = await Promise.all([
    readTeamPage(caller, organization),
    listVisibleTokens(caller, organization.organizationId),
  ]);
  return { page, tokens, now: new Date().toISOString() };
}

type Answer = {
  intent: TeamIntent["intent"] | undefined;
  submission: SubmissionResult<string[]> | null;
  secret?: string;
  errors: readonly string[];
};

export async function action({ request }: Route.ActionArgs) {
  const caller = await requireUser(request);
  const { organizationId } = chooseOrganization(request, caller);
  const form = await request.formData();
  const submission = parseWithZod(form, { schema: teamSchema });
  if (submission.status !== "success") {
    const errors = Object.values(submission.error ?? {}).flatMap((texts) => texts ?? []);
    const intent = form.get("intent") === "add-person" ? "add-person" : undefined;
    return data<Answer>(
      { intent, submission: submission.reply({ hideFields: ["password"] }), errors },
      { status: 400 },
    );
  }
  const { value } = submission;
  const isOfTokens = value.intent === "create-token" || value.intent === "revoke-token";
  assertMay(caller, isOfTokens ? "read" : "organization.administer", organizationId);
  if (value.intent === "create-token") {
    const { secret } = await createToken(caller, organizationId, {
      name: value.name,
      scopes: [...new Set(["read" as const, ...value.scopes])],
      days: value.days,
    });
    return data<Answer>({ intent: value.intent, submission: null, secret, errors: [] });
  }
  const result = await act(caller, organizationId, value);
  const errors = result.ok ? [] : result.problems.map(formatProblem);
  const reply = result.ok
    ? submission.reply({ resetForm: true })
    : submission.reply({ formErrors: errors, hideFields: ["password"] });
  return data<Answer>({ intent: value.intent, submission: reply, errors }, { status: result.ok ? 200 : 422 });
}

function act(
  caller: Caller,
  organizationId: string,
  intent: Exclude<TeamIntent, { intent: "create-token" }>,
): Promise<Result<unknown>> {
  switch (intent.intent) {
    case "add-person":
      return addPerson(caller, organizationId, intent);
    case "set-roles":
      return setRoles(caller, organizationId, intent.userId, intent.roles);
    case "remove-person":
      return removePerson(caller, organizationId, intent.userId);
    case "set-password":
      return setPassword(caller, organizationId, intent.userId, intent.password);
    case "revoke-token":
      return revokeToken(caller, intent.tokenId);
  }
}

export default function Team({ loaderData, actionData }: Route.ComponentProps) {
  const { page, tokens, now } = loaderData;
  const isOfTokens = actionData?.intent === "create-token" || actionData?.intent === "revoke-token";
  const errors = actionData?.errors ?? [];
  return (
    <Page
      title="Team"
      actions={<LinkButton to="/team/settings">Approvals, webhooks, mail</LinkButton>}
      about={`${page.people.length} ${page.people.length === 1 ? "person" : "people"} of ${page.organizationName}`}
    >
      <div className="grid grid-cols-[minmax(0,1fr)_340px] gap-8 max-lg:grid-cols-1">
        <div className="grid content-start gap-8">
          <Block title="People" about={page.mayAdminister ? undefined : "an administrator changes people and roles"}>
            {errors.length > 0 && !isOfTokens && actionData?.intent !== "add-person" ? (
              <Notice tone="error" title={errors.join(" ")} live className="mb-3" />
            ) : null}
            <PeopleTable people={page.people} userId={page.userId} mayAdminister={page.mayAdminister} />
          </Block>
          <TokensBlock tokens={tokens} secret={actionData?.secret} errors={isOfTokens ? errors : []} now={now} />
          {page.mayAdminister ? <AuditBlock lines={page.audit} /> : null}
        </div>
        {page.mayAdminister ? (
          <Block title="Add a person" className="border-t-[1.5px] border-ink pt-2">
            <AddPersonForm
              lastResult={actionData?.intent === "add-person" ? actionData.submission : null}
              count={page.people.length}
            />
          </Block>
        ) : (
          <RoleLegend />
        )}
      </div>
    </Page>
  );
}
