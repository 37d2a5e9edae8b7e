import { Link } from "react-router";
import { StatusBadge } from "~/components/notation/status-badge";
import { LocalTime } from "~/components/shell/local-time";
import { Block } from "~/components/ui/page";
import { Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import type { GatewayState } from "~/services/read-release.server";

/** Delivered against proved, gateway by gateway. */
export function GatewayTable({ gateways }: { gateways: readonly GatewayState[] }) {
  return (
    <Block title="Gateways">
      {gateways.length === 0 ? (
        <p className="border-t border-ink pt-2 text-small text-ink-2">Nothing was delivered yet. A release is handed over on its own page.</p>
      ) : (
        <TableScroll label="Gateways">
          <Table caption="What was delivered to the gateways, and what is proved">
            <thead>
              <tr>
                <Th>Gateway</Th>
                <Th>Model</Th>
                <Th>Delivered</Th>
                <Th>Proved</Th>
              </tr>
            </thead>
            <tbody>
              {gateways.map(({ gatewayId, gateway, model, delivered, proved }) => (
                <Tr key={`${gatewayId} ${model}`}>
                  <Td className="font-semibold">{gateway}</Td>
                  <Td className="text-ink-2">{model}</Td>
                  <Td>
                    <Link to={`/releases/${delivered.releaseId}`} className="font-mono hover:text-copper">
                      {delivered.version}
                    </Link>{" "}
                    <span className="text-note text-ink-2">
                      {delivered.isWithdrawn ? "withdrawn" : delivered.state}, <LocalTime iso={delivered.at} parts="date" />
                    </span>
                  </Td>
                  <Td>
                    {proved ? (
                      <StatusBadge status={proved.version === delivered.version ? "good" : "uncertain"}>{proved.version}</StatusBadge>
                    ) : (
                      <StatusBadge status="stale">not yet</StatusBadge>
                    )}
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
