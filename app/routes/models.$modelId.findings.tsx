import { useSyncExternalStore } from "react";
import type { Route } from "./+types/models.$modelId.findings";
import { requireModelForPage } from "~/auth/require-model.server";
import { FindingsView } from "~/components/findings/findings-view";
import { mendFindings } from "~/components/findings/mend-findings";
import { acceptFinding, reopenFinding } from "~/components/model/follow-waivers";
import { useEditorState, useOpenModel } from "~/components/model/use-model";
import { Progress } from "~/components/ui/progress";

export async function loader({ request, params }: Route.LoaderArgs) {
  const { model } = await requireModelForPage(request, params.modelId, "read");
  return { name: model.name };
}

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `Findings of ${loaderData?.name ?? "the model"} · Ferrule` },
];

export default function Findings() {
  const model = useOpenModel();
  const { workspace, findings } = model;
  const { space } = useEditorState();
  const found = useSyncExternalStore(findings.subscribe, findings.getState, findings.getState);
  const mayEdit = workspace.permissions.includes("model.edit");
  if (!found.isKnown)
    return (
      <main id="main" className="grid flex-1 place-content-center p-8">
        <h1 className="sr-only">Findings</h1>
        <Progress
          stage="Loading the required models and checking"
          className="w-96"
          {...(found.progress === undefined ? {} : { done: found.progress })}
        />
      </main>
    );
  return (
    <FindingsView
      findings={found.findings}
      waived={found.waived}
      ownNodes={space.own.nodes.size}
      progress={found.progress}
      tools={{
        space,
        modelId: workspace.model.id,
        mend: mayEdit ? (list) => mendFindings(model, list) : undefined,
        mendBlockedBy: mayEdit ? undefined : "asks for the role engineer or administrator",
        accept: mayEdit ? (finding, reason) => acceptFinding(workspace.model.id, finding, reason) : undefined,
        reopen: mayEdit ? (waiverId) => reopenFinding(workspace.model.id, waiverId) : undefined,
      }}
    />
  );
}
