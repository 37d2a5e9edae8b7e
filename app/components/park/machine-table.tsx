import type { ReactNode } from "react";
import { Link } from "react-router";
import { FindingTallyBadge } from "~/components/notation/finding-badge";
import { showValue } from "~/components/live/show-value";
import { StatusBadge, StatusShape } from "~/components/notation/status-badge";
import { cx } from "~/components/ui/cx";
import type { TestServerState } from "~/domain/simulation/test-server-state";
import type { ParkMachine } from "~/services/read-park.server";
import { MachineElevation } from "./machine-elevation";
import { isMapped, MemberTape } from "./member-tape";
import { useLiveValue } from "./use-live-value";

type Props = { machines: readonly ParkMachine[]; testServers: readonly TestServerState[] };

const headClass =
  "sticky left-0 z-10 border-r border-r-ink bg-bench px-2.5 text-left font-normal whitespace-nowrap text-ink-2";

/** Machines as columns under their elevation, so that a difference between equal machines shows by eye. */
export function MachineTable({ machines, testServers }: Props) {
  const serverOf = (machine: ParkMachine) => testServers.find((server) => server.modelId === machine.modelId);
  const groups = listGroupNames(machines);
  const identified = (["SerialNumber", "YearOfConstruction"] as const).filter((name) =>
    machines.some((machine) => machine.identification[name]),
  );
  return (
    <>
      <div role="region" aria-label="Machines" tabIndex={0} className="overflow-x-auto max-md:hidden">
        <table
          className="w-full border-[1.5px] border-ink bg-leaf text-small"
          style={{ minWidth: 150 + machines.length * 126 }}
        >
          <caption className="sr-only">Machines of the park, one a column</caption>
          <thead>
            <tr>
              <td className={headClass} />
              {machines.map((machine) => (
                <th
                  key={machine.key}
                  scope="col"
                  className={cx(
                    "border-l border-hair px-3 max-[1400px]:px-2 pt-2 pb-2.5 text-left align-top",
                    serverOf(machine) ? "bg-paper" : "bg-bench",
                  )}
                >
                  <MachineName machine={machine} />
                  <MachineElevation silent={!serverOf(machine)} />
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            <Row label="Now" machines={machines} tall>
              {(machine) => <Now machine={machine} server={serverOf(machine)} />}
            </Row>
            <Row label="Type" machines={machines}>
              {(machine) => <i>{machine.typeName}</i>}
            </Row>
            {identified.map((name) => (
              <Row key={name} label={name === "SerialNumber" ? "Serial number" : "Built"} machines={machines}>
                {(machine) => <span className="font-mono">{machine.identification[name] ?? ""}</span>}
              </Row>
            ))}
            {machines.some((machine) => machine.facts.typeVersion) ? (
              <Row label="Type version" machines={machines}>
                {(machine) => <TypeVersionCell machine={machine} />}
              </Row>
            ) : null}
            <Row label="Release on it" machines={machines}>
              {(machine) => <ReleaseCell machine={machine} />}
            </Row>
            <Row label="Findings" machines={machines}>
              {(machine) => (
                <Link to={`/models/${machine.modelId}/findings`}>
                  <FindingTallyBadge tally={machine.tally} showNone />
                </Link>
              )}
            </Row>
            <Row label={machines.some((machine) => machine.facts.mapped) ? "Mapped members" : "Members"} machines={machines} opens>
              {(machine) => <Total machine={machine} />}
            </Row>
            {groups.map((name) => (
              <Row key={name} label={name} machines={machines} within>
                {(machine) => <GroupCell machine={machine} name={name} />}
              </Row>
            ))}
            <Row label="As-built report" machines={machines} opens>
              {(machine) => <AsBuiltCell machine={machine} />}
            </Row>
            <Row label="Sources" machines={machines}>
              {(machine) => (
                <span className="block w-24 truncate font-mono text-note text-ink-2 max-[1400px]:w-[84px]" title={machine.facts.sources}>
                  {machine.facts.sources || <span className="text-ink-3">none bound</span>}
                </span>
              )}
            </Row>
          </tbody>
        </table>
      </div>
      <ul className="grid gap-3 md:hidden">
        {machines.map((machine) => (
          <MachineCard key={machine.key} machine={machine} server={serverOf(machine)} />
        ))}
      </ul>
    </>
  );
}

function listGroupNames(machines: readonly ParkMachine[]): string[] {
  return [...new Set(machines.flatMap((machine) => machine.groups.map((group) => group.name)))];
}

function MachineName({ machine }: { machine: ParkMachine }) {
  const place = machine.identification.Location ?? machine.identification.YearOfConstruction;
  return (
    <span className="mb-1 flex items-baseline justify-between gap-2">
      <Link
        to={`/models/${machine.modelId}/register?node=${encodeURIComponent(machine.key)}`}
        className="text-[16px] leading-6 font-semibold hover:text-copper"
      >
        {machine.name}
      </Link>
      <span className="font-mono text-note font-normal text-ink-3">{place}</span>
    </span>
  );
}

type RowProps = {
  label: string;
  machines: readonly ParkMachine[];
  tall?: boolean;
  opens?: boolean;
  within?: boolean;
  children: (machine: ParkMachine) => ReactNode;
};

function Row({ label, machines, tall, opens, within, children }: RowProps) {
  const border = opens ? "border-t border-t-ink" : within ? "" : "border-t border-t-hair";
  const height = tall ? "h-11" : within ? "h-[22px]" : "h-7";
  return (
    <tr>
      <th scope="row" className={cx(headClass, border, height, opens && "font-semibold text-ink", within && "pl-4.5")}>
        {label}
      </th>
      {machines.map((machine) => (
        <td
          key={machine.key}
          className={cx("border-l border-l-hair px-3 whitespace-nowrap max-[1400px]:px-2.5", border, height)}
        >
          {children(machine)}
        </td>
      ))}
    </tr>
  );
}

/** The revision of its type that the machine follows; an older one leads to the update. */
function TypeVersionCell({ machine }: { machine: ParkMachine }) {
  const version = machine.facts.typeVersion;
  if (!version) return <span className="text-ink-3">not held</span>;
  if (version.number === version.newest) return <span className="font-mono">r{version.number}</span>;
  return (
    <Link to={`/models/${machine.modelId}/roll-out?take=${version.newest}`} className="hover:text-copper">
      <span className="font-mono">r{version.number}</span> <span className="text-note text-ink-2">r{version.newest} is ready</span>
    </Link>
  );
}

const deliveryWords = { sent: "sent", loaded: "loaded", proved: "proved" } as const;

/** What was delivered to the machine's gateway, and how far it got. */
function ReleaseCell({ machine }: { machine: ParkMachine }) {
  const { gateway } = machine.facts;
  if (!gateway?.delivered) return <span className="text-ink-3" title={gateway ? `Nothing was delivered to ${gateway.name}` : "No gateway publishes this machine"}>none yet</span>;
  const { delivered } = gateway;
  const status = delivered.state === "proved" ? "good" : delivered.isWithdrawn ? "bad" : "uncertain";
  return (
    <Link to={`/releases/${delivered.releaseId}`} className="flex items-center gap-1.5 hover:text-copper" title={gateway.name}>
      <StatusShape status={status} />
      <span className="font-mono">{delivered.version}</span>
      <span className="text-note text-ink-2">{delivered.isWithdrawn ? "withdrawn" : deliveryWords[delivered.state]}</span>
    </Link>
  );
}

function AsBuiltCell({ machine }: { machine: ParkMachine }) {
  const report = machine.facts.asBuilt;
  if (!report)
    return (
      <Link to={`/models/${machine.modelId}/as-built`} className="hover:text-copper">
        <StatusBadge status="stale">never</StatusBadge>
      </Link>
    );
  const status = report.verdict === "as released" ? "good" : report.verdict === "differs" ? "uncertain" : "bad";
  return (
    <Link to={`/models/${machine.modelId}/as-built`} className="hover:text-copper" title={`Report ${report.number}`}>
      <StatusBadge status={status}>{report.verdict}</StatusBadge>
    </Link>
  );
}

/** How many of the members that the machine has are fed; without a mapping, how many it has of those of its type. */
function Total({ machine }: { machine: ParkMachine }) {
  const members = machine.groups.flatMap((group) => group.members);
  const present = members.filter((member) => member.isPresent);
  const counted = machine.facts.mapped ? present.filter((member) => isMapped(member, machine.facts.mapped)) : present;
  return (
    <span className="font-mono">
      {counted.length} <span className="text-ink-3">of {machine.facts.mapped ? present.length : members.length}</span>
    </span>
  );
}

function GroupCell({ machine, name }: { machine: ParkMachine; name: string }) {
  const group = machine.groups.find((candidate) => candidate.name === name);
  return group ? <MemberTape group={group} mapped={machine.facts.mapped} /> : <span className="text-ink-3">not in its type</span>;
}

/** What the machine does now, as the test server tells it. */
function Now({ machine, server }: { machine: ParkMachine; server: TestServerState | undefined }) {
  const state = useLiveValue(server?.id, machine.stateNodeId);
  const figure = useLiveValue(server?.id, machine.figure?.nodeId ?? null);
  if (!server)
    return (
      <Link
        to={`/models/${machine.modelId}/test-server`}
        className="block leading-[18px] hover:text-copper"
        title="Start a test server that serves this model"
      >
        <StatusBadge status="stale">not served</StatusBadge>
      </Link>
    );
  return (
    <Link
      to={`/live/${server.id}?node=${encodeURIComponent(machine.nodeId)}`}
      className="block leading-[18px] hover:text-copper"
    >
      <span className="flex items-center gap-[5px]" title={state?.status.name}>
        <StatusShape status={state?.status.severity ?? "stale"} />
        <span className="truncate">{state?.text ?? (machine.stateNodeId === null ? "no state" : "waiting")}</span>
      </span>
      <span className="block font-mono text-ink-2" title={machine.figure?.name}>
        {figure && machine.figure ? showValue(figure, machine.figure.range) : ""}{" "}
        <span className="text-ink-3">{figure ? machine.figure?.unit : ""}</span>
      </span>
    </Link>
  );
}

function MachineCard({ machine, server }: { machine: ParkMachine; server: TestServerState | undefined }) {
  return (
    <li className="border-[1.5px] border-ink bg-leaf p-3">
      <div className="flex gap-3">
        <div className="min-w-0 flex-1">
          <MachineName machine={machine} />
          <p className="mb-2 text-small text-ink-2">
            <i>{machine.typeName}</i>
          </p>
          <Now machine={machine} server={server} />
        </div>
        <div className="shrink-0">
          <MachineElevation silent={!server} />
        </div>
      </div>
      <dl className="mt-2 grid grid-cols-[1fr_150px] gap-y-1 border-t border-hair pt-2 text-small">
        {machine.groups.map((group) => (
          <div key={group.name} className="contents">
            <dt className="text-ink-2">{group.name}</dt>
            <dd>
              <MemberTape group={group} mapped={machine.facts.mapped} />
            </dd>
          </div>
        ))}
        <dt className="text-ink-2">Findings</dt>
        <dd>
          <FindingTallyBadge tally={machine.tally} showNone />
        </dd>
      </dl>
    </li>
  );
}
