import { StatusBadge } from "~/components/notation/status-badge";
import { RowHead, Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import type { FrameView } from "./frame-fields";
import type { FieldReading } from "./read-fields";

type Props = {
  label: string;
  view: FrameView;
  readings: ReadonlyMap<number, FieldReading> | undefined;
  feeds?: ReadonlyMap<number, string> | undefined;
  /** For narrow places: what each field says, not how it is built. */
  isCompact?: boolean;
};

/** The same frame as rows. */
export function FrameTable({ label, view, readings, feeds, isCompact }: Props) {
  return (
    <TableScroll label={label}>
      <Table caption={label}>
        <thead>
          <tr>
            <Th>Field</Th>
            {isCompact ? null : (
              <>
                <Th right>Subindex</Th>
                <Th>Type</Th>
                <Th right>Bits</Th>
                <Th>Octets</Th>
                <Th>Scale</Th>
                <Th right>Range</Th>
              </>
            )}
            <Th>Unit</Th>
            {readings ? (
              <>
                <Th right>Raw</Th>
                <Th right>Value</Th>
                <Th>Status</Th>
              </>
            ) : (
              <Th>Named values</Th>
            )}
            {feeds ? <Th>Feeds</Th> : null}
          </tr>
        </thead>
        <tbody>
          {view.fields.map((field) => {
            const reading = readings?.get(field.subindex);
            return (
              <Tr key={field.subindex}>
                <RowHead title={field.description}>{field.name}</RowHead>
                {isCompact ? null : (
                  <>
                    <Td right mono>
                      {field.subindex}
                    </Td>
                    <Td mono>{field.typeText}</Td>
                    <Td right mono className="whitespace-nowrap">
                      {field.bitText}
                    </Td>
                    <Td mono className="whitespace-nowrap">
                      {field.octetText.replace(/^octets? /, "")}
                    </Td>
                    <Td mono className="whitespace-nowrap">
                      {field.scaleText}
                    </Td>
                    <Td right mono className="whitespace-nowrap">
                      {field.rangeText}
                    </Td>
                  </>
                )}
                <Td>{field.unitText}</Td>
                {readings ? (
                  <>
                    <Td right mono>
                      {reading?.raw}
                    </Td>
                    <Td right mono className="font-semibold">
                      {reading?.value}
                    </Td>
                    <Td>{reading ? <StatusBadge status={reading.tone}>{reading.status}</StatusBadge> : null}</Td>
                  </>
                ) : (
                  <Td className="text-ink-2">
                    {field.named.map(({ raw, text }) => `${raw} ${text}`.trim()).join(" · ")}
                  </Td>
                )}
                {feeds ? <Td>{feeds.get(field.subindex)}</Td> : null}
              </Tr>
            );
          })}
        </tbody>
      </Table>
    </TableScroll>
  );
}
