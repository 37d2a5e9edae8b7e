import type { SubmissionResult } from "@conform-to/react";
import { Download } from "lucide-react";
import { useState, type ReactNode } from "react";
import { Form, useNavigation } from "react-router";
import { RequiredModelsField } from "~/components/library/required-models-field";
import { baseModelUri } from "~/components/library/required-closure";
import { LocalTime } from "~/components/shell/local-time";
import { Button, buttonClass, TextLink } from "~/components/ui/button";
import { Dialog, DialogClose } from "~/components/ui/dialog";
import { Field, Input } from "~/components/ui/field";
import { Icon } from "~/components/ui/icon";
import { Notice } from "~/components/ui/notice";
import { Block, Page } from "~/components/ui/page";
import type { IdPolicy } from "~/domain/address-space/id-policy";
import type { ModelWorkspace } from "~/presenters/model-workspace.server";
import type { Renumbering } from "~/presenters/renumberings.server";
import type { LibraryChoice } from "~/services/list-library-choices.server";
import type { AboutModelForm } from "~/utils/model-forms";
import { IdPolicyForm } from "./id-policy-form";
import { RenumberingsTable } from "./renumberings-table";

type Intent = AboutModelForm["intent"];
type Answer = {
  readonly intent: Intent | undefined;
  readonly submission: SubmissionResult<string[]> | null;
  readonly refusal: string | undefined;
};

type Props = {
  workspace: ModelWorkspace;
  required: readonly string[];
  choices: readonly LibraryChoice[];
  idPolicy: IdPolicy | undefined;
  renumberings: readonly Renumbering[];
  answer: Answer | undefined;
  editBlockedBy: string | undefined;
};

export function AboutModel({ workspace, required, choices, idPolicy, renumberings, answer, editBlockedBy }: Props) {
  const isSettingIds = useIsSending("set-id-policy");
  const { model } = workspace;
  const refusalOf = (intent: Intent) => (answer?.intent === intent ? answer.refusal : undefined);
  const errorsOf = (intent: Intent, field: string) =>
    answer?.intent === intent ? (answer.submission?.error?.[field] ?? undefined) : undefined;
  return (
    <Page title="About this model" about={model.kind === "types" ? "a model of types" : "a model of machines"}>
      <div className="grid grid-cols-[minmax(0,1fr)_400px] gap-10 max-lg:grid-cols-1">
        <div className="grid content-start gap-8">
          <Facts model={model} />
          <Block title="Required models">
            {workspace.pins.map((pin) => (
              <PinnedNotice key={pin.modelUri} pin={pin} modelId={model.id} />
            ))}
            {workspace.problems.map((problem) => (
              <Notice key={problem.message} tone={problem.severity === "error" ? "error" : "warning"} className="mb-2">
                {problem.message}
              </Notice>
            ))}
            <RequiredForm
              key={required.join(" ")}
              required={required}
              choices={choices}
              refusal={refusalOf("set-required")}
              editBlockedBy={editBlockedBy}
            />
          </Block>
          <Block title="Renumbered">
            <RenumberingsTable list={renumberings} />
          </Block>
        </div>
        <div className="grid content-start gap-5">
          <FieldForm
            intent="rename"
            name="name"
            label="Name"
            hint="For the team’s screens. The namespace stays what it is."
            value={model.name}
            errors={errorsOf("rename", "name")}
            action="Rename"
            editBlockedBy={editBlockedBy}
            first
          />
          <FieldForm
            intent="set-version"
            name="version"
            label="Version"
            hint="Written into the header and into the namespace’s metadata, with the date of today."
            value={model.version ?? ""}
            errors={
              errorsOf("set-version", "version") ??
              (refusalOf("set-version") ? [refusalOf("set-version") ?? ""] : undefined)
            }
            action="Set version"
            editBlockedBy={editBlockedBy}
            mono
          />
          <Part
            title="Export"
            about="The NodeSet2 file, valid against the standard’s schema; the same model gives the same bytes."
          >
            <a
              href={`/models/${model.id}/nodeset`}
              download
              className={buttonClass("plain", "medium", "justify-self-start")}
            >
              <Icon of={Download} /> Download NodeSet2
            </a>
            <a
              href={`/models/${model.id}/nodeset?order=canonical`}
              download
              className={buttonClass("plain", "medium", "justify-self-start")}
            >
              <Icon of={Download} /> The same in canonical order
            </a>
            <a
              href={`/api/v1/models/${model.id}/node-ids`}
              download
              className={buttonClass("plain", "medium", "justify-self-start")}
            >
              <Icon of={Download} /> Download NodeIds as CSV
            </a>
          </Part>
          <Part
            id="node-ids"
            title="NodeIds"
            about="Given once and for all; nodes that are there keep theirs until somebody renumbers them."
          >
            <IdPolicyForm
              key={JSON.stringify(idPolicy)}
              policy={idPolicy}
              refusal={refusalOf("set-id-policy")}
              isSending={isSettingIds}
              editBlockedBy={editBlockedBy}
            />
          </Part>
          <Part
            id="delete"
            title="Delete"
            about="With its history and sheets, for good. Its NodeIds are never given again."
          >
            {refusalOf("delete") ? <Notice tone="error" title={refusalOf("delete")} live /> : null}
            <DeleteModel model={model} editBlockedBy={editBlockedBy} />
          </Part>
        </div>
      </div>
    </Page>
  );
}

