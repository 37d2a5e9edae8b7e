import { useState } from "react";
import type { ReviewPage } from "~/services/read-review.server";
import { ChangeDetail } from "./change-detail";
import { ChangeMatrix, MatrixLegend } from "./change-matrix";
import { CommentThreads } from "./comment-threads";
import { listLooseThreads, listThreads } from "./review-words";
import { VersionFork } from "./version-fork";

/** The changes by meaning at the left, the chosen one with its talk at the right. */
export function MeaningView({ page }: { page: ReviewPage }) {
  const [chosen, setChosen] = useState(page.changes[0]?.id);
  const change = page.changes.find((row) => row.id === chosen);
  return (
    <main
      id="main"
      tabIndex={-1}
      className="grid min-h-0 flex-1 grid-cols-[minmax(0,1.7fr)_minmax(360px,1fr)] outline-none max-lg:grid-cols-1 max-lg:overflow-y-auto"
    >
      <div className="min-h-0 overflow-y-auto px-5 pb-6 max-lg:overflow-visible">
        <div className="my-2">
          <VersionFork page={page} />
        </div>
        {page.changes.length === 0 ? (
          <p className="border-t border-ink py-3 text-small text-ink-2">
            Nothing changed between {page.base.name} and {page.revision.name}.
          </p>
        ) : (
          <>
            <ChangeMatrix page={page} chosen={chosen} onChoose={setChosen} />
            <MatrixLegend />
          </>
        )}
        {page.readers.length === 0 ? (
          <p className="px-2 text-note text-ink-3">
            No reader is named yet: name them under Readers, and each gets a column here.
          </p>
        ) : null}
        {page.dependents.length > 0 ? (
          <p className="px-2 text-note text-ink-3">Models that require this one: {page.dependents.join(", ")}</p>
        ) : null}
      </div>
      <aside
        aria-label="The chosen change"
        className="flex min-h-0 flex-col border-l border-rule bg-bench max-lg:border-t max-lg:border-l-0"
      >
        {change ? (
          <>
            <div className="max-h-[62%] shrink-0 overflow-y-auto max-lg:max-h-none">
              <ChangeDetail page={page} change={change} />
            </div>
            <CommentThreads
              page={page}
              threads={listThreads(page, change)}
              about={{ nodeKey: change.nodeKey, change: change.what }}
              title="on this change"
            />
          </>
        ) : null}
        <details className="max-h-[45%] shrink-0 overflow-y-auto border-t border-rule" open={change === undefined}>
          <summary className="cursor-pointer px-5 py-2 text-small font-semibold">
            On the review as a whole ({listLooseThreads(page).length})
          </summary>
          <CommentThreads page={page} threads={listLooseThreads(page)} title="on the review as a whole" />
        </details>
      </aside>
    </main>
  );
}
