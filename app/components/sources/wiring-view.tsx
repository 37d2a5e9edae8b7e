import { Download, Printer } from "lucide-react";
import { Button, buttonClass } from "~/components/ui/button";
import { Empty } from "~/components/ui/empty";
import { Icon } from "~/components/ui/icon";
import { Page } from "~/components/ui/page";
import { RowHead, Table, TableScroll, Td, Th } from "~/components/ui/table";
import type { Sources } from "~/services/read-sources.server";
import { formatAddress, kindWords, modeWords } from "./source-words";

type Props = { sources: Sources; organization: string; printedAt: string };

/** The wiring list as a fitter takes it to the cabinet: one row a port or unit, with room for a tick. */
export function WiringView({ sources: { sources }, organization, printedAt }: Props) {
  return (
    <Page
      title="Wiring list"
      about={
        <>
          {organization}, <span className="font-mono">{printedAt}</span>
        </>
      }
      actions={
        <span className="flex gap-2 print:hidden">
          <a href="/sources/wiring-list.csv" download className={buttonClass()}>
            <Icon of={Download} /> CSV
          </a>
          <Button icon={Printer} tone="main" onClick={() => window.print()}>
            Print
          </Button>
        </span>
      }
    >
      {sources.length === 0 ? (
        <Empty title="No source is planned yet">
          Add masters and units on the Sources page; their ports make this list.
        </Empty>
      ) : null}
      <div className="grid gap-6">
        {sources.map((source) => (
          <section key={source.id} aria-label={source.name} className="break-inside-avoid">
            <h2 className="mb-1 flex items-baseline gap-3 text-lead font-semibold">
              {source.name}
              <span className="text-small font-normal text-ink-2">{kindWords[source.kind]}</span>
              <span className="font-mono text-small font-normal text-ink-2">{formatAddress(source.address)}</span>
            </h2>
            <TableScroll label={`Wiring of ${source.name}`}>
              {source.ports.length > 0 ? <PortRows source={source} /> : <UnitRows source={source} />}
            </TableScroll>
          </section>
        ))}
      </div>
      <p className="mt-6 text-note text-ink-2">
        Process data of IO-Link is not safety-related communication. Work on wiring only with the supply isolated, by
        licensed persons, after the machine&rsquo;s risk assessment and local codes.
      </p>
    </Page>
  );
}

function PortRows({ source }: { source: Sources["sources"][number] }) {
  return (
    <Table caption={`Ports of ${source.name}`}>
      <thead>
        <tr>
          <Th right>Port</Th>
          <Th>Class</Th>
          <Th>Mode</Th>
          <Th>Machine</Th>
          <Th>Role</Th>
          <Th>Device</Th>
          <Th right>Vendor / device id</Th>
          <Th>Alias</Th>
          <Th>Serial number</Th>
          <Th>Note</Th>
          <Th>Done</Th>
        </tr>
      </thead>
      <tbody>
        {source.ports.map((port) => {
          const { plan, device, bindings } = port;
          const serial =
            plan?.serialNumber ??
            bindings
              .map((one) => one.binding.serialNumber ?? "")
              .filter(Boolean)
              .join(", ");
          return (
            <tr key={port.port}>
              <RowHead className="text-right font-mono">{port.port}</RowHead>
              <Td>{plan?.portClass ?? ""}</Td>
              <Td>
                {plan ? modeWords[plan.mode] : bindings.length === 0 ? <span className="text-ink-3">free</span> : ""}
              </Td>
              <Td className="font-semibold">{bindings.map((one) => one.machine).join(", ")}</Td>
              <Td>{bindings.map((one) => one.role).join(", ")}</Td>
              <Td>{device?.name ?? bindings[0]?.productName ?? ""}</Td>
              <Td right mono>
                {device ? `${device.vendorId} / ${device.deviceId}` : ""}
              </Td>
              <Td mono>{plan?.deviceAlias ?? bindings[0]?.binding.deviceAlias ?? ""}</Td>
              <Td mono>{serial}</Td>
              <Td>{plan?.note ?? ""}</Td>
              <Td>
                <span aria-hidden className="inline-block size-3 border border-edge" />
              </Td>
            </tr>
          );
        })}
      </tbody>
    </Table>
  );
}

function UnitRows({ source }: { source: Sources["sources"][number] }) {
  return (
    <Table caption={`Roles read from ${source.name}`}>
      <thead>
        <tr>
          <Th>Machine</Th>
          <Th>Role</Th>
          <Th right>Unit id</Th>
          <Th right>Address offset</Th>
          <Th>Path</Th>
          <Th>Done</Th>
        </tr>
      </thead>
      <tbody>
        {source.bindings.map((one) => (
          <tr key={`${one.machineKey} ${one.role}`}>
            <RowHead>{one.machine}</RowHead>
            <Td>{one.role}</Td>
            <Td right mono>
              {one.binding.unitId ?? source.address.unitId ?? ""}
            </Td>
            <Td right mono>
              {one.binding.addressOffset ?? ""}
            </Td>
            <Td mono>{one.binding.path ?? ""}</Td>
            <Td>
              <span aria-hidden className="inline-block size-3 border border-edge" />
            </Td>
          </tr>
        ))}
      </tbody>
    </Table>
  );
}
