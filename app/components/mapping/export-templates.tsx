import { Check, Plus } from "lucide-react";
import { useEffect, useState } from "react";
import { FindingShape } from "~/components/notation/finding-badge";
import { useOpenModel } from "~/components/model/use-model";
import { Button } from "~/components/ui/button";
import { cx } from "~/components/ui/cx";
import { Field, Input, TextArea } from "~/components/ui/field";
import { Icon } from "~/components/ui/icon";
import { Block } from "~/components/ui/page";
import type { NodeKey } from "~/domain/address-space/node-id";
import { DownloadLink } from "./download-link";
import {
  useExportTemplates,
  type CaseResult,
  type ExportTemplateStore,
  type TemplateDraft,
} from "./use-export-templates";

const PREVIEW_DELAY_MS = 400;

const first: TemplateDraft = {
  name: "",
  gatewayType: "",
  fileName: "{name}.txt",
  template:
    "# {{ machineType }}{% if machine %}, {{ machine.name }}{% endif %}\n{% for row in rows %}{{ row.target }} = {{ row.source.kind }}\n{% endfor %}",
  cases: [],
};

/** Text templates that a team writes once for a kind of gateway, looped over the rows of the mapping. */
export function ExportTemplates({ of, isLocked }: { of: NodeKey; isLocked: boolean }) {
  const { workspace } = useOpenModel();
  const store = useExportTemplates();
  const [draft, setDraft] = useState<TemplateDraft | undefined>(undefined);
  const blockedBy = workspace.permissions.includes("mapping.edit")
    ? undefined
    : "asks for the role integrator, engineer or administrator";
  const base = `/models/${workspace.model.id}/deliver/template`;
  return (
    <Block
      title="Export templates"
      about="Text for a kind of gateway, made of the rows of this mapping."
      actions={
        <Button size="small" icon={Plus} blockedBy={blockedBy} onClick={() => setDraft(first)}>
          Template
        </Button>
      }
    >
      {store.templates?.length === 0 && !draft ? (
        <p className="text-small text-ink-2">
          None yet. Write what a gateway of yours loads once, with a loop over the rows; every machine then gets its
          file.
        </p>
      ) : (
        <ul aria-label="Export templates" className="border-t border-ink">
          {(store.templates ?? []).map((template) => (
            <li
              key={template.id}
              className={cx(
                "grid grid-cols-[200px_160px_minmax(0,1fr)_auto_auto] items-center gap-4 border-b border-hair py-1.5 text-small",
                draft?.id === template.id && "bg-copper-wash",
              )}
            >
              <span className="pl-2 font-semibold">{template.name}</span>
              <span className="text-ink-2">{template.gatewayType}</span>
              <code>{template.fileName}</code>
              <Button
                size="small"
                aria-expanded={draft?.id === template.id}
                onClick={() => setDraft(draft?.id === template.id ? undefined : template)}
              >
                Open
              </Button>
              <DownloadLink
                href={`${base}?of=${encodeURIComponent(of)}&template=${template.id}`}
                name={template.name}
                isLocked={isLocked}
              />
            </li>
          ))}
        </ul>
      )}
      {draft ? (
        <TemplateEditor
          key={draft.id ?? "new"}
          draft={draft}
          of={of}
          modelId={workspace.model.id}
          store={store}
          blockedBy={blockedBy}
          onDone={() => setDraft(undefined)}
        />
      ) : null}
    </Block>
  );
}

type EditorProps = {
  draft: TemplateDraft;
  of: NodeKey;
  modelId: string;
  store: ExportTemplateStore;
  blockedBy: string | undefined;
  onDone: () => void;
};

