import { useMemo, useState } from "react";
import { FindingShape } from "~/components/notation/finding-badge";
import { Checkbox, Input } from "~/components/ui/field";
import { Block } from "~/components/ui/page";
import { RowHead, Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import type { DeviceDescription } from "~/domain/iodd/device-description";
import { listParameters } from "./describe-device";

const MOST = 400;
const access: Readonly<Record<string, string>> = { ro: "read", rw: "read, write", wo: "write" };

/** Parameters by index: slow, read on demand, never cyclically. */
export function DeviceParameters({ description, language }: { description: DeviceDescription; language: string }) {
  const [query, setQuery] = useState("");
  const [withStandard, setWithStandard] = useState(true);
  const rows = useMemo(() => listParameters(description, language), [description, language]);
  const words = query.toLowerCase().split(/\s+/).filter(Boolean);
  const shown = rows.filter(
    (row) =>
      (withStandard || !row.isStandard) &&
      words.every((word) => `${row.index} ${row.name} ${row.id} ${row.unit}`.toLowerCase().includes(word)),
  );
  return (
    <Block
      title="Parameters"
      about={
        <>
          <span className="font-mono">{description.variables.length}</span> by index; read on demand
        </>
      }
      actions={
        <>
          <Checkbox
            label="Standard ones too"
            checked={withStandard}
            onChange={(event) => setWithStandard(event.currentTarget.checked)}
          />
          <Input
            type="search"
            aria-label="Search the parameters"
            placeholder="Name or index"
            className="w-48!"
            value={query}
            onChange={(event) => setQuery(event.currentTarget.value)}
          />
        </>
      }
    >
      <TableScroll label="Parameters" className="max-h-120 overflow-y-auto">
        <Table caption="Parameters of the device">
          <thead className="sticky top-0 bg-paper">
            <tr>
              <Th right className="pr-3">
                Index
              </Th>
              <Th>Name</Th>
              <Th>Access</Th>
              <Th>Type</Th>
              <Th>Unit</Th>
              <Th>Scale</Th>
              <Th>Values</Th>
              <Th>Default</Th>
            </tr>
          </thead>
          <tbody>
            {shown.slice(0, MOST).map((row) => (
              <Tr key={row.key} className="align-top">
                <Td right mono className="py-1 pr-3 whitespace-nowrap">
                  {row.subindex === 0 ? row.index : <span className="text-ink-3">.{row.subindex}</span>}
                </Td>
                <RowHead className={row.subindex === 0 ? "py-1" : "py-1 pl-6 font-normal!"} title={row.id}>
                  {row.name}
                  {row.isStandard && row.subindex === 0 ? (
                    <span className="ml-1.5 text-note font-normal text-ink-3">standard</span>
                  ) : null}
                </RowHead>
                <Td className="py-1 whitespace-nowrap">{access[row.access] ?? row.access}</Td>
                <Td mono className="py-1 whitespace-nowrap">
                  {row.type}
                </Td>
                <Td className="py-1 whitespace-nowrap">
                  {row.unit}
                  {row.hasSeveralUnits ? (
                    <span className="ml-1 inline-flex items-center gap-1 text-note text-ink-2">
                      <FindingShape severity="hint" /> menus differ
                    </span>
                  ) : null}
                </Td>
                <Td mono className="py-1 whitespace-nowrap">
                  {row.scale}
                </Td>
                <Td className="max-w-90 py-1 text-ink-2">{row.values}</Td>
                <Td mono className="max-w-40 truncate py-1" title={row.defaultValue}>
                  {row.defaultValue}
                </Td>
              </Tr>
            ))}
          </tbody>
        </Table>
      </TableScroll>
      {shown.length > MOST ? (
        <p className="mt-1 text-note text-ink-3">and {shown.length - MOST} more; search by name or index</p>
      ) : null}
      {shown.length === 0 ? <p className="mt-2 text-small text-ink-2">No parameter has these words.</p> : null}
    </Block>
  );
}
