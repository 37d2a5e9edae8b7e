import { data, redirect } from "react-router";
import type { Route } from "./+types/models.$modelId.roll-out";
import { requireModelForPage } from "~/auth/require-model.server";
import { useEditorState, useOpenModel } from "~/components/model/use-model";
import { RollOutView } from "~/components/roll-out/roll-out-view";
import { Progress } from "~/components/ui/progress";
import { formatProblem } from "~/domain/core/problem-texts";
import { rollOut, rollOutSchema } from "~/services/roll-out-machines.server";
import { failWith } from "~/utils/problem-response.server";

export async function loader({ request, params }: Route.LoaderArgs) {
  const { model } = await requireModelForPage(request, params.modelId, "read");
  return { name: model.name };
}

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `Roll-out into ${loaderData?.name ?? "the model"} · Ferrule` },
];

export async function action({ request, params }: Route.ActionArgs) {
  const { caller, model } = await requireModelForPage(request, params.modelId, "mapping.edit");
  if (model.kind !== "machines") throw failWith(404, "request.not-found");
  const intent = rollOutSchema.safeParse(parseJson((await request.formData()).get("intent")));
  if (!intent.success)
    return data({ refusal: "The table is incomplete: every machine needs a name." }, { status: 400 });
  const result = await rollOut(caller, model, intent.data);
  if (!result.ok) return data({ refusal: result.problems.map(formatProblem).join(" ") }, { status: 422 });
  const { first } = result.value;
  return redirect(`/models/${model.id}/register${first === undefined ? "" : `?node=${encodeURIComponent(first)}`}`);
}

function parseJson(text: FormDataEntryValue | null): unknown {
  try {
    return JSON.parse(typeof text === "string" ? text : "null");
  } catch {
    return null;
  }
}

export default function RollOut({ actionData }: Route.ComponentProps) {
  const model = useOpenModel();
  const { space } = useEditorState();
  if (!model.isReady)
    return (
      <main id="main" className="grid flex-1 place-content-center p-8">
        <h1 className="sr-only">Roll-out</h1>
        <Progress stage="Loading the required models" className="w-96" />
      </main>
    );
  return (
    <RollOutView
      space={space}
      refusal={actionData?.refusal}
      editBlockedBy={
        model.workspace.permissions.includes("mapping.edit")
          ? undefined
          : "asks for the role integrator, engineer or administrator"
      }
    />
  );
}