/** Machines stand on a frozen revision; what the types have got since waits until somebody takes it. */
function PinnedNotice({ pin, modelId }: { pin: ModelWorkspace["pins"][number]; modelId: string }) {
  const later =
    pin.newest > pin.number
      ? `Revision ${pin.newest} is frozen since.`
      : pin.editsSince > 0
        ? `It was edited since; freeze a revision there to take what is new.`
        : "Nothing was changed in it since.";
  return (
    <Notice title={`${pin.modelName} is held at revision ${pin.number}: ${pin.message}`} className="mb-2">
      {later} <TextLink to={`/models/${modelId}/roll-out?take=${pin.newest}`}>Type version of the machines</TextLink>
    </Notice>
  );
}

function Facts({ model }: { model: ModelWorkspace["model"] }) {
  return (
    <Block title="Facts">
      <dl className="grid grid-cols-[120px_minmax(0,1fr)] border-t border-ink text-small">
        <Fact label="Namespace URI">
          <span className="font-mono">{model.namespaceUri}</span>
        </Fact>
        <Fact label="Version">
          <span className="font-mono">
            {[model.version, model.publicationDate?.slice(0, 10)].filter(Boolean).join(" · ") || "not given"}
          </span>
        </Fact>
        <Fact label="Came here">
          <LocalTime iso={model.createdAt} />
        </Fact>
        <Fact label="Last edit">
          <span>
            {model.updatedBy}, <LocalTime iso={model.updatedAt} />
          </span>
        </Fact>
      </dl>
    </Block>
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

function Part({ id, title, about, children }: { id?: string; title: string; about: string; children: ReactNode }) {
  return (
    <section id={id} className="grid gap-2 border-t border-rule pt-3">
      <h2 className="text-lead font-semibold">{title}</h2>
      <p className="text-small text-ink-2">{about}</p>
      {children}
    </section>
  );
}

function useIsSending(intent: Intent): boolean {
  return useNavigation().formData?.get("intent") === intent;
}

type RequiredFormProps = Pick<Props, "required" | "choices" | "editBlockedBy"> & { refusal: string | undefined };

function RequiredForm({ required, choices, refusal, editBlockedBy }: RequiredFormProps) {
  const before = required.filter((uri) => uri !== baseModelUri);
  const [chosen, setChosen] = useState<readonly string[]>(before);
  const isSending = useIsSending("set-required");
  const isSame = chosen.length === before.length && chosen.every((uri) => before.includes(uri));
  return (
    <Form method="post" className="grid gap-3">
      <input type="hidden" name="intent" value="set-required" />
      {refusal ? <Notice tone="error" title={refusal} live /> : null}
      <RequiredModelsField
        choices={choices}
        chosen={chosen}
        onChange={setChosen}
        disabled={editBlockedBy !== undefined}
      />
      {editBlockedBy === undefined ? (
        <Button
          type="submit"
          tone="ink"
          busy={isSending}
          blockedBy={isSame ? "nothing was changed" : undefined}
          className="justify-self-start"
        >
          Save required models
        </Button>
      ) : null}
    </Form>
  );
}

type FieldFormProps = {
  intent: Intent;
  name: string;
  label: string;
  hint: string;
  value: string;
  errors: readonly string[] | undefined;
  action: string;
  editBlockedBy: string | undefined;
  mono?: boolean;
  first?: boolean;
};

function FieldForm({ intent, name, label, hint, value, errors, action, editBlockedBy, mono, first }: FieldFormProps) {
  const isSending = useIsSending(intent);
  return (
    <Form
      method="post"
      key={value}
      className={first ? "grid gap-2 border-t-[1.5px] border-ink pt-3" : "grid gap-2 border-t border-rule pt-3"}
    >
      <input type="hidden" name="intent" value={intent} />
      <Field label={label} hint={hint} errors={errors}>
        {(tied) => (
          <Input
            {...tied}
            name={name}
            defaultValue={value}
            maxLength={100}
            required
            readOnly={editBlockedBy !== undefined}
            {...(mono ? { mono } : {})}
          />
        )}
      </Field>
      {editBlockedBy === undefined ? (
        <Button type="submit" busy={isSending} className="justify-self-start">
          {action}
        </Button>
      ) : null}
    </Form>
  );
}

function DeleteModel({ model, editBlockedBy }: { model: ModelWorkspace["model"]; editBlockedBy: string | undefined }) {
  const button = (blockedBy?: string) => (
    <Button tone="danger" blockedBy={blockedBy} className="justify-self-start">
      Delete model
    </Button>
  );
  if (editBlockedBy !== undefined) return button(editBlockedBy);
  return (
    <Dialog
      title={`Delete ${model.name}?`}
      about="The model, its history and its sheets are removed for good. Download the NodeSet2 file first if you may need it."
      trigger={button()}
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
