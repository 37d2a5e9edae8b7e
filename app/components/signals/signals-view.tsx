import { Download } from "lucide-react";
import { useDeferredValue, useEffect, useMemo, useRef, useState } from "react";
import { useNavigate } from "react-router";
import { describe } from "~/components/model/edit-steps";
import type { OpenModel } from "~/components/model/use-model";
import { FindingShape } from "~/components/notation/finding-badge";
import { Button } from "~/components/ui/button";
import { Field, Input, Select, TextArea } from "~/components/ui/field";
import { Page } from "~/components/ui/page";
import { showToast } from "~/components/ui/toast";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { isTypeNode } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { addSignals } from "~/domain/editing/starters/add-signals";
import { readSignalList, type ColumnChoice } from "~/domain/editing/starters/read-signal-list";
import type { TextTable } from "~/domain/editing/starters/text-table";
import { fail, ok, type Problem, type Result } from "~/domain/core/result";
import { readCsv } from "~/utils/read-csv";
import { looksLikeWorkbook, readXlsx, type WorkbookSheet } from "~/utils/read-xlsx";
import { toNamespacePart } from "../models/propose-namespace";
import { ColumnMatch } from "./column-match";
import { proposeColumns, readTemplates, type ColumnTemplate } from "./column-templates";
import { downloadSignalList } from "./download-signal-list";
import { SignalTable } from "./signal-table";

type Props = { model: OpenModel; space: AddressSpace; editBlockedBy: string | undefined };

const newType = "new";
const example =
  "group,name,type,unit,low,high,description\nProcess,spindle speed,REAL,r/min,0,180,Speed of the spindles";

/** Pasted or read from a text file; or a workbook with the sheet that is taken. */
type Source =
  | { readonly kind: "text"; readonly text: string }
  | { readonly kind: "workbook"; readonly name: string; readonly sheets: readonly WorkbookSheet[]; readonly chosen: number }
  | { readonly kind: "unreadable"; readonly problems: readonly Problem[] };

/** Undefined while nothing was given. */
function readSource(source: Source): Result<TextTable> | undefined {
  if (source.kind === "unreadable") return fail(...source.problems);
  if (source.kind === "text") return source.text.trim() === "" ? undefined : readCsv(source.text);
  const sheet = source.sheets[source.chosen];
  return sheet ? ok(sheet.table) : undefined;
}

