import { Link } from "react-router";
import { RatingBadge } from "~/components/notation/difference-badge";
import { LocalTime } from "~/components/shell/local-time";
import { RowHead, Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import { Tag } from "~/components/ui/tag";
import type { ReleaseSummary } from "~/services/read-release.server";

/** Releases with the hash of their bundles; withdrawn ones stay, struck through. */
export function ReleasesTable({ releases }: { releases: readonly ReleaseSummary[] }) {
  return (
    <TableScroll label="Releases">
      <Table caption="Releases, newest first">
        <thead>
          <tr>
            <Th>Release</Th>
            <Th>Change</Th>
            <Th>Released by</Th>
            <Th>SHA-256 of the bundle</Th>
            <Th>State</Th>
          </tr>
        </thead>
        <tbody>
          {releases.map((release) => (
            <Tr key={release.id}>
              <RowHead>
                <Link
                  to={`/releases/${release.id}`}
                  className={release.withdrawn ? "line-through hover:text-copper" : "hover:text-copper"}
                >
                  {release.model} <span className="font-mono">{release.version}</span>
                </Link>
              </RowHead>
              <Td>
                {release.rating ? <RatingBadge rating={release.rating} /> : <span className="text-ink-3">none</span>}
              </Td>
              <Td className="whitespace-nowrap">
                {release.by}, <LocalTime iso={release.at} parts="date" />
              </Td>
              <Td mono className="text-note text-ink-2" title={release.bundleHash}>
                {release.bundleHash.slice(0, 16)}…
              </Td>
              <Td>{release.withdrawn ? <Tag tone="ink">withdrawn</Tag> : <Tag>valid</Tag>}</Td>
            </Tr>
          ))}
        </tbody>
      </Table>
    </TableScroll>
  );
}
