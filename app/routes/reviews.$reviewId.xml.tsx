import { lazy, Suspense, useEffect, useState } from "react";
import { useOutletContext } from "react-router";
import type { Route } from "./+types/reviews.$reviewId.xml";
import { requireReviewForPage } from "~/auth/require-review.server";
import { readReviewTexts } from "~/services/read-review-texts.server";
import type { ReviewPage } from "~/services/read-review.server";

const XmlDiff = lazy(() => import("~/components/xml/xml-diff.client"));

export async function loader({ request, params }: Route.LoaderArgs) {
  const { model, review } = await requireReviewForPage(request, params.reviewId, "read");
  return readReviewTexts(model, review);
}

export default function ReviewXml({ loaderData }: Route.ComponentProps) {
  const page = useOutletContext<ReviewPage>();
  // The editor is the browser's alone; the server draws what waits for it.
  const [isInBrowser, setIsInBrowser] = useState(false);
  useEffect(() => setIsInBrowser(true), []);
  const waiting = <p className="p-5 text-small text-ink-2">Reading both texts …</p>;
  return (
    <main id="main" tabIndex={-1} className="flex min-h-0 flex-1 flex-col outline-none">
      <h2 className="sr-only">Source text of both states</h2>
      {isInBrowser ? (
        <Suspense fallback={waiting}>
          <XmlDiff
            before={loaderData.before}
            after={loaderData.after}
            label={`Source text of ${page.base.name} and ${page.revision.name}`}
          />
        </Suspense>
      ) : (
        waiting
      )}
    </main>
  );
}
