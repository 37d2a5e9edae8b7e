import { Outlet, redirect, useMatches, type ShouldRevalidateFunctionArgs } from "react-router";
import type { Route } from "./+types/models.$modelId";
import { requireModelForPage } from "~/auth/require-model.server";
import { FindingCounts } from "~/components/model/finding-counts";
import { ModelStoreProvider } from "~/components/model/model-store-provider";
import { ModelTools } from "~/components/model/model-tools";
import { ModelBar, TestServerLink } from "~/components/models/model-bar";
import { ModelFoot } from "~/components/models/model-foot";
import { listTestServers } from "~/presenters/list-test-servers.server";
import { presentWorkspace } from "~/presenters/model-workspace.server";
import { loadWorkingModel } from "~/services/working-model.server";
import { failWith } from "~/utils/problem-response.server";

export async function loader({ request, params }: Route.LoaderArgs) {
  const { caller, model } = await requireModelForPage(request, params.modelId, "read");
  if (new URL(request.url).pathname.replace(/\/$/, "") === `/models/${model.id}`)
    throw redirect(`/models/${model.id}/sheet`);
  const working = await loadWorkingModel(model.id);
  if (!working) throw failWith(404, "request.not-found");
  const isServed = listTestServers(model.organizationId, model.id).some((server) => server.state === "running");
  return { ...(await presentWorkspace(caller, working)), isServed };
}

/** The pages inside keep their own state; only a form or another model asks for the workspace anew. */
export function shouldRevalidate({ formMethod, currentParams, nextParams }: ShouldRevalidateFunctionArgs) {
  return (formMethod !== undefined && formMethod !== "GET") || currentParams.modelId !== nextParams.modelId;
}

/** A page whose drawing carries the title block itself says so: `export const handle = { drawsTitleBlock: true }`. */
function useDrawsTitleBlock(): boolean {
  return useMatches().some(
    ({ handle }) => typeof handle === "object" && handle !== null && "drawsTitleBlock" in handle,
  );
}

export default function Model({ loaderData }: Route.ComponentProps) {
  const { model, permissions, isServed } = loaderData;
  const drawsTitleBlock = useDrawsTitleBlock();
  const base = `/models/${model.id}`;
  return (
    <ModelStoreProvider key={model.id} workspace={loaderData}>
      <ModelBar
        model={model}
        mayEdit={permissions.includes("model.edit")}
        tools={<ModelTools />}
        testServer={<TestServerLink modelId={model.id} isRunning={isServed} />}
        tabs={[
          { to: `${base}/sheet`, label: "Sheet" },
          { to: `${base}/register`, label: "Register" },
          { to: `${base}/types`, label: "Types" },
          {
            to: `${base}/findings`,
            label: (
              <>
                Findings <FindingCounts />
              </>
            ),
          },
          { to: `${base}/source`, label: "Source text" },
          { to: `${base}/revisions`, label: "Revisions" },
        ]}
      />
      <div className="flex min-h-0 flex-1 flex-col">
        <Outlet />
      </div>
      {drawsTitleBlock ? null : <ModelFoot />}
    </ModelStoreProvider>
  );
}
