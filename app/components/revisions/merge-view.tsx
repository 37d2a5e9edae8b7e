import { Form, useNavigation } from "react-router";
import { Button, LinkButton } from "~/components/ui/button";
import { Notice } from "~/components/ui/notice";
import { Block, Page } from "~/components/ui/page";
import type { MergePreview } from "~/services/branch-model.server";
import { formatCount } from "~/utils/format";

type Preview = Omit<MergePreview, "operations"> & { readonly operations: number };
type Props = {
  modelId: string;
  direction: MergePreview["direction"];
  preview: Preview | null;
  problems: readonly string[];
  errors: readonly string[];
};

/** A merge, conflict by conflict: what both changed in different ways waits for a choice; the rest is taken as it is. */
export function MergeView({ modelId, direction, preview, problems, errors }: Props) {
  const busy = useNavigation().state === "submitting";
  const other = direction === "into-model" ? "into-variant" : "into-model";
  return (
    <Page
      title={preview ? `Merge ${preview.theirs.name} into ${preview.ours.name}` : "Merge"}
      about="What only one side changed is taken. Nothing is left out without being listed."
      actions={<LinkButton to={`/models/${modelId}/merge?direction=${other}`}>The other way round</LinkButton>}
    >
      <div className="grid max-w-260 gap-6">
        {[...problems, ...errors].map((text) => (
          <Notice key={text} tone="error" title={text} live />
        ))}
        {preview ? (
          <Form method="post" className="grid gap-6" key={`${preview.ours.seq} ${preview.theirs.seq}`}>
            <input type="hidden" name="direction" value={direction} />
            <input type="hidden" name="ours" value={preview.ours.seq} />
            <input type="hidden" name="theirs" value={preview.theirs.seq} />
            <Block title="Conflicts" about={<span className="font-mono">{preview.conflicts.length}</span>}>
              {preview.conflicts.length === 0 ? (
                <p className="border-t border-ink py-2 text-small text-ink-2">
                  None: the two sides changed different things.
                </p>
              ) : (
                preview.conflicts.map((conflict) => (
                  <Conflict key={conflict.id} conflict={conflict} preview={preview} />
                ))
              )}
            </Block>
            <div className="flex items-center gap-3">
              <Button type="submit" tone="main" busy={busy}>
                Merge
              </Button>
              <span className="text-small text-ink-2">
                {preview.operations === 0
                  ? "Nothing would change as it stands."
                  : `${formatCount(preview.operations)} operations as one edit of ${preview.ours.name}, which can be undone.`}
              </span>
            </div>
          </Form>
        ) : null}
      </div>
    </Page>
  );
}

function Conflict({ conflict, preview }: { conflict: Preview["conflicts"][number]; preview: Preview }) {
  const sides = [
    { value: "ours", name: preview.ours.name, text: conflict.ours },
    { value: "theirs", name: preview.theirs.name, text: conflict.theirs },
  ] as const;
  return (
    <fieldset className="border-t border-hair py-2 first:border-ink">
      <legend className="float-left w-full pb-1 text-small">
        <b>{conflict.path || "the model"}</b> <span className="text-ink-2">{conflict.what}</span>
        {conflict.base === null ? null : <span className="text-ink-3"> · was {conflict.base}</span>}
      </legend>
      <div className="clear-both grid grid-cols-2 gap-3 max-sm:grid-cols-1">
        {sides.map((side) => (
          <label
            key={side.value}
            className="flex cursor-pointer items-start gap-2 border border-rule bg-leaf p-2 text-small has-checked:border-copper has-checked:bg-copper-wash"
          >
            <input
              type="radio"
              name={`choice ${conflict.id}`}
              value={side.value}
              required
              className="mt-0.5 accent-(--copper)"
            />
            <span className="min-w-0">
              <span className="block text-note text-ink-3">{side.name}</span>
              <span className="font-mono break-words">{side.text ?? "not there"}</span>
            </span>
          </label>
        ))}
      </div>
    </fieldset>
  );
}
