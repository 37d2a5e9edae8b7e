import { useEffect, useMemo, useRef, useState, type ReactNode } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { formatProblem } from "~/domain/core/problem-texts";
import { checkVariant } from "~/domain/nodeset/values/check-variant";
import type { Variant } from "~/domain/nodeset/values/variant";
import { getDataTypes } from "../model/read-typed-value";
import { Button } from "../ui/button";
import { makeValue } from "~/domain/nodeset/values/initial-value";
import { DraftEditor, ItemEditor, TypedDraftEditor } from "./item-editor";
import { listTypesFor } from "./shapes";
import { finishDraft, listReasons, toDraft, type Draft } from "./value-draft";
import { ValueFormContext, type ValueForm } from "./value-form";
import "./values.css";

export type ValueEditorProps = {
  label: string;
  space: AddressSpace;
  dataType: NodeKey;
  valueRank: number;
  /** As ArrayDimensions says them, 0 for any length. */
  dimensions?: readonly number[];
  /** Absent where there is none yet, or none that fits. */
  value?: Variant | undefined;
  readOnly?: boolean;
  /** Called once, with a value that fits; undefined takes the value away. */
  onCommit: (value: Variant | undefined) => void;
  onDiscard: () => void;
  /** Hears of each change, so that an unfinished draft outlives the form; undefined when there is nothing to keep. */
  onDraft?: (draft: Draft | undefined) => void;
  draft?: Draft | undefined;
  mayTakeAway?: boolean;
  head?: ReactNode;
};

/**
 * The form for a value of any DataType. Nothing is changed before Commit, which is one edit; Ctrl Enter commits, Esc leaves,
 * and asks a second time when something would be lost.
 */
export function ValueEditor(props: ValueEditorProps) {
  const {
    label,
    space,
    dataType,
    valueRank,
    dimensions,
    value,
    readOnly = false,
    onCommit,
    onDiscard,
    onDraft,
    mayTakeAway,
    head,
  } = props;
  const types = getDataTypes(space);
  const form = useMemo<ValueForm>(
    () => ({ space, types, readOnly, Item: ItemEditor, Draft: DraftEditor, TypedDraft: TypedDraftEditor }),
    [space, types, readOnly],
  );
  const [draft, setDraft] = useState<Draft>(
    () => props.draft ?? (value ? toDraft(value) : makeValue(form, dataType, valueRank, dimensions)),
  );
  const [start] = useState(draft);
  const [isLeaving, setLeaving] = useState(false);
  const newest = useRef(draft);
  newest.current = draft;
  const root = useRef<HTMLDivElement>(null);

  useEffect(() => {
    root.current
      ?.querySelector<HTMLElement>(".value-form input, .value-form select, .value-form textarea, .value-form button")
      ?.focus();
  }, []);

  const isChanged = draft !== start || props.draft !== undefined;
  const reasons = listReasons(draft);
  const finished = finishDraft(draft);
  const misfit = finished && checkVariant(finished, { dataType, valueRank }, types);
  const blockedBy =
    reasons.length > 0
      ? `${reasons.length === 1 ? "one field is" : `${reasons.length} fields are`} not finished`
      : misfit
        ? formatProblem(misfit)
        : undefined;

  function change(next: Draft): void {
    setLeaving(false);
    setDraft(next);
    onDraft?.(next);
  }
  function commit(): void {
    const ready = finishDraft(newest.current);
    if (readOnly || !ready || checkVariant(ready, { dataType, valueRank }, types)) return;
    onDraft?.(undefined);
    onCommit(ready);
  }
  function discard(): void {
    onDraft?.(undefined);
    onDiscard();
  }
  /** A field that is left hands its text over first. */
  function commitFromKey(): void {
    if (document.activeElement instanceof HTMLElement) document.activeElement.blur();
    setTimeout(commit, 0);
  }

  return (
    <div
      ref={root}
      role="group"
      aria-label={`Value of ${label}`}
      className="value-editor"
      onKeyDown={(event) => {
        event.stopPropagation();
        if (event.key === "Enter" && (event.ctrlKey || event.metaKey)) {
          event.preventDefault();
          commitFromKey();
        } else if (event.key === "Escape" && !event.defaultPrevented) {
          event.preventDefault();
          if (!isChanged || isLeaving || readOnly) discard();
          else setLeaving(true);
        }
      }}
    >
      {head}
      <ValueFormContext.Provider value={form}>
        <div className="value-form">
          <TypedDraftEditor
            label={label}
            draft={draft}
            onChange={change}
            dataType={dataType}
            valueRank={valueRank}
            allowed={listTypesFor(dataType, types.findBuiltInType(dataType))}
          />
        </div>
      </ValueFormContext.Provider>
      <footer className="value-foot">
        {readOnly ? null : (
          <Button size="small" tone="main" blockedBy={blockedBy} onClick={commit}>
            Commit
          </Button>
        )}
        <Button size="small" onClick={discard}>
          {readOnly || !isChanged ? "Close" : "Discard"}
        </Button>
        {mayTakeAway && !readOnly ? (
          <Button
            size="small"
            tone="bare"
            onClick={() => {
              onDraft?.(undefined);
              onCommit(undefined);
            }}
          >
            Take the value away
          </Button>
        ) : null}
        <span role="status" className="min-w-0 flex-1 text-note text-ink-3">
          {isLeaving ? (
            <b className="text-ink">Esc again discards what you changed.</b>
          ) : blockedBy ? (
            <span className="text-error">Not to be committed yet: {blockedBy}</span>
          ) : readOnly ? (
            "read only"
          ) : (
            "Ctrl Enter commits, Esc leaves"
          )}
        </span>
      </footer>
    </div>
  );
}
