import { Plus, X } from "lucide-react";
import type { ClipboardEvent } from "react";
import { Button, IconButton } from "~/components/ui/button";
import { Input } from "~/components/ui/field";
import { Table, Td, Th } from "~/components/ui/table";
import { proposeNextName, type RollOutRow } from "~/domain/instantiation/roll-out-machines";

const columns = ["name", "serialNumber", "location"] as const;
const words: Record<(typeof columns)[number], string> = {
  name: "Name",
  serialNumber: "Serial number",
  location: "Location",
};

/** One row a machine; a block of cells from a spreadsheet may be pasted into any cell. */
export function MachineRows({
  rows,
  onChange,
}: {
  rows: readonly RollOutRow[];
  onChange: (rows: readonly RollOutRow[]) => void;
}) {
  function set(index: number, change: Partial<RollOutRow>): void {
    onChange(rows.map((row, i) => (i === index ? { ...row, ...change } : row)));
  }
  function paste(event: ClipboardEvent<HTMLInputElement>, index: number, column: number): void {
    const text = event.clipboardData.getData("text/plain");
    if (!/[\t\n]/.test(text.trim())) return;
    event.preventDefault();
    const block = text
      .trimEnd()
      .split(/\r?\n/)
      .map((line) => line.split("\t"));
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
