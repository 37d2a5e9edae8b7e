import { data, redirect } from "react-router";
import type { Route } from "./+types/models.$modelId.test-server";
import { mayDo } from "~/auth/caller.server";
import { requireModelForPage } from "~/auth/require-model.server";
import { TestServerPage } from "~/components/live/test-server-page";
import { listTestServers } from "~/presenters/list-test-servers.server";
import { readTestServerLog, requireTestServer } from "~/services/find-test-server.server";
import { startTestServer, testServerIntentSchema } from "~/services/start-test-server.server";
import { stopTestServer } from "~/services/stop-test-server.server";
import { requireFields } from "~/utils/parse-request.server";

export const meta: Route.MetaFunction = () => [{ title: "Test server · Ferrule" }];

export async function loader({ request, params }: Route.LoaderArgs) {
  const { caller, model } = await requireModelForPage(request, params.modelId, "read");
  const servers = listTestServers(model.organizationId, model.id);
  return {
    headSeq: model.headSeq,
    servers: servers.map((server) => ({ server, log: readTestServerLog(server.id) })),
    mayRun: mayDo(caller, "test-server.run", model.organizationId),
    hasMachines: model.kind === "machines",
  };
}

export async function action({ request, params }: Route.ActionArgs) {
  const { caller, model } = await requireModelForPage(request, params.modelId, "test-server.run");
  const form = await request.formData();
  const old = form.has("id") ? requireTestServer(caller, String(form.get("id")), "test-server.run") : undefined;
  if (old) await stopTestServer(old, caller);
  if (form.get("intent") === "stop") return redirect(`/models/${model.id}/test-server`);
  const intent = requireFields(testServerIntentSchema, old ? { security: old.security, simulatedQuality: old.simulatedQuality, values: old.feed ? "live" : "simulated" } : readChoice(form));
  const started = await startTestServer(model, caller, intent);
  if (!started.ok) return data({ problems: started.problems }, { status: 503 });
  return redirect(`/models/${model.id}/test-server`);
}

function readChoice(form: FormData): object {
  return {
    security: form.get("open") === "1" ? ["basic256sha256", "none"] : ["basic256sha256"],
    simulatedQuality: form.get("simulatedQuality") ?? undefined,
    values: form.get("values") ?? undefined,
  };
}

export default function TestServerRoute({ loaderData, actionData }: Route.ComponentProps) {
  return <TestServerPage {...loaderData} problems={actionData?.problems ?? []} />;
}
