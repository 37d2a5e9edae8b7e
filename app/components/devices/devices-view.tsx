import { Search } from "lucide-react";
import { useMemo, useState } from "react";
import { href, Link } from "react-router";
import { FindingTallyBadge } from "~/components/notation/finding-badge";
import { TextLink } from "~/components/ui/button";
import { Empty } from "~/components/ui/empty";
import { Input } from "~/components/ui/field";
import { Icon } from "~/components/ui/icon";
import { Page } from "~/components/ui/page";
import { RowHead, Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import type { DeviceSummary, DeviceUse } from "~/services/read-devices.server";
import { DeviceUpload } from "./device-upload";
import { groupVersions, searchDevices, type DeviceGroup } from "./group-versions";

type Props = { devices: readonly DeviceSummary[]; editBlockedBy: string | undefined };

/** The device library: what IODDs say, product by product, versions side by side. */
export function DevicesView({ devices, editBlockedBy }: Props) {
  const [query, setQuery] = useState("");
  const groups = useMemo(() => groupVersions(searchDevices(devices, query)), [devices, query]);
  return (
    <Page title="Devices" about="Descriptions of IO-Link devices: which bits mean what, in which unit.">
      <DeviceUpload blockedBy={editBlockedBy} isFirst={devices.length === 0} />
      {devices.length === 0 ? (
        <Empty title="No device description yet">
          An IODD comes from the maker of a sensor. Add it once; every mapping then takes fields, units and special
          values from it.
        </Empty>
      ) : (
        <>
          <div className="mb-3 flex items-center gap-3">
            <label className="relative w-72">
              <span className="sr-only">Search the devices</span>
              <Icon of={Search} className="pointer-events-none absolute inset-y-0 left-2 my-auto text-ink-3" />
              <Input
                type="search"
                value={query}
                onChange={(event) => setQuery(event.currentTarget.value)}
                placeholder="Product, vendor or id"
                className="pl-7"
              />
            </label>
            <span className="text-small text-ink-2">
              <span className="font-mono">{groups.length}</span> {groups.length === 1 ? "device" : "devices"}
            </span>
          </div>
          {groups.length === 0 ? <Empty title="No device has these words" /> : <DeviceTable groups={groups} />}
        </>
      )}
    </Page>
  );
}

function DeviceTable({ groups }: { groups: readonly DeviceGroup<DeviceSummary>[] }) {
  return (
    <TableScroll label="Devices">
      <Table caption="Devices of the library" className="min-w-220">
        <thead>
          <tr>
            <Th>Device</Th>
            <Th>Vendor</Th>
            <Th right>Vendor / device id</Th>
            <Th>Variants</Th>
            <Th>Versions</Th>
            <Th>Languages</Th>
            <Th>Problems</Th>
            <Th>Feeds</Th>
          </tr>
        </thead>
        <tbody>
          {groups.map(({ key, newest, versions }) => (
            <Tr key={key} className="align-top">
              <RowHead className="py-1">
                <Link to={href("/devices/:deviceId", { deviceId: newest.id })} className="hover:text-copper">
                  {newest.productIds[0] ?? newest.deviceName}
                </Link>
                <span className="block font-normal text-ink-2">{newest.deviceName}</span>
              </RowHead>
              <Td className="py-1">{newest.vendorName}</Td>
              <Td right mono className="py-1">
                {newest.vendorId} / {newest.deviceId}
              </Td>
              <Td className="max-w-50 py-1 text-ink-2">{newest.productIds.join(", ")}</Td>
              <Td className="py-1">
                <ul>
                  {versions.map((version) => (
                    <li key={version.id} className="whitespace-nowrap">
                      <TextLink to={href("/devices/:deviceId", { deviceId: version.id })} className="font-mono">
                        {version.documentVersion}
                      </TextLink>{" "}
                      <span className="font-mono text-note text-ink-3">
                        {version.releaseDate} · IODD {version.schemaVersion}
                      </span>
                    </li>
                  ))}
                </ul>
              </Td>
              <Td mono className="py-1 text-ink-2">
                {newest.languages.join(" ")}
              </Td>
              <Td className="py-1">
                <FindingTallyBadge tally={{ ...newest.problems, hint: 0 }} showNone />
              </Td>
              <Td className="py-1">
                <UsedBy uses={versions.flatMap((version) => version.usedBy)} />
              </Td>
            </Tr>
          ))}
        </tbody>
      </Table>
    </TableScroll>
  );
}

function UsedBy({ uses }: { uses: readonly DeviceUse[] }) {
  if (uses.length === 0) return <span className="text-ink-3">nothing yet</span>;
  return (
    <ul>
      {uses.slice(0, 3).map((use) => (
        <li key={`${use.modelId} ${use.type} ${use.role}`}>
          <TextLink to={href("/models/:modelId/mapping", { modelId: use.modelId })}>
            <em>{use.type}</em> · {use.role}
          </TextLink>
        </li>
      ))}
      {uses.length > 3 ? <li className="text-note text-ink-3">and {uses.length - 3} more</li> : null}
    </ul>
  );
}
