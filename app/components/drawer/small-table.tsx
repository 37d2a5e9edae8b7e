import { ArrowDown, ArrowUp, Plus, X } from "lucide-react";
import type { ReactNode } from "react";
import { Button } from "../ui/button";
import { cx } from "../ui/cx";
import "./drawer.css";

export type SmallColumn = { readonly title: string; readonly width?: string };

type Props<Row> = {
  /** Names the table and stands above it with the number of rows. */
  title: string;
  columns: readonly SmallColumn[];
  rows: readonly Row[];
  /** How a row is named in the labels of its buttons. */
  nameOf: (row: Row, index: number) => string;
  /** The cells of a row in the order of the columns. */
  cells: (row: Row, index: number) => readonly ReactNode[];
  readOnly: boolean;
  addLabel?: string;
  onAdd?: () => void;
  onRemove?: (index: number) => void;
  onMove?: (index: number, by: number) => void;
  /** Said instead of the table when there are no rows. */
  none?: string;
  /** Rows above that are only read, as inherited fields. */
  before?: ReactNode;
  foot?: ReactNode;
};

/** A table of the drawer, edited in place: rows come, go and change their order. */
export function SmallTable<Row>(props: Props<Row>) {
  const { title, columns, rows, nameOf, cells, readOnly, addLabel, onAdd, onRemove, onMove, none, before, foot } =
    props;
  const hasTools = !readOnly && (onRemove !== undefined || onMove !== undefined);
  return (
    <>
      <h3>
        {title} <span className="font-mono font-normal">{rows.length}</span>
      </h3>
      {rows.length === 0 && !before ? (
        none === undefined ? null : (
          <p className="text-small text-ink-3">{none}</p>
        )
      ) : (
        <table className="small-table" aria-label={title}>
          <colgroup>
            {columns.map((column) => (
              <col key={column.title} {...(column.width === undefined ? {} : { style: { width: column.width } })} />
            ))}
            {hasTools ? <col style={{ width: onMove ? 62 : 28 }} /> : null}
          </colgroup>
          <thead>
            <tr>
              {columns.map((column) => (
                <th key={column.title} scope="col" title={column.title}>
                  {column.title}
                </th>
              ))}
              {hasTools ? (
                <th scope="col">
                  <span className="sr-only">Change the row</span>
                </th>
              ) : null}
            </tr>
          </thead>
          <tbody>
            {before}
            {rows.map((row, index) => (
              <tr key={index}>
                {cells(row, index).map((cell, i) => (
                  <td key={columns[i]?.title}>{cell}</td>
                ))}
                {hasTools ? (
                  <td className="whitespace-nowrap">
                    {onMove ? (
                      <>
                        <RowTool
                          label={`Move ${nameOf(row, index)} up`}
                          isOff={index === 0}
                          onClick={() => onMove(index, -1)}
                        >
                          <ArrowUp size={12} aria-hidden />
                        </RowTool>
                        <RowTool
                          label={`Move ${nameOf(row, index)} down`}
                          isOff={index === rows.length - 1}
                          onClick={() => onMove(index, 1)}
                        >
                          <ArrowDown size={12} aria-hidden />
                        </RowTool>
                      </>
                    ) : null}
                    {onRemove ? (
                      <RowTool label={`Remove ${nameOf(row, index)}`} onClick={() => onRemove(index)} isDanger>
                        <X size={12} aria-hidden />
                      </RowTool>
                    ) : null}
                  </td>
                ) : null}
              </tr>
            ))}
          </tbody>
        </table>
      )}
      {readOnly || !onAdd ? null : (
        <Button size="small" tone="bare" icon={Plus} className="mt-1 -ml-1.5" onClick={onAdd}>
          {addLabel}
        </Button>
      )}
      {foot}
    </>
  );
}

type ToolProps = { label: string; onClick: () => void; isOff?: boolean; isDanger?: boolean; children: ReactNode };

function RowTool({ label, onClick, isOff = false, isDanger = false, children }: ToolProps) {
  return (
    <button
      type="button"
      aria-label={label}
      title={label}
      disabled={isOff}
      className={cx(
        "px-0.5 align-middle text-ink-3 disabled:opacity-30",
        isDanger ? "hover:text-error" : "hover:text-copper",
      )}
      onClick={onClick}
    >
      {children}
    </button>
  );
}