function TemplateEditor({ draft, of, modelId, store, blockedBy, onDone }: EditorProps) {
  const [name, setName] = useState(draft.name);
  const [gatewayType, setGatewayType] = useState(draft.gatewayType);
  const [fileName, setFileName] = useState(draft.fileName);
  const [template, setTemplate] = useState(draft.template);
  const [cases, setCases] = useState(draft.cases);
  const [results, setResults] = useState<readonly CaseResult[] | undefined>(undefined);
  const { text, failure } = usePreview(store, template, modelId, of);

  async function save(nextCases = cases): Promise<void> {
    const id = await store.save({
      ...(draft.id === undefined ? {} : { id: draft.id }),
      name,
      gatewayType,
      fileName,
      template,
      cases: nextCases.map((one) => ({ ...one })),
    });
    if (id === undefined) return;
    if (draft.id === undefined) onDone();
    else setResults(await store.runCases(id));
  }
  function keepCase(): void {
    if (text === undefined) return;
    const next = [
      ...cases,
      {
        name: `as of ${new Date().toISOString().slice(0, 16).replace("T", " ")}`,
        modelId,
        machineKey: of,
        expected: text,
      },
    ];
    setCases(next);
    void save(next);
  }
  const isBlocked = blockedBy ?? (name.trim() === "" ? "it needs a name" : undefined);
  return (
    <div className="mt-3 grid gap-3 border border-rule bg-bench p-3">
      <div className="grid grid-cols-3 gap-3">
        <Field label="Name of the template">
          {(tied) => (
            <Input
              {...tied}
              size="small"
              value={name}
              maxLength={100}
              onChange={(event) => setName(event.currentTarget.value)}
            />
          )}
        </Field>
        <Field label="Kind of gateway">
          {(tied) => (
            <Input
              {...tied}
              size="small"
              value={gatewayType}
              maxLength={100}
              onChange={(event) => setGatewayType(event.currentTarget.value)}
            />
          )}
        </Field>
        <Field label="File name" hint="{name} stands for the machine">
          {(tied) => (
            <Input
              {...tied}
              size="small"
              mono
              value={fileName}
              maxLength={200}
              onChange={(event) => setFileName(event.currentTarget.value)}
            />
          )}
        </Field>
      </div>
      <div className="grid grid-cols-2 gap-3">
        <Field
          label="Template"
          hint="Liquid: {{ row.target }}, {% for row in rows %}, row.source, row.transforms, row.node.nodeId, row.binding, machine.name. No code is run."
          errors={failure === undefined ? undefined : [failure]}
        >
          {(tied) => (
            <TextArea
              {...tied}
              mono
              rows={14}
              value={template}
              spellCheck={false}
              onChange={(event) => setTemplate(event.currentTarget.value)}
            />
          )}
        </Field>
        <Field label="Preview">{(tied) => <TextArea {...tied} mono readOnly rows={14} value={text ?? ""} />}</Field>
      </div>
      <div className="flex flex-wrap items-center gap-2">
        <Button
          tone="main"
          size="small"
          blockedBy={isBlocked ?? (failure === undefined ? undefined : "the template has a fault")}
          onClick={() => void save()}
        >
          Save the template
        </Button>
        {draft.id === undefined ? null : (
          <>
            <Button
              size="small"
              blockedBy={isBlocked ?? (text === undefined ? "there is no preview" : undefined)}
              onClick={keepCase}
            >
              Keep the preview as a case
            </Button>
            <Button
              size="small"
              tone="danger"
              blockedBy={blockedBy}
              onClick={() => void store.remove(draft.id ?? "").then((done) => done && onDone())}
            >
              Remove
            </Button>
          </>
        )}
        <Button size="small" tone="bare" onClick={onDone}>
          Close
        </Button>
      </div>
      {cases.length > 0 ? (
        <ul aria-label="Cases of the template" className="border-t border-rule text-small">
          {cases.map((one) => {
            const result = results?.find((each) => each.name === one.name);
            return (
              <li key={one.name} className="flex items-center gap-2 border-b border-hair py-1">
                {result === undefined ? null : result.holds ? (
                  <Icon of={Check} className="text-good" label="passes" />
                ) : (
                  <FindingShape severity="error" />
                )}
                <span className="font-semibold">{one.name}</span>
                <span className="text-ink-2">
                  {result === undefined
                    ? "runs when the template is saved"
                    : result.holds
                      ? "passes"
                      : `fails in line ${result.line}: ${result.message}`}
                </span>
                <Button
                  size="small"
                  tone="bare"
                  className="ml-auto"
                  blockedBy={blockedBy}
                  onClick={() => setCases(cases.filter((each) => each !== one))}
                >
                  Drop
                </Button>
              </li>
            );
          })}
        </ul>
      ) : null}
    </div>
  );
}

/** The text that the template makes now, a moment after the last key. */
function usePreview(
  store: ExportTemplateStore,
  template: string,
  modelId: string,
  of: NodeKey,
): { text: string | undefined; failure: string | undefined } {
  const [state, setState] = useState<{ text: string | undefined; failure: string | undefined }>({
    text: undefined,
    failure: undefined,
  });
  useEffect(() => {
    let isOver = false;
    const timer = setTimeout(() => {
      void store.preview(template, modelId, of).then((answer) => {
        if (!isOver)
          setState(
            answer.ok ? { text: answer.value.text, failure: undefined } : { text: undefined, failure: answer.message },
          );
      });
    }, PREVIEW_DELAY_MS);
    return () => {
      isOver = true;
      clearTimeout(timer);
    };
    // The store is made anew with each drawing; what it asks is said by the other three.
  }, [template, modelId, of]);
  return state;
}
