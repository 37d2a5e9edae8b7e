import { Check } from "lucide-react";
import { useEffect, useRef } from "react";
import { useFetcher } from "react-router";
import { LocalTime } from "~/components/shell/local-time";
import { Button } from "~/components/ui/button";
import { cx } from "~/components/ui/cx";
import { Input } from "~/components/ui/field";
import { Initials } from "~/components/ui/initials";
import { Kbd, Tag } from "~/components/ui/tag";
import type { ReviewComment, ReviewPage } from "~/services/read-review.server";
import { useReviewAction } from "./use-review-action";

type Answer = { errors: readonly string[] };
type Props = {
  page: ReviewPage;
  threads: readonly ReviewComment[];
  /** What a new thread is about; absent for the review as a whole. */
  about?: { nodeKey: string | null; change: string };
  title: string;
};

/** The talk on a change: threads with replies, suggestions, and what settles them. */
export function CommentThreads({ page, threads, about, title }: Props) {
  return (
    <section aria-label={title} className="flex min-h-0 flex-1 flex-col">
      <header className="flex items-baseline gap-2 px-5 pt-3.5 pb-2">
        <h3 className="font-semibold">
          {threads.length} {threads.length === 1 ? "comment" : "comments"}
        </h3>
        <span className="text-note text-ink-3">{title}</span>
      </header>
      <ol className="min-h-0 flex-1 overflow-y-auto px-5">
        {threads.map((thread) => (
          <Thread key={thread.id} page={page} thread={thread} />
        ))}
      </ol>
      <CommentForm
        key={`${about?.nodeKey ?? ""} ${about?.change ?? ""}`}
        fields={about ? { nodeKey: about.nodeKey ?? "", change: about.change } : {}}
        label="Comment"
      />
    </section>
  );
}

function Thread({ page, thread }: { page: ReviewPage; thread: ReviewComment }) {
  const replies = page.comments.filter((comment) => comment.parentId === thread.id);
  const isSettled = thread.resolvedBy !== null;
  return (
    <li className={cx("mb-3.5 border-l-2 pl-3", isSettled ? "border-rule text-ink-2" : "border-copper")}>
      <Remark comment={thread} />
      {thread.suggestion && thread.appliedBy === null && page.me.mayEdit ? <ApplySuggestion comment={thread} /> : null}
      {replies.map((reply) => (
        <div key={reply.id} className="mt-2 pl-4">
          <Remark comment={reply} />
        </div>
      ))}
      <div className="mt-1.5 flex items-center gap-2 text-note text-ink-3">
        {isSettled ? <span>settled by {thread.resolvedBy}</span> : null}
        {thread.isCarriedOver ? <Tag>from an earlier review</Tag> : null}
        <SettleButton comment={thread} isSettled={isSettled} />
      </div>
      {isSettled ? null : <CommentForm fields={{ parentId: thread.id }} label={`Reply to ${thread.author}`} isReply />}
    </li>
  );
}

function Remark({ comment }: { comment: ReviewComment }) {
  return (
    <div className="grid grid-cols-[28px_1fr]">
      <Initials name={comment.author} small />
      <div className="min-w-0">
        <p className="flex flex-wrap items-baseline gap-x-2">
          <b className="font-semibold">{comment.author}</b>
          <span className="font-mono text-note text-ink-3">
            <LocalTime iso={comment.at} />
          </span>
        </p>
        <p className="text-body break-words whitespace-pre-wrap">{comment.text}</p>
        {comment.suggestion ? (
          <p className="text-note text-ink-3">
            {comment.appliedBy ? `suggestion applied by ${comment.appliedBy}` : comment.suggestion}
          </p>
        ) : null}
      </div>
    </div>
  );
}

/** One key: A applies the first suggestion that waits, wherever the focus is outside a field. */
function ApplySuggestion({ comment }: { comment: ReviewComment }) {
  const fetcher = useFetcher<Answer>();
  const action = useReviewAction();
  const button = useRef<HTMLButtonElement>(null);
  useEffect(() => {
    const listen = (event: KeyboardEvent) => {
      const target = event.target as HTMLElement;
      const isTyping = target.closest("input, textarea, select, [contenteditable]") !== null;
      const isFirst = document.querySelector("[data-applies-suggestion]") === button.current;
      if (event.key.toLowerCase() !== "a" || event.ctrlKey || event.metaKey || event.altKey || isTyping || !isFirst)
        return;
      event.preventDefault();
      button.current?.click();
    };
    document.addEventListener("keydown", listen);
    return () => document.removeEventListener("keydown", listen);
  }, []);
  return (
    <fetcher.Form action={action} method="post" className="mt-1.5 flex items-center gap-2">
      <input type="hidden" name="intent" value="apply-suggestion" />
      <input type="hidden" name="commentId" value={comment.id} />
      <Button
        ref={button}
        data-applies-suggestion
        type="submit"
        size="small"
        tone="ink"
        icon={Check}
        busy={fetcher.state !== "idle"}
        aria-keyshortcuts="A"
      >
        Apply
      </Button>
      <Kbd>A</Kbd>
      {fetcher.data?.errors?.map((error) => (
        <span key={error} role="alert" className="text-note text-error">
          {error}
        </span>
      ))}
    </fetcher.Form>
  );
}

function SettleButton({ comment, isSettled }: { comment: ReviewComment; isSettled: boolean }) {
  const fetcher = useFetcher();
  const action = useReviewAction();
  return (
    <fetcher.Form action={action} method="post">
      <input type="hidden" name="intent" value="settle" />
      <input type="hidden" name="commentId" value={comment.id} />
      <input type="hidden" name="isSettled" value={isSettled ? "no" : "yes"} />
      <button type="submit" className="underline decoration-rule underline-offset-3 hover:text-copper">
        {isSettled ? "Open again" : "Settle"}
      </button>
    </fetcher.Form>
  );
}

function CommentForm({
  fields,
  label,
  isReply,
}: {
  fields: Readonly<Record<string, string>>;
  label: string;
  isReply?: boolean;
}) {
  const fetcher = useFetcher<Answer>();
  const action = useReviewAction();
  const form = useRef<HTMLFormElement>(null);
  const wasBusy = useRef(false);
  useEffect(() => {
    if (wasBusy.current && fetcher.state === "idle" && (fetcher.data?.errors ?? []).length === 0) form.current?.reset();
    wasBusy.current = fetcher.state !== "idle";
  }, [fetcher.state, fetcher.data]);
  return (
    <fetcher.Form
      action={action}
      ref={form}
      method="post"
      className={isReply ? "mt-1.5 flex gap-2" : "flex items-center gap-2 border-t border-rule px-5 py-3"}
    >
      <input type="hidden" name="intent" value="comment" />
      {Object.entries(fields).map(([name, value]) => (
        <input key={name} type="hidden" name={name} value={value} />
      ))}
      <Input
        name="text"
        aria-label={label}
        placeholder={label}
        required
        maxLength={4000}
        size={isReply ? "small" : "medium"}
      />
      <Button type="submit" size={isReply ? "small" : "medium"} busy={fetcher.state !== "idle"}>
        Send
      </Button>
    </fetcher.Form>
  );
}
