import { pickText } from "~/components/frames/field-name";
import { Block } from "~/components/ui/page";
import { RowHead, Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import { formatCycle } from "./describe-device";
import { DeviceSymbol } from "./device-symbol";
import type { DevicePage } from "./device-page";

export function DeviceIdentity({ device, language }: { device: DevicePage; language: string }) {
  const { summary, description } = device;
  const { communication } = description;
  const picture = (name: string | undefined) =>
    name !== undefined && summary.pictures.includes(name)
      ? `/devices/${summary.id}/picture?name=${encodeURIComponent(name)}`
      : undefined;
  const url = pickText(description.vendorUrl, language);
  const facts: readonly (readonly [string, string])[] = [
    [
      "Vendor",
      `${description.vendorName}${pickText(description.vendorText, language) ? `, ${pickText(description.vendorText, language)}` : ""}`,
    ],
    ["Vendor id", String(description.vendorId)],
    ["Device id", String(description.deviceId)],
    ["Family", pickText(description.deviceFamily, language) ?? ""],
    ["Description version", `${description.documentVersion}, ${description.releaseDate}`],
    ["Schema", `IODD ${description.schemaVersion}`],
    ["IO-Link revision", communication?.ioLinkRevision ?? ""],
    ["Rate", communication?.bitrate ?? ""],
    ["Least cycle time", communication?.minCycleTime === undefined ? "" : formatCycle(communication.minCycleTime)],
    [
      "SIO mode",
      communication?.sioSupported === undefined ? "" : communication.sioSupported ? "supported" : "not supported",
    ],
    ["Profiles and function classes", description.profileCharacteristic.join(", ")],
    ["Data storage", description.features.dataStorage ? "yes" : "no"],
    ["Block parameters", description.features.blockParameter ? "yes" : "no"],
    ["Languages", description.languages.join(", ")],
    ["File", summary.fileName],
    ["SHA-256", summary.hash.slice(0, 16)],
  ];
  return (
    <Block title="Identity">
      <dl className="grid grid-cols-[repeat(auto-fill,minmax(220px,1fr))] gap-x-6 gap-y-2 border-t border-ink pt-2">
        {facts.map(([term, value]) =>
          value === "" ? null : (
            <div key={term} className="min-w-0">
              <dt className="text-key text-ink-3">{term}</dt>
              <dd className="text-small break-words">{value}</dd>
            </div>
          ),
        )}
        {url ? (
          <div className="min-w-0">
            <dt className="text-key text-ink-3">Vendor&rsquo;s address</dt>
            <dd className="text-small break-words">{url}</dd>
          </div>
        ) : null}
      </dl>
      <h3 className="mt-5 mb-1 text-small font-semibold">Variants</h3>
      <TableScroll label="Variants">
        <Table caption="Variants of the device">
          <thead>
            <tr>
              <Th className="w-16">Picture</Th>
              <Th>Product id</Th>
              <Th>Name</Th>
              <Th>Description</Th>
              <Th>Connection</Th>
            </tr>
          </thead>
          <tbody>
            {description.variants.map((variant) => (
              <Tr key={variant.productId}>
                <Td className="py-1">
                  <DeviceSymbol picture={picture(variant.deviceSymbol) ?? picture(variant.deviceIcon)} />
                </Td>
                <RowHead className="font-mono">{variant.productId}</RowHead>
                <Td>{pickText(variant.name, language)}</Td>
                <Td className="text-ink-2">{pickText(variant.description, language)}</Td>
                <Td className="text-ink-2">{describeConnections(description, variant.productId)}</Td>
              </Tr>
            ))}
          </tbody>
        </Table>
      </TableScroll>
    </Block>
  );
}

/** `M12-4: L+, NC, L-, C/Q` for the connections that the file gives this product. */
function describeConnections({ communication }: DevicePage["description"], productId: string): string {
  return (communication?.connections ?? [])
    .filter((connection) => connection.productIds.length === 0 || connection.productIds.includes(productId))
    .map((connection) => {
      const wires = connection.wires.map((wire) => wire.function).join(", ");
      return `${connection.kind.replace(/ConnectionT$/, "")}${wires === "" ? "" : `: ${wires}`}`;
    })
    .join("; ");
}
