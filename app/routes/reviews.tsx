import { data, redirect } from "react-router";
import type { Route } from "./+types/reviews";
import { assertMay, mayDo, requireUser } from "~/auth/caller.server";
import { findModelOf } from "~/auth/require-model.server";
import { ReviewsView } from "~/components/reviews/reviews-view";
import { useRevalidateOn } from "~/components/shell/use-revalidate-on";
import { formatProblem } from "~/domain/core/problem-texts";
import { chooseOrganization } from "~/presenters/chosen-organization.server";
import { askReview, askReviewSchema } from "~/services/ask-review.server";
import { readReleases } from "~/services/read-release.server";
import { readReviewChoices, readReviews } from "~/services/read-review.server";

export const meta: Route.MetaFunction = () => [{ title: "Reviews · Ferrule" }];

export async function loader({ request }: Route.LoaderArgs) {
  const caller = await requireUser(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "read", organizationId);
  const [reviews, releases, choices] = await Promise.all([
    readReviews(caller, organizationId),
    readReleases(organizationId),
    readReviewChoices(caller, organizationId),
  ]);
  return {
    organizationId,
    reviews,
    releases,
    choices,
    chosenModel: new URL(request.url).searchParams.get("model") ?? undefined,
    blockedBy: mayDo(caller, "revision.freeze", organizationId)
      ? undefined
      : "asks for the role engineer, integrator or administrator",
  };
}

/** Asks for a review. */
export async function action({ request }: Route.ActionArgs) {
  const caller = await requireUser(request);
  const form = await request.formData();
  const model = await findModelOf(caller, String(form.get("modelId") ?? ""), "revision.freeze");
  const intent = askReviewSchema.safeParse({ title: form.get("title"), reviewers: form.getAll("reviewers") });
  if (!intent.success) return data({ errors: ["Say what it is about, and name a reviewer."] }, { status: 400 });
  const asked = await askReview(caller, model, intent.data);
  return asked.ok
    ? redirect(`/reviews/${asked.value.id}`)
    : data({ errors: asked.problems.map(formatProblem) }, { status: 409 });
}

export default function Reviews({ loaderData, actionData }: Route.ComponentProps) {
  const { organizationId, ...page } = loaderData;
  useRevalidateOn(`models:${organizationId}`);
  return <ReviewsView {...page} errors={actionData?.errors ?? []} />;
}
