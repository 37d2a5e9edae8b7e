import { useEffect, useMemo, useRef, useState } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { writeNodeSet } from "~/domain/nodeset/write-nodeset";
import type { FindingStore } from "../model/finding-store";
import { useFindingTally, useOpenModel, useSelection, useSpace } from "../model/use-model";
import { applyTheme, monaco, THEME } from "./load-monaco.client";
import "./source-text.css";

const WRITE_DELAY = 250;

/** The NodeSet2 text of the model as it would be exported now, in step with the selection of the other views. */
export default function SourceText() {
  const { view, findings } = useOpenModel();
  const space = useSpace();
  const selection = useSelection();
  const tally = useFindingTally();
  const host = useRef<HTMLDivElement>(null);
  const [editor, setEditor] = useState<monaco.editor.IStandaloneCodeEditor>();
  const written = useWrittenText(space);
  const starts = useMemo(() => listStarts(written.lines), [written]);
  const latest = useRef({ starts, lines: written.lines });
  latest.current = { starts, lines: written.lines };
  const byCaret = useRef<NodeKey>(undefined);

  useEffect(() => {
    if (!host.current) return;
    applyTheme();
    const made = makeEditor(host.current);
    const pick = made.onDidChangeCursorPosition(({ position, reason }) => {
      if (reason !== monaco.editor.CursorChangeReason.Explicit) return;
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
      watcher.disconnect();
      made.getModel()?.dispose();
      made.dispose();
    };
  }, [view]);

  useEffect(() => {
    if (!editor) return;
    const top = editor.getScrollTop();
    editor.getModel()?.setValue(written.xml);
    editor.setScrollTop(top);
  }, [editor, written]);

  useEffect(() => {
    const key = selection.at(-1);
    const line = key === undefined ? undefined : written.lines.get(key);
    if (!editor || line === undefined) return;
    const marks = editor.createDecorationsCollection([{ range: new monaco.Range(line, 1, line, 1), options: { isWholeLine: true, className: "source-selected", marginClassName: "source-selected" } }]);
    if (byCaret.current !== key) {
      editor.setPosition({ lineNumber: line, column: 1 });
      editor.revealLineInCenterIfOutsideViewport(line);
    }
    byCaret.current = undefined;
    return () => marks.clear();
  }, [editor, written, selection]);

  useEffect(() => {
    if (!editor) return;
    const marks = editor.createDecorationsCollection(listFindingMarks(findings, written.lines));
    return () => marks.clear();
  }, [editor, written, findings, tally]);

  return (
    <section className="source-text" aria-label="Source text">
      <div ref={host} className="min-h-0 flex-1" />
    </section>
  );
}

/** Written anew shortly after the last edit; the first text comes at once. */
function useWrittenText(space: AddressSpace): ReturnType<typeof write> {
  const [written, setWritten] = useState(() => write(space));
  const shown = useRef(space);
  useEffect(() => {
    if (shown.current === space) return;
    const timer = setTimeout(() => {
      shown.current = space;
      setWritten(write(space));
    }, WRITE_DELAY);
    return () => clearTimeout(timer);
  }, [space]);
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
    ariaLabel: "NodeSet2 text of the model, read only",
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
