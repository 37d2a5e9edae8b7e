import { Form, Link, useNavigation } from "react-router";
import { LocalTime } from "~/components/shell/local-time";
import { Button } from "~/components/ui/button";
import { cx } from "~/components/ui/cx";
import { Input } from "~/components/ui/field";
import type { ReviewPage } from "~/services/read-review.server";
import { obstacleWords } from "./review-words";

/** The foot of a review: the title block as a row of signatures, the open one on copper-wash. */
export function SignatureRow({ page }: { page: ReviewPage }) {
  const { review, release, reviewers, needed, model, base, revision } = page;
  const approvals = reviewers.filter((row) => row.holds && row.decision === "approved");
  const isChecked = approvals.length >= needed;
  return (
    <section aria-label="Signatures" className="shrink-0 border-t-[1.5px] border-ink bg-leaf">
      <div
        tabIndex={0}
        role="group"
        aria-label="Signatures"
        className="flex min-h-[86px] overflow-x-auto focus-visible:-outline-offset-2 max-md:flex-wrap"
      >
        <div className="grid w-48 shrink-0 content-start border-rule px-5 py-1.5">
          <span className="text-key text-ink-3">{release ? "Version" : "Proposed version"}</span>
          <span className="font-mono text-[24px] leading-[34px] font-semibold text-copper">
            {release?.version ?? page.proposedVersion}
          </span>
          <span className="text-note text-ink-3">
            {release
              ? "released"
              : page.gentleVersion === page.proposedVersion
                ? "from the ratings"
                : `${page.gentleVersion} without breaking changes`}
          </span>
        </div>
        <Signature role="Drawn" name={review.author} at={review.askedAt} note={`revision ${revision.number}`} />
        {reviewers.map((row) => (
          <Signature
            key={row.userId}
            role="Checked"
            name={row.name}
            at={row.holds ? row.decidedAt : null}
            note={describeDecision(row, page)}
            isOpen={!row.holds && page.me.id === row.userId && page.me.mayDecide}
          />
        ))}
        {release ? (
          <Signature
            role="Released"
            name={release.by}
            at={release.at}
            note={<Link className="underline" to={`/releases/${release.id}`}>{`release ${release.version}`}</Link>}
          />
        ) : (
          <ReleaseCell page={page} isNext={isChecked} />
        )}
        <div className="min-w-40 flex-1 border-l border-rule px-3.5 py-1.5">
          <p className="text-key text-ink-3">Model</p>
          <p className="text-small font-semibold">
            <Link to={`/models/${model.id}/revisions`} className="hover:text-copper">
              {model.name}
            </Link>
          </p>
          <p className="truncate font-mono text-note text-ink-3">{model.namespaceUri}</p>
        </div>
        <div className="w-44 shrink-0 border-l border-rule px-3.5 py-1.5">
          <p className="text-key text-ink-3">Compared</p>
          <p className="font-mono text-small">
            {base.name} with {revision.name}
          </p>
          <p className="font-mono text-note text-ink-3">
            {base.hash.slice(0, 7)} · {revision.hash.slice(0, 7)}
          </p>
        </div>
      </div>
    </section>
  );
}

function describeDecision(row: ReviewPage["reviewers"][number], page: ReviewPage): string {
  if (row.holds)
    return row.decision === "approved" ? `approves revision ${row.decidedRevision ?? ""}` : "asks for changes";
  if (row.decision !== null) return `void: ${row.voidedBy ?? "somebody"} edited`;
  return row.userId === page.me.id ? "your turn" : "asked";
}

type SignatureProps = { role: string; name: string; at: string | null; note: React.ReactNode; isOpen?: boolean };

function Signature({ role, name, at, note, isOpen }: SignatureProps) {
  return (
    <div className={cx("w-42 shrink-0 border-l border-rule px-3.5 py-1.5", isOpen && "bg-copper-wash")}>
      <p className="text-key text-ink-3">{role}</p>
      <div
        className={cx("flex h-[26px] items-end border-b pb-0.5", at ? "border-ink-3" : "border-dashed border-ink-3")}
      >
        {at ? (
          <span className="text-[17px] leading-none italic">
            {name
              .split(" ")
              .map((word) => word[0])
              .join(". ")}
            .
          </span>
        ) : null}
      </div>
      <p className="truncate text-small font-medium">{name}</p>
      <p className={cx("text-note leading-[15px]", isOpen ? "font-semibold text-copper" : "text-ink-3")}>
        {note}
        {at ? (
          <>
            , <LocalTime iso={at} parts="date" />
          </>
        ) : null}
      </p>
    </div>
  );
}

/** The last signature: the version, and why it has to wait where it must. */
function ReleaseCell({ page, isNext }: { page: ReviewPage; isNext: boolean }) {
  const busy = useNavigation().formData?.get("intent") === "release";
  const isOver = page.review.state === "closed";
  const reasons = page.obstacles.map((obstacle) => obstacleWords[obstacle] ?? obstacle);
  return (
    <div className={cx("w-64 shrink-0 border-l border-rule px-3.5 py-1.5", isNext && !isOver && "bg-copper-wash")}>
      <p className="text-key text-ink-3">Released</p>
      {isOver ? (
        <p className="text-small">closed without a release</p>
      ) : (
        <Form method="post" className="mt-1 flex items-center gap-2">
          <input type="hidden" name="intent" value="release" />
          <Input
            name="version"
            aria-label="Version"
            mono
            defaultValue={page.proposedVersion}
            key={page.proposedVersion}
            size="small"
            className="w-24!"
            required
          />
          <Button
            type="submit"
            size="small"
            tone={isNext ? "main" : "plain"}
            busy={busy}
            blockedBy={
              page.me.mayRelease
                ? reasons.length > 0
                  ? reasons.join("; ")
                  : undefined
                : "asks for the role engineer, reviewer or administrator"
            }
          >
            Release
          </Button>
        </Form>
      )}
      <p className="mt-1 text-note leading-[15px] text-ink-3">
        {isOver ? "" : reasons.length > 0 ? reasons.join("; ") : "everything is in order"}
      </p>
    </div>
  );
}
