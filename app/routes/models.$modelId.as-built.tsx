import { data } from "react-router";
import type { Route } from "./+types/models.$modelId.as-built";
import { mayDo } from "~/auth/caller.server";
import { requireModelForPage } from "~/auth/require-model.server";
import { AsBuiltView, type AsBuiltAnswer } from "~/components/as-built/as-built-view";
import { formatProblem } from "~/domain/core/problem-texts";
import { presentAsBuiltPage } from "~/presenters/as-built-page.server";
import { requireLiveTarget } from "~/services/live-target.server";
import { asBuiltIntentSchema, startAsBuilt } from "~/services/make-as-built.server";
import { listAsBuilt } from "~/services/read-as-built.server";
import { removeSchedule, saveSchedule, scheduleSchema } from "~/services/schedule-as-built.server";
import { loadWorkingModel } from "~/services/working-model.server";
import { pointCheckSchema, recordPointCheck } from "~/services/record-point-check.server";

export const meta: Route.MetaFunction = ({ loaderData }) => [{ title: `As-built of ${loaderData?.name ?? "the model"} · Ferrule` }];

export async function loader({ request, params }: Route.LoaderArgs) {
  const { caller, model } = await requireModelForPage(request, params.modelId, "read");
  const [page, reports] = await Promise.all([loadWorkingModel(model.id).then((working) => presentAsBuiltPage(model, working?.space)), listAsBuilt(model.id)]);
  return { name: model.name, modelId: model.id, ...page, reports, mayRecord: mayDo(caller, "as-built.record", model.organizationId) };
}

export async function action({ request, params }: Route.ActionArgs) {
  const { caller, model } = await requireModelForPage(request, params.modelId, "as-built.record");
  const form = await request.formData();
  if (form.get("intent") === "schedule" || form.get("intent") === "unschedule") return changeSchedule(caller, model, form);
  if (form.get("intent") === "point-check") {
    const fields = Object.fromEntries([...form].filter(([name, value]) => name !== "intent" && value !== ""));
    const parsed = pointCheckSchema.safeParse(fields);
    if (!parsed.success) return data<AsBuiltAnswer>({ errors: parsed.error.issues.map((issue) => `${issue.path.join(".")}: ${issue.message}`) }, { status: 400 });
    const recorded = await recordPointCheck(caller, model, parsed.data);
    return recorded.ok ? data<AsBuiltAnswer>({ errors: [], isRecorded: true }, { status: 200 }) : data<AsBuiltAnswer>({ errors: recorded.problems.map(formatProblem) }, { status: 422 });
  }
  const ignored = String(form.get("ignored") ?? "").split("\n").map((line) => line.trim()).filter(Boolean);
  const state = String(form.get("state") ?? "");
  const deliveryId = /^delivery (.+)$/.exec(state)?.[1];
  const parsed = asBuiltIntentSchema.safeParse({
    targetId: form.get("targetId"),
    ...(deliveryId === undefined ? { state } : { state: "working", deliveryId }),
    watchSeconds: form.get("watchSeconds"),
    tolerance: { ignored, range: 0, areTextsChecked: form.get("texts") === "on" },
  });
  if (!parsed.success) return data<AsBuiltAnswer>({ errors: parsed.error.issues.map((issue) => `${issue.path.join(".")}: ${issue.message}`) }, { status: 400 });
  const target = await requireLiveTarget(caller, parsed.data.targetId, "read");
  const run = await startAsBuilt(caller, model, target, parsed.data);
  return run.ok ? data<AsBuiltAnswer>({ errors: [], runId: run.value.id }, { status: 202 }) : data<AsBuiltAnswer>({ errors: run.problems.map(formatProblem) }, { status: 422 });
}

async function changeSchedule(caller: Parameters<typeof saveSchedule>[0], model: Parameters<typeof saveSchedule>[1], form: FormData) {
  if (form.get("intent") === "unschedule") {
    await removeSchedule(caller, model, String(form.get("id") ?? ""));
    return data<AsBuiltAnswer>({ errors: [] }, { status: 200 });
  }
  const parsed = scheduleSchema.safeParse({ endpointId: form.get("endpointId"), everyMinutes: form.get("everyMinutes") });
  if (!parsed.success) return data<AsBuiltAnswer>({ errors: parsed.error.issues.map((issue) => `${issue.path.join(".")}: ${issue.message}`) }, { status: 400 });
  const saved = await saveSchedule(caller, model, parsed.data);
  return saved.ok ? data<AsBuiltAnswer>({ errors: [] }, { status: 200 }) : data<AsBuiltAnswer>({ errors: saved.problems.map(formatProblem) }, { status: 422 });
}

export default function AsBuilt({ loaderData, actionData }: Route.ComponentProps) {
  return <AsBuiltView {...loaderData} answer={actionData} />;
}
