import { data } from "react-router";
import { z } from "zod";
import type { Route } from "./+types/live.endpoints";
import { assertMay, mayDo, requireUser, type Caller } from "~/auth/caller.server";
import { EndpointsView, type EndpointsAnswer } from "~/components/live/endpoints-view";
import { formatProblem } from "~/domain/core/problem-texts";
import type { Result } from "~/domain/core/result";
import { chooseOrganization } from "~/presenters/chosen-organization.server";
import { readEndpointsPage } from "~/presenters/endpoints-page.server";
import { allowanceIntentSchema, allowPlace, discoverServer, endpointIntentSchema, forbidPlace, removeEndpoint, saveEndpoint } from "~/services/manage-endpoints.server";

export const meta: Route.MetaFunction = () => [{ title: "Endpoints · Ferrule" }];

export async function loader({ request }: Route.LoaderArgs) {
  const caller = await requireUser(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "read", organizationId);
  const isAdministrator = mayDo(caller, "organization.administer", organizationId);
  return { ...(await readEndpointsPage(organizationId)), isAdministrator, now: new Date().toISOString() };
}

const id = z.string().min(1).max(100);
const intentSchema = z.discriminatedUnion("intent", [
  z.strictObject({ intent: z.literal("discover"), url: z.string().trim().min(1).max(500) }),
  endpointIntentSchema.extend({ intent: z.literal("save") }),
  z.strictObject({ intent: z.literal("remove"), id }),
  allowanceIntentSchema.extend({ intent: z.literal("allow") }),
  z.strictObject({ intent: z.literal("forbid"), id }),
]);
type Intent = z.infer<typeof intentSchema>;

export async function action({ request }: Route.ActionArgs) {
  const caller = await requireUser(request);
  const { organizationId } = chooseOrganization(request, caller);
  const fields = [...(await request.formData())].filter(([, value]) => value !== "");
  const parsed = intentSchema.safeParse(Object.fromEntries(fields));
  if (!parsed.success) {
    const errors = parsed.error.issues.map((issue) => `${issue.path.join(".")}: ${issue.message}`);
    return data<EndpointsAnswer>({ errors }, { status: 400 });
  }
  const isOfAdministrator = parsed.data.intent === "allow" || parsed.data.intent === "forbid";
  assertMay(caller, isOfAdministrator ? "organization.administer" : "test-server.run", organizationId);
  const result = await act(caller, organizationId, parsed.data);
  return result.ok
    ? data<EndpointsAnswer>({ errors: [], done: parsed.data.intent, ...result.value }, { status: 200 })
    : data<EndpointsAnswer>({ errors: result.problems.map(formatProblem) }, { status: 422 });
}

async function act(caller: Caller, organizationId: string, intent: Intent): Promise<Result<Pick<EndpointsAnswer, "discovery"> | null>> {
  switch (intent.intent) {
    case "discover": {
      const found = await discoverServer(organizationId, intent.url);
      return found.ok ? { ...found, value: { discovery: { url: intent.url, ...found.value } } } : found;
    }
    case "save": {
      const { intent: _intent, ...endpoint } = intent;
      const saved = await saveEndpoint(caller, organizationId, endpoint);
      return saved.ok ? { ...saved, value: null } : saved;
    }
    case "remove":
      return removeEndpoint(caller, organizationId, intent.id);
    case "allow":
      return allowPlace(caller, organizationId, intent);
    case "forbid":
      return forbidPlace(caller, organizationId, intent.id);
  }
}

export default function Endpoints({ loaderData, actionData }: Route.ComponentProps) {
  return <EndpointsView {...loaderData} answer={actionData} />;
}
