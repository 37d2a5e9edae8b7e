import { LocalTime } from "~/components/shell/local-time";
import { Table, TableScroll, Td, Th } from "~/components/ui/table";
import { formatNodeId, OPC_UA_NAMESPACE, parseNodeId } from "~/domain/address-space/node-id";
import type { Renumbering } from "~/presenters/renumberings.server";

/** What nodes were called before, for whoever meets an old NodeId in a program or a drawing. */
export function RenumberingsTable({ list }: { list: readonly Renumbering[] }) {
  if (list.length === 0) return <p className="text-small text-ink-2">No node of this model was ever renumbered.</p>;
  return (
    <TableScroll label="Renumbered nodes" className="max-h-80 overflow-y-auto">
      <Table caption="Renumbered nodes, the newest first">
        <thead>
          <tr>
            <Th>Before</Th>
            <Th>Now</Th>
            <Th>By</Th>
          </tr>
        </thead>
        <tbody>
          {list.flatMap(({ seq, author, at, changes }) =>
            changes.map(({ key, from, to }) => (
              <tr key={`${seq} ${key}`}>
                <Td className="font-mono">{withoutNamespace(from)}</Td>
                <Td className="font-mono">{withoutNamespace(to)}</Td>
                <Td>
                  {author}, <LocalTime iso={at} />
                </Td>
              </tr>
            )),
          )}
        </tbody>
      </Table>
    </TableScroll>
  );
}

/** All are of the model's own namespace, which the page names. */
function withoutNamespace(nodeId: string): string {
  const parsed = parseNodeId(nodeId, []);
  return parsed.ok ? formatNodeId({ ...parsed.value, namespaceUri: OPC_UA_NAMESPACE }) : nodeId;
}
