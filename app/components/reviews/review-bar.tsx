import { Check, RefreshCw } from "lucide-react";
import { Form, useNavigation } from "react-router";
import { FindingTallyBadge } from "~/components/notation/finding-badge";
import { Button, LinkButton } from "~/components/ui/button";
import { Dialog, DialogClose } from "~/components/ui/dialog";
import { TextArea } from "~/components/ui/field";
import { LinkTabs } from "~/components/ui/link-tabs";
import { Tag } from "~/components/ui/tag";
import type { ReviewPage } from "~/services/read-review.server";
import { stateWords } from "./review-words";

export function ReviewBar({ page }: { page: ReviewPage }) {
  const { review, revision, changes, me } = page;
  const base = `/reviews/${review.id}`;
  return (
    <section
      aria-label={`Bar of review ${review.number}`}
      className="flex min-h-(--bar-2) shrink-0 flex-wrap items-stretch gap-x-4 border-b border-rule bg-paper px-5"
    >
      <div className="flex min-w-0 items-center gap-2 py-1.5">
        <span className="font-mono text-ink-3">{review.number}</span>
        <h1 className="truncate text-lead font-semibold">{review.title}</h1>
        <Tag tone="ink">{stateWords[review.state]}</Tag>
      </div>
      <LinkTabs
        label="Views of the review"
        tabs={[
          {
            to: base,
            label: (
              <>
                By meaning <span className="font-mono text-ink-3">{changes.length}</span>
              </>
            ),
            end: true,
          },
          { to: `${base}/register`, label: "Side by side" },
          { to: `${base}/sheet`, label: "On the sheet" },
          { to: `${base}/xml`, label: "XML" },
        ]}
      />
      <div className="flex items-center gap-2 text-small">
        {revision.counts ? <FindingTallyBadge tally={revision.counts} showNone /> : null}
      </div>
      <div className="ml-auto flex items-center gap-2 py-1">
        <a
          href={`${base}/report`}
          className="text-small underline decoration-rule underline-offset-3 hover:text-copper"
          target="_blank"
          rel="noreferrer"
        >
          Change report
        </a>
        {page.editsSince > 0 && me.mayFreeze ? <FollowButton edits={page.editsSince} /> : null}
        {me.mayDecide ? <Decisions page={page} /> : null}
        {page.release ? <LinkButton to={`/releases/${page.release.id}`}>Open the release</LinkButton> : null}
      </div>
    </section>
  );
}

function FollowButton({ edits }: { edits: number }) {
  const busy = useNavigation().formData?.get("intent") === "follow";
  return (
    <Form method="post">
      <input type="hidden" name="intent" value="follow" />
      <Button type="submit" icon={RefreshCw} busy={busy}>
        Bring in {edits} {edits === 1 ? "edit" : "edits"}
      </Button>
    </Form>
  );
}

function Decisions({ page }: { page: ReviewPage }) {
  const { me, editsSince } = page;
  const busy = useNavigation().formData?.get("intent") === "decide";
  const mine = page.reviewers.find((row) => row.userId === me.id);
  const blockedBy = me.isAuthor
    ? "you asked for this review or edited what it looks at"
    : editsSince > 0
      ? "the model was edited since; its author brings the review up to date first"
      : mine?.holds && mine.decision === "approved"
        ? "you approve it already"
        : undefined;
  return (
    <>
      <Dialog
        title="Ask for changes"
        about="The author gets your note by mail and in this review."
        trigger={<Button>Ask for changes</Button>}
      >
        <Form method="post" className="grid gap-3">
          <input type="hidden" name="intent" value="decide" />
          <input type="hidden" name="decision" value="changes-wanted" />
          <TextArea
            name="note"
            aria-label="What should change"
            placeholder="What should change"
            required
            maxLength={4000}
            rows={4}
          />
          <div className="flex justify-end gap-2">
            <DialogClose asChild>
              <Button>Cancel</Button>
            </DialogClose>
            <DialogClose asChild>
              <Button type="submit" tone="ink" onClick={(event) => event.currentTarget.form?.requestSubmit()}>
                Ask for changes
              </Button>
            </DialogClose>
          </div>
        </Form>
      </Dialog>
      <Form method="post">
        <input type="hidden" name="intent" value="decide" />
        <input type="hidden" name="decision" value="approved" />
        <Button type="submit" tone="main" icon={Check} busy={busy} blockedBy={blockedBy}>
          Approve
        </Button>
      </Form>
    </>
  );
}
