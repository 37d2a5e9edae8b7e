import { FindingShape } from "../notation/finding-badge";
import { Button } from "../ui/button";
import type { CheckedSource, SourceNote } from "./check-source";

type Props = {
  isEditing: boolean;
  isChanged: boolean;
  checked: CheckedSource | undefined;
  editBlockedBy: string | undefined;
  onFold: (isFolded: boolean) => void;
  onEdit: () => void;
  onCheck: () => void;
  onApply: () => void;
  onLeave: () => void;
  onShow: (line: number) => void;
};

/** Above the text: folding, and the way into and out of editing it. */
export function SourceBar(props: Props) {
  const { isEditing, isChanged, checked, editBlockedBy, onFold, onEdit, onCheck, onApply, onLeave, onShow } = props;
  return (
    <>
      <div className="flex h-11 shrink-0 items-center gap-2 border-b border-rule px-5" role="toolbar" aria-label="Source text tools">
        <Button size="small" onClick={() => onFold(true)}>
          Fold to nodes
        </Button>
        <Button size="small" onClick={() => onFold(false)}>
          Unfold
        </Button>
        <span className="ml-auto text-note text-ink-3">{isEditing ? "The model stays as it is until you apply the text." : "Written from the model; point at a NodeId to see its name."}</span>
        {isEditing ? (
          <>
            <Button size="small" onClick={onLeave}>
              {isChanged ? "Discard the changes" : "Leave editing"}
            </Button>
            <Button size="small" blockedBy={isChanged ? undefined : "nothing was changed"} onClick={onCheck}>
              Check
            </Button>
            <Button size="small" tone="main" blockedBy={!checked ? "check it first" : !checked.ok ? "it cannot be applied" : checked.operations.length === 0 ? "nothing was changed" : undefined} onClick={onApply}>
              Apply as one edit
            </Button>
          </>
        ) : (
          <Button size="small" blockedBy={editBlockedBy} onClick={onEdit}>
            Edit as XML
          </Button>
        )}
      </div>
      {checked ? <Answer checked={checked} onShow={onShow} /> : null}
    </>
  );
}

function Answer({ checked, onShow }: { checked: CheckedSource; onShow: (line: number) => void }) {
  return (
    <section aria-label="What the check says" className="max-h-52 shrink-0 overflow-y-auto border-b-[1.5px] border-ink bg-bench px-5 py-2 text-small">
      <p role={checked.ok ? "status" : "alert"} className="font-semibold">
        {checked.ok ? tellCounts(checked) : "The text cannot be applied."}
      </p>
      {checked.notes.length > 0 ? (
        <ul className="mt-1">
          {checked.notes.slice(0, 100).map((note, i) => (
            <NoteRow key={`${note.line ?? ""} ${note.text} ${i}`} note={note} onShow={onShow} />
          ))}
          {checked.notes.length > 100 ? <li className="text-ink-3">and {checked.notes.length - 100} more</li> : null}
        </ul>
      ) : null}
    </section>
  );
}

function tellCounts({ operations, counts, notes }: Extract<CheckedSource, { ok: true }>): string {
  if (operations.length === 0) return "The text says what the model says already.";
  const parts = [`${counts.added} added`, `${counts.changed} changed`, `${counts.removed} removed`];
  const errors = notes.filter((note) => note.severity === "error").length;
  return `It can be applied. Nodes: ${parts.join(", ")}.${errors > 0 ? ` It brings ${errors} ${errors === 1 ? "error" : "errors"} of the checker.` : ""}`;
}

function NoteRow({ note, onShow }: { note: SourceNote; onShow: (line: number) => void }) {
  const { line } = note;
  return (
    <li className="flex items-start gap-2 border-t border-hair py-1">
      <span className="pt-0.5">
        <FindingShape severity={note.severity} />
      </span>
      {line === undefined ? null : (
        <button type="button" className="shrink-0 font-mono text-note text-ink-2 underline decoration-rule underline-offset-3 hover:text-copper" onClick={() => onShow(line)}>
          line {line}
        </button>
      )}
      <span>{note.text}</span>
    </li>
  );
}
