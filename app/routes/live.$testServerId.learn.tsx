import { data } from "react-router";
import type { Route } from "./+types/live.$testServerId.learn";
import { assertMay, requireUser } from "~/auth/caller.server";
import { LearnView } from "~/components/live/learn-view";
import { listServedNamespaces, previewLearning } from "~/services/learn-model.server";
import { requireLiveTarget } from "~/services/live-target.server";
import { toProblemJson } from "~/utils/problem-response.server";

export const meta: Route.MetaFunction = ({ loaderData }) => [{ title: `Learn from ${loaderData?.name ?? "a server"} · Ferrule` }];

async function requireTarget(request: Request, id: string) {
  const caller = await requireUser(request);
  const target = await requireLiveTarget(caller, id, "read");
  assertMay(caller, "model.edit", target.organizationId);
  return { caller, target };
}

export async function loader({ request, params }: Route.LoaderArgs) {
  const { target } = await requireTarget(request, params.testServerId);
  const served = await listServedNamespaces(target.organizationId, target);
  const { id, name, endpointUrl } = target;
  return { id, name, endpointUrl, namespaces: served.ok ? served.value : [], problems: served.ok ? [] : served.problems.map(toProblemJson) };
}

export async function action({ request, params }: Route.ActionArgs) {
  const { caller, target } = await requireTarget(request, params.testServerId);
  const namespaceUri = String((await request.formData()).get("namespaceUri") ?? "");
  const preview = await previewLearning(caller, target, namespaceUri, request.signal);
  return preview.ok ? data({ preview: preview.value, problems: [] }, { status: 200 }) : data({ preview: null, problems: preview.problems.map(toProblemJson) }, { status: 422 });
}

export default function Learn({ loaderData, actionData }: Route.ComponentProps) {
  return <LearnView {...loaderData} preview={actionData?.preview ?? null} refusals={actionData?.problems ?? []} />;
}
