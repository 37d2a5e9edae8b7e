import { Form } from "react-router";
import type { AsBuiltPage } from "~/presenters/as-built-page.server";
import { StatusBadge } from "../notation/status-badge";
import { LocalTime } from "../shell/local-time";
import { Button } from "../ui/button";
import { Field, Input } from "../ui/field";
import { Block } from "../ui/page";
import { Table, TableScroll, Td, Th, Tr } from "../ui/table";

/** Signals proved by hand: what was done to the sensor, what was read beside it, and what the server showed. */
export function PointChecks({ checks, blockedBy }: { checks: AsBuiltPage["pointChecks"]; blockedBy: string | undefined }) {
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
      <Form method="post" className="mt-3 flex flex-wrap items-end gap-3">
        <input type="hidden" name="intent" value="point-check" />
        <Field label="NodeId of the signal" className="w-96">
          {(tied) => <Input {...tied} name="nodeId" mono required placeholder="nsu=http://…;i=6001" autoComplete="off" />}
        </Field>
        <Field label="Stimulus" className="w-56">
          {(tied) => <Input {...tied} name="stimulus" required placeholder="ice water at the sensor" />}
        </Field>
        <Field label="Read beside it" className="w-28">
          {(tied) => <Input {...tied} name="localReading" type="number" step="any" required mono />}
        </Field>
        <Field label="Shown" className="w-28">
          {(tied) => <Input {...tied} name="shownValue" type="number" step="any" required mono />}
        </Field>
        <Field label="Tolerance ±" className="w-28">
          {(tied) => <Input {...tied} name="tolerance" type="number" step="any" min={0} required mono />}
        </Field>
        <Field label="Unit" optional className="w-20">
          {(tied) => <Input {...tied} name="unit" mono />}
        </Field>
        <Field label="Note" optional className="w-56">
          {(tied) => <Input {...tied} name="note" />}
        </Field>
        <Button type="submit" blockedBy={blockedBy}>
          Record the check
        </Button>
      </Form>
    </Block>
  );
}
