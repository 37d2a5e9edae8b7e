import { ArrowDown, ArrowUp, Plus, X } from "lucide-react";
import { useEffect, useRef, useState, type ClipboardEvent, type KeyboardEvent, type ReactNode } from "react";
import type { BuiltInType } from "~/domain/nodeset/values/variant";
import { parseBlock } from "../model/cell-block";
import { Button } from "../ui/button";
import { fillFromTexts, takesTexts } from "./paste-items";
import { withInserted, withItem, withMoved, withoutItem, type DraftItem } from "./value-draft";
import { useValueForm } from "./value-form";

type RowProps = { label: string; item: DraftItem; onChange: (item: DraftItem) => void };

type Props = {
  label: string;
  type: BuiltInType;
  values: readonly DraftItem[];
  onChange: (values: readonly DraftItem[]) => void;
  make: () => DraftItem;
  render: (row: RowProps) => ReactNode;
};

/** Rows drawn at once; a longer list is turned over like pages. */
const PAGE = 100;

/** A list as rows: Enter goes on to the next row or adds one, Alt with arrows moves a row, a pasted column becomes rows. */
export function ArrayRows({ label, type, values, onChange, make, render }: Props) {
  const { readOnly } = useValueForm();
  const keys = useRowKeys(values.length);
  const [page, setPage] = useState(0);
  const [wanted, setWanted] = useState<number>();
  const list = useRef<HTMLOListElement>(null);
  const first = Math.min(page, Math.max(0, Math.ceil(values.length / PAGE) - 1)) * PAGE;

  useEffect(() => {
    if (wanted === undefined) return;
    const row = list.current?.querySelector(`[data-row="${wanted}"]`);
    const control = row?.querySelector<HTMLElement>("input:not([type=checkbox]), select, textarea, input, button");
    control?.focus();
    // What stands there is typed over.
    if (control instanceof HTMLInputElement && control.type === "text") control.select();
    setWanted(undefined);
  }, [wanted]);

  function insert(index: number, added: readonly DraftItem[]): void {
    keys.insert(index, added.length);
    onChange(withInserted(values, index, added));
    setPage(Math.floor(index / PAGE));
    setWanted(index);
  }
  function remove(index: number): void {
    keys.remove(index);
    onChange(withoutItem(values, index));
    setWanted(Math.max(0, index - 1));
  }
  function move(index: number, by: number): void {
    if (index + by < 0 || index + by >= values.length) return;
    keys.move(index, by);
    onChange(withMoved(values, index, by));
    setWanted(index + by);
  }

  function onKeyDown(event: KeyboardEvent<HTMLLIElement>, index: number): void {
    if (event.target instanceof HTMLElement && event.target.closest("[data-row]") !== event.currentTarget) return;
    const isText =
      event.target instanceof HTMLInputElement && event.target.type === "text" && event.target.role !== "combobox";
    if (event.altKey && (event.key === "ArrowUp" || event.key === "ArrowDown"))
      move(index, event.key === "ArrowUp" ? -1 : 1);
    else if (event.altKey && event.key === "Delete") remove(index);
    else if (event.key === "Enter" && isText && !event.ctrlKey && !event.metaKey && !event.shiftKey) {
      if (index + 1 < values.length) setWanted(index + 1);
      else insert(values.length, [make()]);
    } else return;
    event.preventDefault();
    event.stopPropagation();
  }

  /** More than one line is more than one row, from the row that has the caret. */
  function onPaste(event: ClipboardEvent<HTMLElement>): void {
    const rows = parseBlock(event.clipboardData.getData("text/plain"));
    if (readOnly || rows.length < 2 || !takesTexts(type, make())) return;
    event.preventDefault();
    event.stopPropagation();
    const row = event.target instanceof Element ? event.target.closest<HTMLElement>("[data-row]") : null;
    const start = row ? Number(row.dataset["row"]) : values.length;
    const filled = rows.map((cells) => fillFromTexts(type, make(), cells));
    const after = [...values.slice(0, start), ...filled, ...values.slice(start + filled.length)];
    keys.insert(values.length, Math.max(0, after.length - values.length));
    onChange(after);
    setWanted(start);
  }

  return (
    <div role="group" aria-label={label} className="min-w-0" onPaste={onPaste}>
      <ol ref={list} className="grid gap-1">
        {values.slice(first, first + PAGE).map((item, i) => {
          const index = first + i;
          return (
            <li
              key={keys.list[index]}
              data-row={index}
              className="array-row"
              onKeyDown={(event) => onKeyDown(event, index)}
            >
              <span className="array-index">{index}</span>
              <div className="min-w-0">
                {render({
                  label: `${label} ${index}`,
                  item,
                  onChange: (next) => onChange(withItem(values, index, next)),
                })}
              </div>
              {readOnly ? null : (
                <span className="array-tools">
                  <RowButton
                    label={`Move ${label} ${index} up`}
                    keys="Alt ↑"
                    onClick={() => move(index, -1)}
                    isOff={index === 0}
                  >
                    <ArrowUp size={12} aria-hidden />
                  </RowButton>
                  <RowButton
                    label={`Move ${label} ${index} down`}
                    keys="Alt ↓"
                    onClick={() => move(index, 1)}
                    isOff={index === values.length - 1}
                  >
                    <ArrowDown size={12} aria-hidden />
                  </RowButton>
                  <RowButton label={`Remove ${label} ${index}`} keys="Alt Del" onClick={() => remove(index)}>
                    <X size={12} aria-hidden />
                  </RowButton>
                </span>
              )}
            </li>
          );
        })}
      </ol>
      <div className="mt-1 flex items-center gap-2">
        {readOnly ? null : (
          <Button
            size="small"
            tone="bare"
            icon={Plus}
            className="-ml-1.5"
            aria-label={`Add a row to ${label}`}
            onClick={() => insert(values.length, [make()])}
          >
            Row
          </Button>
        )}
        <span className="text-note text-ink-3">
          <span className="font-mono">{values.length}</span> {values.length === 1 ? "row" : "rows"}
        </span>
        {values.length > PAGE ? (
          <>
            <Button size="small" disabled={first === 0} onClick={() => setPage(first / PAGE - 1)}>
              Earlier
            </Button>
            <Button size="small" disabled={first + PAGE >= values.length} onClick={() => setPage(first / PAGE + 1)}>
              Later
            </Button>
          </>
        ) : null}
      </div>
    </div>
  );
}

