import { data, redirect, redirectDocument, type ShouldRevalidateFunctionArgs } from "react-router";
import type { Route } from "./+types/models.$modelId.roll-out";
import { requireModelForPage } from "~/auth/require-model.server";
import { useEditorState, useOpenModel } from "~/components/model/use-model";
import { RollOutPage } from "~/components/roll-out/roll-out-page";
import { Progress } from "~/components/ui/progress";
import { formatProblem } from "~/domain/core/problem-texts";
import type { Problem } from "~/domain/core/result";
import { holdTypes } from "~/services/hold-types.server";
import { describePins } from "~/services/pins.server";
import { rollOut, rollOutSchema } from "~/services/roll-out-machines.server";
import { previewRevision, takeRevision, takeRevisionSchema } from "~/services/take-revision.server";
import { failWith } from "~/utils/problem-response.server";

export async function loader({ request, params }: Route.LoaderArgs) {
  const { model } = await requireModelForPage(request, params.modelId, "read");
  const pins = await describePins(model);
  const query = new URL(request.url).searchParams;
  const pin = pins.find((one) => one.modelUri === query.get("of")) ?? pins[0];
  const number = query.get("take");
  const previewed =
    pin && number !== null && /^\d{1,9}$/.test(number)
      ? await previewRevision(model, pin.modelUri, Number(number))
      : undefined;
  return {
    name: model.name,
    pins,
    isHeld: model.pins !== null,
    preview: previewed?.ok ? previewed.value : null,
    refusal: previewed && !previewed.ok ? toText(previewed.problems) : null,
  };
}

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `Roll-out into ${loaderData?.name ?? "the model"} · Ferrule` },
];

/** Edits in other windows do not change the page under the hand that fills it. */
export function shouldRevalidate({ currentUrl, nextUrl, formMethod }: ShouldRevalidateFunctionArgs) {
  return formMethod === "POST" || currentUrl.search !== nextUrl.search;
}

export async function action({ request, params }: Route.ActionArgs) {
  const { caller, model } = await requireModelForPage(request, params.modelId, "mapping.edit");
  if (model.kind !== "machines") throw failWith(404, "request.not-found");
  const form = await request.formData();
  if (form.has("take")) {
    const intent = takeRevisionSchema.safeParse(parseJson(form.get("take")));
    if (!intent.success) return data({ refusal: "Choose the revision anew." }, { status: 400 });
    const taken = await takeRevision(caller, model, intent.data);
    if (!taken.ok) return data({ refusal: toText(taken.problems) }, { status: 422 });
    // The open model stands on other types now, so the whole page is loaded anew.
    return redirectDocument(`/models/${model.id}/roll-out`);
  }
  if (form.has("hold")) {
    const held = await holdTypes(caller, model);
    if (!held.ok) return data({ refusal: toText(held.problems) }, { status: 422 });
    return redirectDocument(`/models/${model.id}/roll-out`);
  }
  const intent = rollOutSchema.safeParse(parseJson(form.get("intent")));
  if (!intent.success)
    return data({ refusal: "The table is incomplete: every machine needs a name." }, { status: 400 });
  const result = await rollOut(caller, model, intent.data);
  if (!result.ok) return data({ refusal: toText(result.problems) }, { status: 422 });
  const { first } = result.value;
  return redirect(`/models/${model.id}/register${first === undefined ? "" : `?node=${encodeURIComponent(first)}`}`);
}

function toText(problems: readonly Problem[]): string {
  return problems.map(formatProblem).join(" ");
}

function parseJson(text: FormDataEntryValue | null): unknown {
  try {
    return JSON.parse(typeof text === "string" ? text : "null");
  } catch {
    return null;
  }
}

export default function RollOut({ loaderData, actionData }: Route.ComponentProps) {
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
    <RollOutPage
      space={space}
      clientId={model.editor.clientId}
      pins={loaderData.pins}
      isHeld={loaderData.isHeld}
      preview={loaderData.preview}
      refusal={actionData?.refusal ?? loaderData.refusal ?? undefined}
      editBlockedBy={
        model.workspace.permissions.includes("mapping.edit")
          ? undefined
          : "asks for the role integrator, engineer or administrator"
      }
    />
  );
}
