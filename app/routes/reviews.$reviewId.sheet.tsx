import { useOutletContext } from "react-router";
import type { Route } from "./+types/reviews.$reviewId.sheet";
import { requireReviewForPage } from "~/auth/require-review.server";
import { OverlaidCards } from "~/components/reviews/overlaid-cards";
import { readSideBySide } from "~/services/read-review-texts.server";
import type { ReviewPage } from "~/services/read-review.server";

export async function loader({ request, params }: Route.LoaderArgs) {
  const { model, review } = await requireReviewForPage(request, params.reviewId, "read");
  return { owners: await readSideBySide(model, review) };
}

export default function ReviewSheet({ loaderData }: Route.ComponentProps) {
  const page = useOutletContext<ReviewPage>();
  return <OverlaidCards owners={loaderData.owners} names={[page.base.name, page.revision.name]} />;
}
