import { Link } from "react-router";
import { StatusBadge, type Status } from "~/components/notation/status-badge";
import { LocalTime } from "~/components/shell/local-time";
import { Block } from "~/components/ui/page";
import { Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import type { TestServerPhase, TestServerState } from "~/domain/simulation/test-server-state";

const shapes: Record<TestServerPhase, Status> = {
  starting: "uncertain",
  running: "good",
  stopping: "uncertain",
  stopped: "stale",
  failed: "bad",
  lost: "bad",
};

export function TestServerTable({ servers }: { servers: readonly TestServerState[] }) {
  const shown = servers.filter((server) => server.state !== "stopped");
  return (
    <Block title="Test servers">
      {shown.length === 0 ? (
        <p className="border-t border-ink pt-2 text-small text-ink-2">
          None runs. Start one from a model’s page; it listens on this host only.
        </p>
      ) : (
        <TableScroll label="Test servers">
          <Table caption="Test servers">
            <thead>
              <tr>
                <Th>Serves</Th>
                <Th>State</Th>
                <Th>Endpoint</Th>
                <Th right>Sessions</Th>
                <Th>Since</Th>
              </tr>
            </thead>
            <tbody>
              {shown.map((server) => (
                <Tr key={server.id}>
                  <Td>
                    <Link
                      to={server.state === "running" ? `/live/${server.id}` : `/models/${server.modelId}/test-server`}
                      className="font-semibold hover:text-copper"
                    >
                      {server.modelName}
                    </Link>
                  </Td>
                  <Td>
                    <StatusBadge status={shapes[server.state]}>{server.state}</StatusBadge>
                  </Td>
                  <Td mono>{server.endpointUrl}</Td>
                  <Td right mono>
                    {server.sessions.length}
                  </Td>
                  <Td mono>
                    <LocalTime iso={server.startedAt} parts="time" />
                  </Td>
                </Tr>
              ))}
            </tbody>
          </Table>
        </TableScroll>
      )}
    </Block>
  );
}
