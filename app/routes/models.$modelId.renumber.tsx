import type { Route } from "./+types/models.$modelId.renumber";
import { requireModelForPage } from "~/auth/require-model.server";
import { RenumberingsTable } from "~/components/models/renumberings-table";
import { useEditorState, useOpenModel } from "~/components/model/use-model";
import { RenumberView } from "~/components/renumber/renumber-view";
import { Progress } from "~/components/ui/progress";
import { listRenumberings } from "~/presenters/renumberings.server";

export async function loader({ request, params }: Route.LoaderArgs) {
  const { model } = await requireModelForPage(request, params.modelId, "read");
  return { name: model.name, modelId: model.id, record: await listRenumberings(model.id) };
}

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `Renumber ${loaderData?.name ?? "the model"} · Ferrule` },
];

export default function Renumber({ loaderData }: Route.ComponentProps) {
  const model = useOpenModel();
  const { space } = useEditorState();
  return (
    <main id="main" className="min-h-0 flex-1 overflow-y-auto px-5 py-4">
      <h1 className="mb-2 text-title font-semibold">Renumber nodes</h1>
      {model.isReady ? (
        <RenumberView
          space={space}
          editBlockedBy={model.actions.canEdit ? undefined : "asks for the role engineer or administrator"}
          record={
            <section aria-label="Record" className="grid gap-2 border-t-[1.5px] border-ink pt-3">
              <h2 className="flex items-center gap-3 text-lead font-semibold">
                Record
                <a
                  href={`/models/${loaderData.modelId}/renumberings.csv`}
                  download
                  className="text-small font-normal underline decoration-rule underline-offset-3 hover:text-copper"
                >
                  Download all as CSV
                </a>
              </h2>
              <RenumberingsTable list={loaderData.record} />
            </section>
          }
        />
      ) : (
        <Progress stage="Loading the required models" className="w-96" />
      )}
    </main>
  );
}
