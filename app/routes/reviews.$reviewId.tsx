import { data, Outlet, redirect } from "react-router";
import type { Route } from "./+types/reviews.$reviewId";
import { assertMay } from "~/auth/caller.server";
import { requireReviewForPage, type ReviewAccess } from "~/auth/require-review.server";
import type { Action } from "~/auth/permissions";
import { ReviewBar } from "~/components/reviews/review-bar";
import { SignatureRow } from "~/components/reviews/signature-row";
import { useRevalidateOn } from "~/components/shell/use-revalidate-on";
import { Notice } from "~/components/ui/notice";
import { formatProblem } from "~/domain/core/problem-texts";
import { fail, problem, type Result } from "~/domain/core/result";
import { closeReview, followReview } from "~/services/ask-review.server";
import { addReviewComment, applySuggestion, commentSchema, settleComment } from "~/services/comment-review.server";
import { decideReview, decisionSchema } from "~/services/decide-review.server";
import { readReview } from "~/services/read-review.server";
import { releaseRevision, releaseSchema } from "~/services/release-revision.server";
import { failWith } from "~/utils/problem-response.server";

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `Review ${loaderData ? `${loaderData.page.review.number} ${loaderData.page.review.title}` : ""} · Ferrule` },
];

export async function loader({ request, params }: Route.LoaderArgs) {
  const { caller, model, review } = await requireReviewForPage(request, params.reviewId, "read");
  const page = await readReview(caller, model, review);
  if (!page) throw failWith(404, "request.not-found");
  return { organizationId: model.organizationId, page };
}

const needs: Readonly<Record<string, Action>> = {
  comment: "comment",
  settle: "comment",
  "apply-suggestion": "comment",
  decide: "review.decide",
  follow: "revision.freeze",
  close: "revision.freeze",
  release: "release",
};

export async function action({ request, params }: Route.ActionArgs) {
  const access = await requireReviewForPage(request, params.reviewId, "read");
  const form = await request.formData();
  const intent = String(form.get("intent") ?? "");
  assertMay(access.caller, needs[intent] ?? "read", access.model.organizationId);
  const result = await act(access, intent, form);
  if (!result.ok) return data({ intent, errors: result.problems.map(formatProblem) }, { status: 409 });
  if (intent === "release") throw redirect(`/releases/${(result.value as { id: string }).id}`);
  return data({ intent, errors: [] as string[] });
}

async function act({ caller, model, review }: ReviewAccess, intent: string, form: FormData): Promise<Result<unknown>> {
  const text = (name: string): string | undefined => {
    const value = form.get(name);
    return typeof value === "string" && value !== "" ? value : undefined;
  };
  const wrong = (message: string) => fail(problem("request.field", { field: intent, message }));
  switch (intent) {
    case "comment": {
      const fields = {
        text: text("text"),
        nodeKey: text("nodeKey"),
        change: text("change"),
        parentId: text("parentId"),
        takesBack: form.get("takesBack") === "yes",
      };
      const comment = commentSchema.safeParse(
        Object.fromEntries(Object.entries(fields).filter(([, value]) => value !== undefined)),
      );
      return comment.success ? addReviewComment(caller, model, review, comment.data) : wrong("write something");
    }
    case "settle":
      return settleComment(caller, model, text("commentId") ?? "", form.get("isSettled") === "yes");
    case "apply-suggestion":
      return applySuggestion(caller, model, review, text("commentId") ?? "");
    case "decide": {
      const decision = decisionSchema.safeParse({ decision: form.get("decision"), note: text("note") ?? "" });
      return decision.success
        ? decideReview(caller, model, review, decision.data)
        : wrong("approve, or ask for changes");
    }
    case "follow":
      return followReview(caller, model, review);
    case "close":
      return closeReview(caller, model, review);
    case "release": {
      const release = releaseSchema.safeParse({ version: text("version"), notes: text("notes") ?? "" });
      return release.success ? releaseRevision(caller, model, review, release.data) : wrong("write the version");
    }
    default:
      return fail(problem("request.field", { field: "intent", message: "unknown" }));
  }
}

export default function Review({ loaderData, actionData }: Route.ComponentProps) {
  const { page, organizationId } = loaderData;
  useRevalidateOn(`models:${organizationId}`);
  return (
    <>
      <ReviewBar page={page} />
      {actionData && actionData.errors.length > 0 ? (
        <Notice tone="error" title={actionData.errors.join(" ")} live className="mx-5 mt-2" />
      ) : null}
      <Outlet context={page} />
      <SignatureRow page={page} />
    </>
  );
}
