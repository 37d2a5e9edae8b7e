import { useParams } from "react-router";

/** Where the forms of a review go: to the review itself, whichever of its views they stand in. */
export function useReviewAction(): string {
  return `/reviews/${useParams().reviewId ?? ""}`;
}
