import { pickText } from "~/components/frames/field-name";
import { FindingShape } from "~/components/notation/finding-badge";
import { Block } from "~/components/ui/page";
import { RowHead, Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import type { DeviceDescription, IoddEvent } from "~/domain/iodd/device-description";
import { formatErrorCode, formatEventCode } from "./describe-device";

const severities = { Error: "error", Warning: "warning", Notification: "hint" } as const satisfies Record<
  NonNullable<IoddEvent["type"]>,
  string
>;

/** Events that the device may send, and the errors by which it refuses a parameter. */
export function DeviceCodes({ description, language }: { description: DeviceDescription; language: string }) {
  return (
    <div className="grid grid-cols-[3fr_2fr] gap-8 max-lg:grid-cols-1">
      <Block title="Events" about={<span className="font-mono">{description.events.length}</span>}>
        {description.events.length === 0 ? (
          <p className="text-small text-ink-2">The description lists none.</p>
        ) : (
          <TableScroll label="Events" className="max-h-80 overflow-y-auto">
            <Table caption="Events of the device">
              <thead>
                <tr>
                  <Th>Code</Th>
                  <Th>Kind</Th>
                  <Th>Name</Th>
                </tr>
              </thead>
              <tbody>
                {description.events.map((event) => (
                  <Tr key={event.code}>
                    <RowHead className="font-mono">{formatEventCode(event.code)}</RowHead>
                    <Td className="whitespace-nowrap">
                      <span className="inline-flex items-center gap-1.5">
                        {event.type ? <FindingShape severity={severities[event.type]} /> : null}
                        {event.type ?? "not said"}
                      </span>
                    </Td>
                    <Td title={pickText(event.description, language)}>
                      {pickText(event.name, language) ?? (event.isStandard ? "standard event" : "")}
                    </Td>
                  </Tr>
                ))}
              </tbody>
            </Table>
          </TableScroll>
        )}
      </Block>
      <Block title="Error types" about={<span className="font-mono">{description.errorTypes.length}</span>}>
        {description.errorTypes.length === 0 ? (
          <p className="text-small text-ink-2">The description lists none.</p>
        ) : (
          <TableScroll label="Error types" className="max-h-80 overflow-y-auto">
            <Table caption="Error types of the device">
              <thead>
                <tr>
                  <Th>Code</Th>
                  <Th>Name</Th>
                </tr>
              </thead>
              <tbody>
                {description.errorTypes.map((error) => (
                  <Tr key={formatErrorCode(error)}>
                    <RowHead className="font-mono">{formatErrorCode(error)}</RowHead>
                    <Td>{pickText(error.name, language) ?? (error.isStandard ? "standard error" : "")}</Td>
                  </Tr>
                ))}
              </tbody>
            </Table>
          </TableScroll>
        )}
      </Block>
    </div>
  );
}