function RowButton({
  label,
  keys,
  onClick,
  isOff = false,
  children,
}: {
  label: string;
  keys: string;
  onClick: () => void;
  isOff?: boolean;
  children: ReactNode;
}) {
  return (
    <button
      type="button"
      tabIndex={-1}
      aria-label={label}
      title={`${label} (${keys})`}
      disabled={isOff}
      onClick={onClick}
    >
      {children}
    </button>
  );
}

type RowKeys = {
  readonly list: readonly number[];
  insert(index: number, count: number): void;
  remove(index: number): void;
  move(index: number, by: number): void;
};

/** Rows keep what is typed in them while others come and go, so each has a key of its own. */
function useRowKeys(length: number): RowKeys {
  const state = useRef<{ next: number; list: number[] }>({ next: 0, list: [] });
  const { current } = state;
  const fresh = (count: number): number[] => Array.from({ length: count }, () => current.next++);
  if (current.list.length < length) current.list = [...current.list, ...fresh(length - current.list.length)];
  if (current.list.length > length) current.list = current.list.slice(0, length);
  return {
    list: current.list,
    insert: (index, count) => (current.list = withInserted(current.list, index, fresh(count))),
    remove: (index) => (current.list = withoutItem(current.list, index)),
    move: (index, by) => (current.list = [...withMoved(current.list, index, by)]),
  };
}
