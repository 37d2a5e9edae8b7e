import type { Route } from "./+types/models.$modelId.signals";
import { requireModelForPage } from "~/auth/require-model.server";
import { useEditorState, useOpenModel } from "~/components/model/use-model";
import { SignalsView } from "~/components/signals/signals-view";
import { Progress } from "~/components/ui/progress";

export async function loader({ request, params }: Route.LoaderArgs) {
  const { model } = await requireModelForPage(request, params.modelId, "read");
  return { name: model.name };
}

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `Signal list for ${loaderData?.name ?? "the model"} · Ferrule` },
];

export default function Signals() {
  const model = useOpenModel();
  const { space } = useEditorState();
  if (!model.isReady)
    return (
      <main id="main" className="grid flex-1 place-content-center p-8">
        <h1 className="sr-only">Signal list</h1>
        <Progress stage="Loading the required models" className="w-96" />
      </main>
    );
  return (
    <SignalsView
      model={model}
      space={space}
      editBlockedBy={model.actions.canEdit ? undefined : "asks for the role engineer or administrator"}
    />
  );
}
