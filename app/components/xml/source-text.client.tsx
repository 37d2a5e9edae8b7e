import { useCallback, useEffect, useMemo, useRef, useState } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { writeNodeSet } from "~/domain/nodeset/write-nodeset";
import { describe } from "../model/edit-steps";
import type { FindingStore } from "../model/finding-store";
import { useFindingTally, useOpenModel, useSelection, useSpace } from "../model/use-model";
import { showToast } from "../ui/toast";
import { checkSource, type CheckedSource } from "./check-source";
import { applyTheme, monaco, THEME } from "./load-monaco.client";
import { SourceBar } from "./source-bar";
import { findDraft, keepDraft, type SourceDraft } from "./source-draft";
import { explainNames } from "./source-language.client";
import "./source-text.css";

const WRITE_DELAY = 250;
const MARKERS = "source";

/** The NodeSet2 text of the model as it would be exported now, in step with the selection of the other views. */
export default function SourceText() {
  const { workspace, editor: store, view, findings, actions } = useOpenModel();
  const modelId = workspace.model.id;
  const space = useSpace();
  const selection = useSelection();
  const tally = useFindingTally();
  const host = useRef<HTMLDivElement>(null);
  const [editor, setEditor] = useState<monaco.editor.IStandaloneCodeEditor>();
  const [draft, setDraft] = useState<SourceDraft | undefined>(() => findDraft(modelId));
  const [checked, setChecked] = useState<CheckedSource>();
  const written = useWrittenText(space, draft === undefined);
  const starts = useMemo(() => listStarts(written.lines), [written]);
  const latest = useRef({ starts, space, isEditing: draft !== undefined });
  latest.current = { starts, space, isEditing: draft !== undefined };
  const byCaret = useRef<NodeKey>(undefined);

  useEffect(() => {
    if (!host.current) return;
    applyTheme();
    const made = makeEditor(host.current);
    const model = made.getModel();
    const endNames = model ? explainNames(model, () => latest.current.space) : undefined;
    const pick = made.onDidChangeCursorPosition(({ position, reason }) => {
      if (reason !== monaco.editor.CursorChangeReason.Explicit || latest.current.isEditing) return;
      const key = findNodeAt(latest.current.starts, position.lineNumber);
      if (key === undefined) return;
      byCaret.current = key;
      view.select([key]);
    });
    const watcher = new MutationObserver(applyTheme);
    watcher.observe(document.documentElement, { attributes: true, attributeFilter: ["data-theme"] });
    setEditor(made);
    return () => {
      pick.dispose();
      endNames?.();
      watcher.disconnect();
      made.getModel()?.dispose();
      made.dispose();
    };
  }, [view]);

  useEffect(() => {
    const model = editor?.getModel();
    if (!editor || !model) return;
    const isFirst = model.getValueLength() === 0;
    showText(model, draft?.text ?? written.xml);
    if (isFirst && draft === undefined) void fold(editor, true);
    // While it is edited the text is the person's; what is typed must not be written over.
  }, [editor, written, draft === undefined]);

  useEffect(() => {
    editor?.updateOptions({ readOnly: draft === undefined, domReadOnly: draft === undefined, ariaLabel: getLabel(draft !== undefined) });
  }, [editor, draft === undefined]);

  useEffect(() => {
    const model = editor?.getModel();
    if (!model || !draft) return;
    const { base } = draft;
    const typing = model.onDidChangeContent(() => {
      const next = { base, text: model.getValue() };
      keepDraft(modelId, next);
      setDraft(next);
      setChecked(undefined);
    });
    return () => typing.dispose();
  }, [editor, modelId, draft?.base]);

  useEffect(() => {
    if (draft === undefined || draft.text === written.xml) return;
    const ask = (event: BeforeUnloadEvent): void => event.preventDefault();
    window.addEventListener("beforeunload", ask);
    return () => window.removeEventListener("beforeunload", ask);
  }, [draft, written]);

  useEffect(() => {
    const key = selection.at(-1);
    const line = key === undefined ? undefined : written.lines.get(key);
    if (!editor || line === undefined || draft !== undefined) return;
    const marks = editor.createDecorationsCollection([{ range: new monaco.Range(line, 1, line, 1), options: { isWholeLine: true, className: "source-selected", marginClassName: "source-selected" } }]);
    if (byCaret.current !== key) {
      editor.setPosition({ lineNumber: line, column: 1 });
      editor.revealLineInCenterIfOutsideViewport(line);
    }
    byCaret.current = undefined;
    return () => marks.clear();
  }, [editor, written, selection, draft === undefined]);

  useEffect(() => {
    if (!editor || draft !== undefined) return;
    const marks = editor.createDecorationsCollection(listFindingMarks(findings, written.lines));
    return () => marks.clear();
  }, [editor, written, findings, tally, draft === undefined]);

  useEffect(() => {
    const model = editor?.getModel();
    if (model) monaco.editor.setModelMarkers(model, MARKERS, listMarkers(model, checked));
  }, [editor, checked]);

  const showLine = useCallback(
    (line: number) => {
      editor?.setPosition({ lineNumber: line, column: 1 });
      editor?.revealLineInCenter(line);
      editor?.focus();
    },
    [editor],
  );
  function startEditing(): void {
    const next = { base: space, text: written.xml };
    keepDraft(modelId, next);
    setDraft(next);
    editor?.focus();
  }
  function leave(): void {
    keepDraft(modelId, undefined);
    setDraft(undefined);
    setChecked(undefined);
  }
  function apply(): void {
    if (!checked?.ok || !draft) return;
    // Others may have edited since the check.
    const again = checkSource(draft.base, store.getState().space, draft.text);
    if (!again.ok) return setChecked(again);
    const applied = store.dispatch("edit-source", again.operations);
    if (!applied.ok) {
      const notes = applied.problems.map((found) => ({ severity: found.severity, line: undefined, text: describe(space, [found]).join(" ") }));
      return setChecked({ ok: false, notes });
    }
    const { added, changed, removed } = again.counts;
    showToast({ tone: "good", title: "The text was applied as one edit", detail: `Nodes: ${added} added, ${changed} changed, ${removed} removed. Ctrl Z takes it back.` });
    leave();
  }
  return (
    <section className="source-text" aria-label="Source text">
      <SourceBar
        isEditing={draft !== undefined}
        isChanged={draft !== undefined && draft.text !== written.xml}
        checked={checked}
        editBlockedBy={actions.canEdit ? undefined : "asks for the role engineer or administrator"}
        onFold={(isFolded) => editor && void fold(editor, isFolded)}
        onEdit={startEditing}
        onCheck={() => draft && setChecked(checkSource(draft.base, space, draft.text))}
        onApply={apply}
        onLeave={leave}
        onShow={showLine}
      />
      <div ref={host} className="min-h-0 flex-1" />
    </section>
  );
}

