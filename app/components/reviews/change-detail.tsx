import { Undo2 } from "lucide-react";
import { useFetcher } from "react-router";
import { RatingBadge } from "~/components/notation/difference-badge";
import { NodeClassGlyph } from "~/components/notation/node-class-glyph";
import { Button, TextLink } from "~/components/ui/button";
import { cx } from "~/components/ui/cx";
import { Tag } from "~/components/ui/tag";
import type { ReviewChange, ReviewPage } from "~/services/read-review.server";
import { effectWords } from "./review-words";
import { useReviewAction } from "./use-review-action";

/** One change: before and after in notation, why it is rated so, whom it touches, the other way. */
export function ChangeDetail({ page, change }: { page: ReviewPage; change: ReviewChange }) {
  return (
    <section aria-label={`Change of ${change.name}`} className="border-b border-rule bg-leaf px-5 pt-3.5 pb-3">
      <header className="flex items-center gap-2">
        {change.nodeClass ? <NodeClassGlyph kind={change.isProperty ? "Property" : change.nodeClass} label /> : null}
        <h2 className={cx("text-lead font-semibold", change.nodeClass?.endsWith("Type") && "italic")}>
          {change.nodeId && change.after !== null ? (
            <TextLink to={`/models/${page.model.id}/sheet?node=${encodeURIComponent(change.nodeId)}`}>
              {change.name}
            </TextLink>
          ) : (
            change.name
          )}
        </h2>
        <span className="min-w-0 flex-1 truncate font-mono text-note text-ink-3" title={change.nodeId ?? undefined}>
          {change.path}
        </span>
        <RatingBadge rating={change.rating} />
      </header>
      <BeforeAfter page={page} change={change} />
      <dl className="mt-2 grid grid-cols-[70px_1fr] gap-y-1.5 text-small">
        <Fact name="Why">
          {change.reason} {change.clause === "" ? null : <Tag>{change.clause}</Tag>}
        </Fact>
        <Fact name="Who">
          <WhoIsTouched page={page} change={change} />
        </Fact>
        {change.nodeKey !== null && page.review.state !== "released" && page.review.state !== "closed" ? (
          <Fact name="Other way">
            <OtherWay change={change} />
          </Fact>
        ) : null}
      </dl>
    </section>
  );
}

function Fact({ name, children }: { name: string; children: React.ReactNode }) {
  return (
    <>
      <dt className="text-note leading-[18px] text-ink-3">{name}</dt>
      <dd>{children}</dd>
    </>
  );
}

function BeforeAfter({ page, change }: { page: ReviewPage; change: ReviewChange }) {
  const label = change.detail ?? change.kind.replace(/-(changed|added|removed)$/, "").replaceAll("-", " ");
  const isVariable = change.nodeClass === "Variable" || change.nodeClass === "VariableType";
  const isType = change.nodeClass?.endsWith("Type") === true;
  const sides = [
    { name: page.base.name, value: change.before, wash: "bg-removed-wash", text: "text-removed line-through" },
    { name: page.revision.name, value: change.after, wash: "bg-added-wash", text: "text-added underline" },
  ];
  return (
    <div className="mt-2 grid grid-cols-[1fr_24px_1fr] items-stretch gap-1">
      {sides.map((side, i) => (
        <div key={side.name} className={cx("min-w-0", i === 1 && "col-start-3")}>
          <p className="text-note text-ink-3">{side.name}</p>
          <div className={cx("p-2", side.value === null ? "border border-dashed border-edge" : side.wash)}>
            {side.value === null ? (
              <p className="py-2 text-center text-note text-ink-3">not there</p>
            ) : (
              <div
                className={cx(
                  "border-[1.5px] border-ink bg-leaf",
                  isVariable && "rounded-[9px]",
                  isType && "shadow-[4px_4px_0_var(--shade)]",
                )}
              >
                <p
                  className={cx(
                    "border-b border-ink px-2 py-0.5 text-center text-small font-semibold",
                    isType && "italic",
                  )}
                >
                  {change.name}
                </p>
                <p className={cx("px-2 py-1 font-mono text-note break-words", side.text)}>
                  {label} = {side.value}
                </p>
              </div>
            )}
          </div>
        </div>
      ))}
      <svg
        viewBox="0 0 24 24"
        className="col-start-2 row-start-1 my-auto"
        fill="none"
        stroke="currentColor"
        strokeWidth={1.4}
        aria-hidden
      >
        <path d="M2 12h19M16 7l5 5-5 5" />
      </svg>
    </div>
  );
}

const SHOWN = 6;

function WhoIsTouched({ page, change }: { page: ReviewPage; change: ReviewChange }) {
  const named = new Map(page.readers.map((reader) => [reader.id, reader.name]));
  const { readers, subtypes, instances } = change;
  if (readers.length + subtypes.length + instances.length === 0)
    return <span className="text-ink-3">nobody that is known</span>;
  return (
    <div className="grid gap-1">
      {readers.length > 0 ? (
        <table className="w-full border-collapse">
          <caption className="sr-only">Readers of what changes</caption>
          <thead>
            <tr className="text-left text-note text-ink-3">
              <th scope="col" className="border-b border-ink font-medium">
                Reader
              </th>
              <th scope="col" className="w-16 border-b border-ink text-right font-medium">
                Nodes
              </th>
              <th scope="col" className="border-b border-ink pl-3 font-medium">
                Effect
              </th>
            </tr>
          </thead>
          <tbody>
            {readers.map((row) => (
              <tr key={row.id}>
                <td className="border-b border-hair">{named.get(row.id)}</td>
                <td className="border-b border-hair text-right font-mono">{row.nodes}</td>
                <td className="border-b border-hair pl-3">{effectWords[row.effect]}</td>
              </tr>
            ))}
          </tbody>
        </table>
      ) : null}
      {subtypes.length > 0 ? (
        <p>
          {count(subtypes.length, "subtype")}: <i>{listSome(subtypes)}</i>
        </p>
      ) : null}
      {instances.length > 0 ? (
        <p>
          {count(instances.length, "instance")}: {listSome(instances.map(({ model, path }) => `${path} (${model})`))}
        </p>
      ) : null}
    </div>
  );
}

function count(n: number, word: string): string {
  return `${n} ${word}${n === 1 ? "" : "s"}`;
}

function listSome(texts: readonly string[]): string {
  return texts.slice(0, SHOWN).join(", ") + (texts.length > SHOWN ? ` and ${texts.length - SHOWN} more` : "");
}

/** Taking the change back, as a suggestion that the author applies with one key. */
function OtherWay({ change }: { change: ReviewChange }) {
  const fetcher = useFetcher<{ errors: readonly string[] }>();
  const action = useReviewAction();
  return (
    <fetcher.Form action={action} method="post" className="flex items-center gap-2">
      <input type="hidden" name="intent" value="comment" />
      <input type="hidden" name="nodeKey" value={change.nodeKey ?? ""} />
      <input type="hidden" name="change" value={change.what} />
      <input type="hidden" name="takesBack" value="yes" />
      <input type="hidden" name="text" value={`Suggestion: keep it as it was (${change.kind.replaceAll("-", " ")}).`} />
      <span className="flex-1">
        Keep it as it was.
        {fetcher.data?.errors?.map((error) => (
          <span key={error} role="alert" className="block text-error">
            {error}
          </span>
        ))}
      </span>
      <Button type="submit" size="small" icon={Undo2} busy={fetcher.state !== "idle"}>
        Suggest to take it back
      </Button>
    </fetcher.Form>
  );
}
