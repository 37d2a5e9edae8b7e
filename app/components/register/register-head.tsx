import { ArrowDown, ArrowUp } from "lucide-react";
import type { PointerEvent } from "react";
import { cx } from "../ui/cx";
import type { Column, ColumnId } from "./columns";
import type { SortRule } from "./row-order";

type Props = {
  columns: readonly Column[];
  template: string;
  width: number;
  sort: SortRule | undefined;
  onSort: (column: ColumnId) => void;
  onWidth: (column: ColumnId, width: number) => void;
};

/** Heads sort by a press and are dragged wider at their right edge; the menu "Columns" does both by keyboard. */
export function RegisterHead({ columns, template, width, sort, onSort, onWidth }: Props) {
  return (
    <div className="register-head" role="row" aria-rowindex={1} style={{ gridTemplateColumns: template, minWidth: width }}>
      {columns.map((column, index) => {
        const isSorted = sort?.column === column.id;
        return (
          <div
            key={column.id}
            role="columnheader"
            aria-colindex={index + 1}
            aria-sort={isSorted ? (sort.isDescending ? "descending" : "ascending") : "none"}
            className={cx(column.isRight && "justify-end", isSorted && "is-sorted")}
          >
            <button type="button" tabIndex={-1} title={`Sort by ${column.title}`} onClick={() => onSort(column.id)}>
              {column.title}
              {isSorted ? sort.isDescending ? <ArrowDown size={11} aria-hidden /> : <ArrowUp size={11} aria-hidden /> : null}
            </button>
            <span className="register-edge" aria-hidden="true" onPointerDown={(event) => dragWidth(event, (wider) => onWidth(column.id, wider))} />
          </div>
        );
      })}
    </div>
  );
}

function dragWidth(event: PointerEvent<HTMLElement>, onWidth: (width: number) => void): void {
  const head = event.currentTarget.parentElement;
  if (!head || event.button !== 0) return;
  event.preventDefault();
  event.currentTarget.setPointerCapture(event.pointerId);
  const from = event.clientX;
  const width = head.getBoundingClientRect().width;
  const edge = event.currentTarget;
  const move = (moved: globalThis.PointerEvent): void => onWidth(width + moved.clientX - from);
  const end = (): void => {
    edge.removeEventListener("pointermove", move);
    edge.removeEventListener("pointerup", end);
    edge.removeEventListener("pointercancel", end);
  };
  edge.addEventListener("pointermove", move);
  edge.addEventListener("pointerup", end);
  edge.addEventListener("pointercancel", end);
}
