import { ArrowLeft, ArrowRight, Plus, Unplug } from "lucide-react";
import { useState } from "react";
import { FerruleBadge } from "~/components/notation/ferrule-badge";
import { FindingShape } from "~/components/notation/finding-badge";
import { StatusBadge } from "~/components/notation/status-badge";
import { Button, buttonClass, IconButton } from "~/components/ui/button";
import { cx } from "~/components/ui/cx";
import { Checkbox } from "~/components/ui/field";
import { Icon } from "~/components/ui/icon";
import { Menu } from "~/components/ui/menu";
import { Notice } from "~/components/ui/notice";
import type { RowContent, Transform } from "~/domain/mapping/mapping";
import { findSourceUnit, type NodeReading } from "./bench-readings";
import { CommitInput, FigureInput } from "./commit-input";
import { describeSource, feedOf, type Roles } from "./describe-source";
import { makeTransform, transformKinds } from "./describe-transform";
import { nameMember, type Member } from "./mapping-scene";
import { QualityEditor } from "./quality-editor";
import { listStations, type Station } from "./row-stations";
import { SourceEditor } from "./source-editor";
import { TransformEditor } from "./transform-editor";
import type { MappingActions } from "./use-mapping-actions";

type Props = {
  member: Member & { readonly row: RowContent };
  members: readonly Member[];
  roles: Roles;
  reading: NodeReading | undefined;
  findings: readonly {
    readonly severity: "error" | "warning" | "hint";
    readonly rule: string;
    readonly message: string;
  }[];
  actions: MappingActions;
};

