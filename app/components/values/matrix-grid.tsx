import { useState, type ClipboardEvent, type KeyboardEvent, type ReactNode } from "react";
import type { BuiltInType } from "~/domain/nodeset/values/variant";
import { parseBlock } from "../model/cell-block";
import { Button } from "../ui/button";
import { Input } from "../ui/field";
import { fillFromTexts, takesTexts } from "./paste-items";
import { resizeMatrix, toFlat, withItem, type DraftItem } from "./value-draft";
import { useValueForm } from "./value-form";

type CellProps = { label: string; item: DraftItem; onChange: (item: DraftItem) => void };

type Props = {
  label: string;
  type: BuiltInType;
  values: readonly DraftItem[];
  dimensions: readonly number[];
  /** Fixed by a ValueRank of 2 and more; others let the number of dimensions be chosen. */
  rank: number;
  onChange: (values: readonly DraftItem[], dimensions: readonly number[]) => void;
  make: () => DraftItem;
  render: (cell: CellProps) => ReactNode;
};

/** More cells are no form any more; they stay as they are. */
const MOST_CELLS = 4_000;

/** The last two dimensions as a grid; of the others one place is shown at a time. */
export function MatrixGrid(props: Props) {
  const { label, type, values, dimensions, rank, onChange, make, render } = props;
  const { readOnly } = useValueForm();
  const [place, setPlace] = useState<readonly number[]>([]);
  const outer = dimensions.slice(0, -2);
  const at = outer.map((size, i) => Math.min(place[i] ?? 0, size - 1));
  const [rows = 1, columns = 1] = dimensions.length < 2 ? [1, dimensions[0] ?? 1] : dimensions.slice(-2);
  const flatOf = (row: number, column: number): number =>
    toFlat(dimensions.length < 2 ? [column] : [...at, row, column], dimensions);

  function resize(next: readonly number[]): void {
    const count = next.reduce((product, size) => product * size, 1);
    if (count >= 1 && count <= MOST_CELLS) onChange(resizeMatrix(values, dimensions, next, make), next);
  }

  /** Up and down go through a column; left and right belong to the caret. */
  function onKeyDown(event: KeyboardEvent<HTMLTableElement>): void {
    const step = { ArrowUp: -1, ArrowDown: 1, Enter: 1 }[event.key];
    if (
      step === undefined ||
      event.ctrlKey ||
      event.metaKey ||
      !(event.target instanceof HTMLInputElement) ||
      event.target.role === "combobox"
    )
      return;
    const cell = event.target.closest<HTMLElement>("[data-cell]");
    const [row = 0, column = 0] = cell?.dataset["cell"]?.split(",").map(Number) ?? [];
    const next = event.currentTarget.querySelector<HTMLElement>(`[data-cell="${row + step},${column}"] input`);
    event.preventDefault();
    event.stopPropagation();
    next?.focus();
  }

  function onPaste(event: ClipboardEvent<HTMLTableElement>): void {
    const block = parseBlock(event.clipboardData.getData("text/plain"));
    const cell = event.target instanceof Element ? event.target.closest<HTMLElement>("[data-cell]") : null;
    if (readOnly || !cell || (block.length < 2 && (block[0]?.length ?? 0) < 2) || !takesTexts(type, make())) return;
    event.preventDefault();
    const [row = 0, column = 0] = cell.dataset["cell"]?.split(",").map(Number) ?? [];
    const next = [...values];
    block.forEach((texts, r) =>
      texts.forEach((text, c) => {
        if (row + r < rows && column + c < columns)
          next[flatOf(row + r, column + c)] = fillFromTexts(type, make(), [text]);
      }),
    );
    onChange(next, dimensions);
  }

  return (
    <div role="group" aria-label={label} className="grid min-w-0 gap-1.5">
      <div className="flex flex-wrap items-center gap-1.5 text-note text-ink-3">
        Size
        {dimensions.map((size, i) => (
          <span key={i} className="flex items-center gap-1.5">
            {i > 0 ? "×" : null}
            <SizeField
              label={`Dimension ${i + 1} of ${label}`}
              size={size}
              readOnly={readOnly}
              onCommit={(next) => resize(withItem(dimensions, i, next))}
            />
          </span>
        ))}
        {readOnly || rank >= 2 ? null : (
          <>
            <Button size="small" tone="bare" onClick={() => resize([...dimensions, 1])}>
              Dimension more
            </Button>
            {dimensions.length > 2 ? (
              <Button size="small" tone="bare" onClick={() => resize(dimensions.slice(0, -1))}>
                Dimension less
              </Button>
            ) : null}
          </>
        )}
        {outer.map((size, i) => (
          <span key={`place ${i}`} className="ml-3 flex items-center gap-1.5">
            Shown of dimension {i + 1}
            <SizeField
              label={`Place in dimension ${i + 1} of ${label}`}
              size={at[i] ?? 0}
              low={0}
              high={size - 1}
              readOnly={false}
              onCommit={(next) => setPlace(withItem(at, i, next))}
            />
          </span>
        ))}
      </div>
      {values.length > MOST_CELLS ? (
        <p className="text-small text-ink-2">
          {values.length} cells are more than this form shows; they stay as they are.
        </p>
      ) : (
        <div className="overflow-x-auto" role="region" aria-label={`Cells of ${label}`} tabIndex={0}>
          <table className="matrix-grid" aria-label={`Cells of ${label}`} onKeyDown={onKeyDown} onPaste={onPaste}>
            <thead>
              <tr>
                <td />
                {Array.from({ length: columns }, (_, column) => (
                  <th key={column} scope="col">
                    {column}
                  </th>
                ))}
              </tr>
            </thead>
            <tbody>
              {Array.from({ length: rows }, (_, row) => (
                <tr key={row}>
                  <th scope="row">{row}</th>
                  {Array.from({ length: columns }, (_, column) => {
                    const flat = flatOf(row, column);
                    const name = [...(dimensions.length < 2 ? [] : [...at, row]), column].join(", ");
                    return (
                      <td key={`${at.join()} ${column}`} data-cell={`${row},${column}`}>
                        {render({
                          label: `${label} ${name}`,
                          item: values[flat] as DraftItem,
                          onChange: (item) => onChange(withItem(values, flat, item), dimensions),
                        })}
                      </td>
                    );
                  })}
                </tr>
              ))}
            </tbody>
          </table>
        </div>
      )}
    </div>
  );
}

function SizeField({
  label,
  size,
  low = 1,
  high = MOST_CELLS,
  readOnly,
  onCommit,
}: {
  label: string;
  size: number;
  low?: number;
  high?: number;
  readOnly: boolean;
  onCommit: (size: number) => void;
}) {
  return (
    <Input
      type="number"
      size="small"
      mono
      className="w-14! text-right"
      aria-label={label}
      min={low}
      max={high}
      value={size}
      readOnly={readOnly}
      onChange={(event) => {
        const next = event.currentTarget.valueAsNumber;
        if (Number.isInteger(next) && next >= low && next <= high) onCommit(next);
      }}
    />
  );
}