async function fold(editor: monaco.editor.IStandaloneCodeEditor, isFolded: boolean): Promise<void> {
  await editor.getAction(isFolded ? "editor.foldAll" : "editor.unfoldAll")?.run();
}

/** Changes only the lines that differ, so that folds and the place in the text stay. */
function showText(model: monaco.editor.ITextModel, text: string): void {
  const [old, now] = [model.getLinesContent(), text.split("\n")];
  let first = 0;
  while (first < old.length && first < now.length && old[first] === now[first]) first++;
  let last = 0;
  while (last < old.length - first && last < now.length - first && old[old.length - 1 - last] === now[now.length - 1 - last]) last++;
  if (first === old.length && old.length === now.length) return;
  if (first === 0 || last === 0) return model.setValue(text);
  const range = new monaco.Range(first, model.getLineMaxColumn(first), old.length - last, model.getLineMaxColumn(old.length - last));
  const lines = now.slice(first, now.length - last);
  model.applyEdits([{ range, text: lines.length === 0 ? "" : `\n${lines.join("\n")}` }]);
}

function listMarkers(model: monaco.editor.ITextModel, checked: CheckedSource | undefined): monaco.editor.IMarkerData[] {
  return (checked?.notes ?? []).flatMap(({ line, text, severity }) => {
    if (line === undefined || line > model.getLineCount()) return [];
    const level = severity === "error" ? monaco.MarkerSeverity.Error : severity === "warning" ? monaco.MarkerSeverity.Warning : monaco.MarkerSeverity.Info;
    const range = { startLineNumber: line, startColumn: model.getLineFirstNonWhitespaceColumn(line), endLineNumber: line, endColumn: model.getLineMaxColumn(line) };
    return [{ ...range, message: text, severity: level }];
  });
}

function getLabel(isEditing: boolean): string {
  return isEditing ? "NodeSet2 text of the model, in edit" : "NodeSet2 text of the model, read only";
}

/** Written anew shortly after the last edit; the first text comes at once. While it is edited it stays. */
function useWrittenText(space: AddressSpace, isFollowing: boolean): ReturnType<typeof write> {
  const [written, setWritten] = useState(() => write(space));
  const shown = useRef(space);
  useEffect(() => {
    if (shown.current === space || !isFollowing) return;
    const timer = setTimeout(() => {
      shown.current = space;
      setWritten(write(space));
    }, WRITE_DELAY);
    return () => clearTimeout(timer);
  }, [space, isFollowing]);
  return written;
}

function write(space: AddressSpace) {
  return writeNodeSet({ header: space.own.header, nodes: space.listOwnNodes() }, { findNodeId: (key) => space.getNode(key)?.nodeId });
}

function makeEditor(element: HTMLElement): monaco.editor.IStandaloneCodeEditor {
  return monaco.editor.create(element, {
    value: "",
    language: "xml",
    theme: THEME,
    readOnly: true,
    domReadOnly: true,
    automaticLayout: true,
    fontFamily: "JetBrains Mono Variable, monospace",
    fontLigatures: false,
    fontSize: 12,
    lineHeight: 18,
    minimap: { enabled: false },
    scrollBeyondLastLine: false,
    glyphMargin: true,
    folding: true,
    renderLineHighlight: "line",
    stickyScroll: { enabled: true },
    showFoldingControls: "always",
    ariaLabel: getLabel(false),
    contextmenu: false,
  });
}

type Start = { readonly line: number; readonly key: NodeKey };

function listStarts(lines: ReadonlyMap<NodeKey, number>): Start[] {
  return [...lines].map(([key, line]) => ({ key, line })).sort((a, b) => a.line - b.line);
}

/** The node in whose element the line stands. */
function findNodeAt(starts: readonly Start[], line: number): NodeKey | undefined {
  let low = 0;
  let high = starts.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if ((starts[middle]?.line ?? 0) <= line) low = middle + 1;
    else high = middle;
  }
  return starts[low - 1]?.key;
}

function listFindingMarks(findings: FindingStore, lines: ReadonlyMap<NodeKey, number>): monaco.editor.IModelDeltaDecoration[] {
  return findings.getState().findings.flatMap((finding) => {
    const line = finding.key === undefined ? undefined : lines.get(finding.key);
    if (line === undefined) return [];
    const hoverMessage = { value: `**${finding.rule}** ${finding.message}\n\n${finding.facts.join("\n\n")}\n\n${finding.clause}` };
    return [{ range: new monaco.Range(line, 1, line, 1), options: { glyphMarginClassName: `source-mark is-${finding.severity}`, glyphMarginHoverMessage: hoverMessage } }];
  });
}
