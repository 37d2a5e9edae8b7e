import { Plus, X } from "lucide-react";
import type { ClipboardEvent, ReactNode } from "react";
import { Button, IconButton } from "~/components/ui/button";
import { Popover } from "~/components/ui/popover";
import { Input } from "~/components/ui/field";
import { parseBlock } from "~/components/model/cell-block";
import { Table, Td, Th } from "~/components/ui/table";
import { proposeNextName, type RollOutRow } from "~/domain/instantiation/roll-out-machines";

const columns = ["name", "serialNumber", "location"] as const;
const words: Record<(typeof columns)[number], string> = {
  name: "Name",
  serialNumber: "Serial number",
  location: "Place",
};

/** One row a machine; a block of cells from a spreadsheet may be pasted into any cell. */
export function MachineRows({
  rows,
  onChange,
  common,
  choiceFor,
}: {
  rows: readonly RollOutRow[];
  onChange: (rows: readonly RollOutRow[]) => void;
  /** Optional members that a machine gets without a choice of its own. */
  common: readonly string[];
  choiceFor: (row: RollOutRow, onChoose: (optional: readonly string[]) => void) => ReactNode;
}) {
  function set(index: number, change: Partial<RollOutRow>): void {
    onChange(rows.map((row, i) => (i === index ? { ...row, ...change } : row)));
  }
  function paste(event: ClipboardEvent<HTMLInputElement>, index: number, column: number): void {
    const text = event.clipboardData.getData("text/plain");
    if (!/[\t\n]/.test(text.trim())) return;
    event.preventDefault();
    const block = parseBlock(text);
    const next = [...rows];
    block.forEach((cells, i) => {
      const row = { ...(next[index + i] ?? { name: "", serialNumber: "", location: "" }) };
      cells.forEach((cell, j) => {
        const name = columns[column + j];
        if (name) row[name] = cell.trim();
      });
      next[index + i] = row;
    });
    onChange(next.slice(0, 100));
  }
  return (
    <div className="grid gap-2">
      <Table caption="Machines to make">
        <thead>
          <tr>
            <Th right className="w-8">
              <span className="sr-only">Number</span>
            </Th>
            {columns.map((column) => (
              <Th key={column}>{words[column]}</Th>
            ))}
            <Th>Optional members</Th>
            <Th className="w-8">
              <span className="sr-only">Remove</span>
            </Th>
          </tr>
        </thead>
        <tbody>
          {rows.map((row, index) => (
            <tr key={index}>
              <Td right mono className="text-ink-3">
                {index + 1}
              </Td>
              {columns.map((column, j) => (
                <Td key={column} className="py-0.5">
                  <Input
                    aria-label={`${words[column]} of machine ${index + 1}`}
                    size="small"
                    value={row[column]}
                    mono={column === "serialNumber"}
                    maxLength={200}
                    onChange={(event) => set(index, { [column]: event.currentTarget.value })}
                    onPaste={(event) => paste(event, index, j)}
                  />
                </Td>
              ))}
              <Td className="whitespace-nowrap">
                <Popover
                  label={`Optional members of machine ${index + 1}`}
                  className="max-h-96 w-80 overflow-y-auto p-3"
                  trigger={
                    <Button size="small" tone="bare" aria-label={`Optional members of machine ${index + 1}: ${tellChoice(row, common)}`}>
                      {tellChoice(row, common)}
                    </Button>
                  }
                >
                  {choiceFor(row, (optional) => set(index, { optional })) ?? <p className="text-small text-ink-2">Choose the type first.</p>}
                  {row.optional ? (
                    <Button size="small" className="mt-2" onClick={() => onChange(rows.map((other, i) => (i === index ? withoutChoice(other) : other)))}>
                      As the others
                    </Button>
                  ) : null}
                </Popover>
              </Td>
              <Td right>
                <IconButton
                  icon={X}
                  size="small"
                  label={`Remove machine ${index + 1}`}
                  blockedBy={rows.length === 1 ? "one machine stays" : undefined}
                  onClick={() => onChange(rows.filter((_, i) => i !== index))}
                />
              </Td>
            </tr>
          ))}
        </tbody>
      </Table>
      <Button
        icon={Plus}
        className="justify-self-start"
        onClick={() =>
          onChange([
            ...rows,
            { name: proposeNextName(rows.at(-1)?.name ?? ""), serialNumber: "", location: rows.at(-1)?.location ?? "" },
          ])
        }
      >
        Machine
      </Button>
    </div>
  );
}

function withoutChoice({ optional: _choice, ...row }: RollOutRow): RollOutRow {
  return row;
}

function tellChoice(row: RollOutRow, common: readonly string[]): string {
  const count = (row.optional ?? common).length;
  return `${count === 0 ? "none" : count}${row.optional ? ", its own choice" : ", as the others"}`;
}
