import { useSearchParams } from "react-router";
import type { Route } from "./+types/models.$modelId.types";
import { requireModelForPage } from "~/auth/require-model.server";
import { useEditorState, useOpenModel } from "~/components/model/use-model";
import { TypesView } from "~/components/types/types-view";
import { Progress } from "~/components/ui/progress";
import type { NodeKey } from "~/domain/address-space/node-id";

export async function loader({ request, params }: Route.LoaderArgs) {
  const { model } = await requireModelForPage(request, params.modelId, "read");
  return { name: model.name };
}

/** Which type is shown is the browser's business. */
export function shouldRevalidate() {
  return false;
}

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `Types for ${loaderData?.name ?? "the model"} · Ferrule` },
];

export default function Types() {
  const model = useOpenModel();
  const { space } = useEditorState();
  const [search, setSearch] = useSearchParams();
  if (!model.isReady)
    return (
      <main id="main" className="grid flex-1 place-content-center p-8">
        <h1 className="sr-only">Types</h1>
        <Progress stage="Loading the required models" className="w-96" />
      </main>
    );
  const wanted = search.get("type") as NodeKey | null;
  return (
    <TypesView
      model={model}
      space={space}
      shown={wanted !== null && space.getNode(wanted) ? wanted : undefined}
      onShow={(type) => setSearch({ type }, { replace: true, preventScrollReset: true })}
      editBlockedBy={model.actions.canEdit ? undefined : "asks for the role engineer or administrator"}
    />
  );
}
