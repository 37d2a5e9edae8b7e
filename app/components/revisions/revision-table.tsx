import { Download } from "lucide-react";
import { Form, Link } from "react-router";
import { RatingBadge } from "~/components/notation/difference-badge";
import { FindingTallyBadge } from "~/components/notation/finding-badge";
import { Button, TextLink } from "~/components/ui/button";
import { Dialog, DialogClose } from "~/components/ui/dialog";
import { Field, Input } from "~/components/ui/field";
import { Icon } from "~/components/ui/icon";
import { RowHead, Table, Td, Th, Tr } from "~/components/ui/table";
import { Tag } from "~/components/ui/tag";
import type { ReleaseSummary } from "~/services/read-release.server";
import type { RevisionJson } from "~/utils/api-schemas";
import { formatCount } from "~/utils/format";

type Props = {
  modelId: string;
  revisions: readonly RevisionJson[];
  releases: readonly ReleaseSummary[];
  mayEdit: boolean;
  isVariant: boolean;
};

export function RevisionTable({ modelId, revisions, releases, mayEdit, isVariant }: Props) {
  const versions = new Map(releases.map((release) => [release.revision, release]));
  return (
    <Table caption="Revisions, newest first">
      <thead>
        <tr>
          <Th right className="w-12">
            No.
          </Th>
          <Th>Message</Th>
          <Th>Frozen by</Th>
          <Th>When, UTC</Th>
          <Th right>Edits up to</Th>
          <Th right>Nodes</Th>
          <Th>Changes</Th>
          <Th>Findings</Th>
          <Th>Content</Th>
          <Th>
            <span className="sr-only">Take it</span>
          </Th>
        </tr>
      </thead>
      <tbody>
        {revisions.map((revision) => (
          <Tr key={revision.number}>
            <Td right mono>
              {revision.number}
            </Td>
            <RowHead>
              {revision.message}
              {versions.has(revision.number) ? (
                <Link to={`/releases/${versions.get(revision.number)?.id ?? ""}`} className="ml-2">
                  <Tag tone="ink" mono>
                    {versions.get(revision.number)?.version}
                  </Tag>
                </Link>
              ) : null}
            </RowHead>
            <Td className="whitespace-nowrap">{revision.author}</Td>
            <Td mono className="text-note whitespace-nowrap text-ink-2">
              {formatTime(revision.at)}
            </Td>
            <Td right mono>
              {formatCount(revision.seq)}
            </Td>
            <Td right mono>
              {formatCount(revision.nodeCount)}
            </Td>
            <Td className="whitespace-nowrap">
              <ChangeSize changes={revision.changes} />
            </Td>
            <Td>
              {revision.counts ? (
                <FindingTallyBadge tally={revision.counts} showNone />
              ) : (
                <span className="text-ink-3">not counted</span>
              )}
            </Td>
            <Td mono className="text-note text-ink-3" title={revision.hash}>
              {revision.hash.slice(0, 12)}
            </Td>
            <Td className="whitespace-nowrap">
              <span className="flex items-center justify-end gap-3">
                {mayEdit ? <RestoreDialog number={revision.number} /> : null}
                {mayEdit && !isVariant ? <BranchDialog number={revision.number} /> : null}
                <TextLink to={`?from=${revision.number}&to=working`}>Compare with now</TextLink>
                <a
                  href={`/api/v1/models/${modelId}/revisions/${revision.number}/nodeset`}
                  download
                  className="inline-flex items-center gap-1 underline decoration-rule decoration-1 underline-offset-3 hover:text-copper hover:decoration-copper"
                  aria-label={`Download revision ${revision.number} as NodeSet2`}
                >
                  <Icon of={Download} /> NodeSet2
                </a>
              </span>
            </Td>
          </Tr>
        ))}
      </tbody>
    </Table>
  );
}

/** Day and minute in UTC, the same on server and in the browser. */
function formatTime(at: string): string {
  return `${at.slice(0, 10)} ${at.slice(11, 16)}`;
}

/** Breaking, additive and neutral changes since the revision before. */
function ChangeSize({ changes }: Pick<RevisionJson, "changes">) {
  if (!changes) return <span className="text-ink-3">–</span>;
  const parts = (["breaking", "additive", "neutral"] as const).filter((rating) => changes[rating] > 0);
  if (parts.length === 0) return <span className="text-ink-3">none</span>;
  return (
    <span className="inline-flex gap-3">
      {parts.map((rating) => (
        <RatingBadge key={rating} rating={rating} count={changes[rating]} />
      ))}
    </span>
  );
}

function RestoreDialog({ number }: { number: number }) {
  return (
    <Dialog
      title={`Restore revision ${number}?`}
      about="The working state becomes what the revision is, as one edit that can be undone. Nothing of the history is lost."
      trigger={
        <Button size="small" tone="bare">
          Restore
        </Button>
      }
    >
      <Form method="post" className="flex justify-end gap-2">
        <input type="hidden" name="intent" value="restore" />
        <input type="hidden" name="number" value={number} />
        <DialogClose asChild>
          <Button>Cancel</Button>
        </DialogClose>
        <Button type="submit" tone="ink">
          Restore
        </Button>
      </Form>
    </Dialog>
  );
}

function BranchDialog({ number }: { number: number }) {
  return (
    <Dialog
      title={`Variant of revision ${number}`}
      about="A branch for a trial, with sheets, findings and revisions of its own. Merge it home when it holds."
      trigger={
        <Button size="small" tone="bare">
          Variant
        </Button>
      }
    >
      <Form method="post" className="grid gap-3">
        <input type="hidden" name="intent" value="branch" />
        <input type="hidden" name="number" value={number} />
        <Field label="Name">
          {(control) => <Input {...control} name="name" required maxLength={100} placeholder="Trial with two heads" />}
        </Field>
        <div className="flex justify-end gap-2">
          <DialogClose asChild>
            <Button>Cancel</Button>
          </DialogClose>
          <Button type="submit" tone="main">
            Make the variant
          </Button>
        </div>
      </Form>
    </Dialog>
  );
}
