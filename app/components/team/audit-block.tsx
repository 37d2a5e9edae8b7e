import { LocalTime } from "~/components/shell/local-time";
import { Block } from "~/components/ui/page";
import { Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import type { AuditLine } from "~/presenters/team-page.server";

/** The newest acts that the audit keeps. */
export function AuditBlock({ lines }: { lines: readonly AuditLine[] }) {
  return (
    <Block title="Audit" about="the newest acts">
      <TableScroll label="Audit">
        <Table caption="Newest entries of the audit">
          <thead>
            <tr>
              <Th>When</Th>
              <Th>Who</Th>
              <Th>Act</Th>
              <Th>On what</Th>
            </tr>
          </thead>
          <tbody>
            {lines.map((line) => (
              <Tr key={line.id}>
                <Td mono className="text-ink-2">
                  <LocalTime iso={line.at} />
                </Td>
                <Td>{line.who}</Td>
                <Td mono>{line.action}</Td>
                <Td>{line.subject}</Td>
              </Tr>
            ))}
          </tbody>
        </Table>
      </TableScroll>
    </Block>
  );
}
