import { Form, useNavigation } from "react-router";
import { RatingBadge } from "~/components/notation/difference-badge";
import { Button } from "~/components/ui/button";
import { Checkbox, Field, Input } from "~/components/ui/field";
import { Notice } from "~/components/ui/notice";
import { Block, Page } from "~/components/ui/page";
import { RowHead, Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import { Tag } from "~/components/ui/tag";
import type { RetargetPreview, TargetVersion } from "~/services/retarget-model.server";

type Props = {
  namespaceUri: string;
  versions: readonly TargetVersion[];
  preview: RetargetPreview | null;
  types: readonly { readonly key: string; readonly nodeId: string; readonly name: string }[];
  errors: readonly string[];
};

const MAX_SHOWN = 200;

/** What a model stands on in which version, and taking a part of it into a namespace of its own. */
export function PartsView({ namespaceUri, versions, preview, types, errors }: Props) {
  const busy = useNavigation().formData?.get("intent");
  return (
    <Page title="Required versions, split">
      <div className="grid max-w-260 gap-8">
        {errors.map((text) => (
          <Notice key={text} tone="error" title={text} live />
        ))}
        <Block title="Required models" about="look at what another version would break before taking it">
          <TableScroll label="Versions of required models">
            <Table caption="Versions of required models that the library holds">
              <thead>
                <tr>
                  <Th>Model</Th>
                  <Th>Version</Th>
                  <Th>Published</Th>
                  <Th>
                    <span className="sr-only">Look</span>
                  </Th>
                </tr>
              </thead>
              <tbody>
                {versions.map((version) => (
                  <Tr key={`${version.modelUri} ${version.source}`}>
                    <RowHead className="font-mono font-normal">{version.modelUri}</RowHead>
                    <Td mono>{version.version ?? "–"}</Td>
                    <Td mono className="text-note">
                      {version.publicationDate ?? "–"}
                    </Td>
                    <Td right>
                      {version.isNow ? (
                        <Tag>stands on it</Tag>
                      ) : (
                        <Form method="get" preventScrollReset>
                          <input type="hidden" name="modelUri" value={version.modelUri} />
                          <input type="hidden" name="source" value={version.source} />
                          <Button type="submit" size="small">
                            What breaks?
                          </Button>
                        </Form>
                      )}
                    </Td>
                  </Tr>
                ))}
              </tbody>
            </Table>
          </TableScroll>
        </Block>
        {preview ? <BreaksBlock preview={preview} busy={busy === "retarget"} /> : null}
        <Block title="Split off" about="types into a namespace of their own; this model then requires the new one">
          <Form method="post" className="grid gap-3">
            <input type="hidden" name="intent" value="split" />
            <div className="grid grid-cols-2 gap-3 max-sm:grid-cols-1">
              <Field label="Name of the new model">
                {(control) => <Input {...control} name="name" required maxLength={100} />}
              </Field>
              <Field label="Namespace">
                {(control) => (
                  <Input
                    {...control}
                    name="namespaceUri"
                    mono
                    required
                    maxLength={400}
                    placeholder={`${namespaceUri.replace(/\/$/, "")}/Common/`}
                  />
                )}
              </Field>
            </div>
            <fieldset className="grid grid-cols-3 gap-1.5 max-lg:grid-cols-2 max-sm:grid-cols-1">
              <legend className="pb-1 text-note font-medium text-ink-2">Types that go, with their members</legend>
              {types.map((type) => (
                <Checkbox key={type.key} name="types" value={type.key} label={<i>{type.name}</i>} />
              ))}
            </fieldset>
            <p className="text-small text-ink-2">
              Every moved node gets another NodeId: for readers this is breaking, and the comparison will say so.
            </p>
            <Button type="submit" busy={busy === "split"} className="justify-self-start">
              Split them off
            </Button>
          </Form>
        </Block>
      </div>
    </Page>
  );
}

function BreaksBlock({ preview, busy }: { preview: RetargetPreview; busy: boolean }) {
  const { target, breaks } = preview;
  return (
    <Block
      title={`With ${target.version ?? target.publicationDate ?? "that version"} of ${target.modelUri}`}
      about={`${breaks.length} breaking`}
    >
      {breaks.length === 0 ? (
        <p className="border-t border-ink py-2 text-small text-ink-2">Nothing that this model uses breaks.</p>
      ) : (
        <TableScroll label="What breaks">
          <Table caption="Own nodes that use what changed">
            <thead>
              <tr>
                <Th>Own node</Th>
                <Th>Uses</Th>
                <Th>Change</Th>
                <Th>Why</Th>
              </tr>
            </thead>
            <tbody>
              {breaks.slice(0, MAX_SHOWN).map((row, i) => (
                <Tr key={i}>
                  <RowHead>{row.path}</RowHead>
                  <Td>{row.uses}</Td>
                  <Td>
                    <RatingBadge rating={row.rating} /> {row.kind.replaceAll("-", " ")}
                  </Td>
                  <Td className="text-note text-ink-2">
                    {row.reason} {row.clause}
                  </Td>
                </Tr>
              ))}
            </tbody>
          </Table>
        </TableScroll>
      )}
      {breaks.length > MAX_SHOWN ? <p className="text-note text-ink-3">and {breaks.length - MAX_SHOWN} more</p> : null}
      <Form method="post" className="mt-3">
        <input type="hidden" name="intent" value="retarget" />
        <input type="hidden" name="modelUri" value={target.modelUri} />
        <input type="hidden" name="source" value={target.source} />
        <Button type="submit" busy={busy}>
          Take this version
        </Button>
      </Form>
    </Block>
  );
}
