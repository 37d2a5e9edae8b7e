import { useState } from "react";
import { Form, useNavigation } from "react-router";
import type { ImportPreview } from "~/services/preview-import.server";
import { FindingShape } from "~/components/notation/finding-badge";
import { NodeClassGlyph } from "~/components/notation/node-class-glyph";
import { StatusBadge, type Status } from "~/components/notation/status-badge";
import { Button, LinkButton } from "~/components/ui/button";
import { Field, Input } from "~/components/ui/field";
import { Notice } from "~/components/ui/notice";
import { Block } from "~/components/ui/page";
import { Segments } from "~/components/ui/segments";
import { Table, Td, Th } from "~/components/ui/table";
import type { NodeClass } from "~/domain/address-space/node";
import { formatCount } from "~/utils/format";
import { ProblemList, type ShownProblem } from "./problem-list";

export type ImportTarget = "model" | "library";

type Props = {
  preview: ImportPreview;
  target: ImportTarget;
  /** Where the form is sent; the page itself when absent. */
  action?: string;
};

/** What the file is and what would come of it; nothing is stored yet. */
export function ImportPreviewView({ preview, target, action }: Props) {
  const main = preview.models[0];
  return (
    <div className="grid grid-cols-[minmax(0,1fr)_380px] gap-8 max-lg:grid-cols-1">
      <div className="grid content-start gap-6">
        <Block title={preview.fileName} about={`${formatCount(preview.bytes)} bytes`}>
          <p className="mb-3 text-small text-ink-2">
            A NodeSet2 file with {preview.models.length === 1 ? "one model" : `${preview.models.length} models`},{" "}
            {formatCount(preview.counts.nodes)} nodes and {formatCount(preview.counts.references)} references.
          </p>
          <Models preview={preview} />
        </Block>
        <Block title="Required models">
          <RequiredModels required={preview.required} />
        </Block>
        <Block title="Nodes">
          <Counts counts={preview.counts} />
        </Block>
        <Block title="Problems" about={preview.problems.length === 0 ? "none" : String(preview.problems.length)}>
          {preview.problems.length === 0 ? (
            <p className="border-t border-ink pt-2 text-small text-ink-2">The file was read without a problem.</p>
          ) : (
            <ProblemList problems={preview.problems} caption="Problems of the file" />
          )}
        </Block>
      </div>
      <ImportForm key={preview.uploadId} preview={preview} target={target} modelUri={main?.modelUri ?? ""} action={action} />
    </div>
  );
}

function Models({ preview }: { preview: ImportPreview }) {
  return (
    <Table caption="Models in the file">
      <thead>
        <tr>
          <Th>Model</Th>
          <Th>Version</Th>
          <Th>Published</Th>
        </tr>
      </thead>
      <tbody>
        {preview.models.map((model) => (
          <tr key={model.modelUri}>
            <Td mono>{model.modelUri}</Td>
            <Td mono>{model.version ?? "not given"}</Td>
            <Td mono>{model.publicationDate?.slice(0, 10) ?? "not given"}</Td>
          </tr>
        ))}
      </tbody>
    </Table>
  );
}

type Requirement = ImportPreview["required"][number];

/** A newer one is meant to be compatible (OPC 10000-6 §F.5); an older one may lack what the file uses. */
function describeRequirement({ state, publicationDate, found }: Requirement): { status: Status; words: string } {
  if (state === "missing") return { status: "bad", words: "missing" };
  if (state === "present") return { status: "good", words: "present" };
  const isNewer = (found?.publicationDate ?? "") >= (publicationDate ?? "");
  return isNewer
    ? { status: "good", words: "a newer one is present" }
    : { status: "uncertain", words: "only an older one is present" };
}

