import { Outlet, redirect, useMatches, useRouteLoaderData, type ShouldRevalidateFunctionArgs } from "react-router";
import type { Route } from "./+types/models.$modelId";
import { requireModelForPage } from "~/auth/require-model.server";
import { FindingCounts } from "~/components/model/finding-counts";
import { ModelStoreProvider } from "~/components/model/model-store-provider";
import { ModelTools } from "~/components/model/model-tools";
import { ModelBar, TestServerLink } from "~/components/models/model-bar";
import { ModelFoot } from "~/components/models/model-foot";
import type { FrameData } from "~/presenters/frame.server";
import { presentWorkspace } from "~/presenters/model-workspace.server";
import { describePins } from "~/services/pins.server";
import { loadWorkingModel } from "~/services/working-model.server";
import { failWith } from "~/utils/problem-response.server";

export async function loader({ request, params }: Route.LoaderArgs) {
  const { caller, model } = await requireModelForPage(request, params.modelId, "read");
  if (new URL(request.url).pathname.replace(/\/$/, "") === `/models/${model.id}`)
    throw redirect(`/models/${model.id}/sheet`);
  const working = await loadWorkingModel(model.id);
  if (!working) throw failWith(404, "request.not-found");
  return presentWorkspace(caller, working, await describePins(working.model));
}

/** The open model lives on between pages; only its About page changes what it was opened with. */
export function shouldRevalidate({ formAction, currentParams, nextParams }: ShouldRevalidateFunctionArgs) {
  return formAction === `/models/${currentParams.modelId ?? ""}/about` || currentParams.modelId !== nextParams.modelId;
}

/** A page whose drawing carries the title block itself says so: `export const handle = { drawsTitleBlock: true }`. */
function useDrawsTitleBlock(): boolean {
  return useMatches().some(
    ({ handle }) => typeof handle === "object" && handle !== null && "drawsTitleBlock" in handle,
  );
}

const noServers: FrameData["testServers"] = [];

export default function Model({ loaderData }: Route.ComponentProps) {
  const { model, permissions } = loaderData;
  const frame = useRouteLoaderData<FrameData>("routes/frame");
  const drawsTitleBlock = useDrawsTitleBlock();
  const base = `/models/${model.id}`;
  return (
    <ModelStoreProvider key={model.id} workspace={loaderData}>
      <ModelBar
        model={model}
        mayEdit={permissions.includes("model.edit")}
        tools={<ModelTools />}
        testServer={
          <TestServerLink
            modelId={model.id}
            organizationId={model.organizationId}
            known={frame?.testServers ?? noServers}
          />
        }
        tabs={[
          { to: `${base}/sheet`, label: "Sheet" },
          { to: `${base}/register`, label: "Register" },
          { to: `${base}/types`, label: "Types" },
          ...(model.kind === "types" ? [{ to: `${base}/survey`, label: "Survey" }] : []),
          { to: `${base}/mapping`, label: "Mapping" },
          ...(model.kind === "machines" ? [{ to: `${base}/roll-out`, label: "Roll-out" }] : []),
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
          { to: `${base}/as-built`, label: "As-built" },
        ]}
      />
      <div className="flex min-h-0 flex-1 flex-col">
        <Outlet />
      </div>
      {drawsTitleBlock ? null : <ModelFoot />}
    </ModelStoreProvider>
  );
}