/** A signal list becomes members: paste or choose it, match the columns, look, and take it in one step. */
export function SignalsView({ model, space, editBlockedBy }: Props) {
  const navigate = useNavigate();
  const [source, setSource] = useState<Source>({ kind: "text", text: "" });
  const [matched, setMatched] = useState<ColumnChoice | undefined>(undefined);
  const [templates, setTemplates] = useState<readonly ColumnTemplate[]>([]);
  const [target, setTarget] = useState<string>(newType);
  const [typeName, setTypeName] = useState(`${toNamespacePart(model.workspace.model.name) || "Machine"}Type`);
  const file = useRef<HTMLInputElement>(null);
  const read = useDeferredValue(source);
  const table = useMemo(() => readSource(read), [read]);
  const head = table?.ok ? (table.value.rows[0]?.fields ?? []) : [];
  const columns = matched ?? proposeColumns(templates, head);
  const dataTypes = useMemo(() => listDataTypes(space), [space]);
  const list = useMemo(
    () => (table?.ok ? readSignalList(table.value, columns, (name) => dataTypes.get(name)) : undefined),
    [table, columns, dataTypes],
  );
  const problems = [...(table && !table.ok ? table.problems : []), ...(list?.problems ?? [])];
  const ownTypes = space.listOwnNodes().filter((node) => isTypeNode(node) && node.nodeClass === "ObjectType");
  const count = list?.signals.length ?? 0;

  useEffect(() => setTemplates(readTemplates()), []);

  function change(next: Source): void {
    setMatched(undefined);
    setSource(next);
  }
  async function chooseFile(chosen: File | undefined): Promise<void> {
    if (!chosen) return;
    const bytes = new Uint8Array(await chosen.arrayBuffer());
    if (!looksLikeWorkbook(bytes) && !/\.xls[xmb]?$/i.test(chosen.name)) return change({ kind: "text", text: new TextDecoder().decode(bytes) });
    const sheets = await readXlsx(bytes);
    change(sheets.ok ? { kind: "workbook", name: chosen.name, sheets: sheets.value, chosen: 0 } : { kind: "unreadable", problems: sheets.problems });
  }
  function clear(): void {
    if (file.current) file.current.value = "";
    change({ kind: "text", text: "" });
  }
  function take(): void {
    const type = target === newType ? { name: typeName.trim() } : { key: target as NodeKey };
    const edit = addSignals(space, model.editor.allocator, { type, signals: list?.signals ?? [] });
    const saved = edit.ok ? model.editor.dispatch("add-signals", edit.value.operations) : edit;
    if (!edit.ok || !saved.ok) {
      showToast({
        tone: "error",
        title: "The list could not be taken in",
        detail: describe(space, saved.problems).join(" "),
        seconds: 15,
      });
      return;
    }
    showToast({
      tone: "good",
      title: `${count} ${count === 1 ? "signal" : "signals"} taken in`,
      detail: "Undo takes all of them back in one step.",
    });
    const first = edit.value.made[0];
    void navigate(
      `/models/${model.workspace.model.id}/register${first === undefined ? "" : `?node=${encodeURIComponent(first)}`}`,
    );
  }

  return (
    <Page
      title="Signal list"
      about="Rows become members: a group becomes an Object, a signal a Variable with unit and range."
      actions={
        <Button icon={Download} onClick={() => void downloadSignalList(space, model.workspace.model.name)}>
          This model as signal list (XLSX)
        </Button>
      }
    >
      <div className="grid grid-cols-[minmax(0,1fr)_320px] gap-8 max-lg:grid-cols-1">
        <div className="grid grid-cols-[minmax(0,1fr)] content-start gap-5">
          {source.kind === "workbook" ? (
            <Workbook source={source} onSheet={(chosen) => change({ ...source, chosen })} onClear={clear} />
          ) : (
            <Field
              label="The list"
              hint="Copy the cells in your spreadsheet and paste them here, or choose a CSV or XLSX file. The first row holds the heads."
            >
              {(tied) => (
                <TextArea
                  {...tied}
                  mono
                  rows={table ? 5 : 10}
                  value={source.kind === "text" ? source.text : ""}
                  placeholder={example}
                  spellCheck={false}
                  onChange={(event) => change({ kind: "text", text: event.currentTarget.value })}
                />
              )}
            </Field>
          )}
          <input
            ref={file}
            type="file"
            aria-label="CSV or XLSX file"
            accept=".csv,.tsv,.txt,.xlsx,text/csv,text/plain,application/vnd.openxmlformats-officedocument.spreadsheetml.sheet"
            onChange={(event) => void chooseFile(event.currentTarget.files?.[0])}
            className="text-small file:mr-3 file:h-7 file:rounded-edge file:border file:border-edge file:bg-leaf file:px-2.5 file:text-small file:font-medium"
          />
          {head.length > 0 ? <ColumnMatch head={head} columns={columns} templates={templates} onChange={setMatched} onTemplates={setTemplates} /> : null}
          {list && count > 0 ? <SignalTable signals={list.signals} space={space} /> : null}
        </div>
        <aside className="grid content-start gap-4 border-t-[1.5px] border-ink pt-3">
          <h2 className="text-lead font-semibold">Take it in</h2>
          <Field label="Members of">
            {(tied) => (
              <Select {...tied} value={target} onChange={(event) => setTarget(event.currentTarget.value)}>
                <option value={newType}>a new type</option>
                {ownTypes.map((node) => (
                  <option key={node.key} value={node.key}>
                    {node.browseName.name}
                  </option>
                ))}
              </Select>
            )}
          </Field>
          {target === newType ? (
            <Field label="Name of the type">
              {(tied) => (
                <Input {...tied} value={typeName} onChange={(event) => setTypeName(event.currentTarget.value)} />
              )}
            </Field>
          ) : null}
          <Button
            tone="main"
            className="justify-self-start"
            onClick={take}
            blockedBy={editBlockedBy ?? (count === 0 ? "no signal has been read yet" : undefined)}
          >
            Take in {count} {count === 1 ? "signal" : "signals"}
          </Button>
          {problems.length > 0 ? (
            <section>
              <h3 className="mb-1 text-note font-medium text-ink-2">Problems {problems.length}</h3>
              <ul className="max-h-80 overflow-y-auto border-t border-ink">
                {problems.map((problem, i) => (
                  <li
                    key={`${problem.code} ${problem.at?.line ?? ""} ${i}`}
                    className="grid grid-cols-[14px_1fr] gap-1.5 border-b border-hair py-1 text-small"
                  >
                    <span className="pt-0.5">
                      <FindingShape severity={problem.severity} />
                    </span>
                    <span>
                      {problem.at?.line === undefined ? null : (
                        <span className="mr-1 font-mono text-note text-ink-3">line {problem.at.line}</span>
                      )}
                      {describe(space, [problem]).join(" ")}
                    </span>
                  </li>
                ))}
              </ul>
            </section>
          ) : null}
        </aside>
      </div>
    </Page>
  );
}

/** DataTypes of all loaded models by name; an own one wins over one of a required model. */
function listDataTypes(space: AddressSpace): ReadonlyMap<string, NodeKey> {
  const found = new Map<string, NodeKey>();
  for (const layer of space.layers) {
    for (const node of layer.nodes.values()) if (node.nodeClass === "DataType") found.set(node.browseName.name, node.key);
  }
  return found;
}

type WorkbookProps = { source: Extract<Source, { kind: "workbook" }>; onSheet: (index: number) => void; onClear: () => void };

/** The chosen workbook, and which of its sheets is the list. */
function Workbook({ source, onSheet, onClear }: WorkbookProps) {
  return (
    <div className="flex flex-wrap items-end gap-4 border border-rule bg-leaf p-3">
      <p className="min-w-40 text-small">
        <b className="block font-semibold">{source.name}</b>
        <span className="text-ink-3">{(source.sheets[source.chosen]?.table.rows.length ?? 1) - 1} rows below the heads</span>
      </p>
      <Field label="Sheet">
        {(tied) => (
          <Select {...tied} size="small" className="w-56" value={source.chosen} onChange={(event) => onSheet(Number(event.currentTarget.value))}>
            {source.sheets.map((sheet, i) => (
              <option key={sheet.name} value={i}>
                {sheet.name}
              </option>
            ))}
          </Select>
        )}
      </Field>
      <Button size="small" onClick={onClear}>
        Paste instead
      </Button>
    </div>
  );
}