function RequiredModels({ required }: { required: ImportPreview["required"] }) {
  if (required.length === 0)
    return <p className="border-t border-ink pt-2 text-small text-ink-2">The file names none.</p>;
  return (
    <Table caption="Required models">
      <thead>
        <tr>
          <Th>Model</Th>
          <Th>Asked for</Th>
          <Th>In the library</Th>
        </tr>
      </thead>
      <tbody>
        {required.map((row) => (
          <tr key={row.modelUri}>
            <Td mono>{row.modelUri}</Td>
            <Td mono>{[row.version, row.publicationDate?.slice(0, 10)].filter(Boolean).join(" · ") || "any"}</Td>
            <Td>
              <StatusBadge status={describeRequirement(row).status}>
                {describeRequirement(row).words}
                {row.found && row.state === "other-version" ? (
                  <span className="font-mono">
                    {[row.found.version, row.found.publicationDate?.slice(0, 10)].filter(Boolean).join(" · ")}
                  </span>
                ) : null}
              </StatusBadge>
            </Td>
          </tr>
        ))}
      </tbody>
    </Table>
  );
}

function Counts({ counts }: { counts: ImportPreview["counts"] }) {
  const rows = Object.entries(counts.byClass) as [NodeClass, number][];
  return (
    <ul className="grid grid-cols-[repeat(auto-fill,minmax(170px,1fr))] border-t border-ink">
      {rows.map(([nodeClass, count]) => (
        <li key={nodeClass} className="flex h-7 items-center gap-2 border-b border-hair pr-4 text-small">
          <NodeClassGlyph kind={nodeClass} />
          {nodeClass}
          <span className="ml-auto font-mono">{formatCount(count)}</span>
        </li>
      ))}
    </ul>
  );
}

function ImportForm({ preview, target, modelUri, action }: { preview: ImportPreview; target: ImportTarget; modelUri: string; action: string | undefined }) {
  const [into, setInto] = useState<ImportTarget>(target);
  const busy = useNavigation().state !== "idle";
  const against: readonly ShownProblem[] = into === "model" ? preview.againstModel : preview.againstLibrary;
  return (
    <Form method="post" {...(action === undefined ? {} : { action })} className="grid content-start gap-4 border-t-[1.5px] border-ink pt-3">
      <input type="hidden" name="upload" value={preview.uploadId} />
      <h2 className="text-lead font-semibold">Take it in</h2>
      <Segments
        label="Take it in as"
        name="into"
        value={into}
        onChange={setInto}
        className="justify-self-start"
        options={[
          { value: "model", label: "A model of the team" },
          { value: "library", label: "Part of the library" },
        ]}
      />
      <p className="text-small text-ink-2">
        {into === "model"
          ? "Its namespace becomes yours to edit, with every NodeId as it is in the file."
          : "It can be required by your models and is read only."}
      </p>
      {into === "model" ? (
        <>
          <Field label="Name">
            {(tied) => <Input {...tied} name="name" defaultValue={preview.suggestedName} maxLength={100} required />}
          </Field>
          <div className="grid gap-1">
            <span className="text-note font-medium text-ink-2">Kind</span>
            <Segments
              label="Kind"
              name="kind"
              value={preview.suggestedKind}
              className="justify-self-start"
              options={[
                { value: "types", label: "Types" },
                { value: "machines", label: "Machines" },
              ]}
            />
          </div>
        </>
      ) : null}
      <div className="grid gap-0.5">
        <span className="text-note font-medium text-ink-2">Namespace</span>
        <span className="font-mono text-small break-all">{modelUri}</span>
      </div>
      {against.length > 0 ? (
        <Notice
          tone="error"
          glyph={<FindingShape severity="error" />}
          title={into === "model" ? "It cannot become a model" : "It cannot become part of the library"}
        >
          <ul className="grid gap-1">
            {against.map((problem) => (
              <li key={problem.message}>
                {problem.message}
                {problem.line === undefined ? null : (
                  <span className="font-mono text-note text-ink-2">
                    {" "}
                    line {problem.line}, column {problem.column ?? 1}
                  </span>
                )}
              </li>
            ))}
          </ul>
        </Notice>
      ) : null}
      <p className="flex flex-wrap gap-2">
        <Button
          type="submit"
          tone="main"
          busy={busy}
          blockedBy={against.length > 0 ? "see the problems above" : undefined}
          name="intent"
          value="import"
        >
          {into === "model" ? "Import as model" : "Add to library"}
        </Button>
        <LinkButton to={`/models/import?into=${into}`} reloadDocument>
          Another file
        </LinkButton>
      </p>
      <p className="text-note text-ink-3">Nothing is stored until you press the button; then all of it, or nothing.</p>
    </Form>
  );
}
