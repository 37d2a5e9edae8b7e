import { RowHead, Table, TableScroll, Td, Th } from "~/components/ui/table";
import { FindingBadge } from "~/components/notation/finding-badge";
import { cx } from "~/components/ui/cx";
import type { SourceView } from "~/services/read-sources.server";
import type { SourceFinding } from "~/services/list-source-findings.server";
import { formatAddress, kindWords } from "./source-words";

type Props = {
  label: string;
  sources: readonly SourceView[];
  findings: readonly SourceFinding[];
  selected: string | undefined;
  onSelect: (id: string) => void;
};

/** Sources without ports: Modbus units, servers, services. */
export function UnitTable({ label, sources, findings, selected, onSelect }: Props) {
  return (
    <TableScroll label={label}>
      <Table caption={label} className="min-w-200">
        <thead>
          <tr>
            <Th>Name</Th>
            <Th>Kind</Th>
            <Th>Address</Th>
            <Th right>Read every</Th>
            <Th>Read by</Th>
            <Th>Findings</Th>
          </tr>
        </thead>
        <tbody>
          {sources.map((source) => {
            const own = findings.filter((finding) => finding.sourceId === source.id);
            return (
              <tr
                key={source.id}
                className={cx(
                  "align-top",
                  selected === source.id ? "bg-copper-wash shadow-[inset_3px_0_0_var(--copper)]" : "hover:bg-bench",
                )}
              >
                <RowHead className="p-0">
                  <button
                    type="button"
                    aria-pressed={selected === source.id}
                    className="h-7 w-full px-2 text-left font-semibold focus-visible:-outline-offset-2"
                    onClick={() => onSelect(source.id)}
                  >
                    {source.name}
                  </button>
                </RowHead>
                <Td className="py-1">{kindWords[source.kind]}</Td>
                <Td mono className="py-1">
                  {formatAddress(source.address) || "–"}
                </Td>
                <Td right mono className="py-1">
                  {source.address.periodMs} ms
                </Td>
                <Td className="py-1">
                  {source.bindings.length === 0 ? (
                    <span className="text-ink-3">no machine yet</span>
                  ) : (
                    source.bindings.map((binding) => (
                      <span
                        key={`${binding.machineKey} ${binding.role}`}
                        className="mr-3 inline-block whitespace-nowrap"
                      >
                        <strong className="font-semibold">{binding.machine}</strong> {binding.role}
                        {binding.binding.unitId === undefined ? null : (
                          <span className="ml-1 font-mono text-note text-ink-3">unit {binding.binding.unitId}</span>
                        )}
                      </span>
                    ))
                  )}
                </Td>
                <Td className="py-1">
                  {own[0] ? (
                    <FindingBadge severity={own[0].severity} count={own.length} title={own[0].message} />
                  ) : null}
                </Td>
              </tr>
            );
          })}
        </tbody>
      </Table>
    </TableScroll>
  );
}
