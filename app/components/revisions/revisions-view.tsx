import { Snowflake } from "lucide-react";
import { useEffect, useRef } from "react";
import { Form, useNavigation } from "react-router";
import { ReleasesTable } from "~/components/releases/releases-table";
import { Button, LinkButton } from "~/components/ui/button";
import { Field, Input } from "~/components/ui/field";
import { Notice } from "~/components/ui/notice";
import { Block, Page } from "~/components/ui/page";
import { TableScroll } from "~/components/ui/table";
import type { ReleaseSummary } from "~/services/read-release.server";
import type { RevisionJson } from "~/utils/api-schemas";
import { formatCount } from "~/utils/format";
import type { Compared } from "./compared";
import { ComparisonBlock } from "./comparison-block";
import { RevisionTable } from "./revision-table";
import { VariantsBlock, type VariantLine } from "./variants-block";

type Props = {
  modelId: string;
  revisions: readonly RevisionJson[];
  compared: Compared | null;
  releases: readonly ReleaseSummary[];
  variants: readonly VariantLine[];
  /** Set when the model is a variant itself. */
  variantOf: { readonly id: string; readonly name: string } | null;
  mayFreeze: boolean;
  mayEdit: boolean;
  refusal: string | undefined;
};

/** What the model was, and what has changed since. */
export function RevisionsView(props: Props) {
  const { modelId, revisions, compared, releases, variants, variantOf, mayFreeze, mayEdit, refusal } = props;
  return (
    <Page
      title="Revisions"
      about="Frozen states that never change. One revision id travels with everything made from it."
      actions={
        <>
          {mayEdit && !variantOf ? (
            <LinkButton to={`/models/${modelId}/parts`}>Required versions, split</LinkButton>
          ) : null}
          {variantOf ? (
            <LinkButton to={`/models/${modelId}/merge`}>Merge with {variantOf.name}</LinkButton>
          ) : (
            <LinkButton to={`/reviews?model=${modelId}`}>Ask for a review</LinkButton>
          )}
        </>
      }
    >
      <div className="grid gap-8">
        <FreezeForm
          key={revisions.length}
          blockedBy={mayFreeze ? undefined : "asks for the role engineer, integrator or administrator"}
          refusal={refusal}
        />
        <Block title="Frozen states" about={<span className="font-mono">{formatCount(revisions.length)}</span>}>
          <TableScroll label="Revisions">
            <RevisionTable
              modelId={modelId}
              revisions={revisions}
              releases={releases}
              mayEdit={mayEdit}
              isVariant={variantOf !== null}
            />
          </TableScroll>
        </Block>
        {releases.length > 0 ? (
          <Block title="Releases" about={<span className="font-mono">{releases.length}</span>}>
            <ReleasesTable releases={releases} />
          </Block>
        ) : null}
        {variants.length > 0 ? <VariantsBlock variants={variants} /> : null}
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
      <input type="hidden" name="intent" value="freeze" />
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
