import { MessageSquare } from "lucide-react";
import { Fragment } from "react";
import { DifferenceBadge, RatingBadge, type Difference, type Rating } from "~/components/notation/difference-badge";
import { NodeClassGlyph } from "~/components/notation/node-class-glyph";
import { cx } from "~/components/ui/cx";
import { Icon } from "~/components/ui/icon";
import type { ReviewChange, ReviewPage } from "~/services/read-review.server";
import { EffectMark } from "./effect-mark";
import { describeChange, listThreads } from "./review-words";

const groups: readonly (readonly [Rating, string])[] = [
  ["breaking", "a reader written for the earlier state stops working"],
  ["additive", "old readers see nothing new"],
  ["neutral", "same nodes, same types"],
];

type Props = { page: ReviewPage; chosen: string | undefined; onChoose: (id: string) => void };

/** Changes as rows against readers as columns: the question is whom a change breaks. */
export function ChangeMatrix({ page, chosen, onChoose }: Props) {
  const { changes, readers } = page;
  const columns = readers.length + 3;
  return (
    <div role="region" aria-label="Changes against readers" tabIndex={0} className="overflow-x-auto">
      <table className="w-full border-collapse text-small">
        <caption className="sr-only">
          Changes between {page.base.name} and {page.revision.name}, and what each does to readers
        </caption>
        <thead>
          <tr className="align-bottom">
            <th scope="col" className="h-9 border-b border-ink pb-1 pl-2 text-left text-note font-medium text-ink-3">
              What changes
            </th>
            <th scope="col" className="border-b border-ink pb-1 text-left text-note font-medium text-ink-3">
              How
            </th>
            {readers.map((reader) => (
              <th
                key={reader.id}
                scope="col"
                className="w-20 border-b border-l border-ink border-l-hair px-1 pb-1 text-center text-note leading-[14px] font-medium text-ink-3"
              >
                {reader.name}
              </th>
            ))}
            <th scope="col" className="w-12 border-b border-ink">
              <span className="sr-only">Comments</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {groups.map(([rating, about]) => {
            const rows = changes.filter((change) => change.rating === rating);
            if (rows.length === 0) return null;
            return (
              <Fragment key={rating}>
                <tr>
                  <th
                    scope="rowgroup"
                    colSpan={columns}
                    className="h-[34px] border-b border-rule bg-bench pl-2 text-left font-normal"
                  >
                    <RatingBadge rating={rating} count={rows.length} />{" "}
                    <span className="ml-2 text-note text-ink-3">{about}</span>
                  </th>
                </tr>
                {rows.map((change) => (
                  <ChangeRow
                    key={change.id}
                    page={page}
                    change={change}
                    isChosen={change.id === chosen}
                    onChoose={onChoose}
                  />
                ))}
              </Fragment>
            );
          })}
          <SumRow page={page} />
        </tbody>
      </table>
    </div>
  );
}

function ChangeRow({
  page,
  change,
  isChosen,
  onChoose,
}: {
  page: ReviewPage;
  change: ReviewChange;
  isChosen: boolean;
  onChoose: (id: string) => void;
}) {
  const threads = listThreads(page, change);
  const open = threads.filter((thread) => thread.resolvedBy === null).length;
  return (
    <tr
      className={cx("cursor-pointer", isChosen ? "bg-copper-wash" : "hover:bg-bench")}
      onClick={() => onChoose(change.id)}
    >
      <th
        scope="row"
        className={cx(
          "h-[33px] w-[36%] max-w-0 border-b border-hair pl-2 pr-3 text-left font-normal",
          isChosen && "shadow-[inset_3px_0_0_var(--copper)]",
        )}
      >
        <span className="flex items-center gap-2">
          <DifferenceBadge difference={toDifference(change)} />
          {change.nodeClass ? <NodeClassGlyph kind={change.isProperty ? "Property" : change.nodeClass} label /> : null}
          <button
            type="button"
            aria-pressed={isChosen}
            className="min-w-0 truncate text-left"
            onClick={() => onChoose(change.id)}
          >
            <b className={cx("font-semibold", change.nodeClass?.endsWith("Type") && "italic")}>{change.name}</b>
            {change.owner ? (
              <span className="text-ink-2">
                {" in "}
                <i>{change.owner}</i>
              </span>
            ) : null}
          </button>
        </span>
      </th>
      <td className="border-b border-hair pr-2 break-words">{describeChange(change)}</td>
      {page.readers.map((reader) => {
        const hit = change.readers.find((row) => row.id === reader.id);
        return (
          <td key={reader.id} className="border-b border-l border-hair text-center">
            {hit ? <EffectMark effect={hit.effect} /> : <span className="text-ink-3">·</span>}
          </td>
        );
      })}
      <td className="border-b border-hair text-right">
        {threads.length > 0 ? (
          <span
            className="inline-flex items-center gap-1 pr-1 text-ink-2"
            title={open === 0 ? "settled" : `${open} open`}
          >
            <Icon of={MessageSquare} /> <span className="font-mono">{threads.length}</span>
          </span>
        ) : null}
      </td>
    </tr>
  );
}

function SumRow({ page }: { page: ReviewPage }) {
  if (page.readers.length === 0) return null;
  const stops = (id: string) =>
    page.changes.filter((change) => change.readers.some((row) => row.id === id && row.effect === "stops")).length;
  return (
    <tr>
      <th scope="row" colSpan={2} className="h-[33px] border-t border-ink pl-2 text-left font-normal text-ink-2">
        Changes that stop a reader
      </th>
      {page.readers.map((reader) => (
        <td key={reader.id} className="border-t border-l border-ink border-l-hair text-center font-mono">
          {stops(reader.id) || "–"}
        </td>
      ))}
      <td className="border-t border-ink" />
    </tr>
  );
}

export function toDifference({ kind }: Pick<ReviewChange, "kind">): Difference {
  if (kind.endsWith("-added")) return "added";
  return kind.endsWith("-removed") ? "removed" : "changed";
}

export function MatrixLegend() {
  return (
    <p className="flex flex-wrap items-center gap-x-5 gap-y-1 px-2 py-1.5 text-note text-ink-2">
      <span className="flex items-center gap-1.5">
        <EffectMark effect="stops" label="" /> stops working
      </span>
      <span className="flex items-center gap-1.5">
        <EffectMark effect="look" label="" /> reads it, must look
      </span>
      <span className="flex items-center gap-1.5">
        <EffectMark effect="may-use" label="" /> may use it
      </span>
    </p>
  );
}
