import { ChevronDown, ChevronRight } from "lucide-react";
import { Fragment, useState } from "react";
import { StatusBadge } from "~/components/notation/status-badge";
import { Button } from "~/components/ui/button";
import { cx } from "~/components/ui/cx";
import { Icon } from "~/components/ui/icon";
import { RowHead, Table, TableScroll, Td, Th } from "~/components/ui/table";
import { formatQuality, formatStatus } from "~/domain/mapping/status";
import type { TraceStep } from "~/domain/mapping/trace-row";
import { formatSampleValue, toTone, type NodeReading } from "./bench-readings";
import { describeTransform, nameTransform } from "./describe-transform";
import type { MappingScene } from "./mapping-scene";

/** All nodes with value, unit and status; each opens to the path of its steps. */
export function BenchResults({ scene, readings }: { scene: MappingScene; readings: ReadonlyMap<string, NodeReading> }) {
  const [open, setOpen] = useState<string | undefined>(undefined);
  const [showsAll, setShowsAll] = useState(false);
  const fed = scene.members.filter((member) => member.row && member.row.direction !== "out");
  const members = showsAll || readings.size === 0 ? fed : fed.filter((member) => readings.has(member.id));
  return (
    <div>
      <TableScroll label="Nodes">
        <Table caption="Nodes with what the bytes give">
          <thead>
            <tr>
              <Th>Node</Th>
              <Th right>Raw</Th>
              <Th right>Value</Th>
              <Th>Unit</Th>
              <Th>Status</Th>
            </tr>
          </thead>
          <tbody>
            {members.map((member) => {
              const reading = readings.get(member.id);
              const isOpen = open === member.id;
              return (
                <Fragment key={member.id}>
                  <tr className={cx(isOpen ? "bg-copper-wash" : "hover:bg-bench")}>
                    <RowHead className="p-0!">
                      <button
                        type="button"
                        aria-expanded={isOpen}
                        disabled={!reading}
                        onClick={() => setOpen(isOpen ? undefined : member.id)}
                        className="flex h-7 w-full items-center gap-1 text-left font-semibold focus-visible:-outline-offset-2 disabled:font-normal disabled:text-ink-2"
                      >
                        <Icon
                          of={isOpen ? ChevronDown : ChevronRight}
                          className={cx("text-ink-3", !reading && "invisible")}
                        />
                        {member.target.path}
                      </button>
                    </RowHead>
                    <Td right mono className="text-ink-2">
                      {reading?.stations.get("raw")?.text ?? reading?.stations.get("read")?.text ?? ""}
                    </Td>
                    <Td right mono className="font-semibold">
                      {reading?.text ?? ""}
                    </Td>
                    <Td>{reading?.unit}</Td>
                    <Td>
                      {reading ? (
                        <span title={formatQuality(reading.statusCode)}>
                          <StatusBadge status={reading.tone}>{reading.status}</StatusBadge>
                        </span>
                      ) : (
                        <StatusBadge status="stale">no input yet</StatusBadge>
                      )}
                    </Td>
                  </tr>
                  {isOpen && reading ? (
                    <tr>
                      <td colSpan={5} className="border-b border-hair bg-bench p-2">
                        <StepPath steps={reading.steps} unit={reading.unit} />
                      </td>
                    </tr>
                  ) : null}
                </Fragment>
              );
            })}
          </tbody>
        </Table>
      </TableScroll>
      {fed.length > members.length || (showsAll && readings.size > 0) ? (
        <Button
          size="small"
          tone="bare"
          className="mt-1"
          aria-expanded={showsAll}
          onClick={() => setShowsAll(!showsAll)}
        >
          {showsAll ? "Only nodes with input" : `${fed.length - members.length} nodes without input`}
        </Button>
      ) : null}
    </div>
  );
}

const kindWords: Readonly<Record<TraceStep["kind"], string>> = {
  bits: "Bits",
  raw: "Raw",
  scaled: "Scaled",
  source: "Read",
  formula: "Formula",
  transform: "Step",
  node: "Node",
};

function StepPath({ steps, unit }: { steps: readonly TraceStep[]; unit: string }) {
  return (
    <ol className="grid grid-cols-[80px_minmax(0,1fr)_auto_auto] gap-x-4 gap-y-0.5 pl-5 text-small">
      {steps.map((step, i) => (
        <li key={i} className="contents">
          <span className="text-ink-3">
            {step.transform ? nameTransform(step.transform.kind) : kindWords[step.kind]}
          </span>
          <span className="truncate font-mono">{step.transform ? describeTransform(step.transform) : step.text}</span>
          <span className="text-right font-mono font-semibold">
            {step.kind === "bits"
              ? ""
              : `${formatSampleValue(step.value)} ${step.value === null ? "" : step.kind === "node" ? unit : step.unit}`}
          </span>
          <span>
            {step.kind === "bits" ? null : (
              <StatusBadge status={toTone(step.status)}>{formatStatus(step.status)}</StatusBadge>
            )}
          </span>
        </li>
      ))}
    </ol>
  );
}