/** One row: the stations from the bits to the node, where it comes from, its steps, its quality. */
export function RowInspector({ member, members, roles, reading, findings, actions }: Props) {
  const { id, row, target } = member;
  const [step, setStep] = useState<number | undefined>(undefined);
  const open = step !== undefined && step < row.transforms.length ? step : undefined;
  const transform = open === undefined ? undefined : row.transforms[open];
  const save = (next: Partial<RowContent>) => actions.setRow(id, { ...row, ...next });
  const saveSteps = (transforms: readonly Transform[]) => save({ transforms: [...transforms] });

  function addStep(kind: Transform["kind"]): void {
    saveSteps([
      ...row.transforms,
      makeTransform(kind, {
        from: row.transforms.length === 0 ? findSourceUnit(member, { roles }) : undefined,
        to: target.unit?.code || undefined,
      }),
    ]);
    setStep(row.transforms.length);
  }
  function move(by: 1 | -1): void {
    if (open === undefined || transform === undefined) return;
    const rest = row.transforms.filter((_, i) => i !== open);
    rest.splice(open + by, 0, transform);
    saveSteps(rest);
    setStep(open + by);
  }

  return (
    <div className="grid gap-4 px-5 py-3">
      {findings.map((finding) => (
        <p key={`${finding.rule} ${finding.message}`} className="flex items-start gap-1.5 text-small">
          <span className="pt-0.5">
            <FindingShape severity={finding.severity} />
          </span>
          <span>
            <span className="font-mono text-note text-ink-3">{finding.rule}</span> {finding.message}
          </span>
        </p>
      ))}
      <div className="flex flex-wrap items-stretch gap-y-2" role="group" aria-label="Steps from the source to the node">
        {listStations(row, target, roles).map((station, index) => (
          <StationBox
            key={station.key}
            station={station}
            index={index}
            reading={reading}
            isOpen={station.transform !== undefined && station.transform === open}
            onOpen={(transformIndex) => setStep(transformIndex === open ? undefined : transformIndex)}
          />
        ))}
        <span className="ml-3 self-center">
          <Menu
            label="Add a step"
            trigger={
              <button
                type="button"
                className={buttonClass("plain", "small")}
                disabled={actions.blockedBy !== undefined}
              >
                <Icon of={Plus} /> Step
              </button>
            }
            entries={transformKinds.map(([kind, label]) => ({ label, onSelect: () => addStep(kind) }))}
          />
        </span>
      </div>
      <div className="grid grid-cols-[minmax(260px,1fr)_minmax(260px,1fr)_minmax(320px,1.3fr)] gap-6">
        <fieldset disabled={actions.blockedBy !== undefined} className="min-w-0">
          <legend className="mb-1 text-small font-semibold">Source</legend>
          <SourceEditor
            source={row.source}
            roles={roles}
            members={members}
            target={target}
            onChange={(source) => save({ source })}
          />
        </fieldset>
        <fieldset disabled={actions.blockedBy !== undefined} className="min-w-0">
          <legend className="mb-1 text-small font-semibold">
            {transform ? `Step ${(open ?? 0) + 1} of ${row.transforms.length}` : "Step"}
          </legend>
          {transform && open !== undefined ? (
            <div className="grid gap-2">
              <TransformEditor
                key={open}
                transform={transform}
                onChange={(next) => saveSteps(row.transforms.map((old, i) => (i === open ? next : old)))}
              />
              <div className="flex items-center gap-1">
                <IconButton
                  icon={ArrowLeft}
                  size="small"
                  label="Earlier"
                  {...(open === 0 ? { blockedBy: "is the first" } : {})}
                  onClick={() => move(-1)}
                />
                <IconButton
                  icon={ArrowRight}
                  size="small"
                  label="Later"
                  {...(open === row.transforms.length - 1 ? { blockedBy: "is the last" } : {})}
                  onClick={() => move(1)}
                />
                <Button
                  size="small"
                  className="ml-auto"
                  onClick={() => {
                    saveSteps(row.transforms.filter((_, i) => i !== open));
                    setStep(undefined);
                  }}
                >
                  Remove this step
                </Button>
              </div>
            </div>
          ) : (
            <p className="text-small text-ink-3">
              {row.transforms.length === 0
                ? "The value arrives as it is read. Add a step to scale, convert, test a bit or map states."
                : "Press a step above to change it."}
            </p>
          )}
        </fieldset>
        <fieldset disabled={actions.blockedBy !== undefined} className="grid min-w-0 content-start gap-2">
          <legend className="mb-1 text-small font-semibold">{row.direction === "out" ? "Output" : "Quality"}</legend>
          {row.direction === "out" ? (
            <OutputFields row={row} save={save} />
          ) : (
            <QualityEditor row={row} onChange={(quality) => saveWithout(actions, id, row, "quality", quality)} />
          )}
          <div className="grid grid-cols-2 gap-3">
            <FigureInput
              label="Read every"
              unit="ms"
              isWhole
              low={1}
              high={86_400_000}
              value={row.period}
              onClear={() => saveWithout(actions, id, row, "period", undefined)}
              onCommit={(period) => save({ period })}
            />
            <CommitInput
              label="Comment"
              value={row.comment ?? ""}
              onCommit={(text) => {
                saveWithout(actions, id, row, "comment", text.trim() || undefined);
                return undefined;
              }}
            />
          </div>
          <Checkbox
            label="Mirrors a safety signal"
            hint="Shows the state of a safety signal. Do not use for protection."
            checked={row.mirrorsSafetySignal === true}
            onChange={(event) =>
              saveWithout(actions, id, row, "mirrorsSafetySignal", event.currentTarget.checked || undefined)
            }
          />
        </fieldset>
      </div>
    </div>
  );
}

/** Sets a member of the row, or takes it away. */
function saveWithout<K extends keyof RowContent>(
  actions: MappingActions,
  id: string,
  row: RowContent,
  key: K,
  value: RowContent[K] | undefined,
): void {
  const { [key]: _old, ...rest } = row;
  actions.setRow(id, (value === undefined ? rest : { ...rest, [key]: value }) as RowContent);
}

