import { getFormProps, useForm, type SubmissionResult } from "@conform-to/react";
import { getZodConstraint, parseWithZod } from "@conform-to/zod/v4";
import { Download } from "lucide-react";
import type { ReactNode } from "react";
import { Form, useNavigation } from "react-router";
import { StatusBadge } from "~/components/notation/status-badge";
import { ConformField } from "~/components/shell/conform-field";
import { LocalTime } from "~/components/shell/local-time";
import { Button } from "~/components/ui/button";
import { Dialog, DialogClose } from "~/components/ui/dialog";
import { Icon } from "~/components/ui/icon";
import { Notice } from "~/components/ui/notice";
import { Block, Page } from "~/components/ui/page";
import { Table, Td, Th } from "~/components/ui/table";
import type { ModelWorkspace } from "~/presenters/model-workspace.server";
import { modelParticularsSchema as schema } from "~/utils/model-forms";

type Props = {
  workspace: ModelWorkspace;
  lastResult: SubmissionResult<string[]> | null;
  refusal: string | undefined;
  editBlockedBy: string | undefined;
};

export function AboutModel({ workspace, lastResult, refusal, editBlockedBy }: Props) {
  const { model } = workspace;
  return (
    <Page title="About this model" about={model.kind === "types" ? "a model of types" : "a model of machines"}>
      <div className="grid grid-cols-[minmax(0,1fr)_420px] gap-10 max-lg:grid-cols-1">
        <div className="grid content-start gap-8">
          <Block title="Facts">
            <dl className="grid grid-cols-[120px_minmax(0,1fr)] border-t border-ink text-small">
              <Fact label="Namespace URI">
                <span className="font-mono">{model.namespaceUri}</span>
              </Fact>
              <Fact label="Version">
                <span className="font-mono">{model.version ?? "none"}</span>
              </Fact>
              <Fact label="Published">
                <span className="font-mono">{model.publicationDate?.slice(0, 10) ?? "not given"}</span>
              </Fact>
              <Fact label="Came here">
                <LocalTime iso={model.createdAt} />
              </Fact>
              <Fact label="Last edit">
                {model.updatedBy}, <LocalTime iso={model.updatedAt} />
              </Fact>
            </dl>
          </Block>
          <Block title="Stands on" about="required models, in the order in which they are loaded">
            <Table caption="Required models">
              <thead>
                <tr>
                  <Th>Model URI</Th>
                  <Th>Version</Th>
                  <Th>Published</Th>
                  <Th>State</Th>
                </tr>
              </thead>
              <tbody>
                {workspace.layers.map((layer) => (
                  <tr key={layer.modelUri}>
                    <Td mono>{layer.modelUri}</Td>
                    <Td mono>{layer.version}</Td>
                    <Td mono>{layer.publicationDate?.slice(0, 10)}</Td>
                    <Td>
                      <StatusBadge status="good">present</StatusBadge>
                    </Td>
                  </tr>
                ))}
              </tbody>
            </Table>
            {workspace.problems.map((problem) => (
              <Notice key={problem.message} tone={problem.severity === "error" ? "error" : "warning"} className="mt-2">
                {problem.message}
              </Notice>
            ))}
          </Block>
        </div>
        <div className="grid content-start gap-6">
          <RenameForm model={model} lastResult={lastResult} editBlockedBy={editBlockedBy} />
          <section className="grid gap-2 border-t border-rule pt-3">
            <h2 className="text-lead font-semibold">Export</h2>
            <p className="text-small text-ink-2">The NodeSet2 file, valid against the standard’s schema; the same model gives the same bytes.</p>
            <a
              href={`/models/${model.id}/nodeset`}
              download
              className="inline-flex h-7 items-center gap-1.5 justify-self-start rounded-edge border border-edge bg-leaf px-2.5 text-small font-medium hover:bg-bench-2"
            >
              <Icon of={Download} /> Download NodeSet2
            </a>
          </section>
          <section id="delete" className="grid gap-2 border-t border-rule pt-3">
            <h2 className="text-lead font-semibold">Delete</h2>
            <p className="text-small text-ink-2">With its history and sheets, for good. Its NodeIds are never given again.</p>
            {refusal ? <Notice tone="error" title={refusal} live /> : null}
            <DeleteModel model={model} editBlockedBy={editBlockedBy} />
          </section>
        </div>
      </div>
    </Page>
  );
}

function Fact({ label, children }: { label: string; children: ReactNode }) {
  return (
    <>
      <dt className="flex h-7 items-center border-b border-hair text-note text-ink-3">{label}</dt>
      <dd className="flex h-7 items-center border-b border-hair">{children}</dd>
    </>
  );
}

function RenameForm({ model, lastResult, editBlockedBy }: { model: ModelWorkspace["model"]; lastResult: SubmissionResult<string[]> | null; editBlockedBy: string | undefined }) {
  const busy = useNavigation().formData?.get("intent") === "rename";
  const [form, fields] = useForm({
    lastResult,
    defaultValue: { name: model.name },
    constraint: getZodConstraint(schema),
    onValidate: ({ formData }) => parseWithZod(formData, { schema }),
    shouldRevalidate: "onInput",
  });
  return (
    <Form method="post" {...getFormProps(form)} className="grid gap-3 border-t-[1.5px] border-ink pt-3">
      <h2 className="text-lead font-semibold">Name</h2>
      <input type="hidden" name="intent" value="rename" />
      <ConformField field={fields.name} label="Name of the model" hint="For the team’s screens. The namespace stays what it is." />
      <Button type="submit" tone="ink" busy={busy} blockedBy={editBlockedBy} className="justify-self-start">
        Rename
      </Button>
    </Form>
  );
}

function DeleteModel({ model, editBlockedBy }: { model: ModelWorkspace["model"]; editBlockedBy: string | undefined }) {
  if (editBlockedBy !== undefined)
    return (
      <Button tone="danger" blockedBy={editBlockedBy} className="justify-self-start">
        Delete model
      </Button>
    );
  return (
    <Dialog
      title={`Delete ${model.name}?`}
      about="The model, its history and its sheets are removed for good. Download the NodeSet2 file first if you may need it."
      trigger={
        <Button tone="danger" className="justify-self-start">
          Delete model
        </Button>
      }
    >
      <Form method="post" className="flex justify-end gap-2">
        <input type="hidden" name="intent" value="delete" />
        <DialogClose asChild>
          <Button>Keep it</Button>
        </DialogClose>
        <Button type="submit" tone="danger">
          Delete for good
        </Button>
      </Form>
    </Dialog>
  );
}
