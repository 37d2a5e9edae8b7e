import { useOutletContext } from "react-router";
import { MeaningView } from "~/components/reviews/meaning-view";
import type { ReviewPage } from "~/services/read-review.server";

export default function ReviewByMeaning() {
  const page = useOutletContext<ReviewPage>();
  return <MeaningView key={`${page.review.id} ${page.revision.number}`} page={page} />;
}
