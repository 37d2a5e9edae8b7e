import { Download, Snowflake } from "lucide-react";
import { useEffect, useRef } from "react";
import { Form, useNavigation } from "react-router";
import { FindingTallyBadge } from "~/components/notation/finding-badge";
import { Button, TextLink } from "~/components/ui/button";
import { Field, Input } from "~/components/ui/field";
import { Icon } from "~/components/ui/icon";
import { Notice } from "~/components/ui/notice";
import { Block, Page } from "~/components/ui/page";
import { RowHead, Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import type { RevisionJson } from "~/utils/api-schemas";
import { formatCount } from "~/utils/format";
import type { Compared } from "./compared";
import { ComparisonBlock } from "./comparison-block";

type Props = {
  modelId: string;
  revisions: readonly RevisionJson[];
  compared: Compared | null;
  mayFreeze: boolean;
  refusal: string | undefined;
};

/** What the model was, and what has changed since. */
export function RevisionsView({ modelId, revisions, compared, mayFreeze, refusal }: Props) {
  return (
    <Page
      title="Revisions"
      about="Frozen states that never change. One revision id travels with everything made from it."
    >
      <div className="grid gap-8">
        <FreezeForm
          key={revisions.length}
          blockedBy={mayFreeze ? undefined : "asks for the role engineer, integrator or administrator"}
          refusal={refusal}
        />
        <Block title="Frozen states" about={<span className="font-mono">{formatCount(revisions.length)}</span>}>
          <TableScroll label="Revisions">
            <RevisionTable modelId={modelId} revisions={revisions} />
          </TableScroll>
        </Block>
        {compared ? <ComparisonBlock modelId={modelId} revisions={revisions} compared={compared} /> : null}
      </div>
    </Page>
  );
}

function FreezeForm({ blockedBy, refusal }: { blockedBy: string | undefined; refusal: string | undefined }) {
  const busy = useNavigation().state === "submitting";
  const form = useRef<HTMLFormElement>(null);
  useEffect(() => {
    if (refusal) form.current?.querySelector("input")?.focus();
  }, [refusal]);
  return (
    <Form method="post" ref={form} className="grid max-w-200 gap-3">
      {refusal ? <Notice tone="error" title={refusal} live /> : null}
      <div className="flex items-end gap-2">
        <Field label="Message" className="flex-1">
          {(control) => (
            <Input
              {...control}
              name="message"
              required
              maxLength={1000}
              placeholder="What this revision is for"
              disabled={blockedBy !== undefined}
            />
          )}
        </Field>
        <Button type="submit" tone="main" icon={Snowflake} busy={busy} {...(blockedBy ? { blockedBy } : {})}>
          Freeze a revision
        </Button>
      </div>
    </Form>
  );
}

function RevisionTable({ modelId, revisions }: Pick<Props, "modelId" | "revisions">) {
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
            <RowHead>{revision.message}</RowHead>
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
