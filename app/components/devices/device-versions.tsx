import { useEffect, useState } from "react";
import { DifferenceBadge } from "~/components/notation/difference-badge";
import { Select } from "~/components/ui/field";
import { Block } from "~/components/ui/page";
import { RowHead, Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import type { DeviceDescription } from "~/domain/iodd/device-description";
import { compareDescriptions, type Difference } from "./compare-descriptions";
import type { DevicePage } from "./device-page";

/** Another version beside this one: what differs, from the older to the newer. */
export function DeviceVersions({ device, language }: { device: DevicePage; language: string }) {
  const { summary, versions, description } = device;
  const others = versions.filter((version) => version.id !== summary.id);
  const [otherId, setOtherId] = useState(others[0]?.id ?? "");
  const [other, setOther] = useState<{ id: string; description: DeviceDescription } | undefined>(undefined);
  const [failure, setFailure] = useState<string | undefined>(undefined);
  useEffect(() => {
    const controller = new AbortController();
    setFailure(undefined);
    fetch(`/devices/${otherId}/description`, { signal: controller.signal })
      .then(async (response) => {
        if (!response.ok) throw new Error(`status ${response.status}`);
        setOther({ id: otherId, description: (await response.json()) as DeviceDescription });
      })
      .catch((error: unknown) => {
        if (!controller.signal.aborted) setFailure(error instanceof Error ? error.message : String(error));
      });
    return () => controller.abort();
  }, [otherId]);

  const compared = others.find((version) => version.id === otherId) ?? others[0];
  if (!compared) return null;
  const isOlder = versions.indexOf(compared) > versions.findIndex((version) => version.id === summary.id);
  const shown = other?.id === otherId ? other.description : undefined;
  const differences = shown
    ? isOlder
      ? compareDescriptions(shown, description, language)
      : compareDescriptions(description, shown, language)
    : undefined;
  const [before, after] = isOlder ? [compared, summary] : [summary, compared];
  return (
    <Block
      title="Versions side by side"
      actions={
        <Select
          aria-label="Compare with"
          className="w-72!"
          value={otherId}
          onChange={(event) => setOtherId(event.currentTarget.value)}
        >
          {others.map((version) => (
            <option key={version.id} value={version.id}>
              with {version.documentVersion}, {version.releaseDate}, IODD {version.schemaVersion}
            </option>
          ))}
        </Select>
      }
    >
      {failure ? <p className="text-small text-error">The other version could not be read: {failure}</p> : null}
      {differences === undefined ? (
        failure ? null : (
          <p className="text-small text-ink-2">Reading the other version …</p>
        )
      ) : differences.length === 0 ? (
        <p className="text-small text-ink-2">Nothing differs in process data, parameters, events and error types.</p>
      ) : (
        <DifferenceTable
          differences={differences}
          before={`${before.documentVersion}, ${before.releaseDate}`}
          after={`${after.documentVersion}, ${after.releaseDate}`}
        />
      )}
    </Block>
  );
}

function DifferenceTable({
  differences,
  before,
  after,
}: {
  differences: readonly Difference[];
  before: string;
  after: string;
}) {
  return (
    <TableScroll label="Differences between the versions" className="max-h-120 overflow-y-auto">
      <Table caption="Differences between the versions">
        <thead>
          <tr>
            <Th className="w-8">
              <span className="sr-only">Change</span>
            </Th>
            <Th>Part</Th>
            <Th>What</Th>
            <Th>{before}</Th>
            <Th>{after}</Th>
          </tr>
        </thead>
        <tbody>
          {differences.map((difference) => (
            <Tr key={`${difference.part} ${difference.name}`} className="align-top">
              <Td className="py-1">
                <DifferenceBadge difference={difference.change} />
              </Td>
              <Td className="py-1 text-ink-2">{difference.part}</Td>
              <RowHead className="py-1">{difference.name}</RowHead>
              <Td mono className="py-1">
                {difference.before}
              </Td>
              <Td mono className="py-1">
                {difference.after}
              </Td>
            </Tr>
          ))}
        </tbody>
      </Table>
    </TableScroll>
  );
}
