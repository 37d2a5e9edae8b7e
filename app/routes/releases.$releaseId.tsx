import { data } from "react-router";
import type { Route } from "./+types/releases.$releaseId";
import type { Action } from "~/auth/permissions";
import { assertMay } from "~/auth/caller.server";
import { requireReleaseForPage } from "~/auth/require-review.server";
import { ReleaseView } from "~/components/releases/release-view";
import { useRevalidateOn } from "~/components/shell/use-revalidate-on";
import { formatProblem } from "~/domain/core/problem-texts";
import { fail, problem, type Result } from "~/domain/core/result";
import { advanceDelivery, deliverRelease, deliverSchema } from "~/services/deliver-release.server";
import { readRelease } from "~/services/read-release.server";
import { proveReproducible, withdrawRelease, withdrawSchema } from "~/services/release-revision.server";

export const meta: Route.MetaFunction = ({ loaderData }) => [
  {
    title: loaderData
      ? `${loaderData.page.release.model} ${loaderData.page.release.version} · Ferrule`
      : "Release · Ferrule",
  },
];

export async function loader({ request, params }: Route.LoaderArgs) {
  const { caller, model, release } = await requireReleaseForPage(request, params.releaseId, "read");
  return { organizationId: model.organizationId, page: await readRelease(caller, model, release) };
}

const needs: Readonly<Record<string, Action>> = { withdraw: "release", deliver: "release", loaded: "release" };

export async function action({ request, params }: Route.ActionArgs) {
  const { caller, model, release } = await requireReleaseForPage(request, params.releaseId, "read");
  const form = await request.formData();
  const intent = String(form.get("intent") ?? "");
  assertMay(caller, needs[intent] ?? "read", model.organizationId);
  if (intent === "rebuild") return data({ rebuilt: await proveReproducible(model, release), errors: [] as string[] });
  const result = await act();
  const errors = result.ok ? [] : result.problems.map(formatProblem);
  return data({ rebuilt: undefined, errors }, { status: result.ok ? 200 : 409 });

  async function act(): Promise<Result<unknown>> {
    if (intent === "withdraw") {
      const parsed = withdrawSchema.safeParse({ reason: form.get("reason") });
      return parsed.success
        ? withdrawRelease(caller, model, release, parsed.data.reason)
        : fail(problem("request.field", { field: "reason", message: "say why" }));
    }
    if (intent === "deliver") {
      const parsed = deliverSchema.safeParse({ gatewayId: form.get("gatewayId"), note: form.get("note") ?? "" });
      return parsed.success
        ? deliverRelease(caller, model, release, parsed.data)
        : fail(problem("delivery.no-gateway"));
    }
    if (intent === "loaded")
      return advanceDelivery(caller, model, release, String(form.get("deliveryId") ?? ""), "loaded");
    return fail(problem("request.field", { field: "intent", message: "unknown" }));
  }
}

export default function Release({ loaderData, actionData }: Route.ComponentProps) {
  useRevalidateOn(`models:${loaderData.organizationId}`);
  return <ReleaseView page={loaderData.page} errors={actionData?.errors ?? []} />;
}
