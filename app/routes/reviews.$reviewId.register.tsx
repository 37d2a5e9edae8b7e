import { useOutletContext } from "react-router";
import type { Route } from "./+types/reviews.$reviewId.register";
import { requireReviewForPage } from "~/auth/require-review.server";
import { SideBySide } from "~/components/reviews/side-by-side";
import { readSideBySide } from "~/services/read-review-texts.server";
import type { ReviewPage } from "~/services/read-review.server";

export async function loader({ request, params }: Route.LoaderArgs) {
  const { model, review } = await requireReviewForPage(request, params.reviewId, "read");
  return { owners: await readSideBySide(model, review) };
}

export default function ReviewRegister({ loaderData }: Route.ComponentProps) {
  const page = useOutletContext<ReviewPage>();
  return <SideBySide owners={loaderData.owners} names={[page.base.name, page.revision.name]} />;
}
