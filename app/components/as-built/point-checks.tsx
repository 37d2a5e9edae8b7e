import type { AsBuiltPage } from "~/presenters/as-built-page.server";
import { StatusBadge } from "../notation/status-badge";
import { LocalTime } from "../shell/local-time";
import { Block } from "../ui/page";
import { Table, TableScroll, Td, Th, Tr } from "../ui/table";
import { PointCheckForm } from "./point-check-form";

type Props = Pick<AsBuiltPage, "signals" | "targets"> & { blockedBy: string | undefined };

/** Signals proved by hand: what was done to the sensor, what was read beside it, and what the server showed. */
export function PointChecks({ checks, signals, targets, blockedBy }: Props & { checks: AsBuiltPage["pointChecks"] }) {
  return (
    <Block title="Point checks" about="One signal of one machine proved by hand. Work at the machine follows its risk assessment, local codes and licensed practice.">
      {checks.length === 0 ? (
        <p className="border-t border-ink py-2 text-small text-ink-2">No signal has been checked yet.</p>
      ) : (
        <TableScroll label="Point checks">
          <Table caption="Point checks, newest first">
            <thead>
              <tr>
                <Th>Signal</Th>
                <Th>Stimulus</Th>
                <Th right>Read beside it</Th>
                <Th right>Shown</Th>
                <Th right>Tolerance</Th>
                <Th>Outcome</Th>
                <Th>Note</Th>
                <Th>Checked</Th>
              </tr>
            </thead>
            <tbody>
              {checks.map((check) => (
                <Tr key={check.id}>
                  <Td mono title={check.nodeId}>
                    {check.path}
                  </Td>
                  <Td>{check.stimulus}</Td>
                  <Td right mono>
                    {check.localReading} {check.unit}
                  </Td>
                  <Td right mono>
                    {check.shownValue} {check.unit}
                  </Td>
                  <Td right mono>
                    ± {check.tolerance}
                  </Td>
                  <Td>
                    <StatusBadge status={check.isWithin ? "good" : "bad"}>{check.isWithin ? "within" : "outside"}</StatusBadge>
                  </Td>
                  <Td>{check.note}</Td>
                  <Td className="text-ink-2">
                    <LocalTime iso={check.at} />, {check.checkedBy}
                  </Td>
                </Tr>
              ))}
            </tbody>
          </Table>
        </TableScroll>
      )}
      <PointCheckForm signals={signals} targets={targets} blockedBy={blockedBy} />
    </Block>
  );
}
