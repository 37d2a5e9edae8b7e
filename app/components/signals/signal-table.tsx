import { NodeClassGlyph } from "~/components/notation/node-class-glyph";
import { Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { Signal } from "~/domain/editing/starters/read-signal-list";
import { formatRange } from "~/domain/live/format-live";

const most = 200;

/** What the rows will become. */
export function SignalTable({ signals, space }: { signals: readonly Signal[]; space: AddressSpace }) {
  return (
    <section>
      <h2 className="mb-1.5 text-lead font-semibold">
        Preview <span className="font-mono font-normal text-ink-3">{signals.length}</span>
      </h2>
      <TableScroll label="Preview">
        <Table caption="Members that the list makes">
          <thead>
            <tr>
              <Th right>Line</Th>
              <Th>Group</Th>
              <Th>Member</Th>
              <Th>DataType</Th>
              <Th>Unit</Th>
              <Th right>EURange</Th>
              <Th>Rule</Th>
              <Th>Description</Th>
            </tr>
          </thead>
          <tbody>
            {signals.slice(0, most).map((signal) => (
              <Tr key={signal.line}>
                <Td right mono className="text-ink-3">
                  {signal.line}
                </Td>
                <Td>{signal.group}</Td>
                <Td>
                  <span className="flex items-center gap-1.5 font-semibold whitespace-nowrap">
                    <NodeClassGlyph kind="Variable" />
                    {signal.name}
                  </span>
                </Td>
                <Td mono>{space.getNode(signal.dataType)?.browseName.name}</Td>
                <Td>
                  {signal.unit ? (
                    <span title={signal.unit.name}>
                      {signal.unit.symbol} <span className="font-mono text-note text-ink-3">{signal.unit.code}</span>
                    </span>
                  ) : null}
                </Td>
                <Td right mono className="whitespace-nowrap">
                  {signal.range ? formatRange(signal.range) : ""}
                </Td>
                <Td>{signal.isOptional ? "Optional" : "Mandatory"}</Td>
                <Td className="max-w-60 truncate text-ink-2">
                  <span title={signal.description}>{signal.description}</span>
                </Td>
              </Tr>
            ))}
          </tbody>
        </Table>
      </TableScroll>
      {signals.length > most ? <p className="mt-1 text-note text-ink-3">and {signals.length - most} more</p> : null}
    </section>
  );
}