function OutputFields({ row, save }: { row: RowContent; save: (next: Partial<RowContent>) => boolean }) {
  const { low = 0, high = 0 } = row.limits ?? {};
  return (
    <div className="grid gap-2">
      <Notice tone="warning" title="This value acts on a machine">
        Check range, unit and owner first. IO-Link process data is not safety-related communication, and a write can
        move machinery: follow the machine&rsquo;s risk assessment, local codes and licensed practice.
      </Notice>
      <div className="grid grid-cols-2 gap-3">
        <FigureInput
          label="Lowest value written"
          value={row.limits?.low}
          onCommit={(value) => save({ limits: { low: value, high: Math.max(value, high) } })}
        />
        <FigureInput
          label="Highest value written"
          value={row.limits?.high}
          onCommit={(value) => save({ limits: { low: Math.min(low, value), high: value } })}
        />
      </div>
      <p className="text-note text-ink-3">
        {row.limits ? "Beyond these limits nothing is written." : "Without limits nothing is written at all."}
      </p>
    </div>
  );
}

type StationProps = {
  station: Station;
  index: number;
  reading: NodeReading | undefined;
  isOpen: boolean;
  onOpen: (transform: number) => void;
};

function StationBox({ station, index, reading, isOpen, onOpen }: StationProps) {
  const value = reading?.stations.get(station.key);
  const isNode = station.key === "node";
  const body = (
    <>
      <span className="flex items-center justify-between gap-2 text-note text-ink-3">
        {station.title}
        {isNode && reading ? <StatusBadge status={reading.tone}>{reading.status}</StatusBadge> : null}
      </span>
      <span className="my-0.5 block max-w-44 truncate font-mono text-lead font-semibold">
        {value?.text ?? <span className="font-normal text-ink-3">–</span>}
        {value?.unit ? <span className="ml-1 text-small font-normal text-ink-2">{value.unit}</span> : null}
      </span>
      <span className="block max-w-44 truncate text-note text-ink-2" title={station.note}>
        {station.note}
      </span>
    </>
  );
  const className = cx(
    "min-w-26 border bg-leaf px-3 py-1.5 text-left",
    isNode ? "rounded-variable border-ink" : isOpen ? "border-copper bg-copper-wash" : "border-edge",
  );
  return (
    <span className="flex items-stretch">
      {index > 0 ? (
        <svg
          viewBox="0 0 24 12"
          width={24}
          className="shrink-0 self-center"
          stroke="var(--copper-line)"
          fill="var(--copper-line)"
          aria-hidden
        >
          <path d="M0 6h17" fill="none" strokeWidth={1.5} />
          <path d="M24 6l-8-3.5v7z" stroke="none" />
        </svg>
      ) : null}
      {station.transform === undefined ? (
        <span className={className}>{body}</span>
      ) : (
        <button
          type="button"
          aria-expanded={isOpen}
          onClick={() => station.transform !== undefined && onOpen(station.transform)}
          className={cx(className, "hover:border-copper")}
        >
          {body}
        </button>
      )}
    </span>
  );
}

/** Head of the drawer: what feeds what. */
export function RowHead({ member, roles }: { member: Member; roles: Roles }) {
  const { row, target } = member;
  const name = nameMember(target);
  return (
    <>
      <FerruleBadge feed={feedOf(row)} />
      <h2 className="min-w-0 truncate text-small font-semibold">
        {row
          ? row.direction === "out"
            ? `${name} writes ${describeSource(row.source, roles)}`
            : `${describeSource(row.source, roles)} feeds ${name}`
          : `Nothing feeds ${name} yet`}
      </h2>
      <span className="truncate font-mono text-note text-ink-3">{target.path}</span>
    </>
  );
}

export function UnmapButton({ member, actions }: { member: Member; actions: MappingActions }) {
  return (
    <Button
      size="small"
      icon={Unplug}
      tone="bare"
      blockedBy={actions.blockedBy}
      onClick={() => actions.removeRow(member.id)}
    >
      Unmap
    </Button>
  );
}
