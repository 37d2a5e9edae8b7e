import { useMemo, useState } from "react";
import { href } from "react-router";
import { useBadges, useEditorState, useOpenModel, type Badge } from "~/components/model/use-model";
import { FindingBadge, FindingShape } from "~/components/notation/finding-badge";
import { Button, LinkButton } from "~/components/ui/button";
import { Drawer } from "~/components/ui/drawer";
import { Empty } from "~/components/ui/empty";
import { Block, Page } from "~/components/ui/page";
import { Segments } from "~/components/ui/segments";
import { Input } from "~/components/ui/field";
import { RowHead, Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import { cx } from "~/components/ui/cx";
import { showToast } from "~/components/ui/toast";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { formatProblem } from "~/domain/core/problem-texts";
import { listMachines, type Machine } from "~/domain/instantiation/list-machines";
import { listBoundRoles, toMachineMapping } from "~/domain/mapping/bindings";
import type { PlannedSource } from "~/domain/mapping/make-wiring";
import type { Binding } from "~/domain/mapping/mapping-parts";
import { isIoLinkMaster } from "~/domain/mapping/source-settings";
import { planBindings, type RollOutCell } from "~/domain/mapping/roll-out-bindings";
import type { DeviceSummary } from "~/services/read-devices.server";
import type { LoggedReplacement } from "~/services/replace-device.server";
import { BindingPanel } from "./binding-panel";
import { Exceptions } from "./exception-editor";
import { DeliverPanel } from "./deliver-panel";
import { MappingActions } from "./use-mapping-actions";

type Props = {
  sources: readonly PlannedSource[];
  devices: readonly DeviceSummary[];
  replacements: readonly LoggedReplacement[];
};
type View = "bindings" | "deliver";

/** The mapping of a model of machines: where each role of the type is found on each machine. */
export function BindingsView({ sources, devices, replacements }: Props) {
  const model = useOpenModel();
  const { space } = useEditorState();
  const [view, setView] = useState<View>("bindings");
  const machines = useMemo(() => listMachines(space), [space]);
  const tables = useMemo(
    () => groupByRoles(machines, (key) => listBoundRoles(space, key).map((one) => one.role)),
    [machines, space],
  );
  if (machines.length === 0)
    return (
      <main id="main" className="grid flex-1 place-content-center p-8">
        <h1 className="sr-only">Bindings</h1>
        <Empty
          title="No machine yet"
          action={
            <LinkButton tone="main" to={href("/models/:modelId/roll-out", { modelId: model.workspace.model.id })}>
              Roll out machines
            </LinkButton>
          }
        >
          Machines are made of a type in one go on the Roll-out page. Then each role of the type is bound to a port or
          an address here.
        </Empty>
      </main>
    );
  return (
    <Page
      title="Bindings"
      about="Where each role of the type is found on each machine."
      actions={
        <Segments
          label="View"
          value={view}
          onChange={setView}
          options={[
            { value: "bindings", label: "Bindings" },
            { value: "deliver", label: "Deliver" },
          ]}
        />
      }
    >
      {view === "deliver" ? (
        <DeliverPanel
          machines={machines.map(({ key, name }) => ({ key, name }))}
          type={undefined}
          outputs={listMachineOutputs(space, machines)}
        />
      ) : (
        <div className="grid gap-8">
          {tables.map(({ roles, machines: group }) =>
            roles.length === 0 ? (
              <p key="none" className="text-small text-ink-2">
                {group.map((machine) => machine.name).join(", ")}: the type has no mapping in the release that this
                model stands on.
              </p>
            ) : (
              <BindingTable key={roles.join("\n")} roles={roles} machines={group} sources={sources} devices={devices} />
            ),
          )}
          <Exceptions machines={machines} />
          {replacements.length > 0 ? <Replacements replacements={replacements} /> : null}
        </div>
      )}
    </Page>
  );
}

function listMachineOutputs(space: AddressSpace, machines: readonly Machine[]): string[] {
  const rows = machines.flatMap((machine) => toMachineMapping(space, machine.key)?.rows ?? []);
  return [...new Set(rows.flatMap((row) => (row.direction === "out" ? [row.target] : [])))];
}

/** Machines whose types have the same roles share a table. */
function groupByRoles(
  machines: readonly Machine[],
  listRoles: (key: NodeKey) => readonly string[],
): { roles: readonly string[]; machines: Machine[] }[] {
  const groups = new Map<string, { roles: readonly string[]; machines: Machine[] }>();
  for (const machine of machines) {
    const roles = listRoles(machine.key);
    const key = roles.join("\n");
    const group = groups.get(key) ?? { roles, machines: [] };
    groups.set(key, group);
    group.machines.push(machine);
  }
  return [...groups.values()];
}

type TableProps = {
  roles: readonly string[];
  machines: readonly Machine[];
  sources: readonly PlannedSource[];
  devices: readonly DeviceSummary[];
};

function BindingTable({ roles, machines, sources, devices }: TableProps) {
  const model = useOpenModel();
  const { space } = useEditorState();
  const [patterns, setPatterns] = useState<Readonly<Record<string, string>>>({});
  const [open, setOpen] = useState<{ machine: NodeKey; role: string } | undefined>(undefined);
  const machineActions = (machine: NodeKey) => new MappingActions(model, machine);
  const actions = machineActions(machines[0]?.key as NodeKey);
  const badges = useBadges(machines.map((machine) => machine.key));
  const hasPattern = Object.values(patterns).some((pattern) => pattern.trim() !== "");
  const plan = useMemo(
    () =>
      hasPattern
        ? planBindings(space, sources, { machines: machines.map((machine) => machine.key), patterns })
        : undefined,
    [space, sources, machines, patterns, hasPattern],
  );
  const conflicts = plan?.cells.filter((cell) => cell.conflicts.length > 0) ?? [];
  const openMachine = machines.find((machine) => machine.key === open?.machine);

  function take(): void {
    if (!plan || !actions.dispatch("bind-roles", plan.operations)) return;
    setPatterns({});
    showToast({
      tone: "good",
      title: `${plan.operations.length} ${plan.operations.length === 1 ? "role" : "roles"} bound`,
      detail: "Undo takes all of them back in one step.",
    });
  }
  return (
    <section aria-label={`Bindings of ${machines[0]?.typeName ?? "machines"}`}>
      <header className="mb-1.5 flex min-h-7 items-center gap-3">
        <h2 className="text-lead font-semibold">
          <em>{machines[0]?.typeName}</em>
        </h2>
        <span className="text-small text-ink-2">
          <span className="font-mono">{machines.length}</span> machines,{" "}
          <span className="font-mono">{roles.length}</span> roles
        </span>
        {plan ? (
          <span className="ml-auto flex items-center gap-3 text-small">
            {conflicts.length > 0 ? (
              <span className="flex items-center gap-1.5">
                <FindingShape severity="error" /> {conflicts.length} {conflicts.length === 1 ? "conflict" : "conflicts"}
              </span>
            ) : null}
            <Button onClick={() => setPatterns({})}>Clear the patterns</Button>
            <Button
              tone="main"
              blockedBy={
                actions.blockedBy ?? (plan.operations.length === 0 ? "the patterns change nothing" : undefined)
              }
              onClick={take}
            >
              Bind {plan.operations.length}
            </Button>
          </span>
        ) : null}
      </header>
      <TableScroll label="Bindings">
        <Table caption="Roles of the machines and where they are found" className="min-w-240">
          <thead>
            <tr>
              <Th>Machine</Th>
              {roles.map((role) => (
                <Th key={role}>{role}</Th>
              ))}
            </tr>
            <tr>
              <th scope="row" className="border-b border-rule py-1 pr-2 text-left text-note font-normal text-ink-3">
                Pattern
              </th>
              {roles.map((role) => (
                <td key={role} className="border-b border-rule px-2 py-1">
                  <Input
                    size="small"
                    mono
                    aria-label={`Pattern for ${role}`}
                    placeholder={patternHint(sources)}
                    value={patterns[role] ?? ""}
                    spellCheck={false}
                    disabled={actions.blockedBy !== undefined}
                    onChange={(event) => setPatterns({ ...patterns, [role]: event.currentTarget.value })}
                  />
                </td>
              ))}
            </tr>
          </thead>
          <tbody>
            {machines.map((machine) => {
              const bound = new Map(listBoundRoles(space, machine.key).map((one) => [one.role, one.binding]));
              return (
                <tr key={machine.key} className="align-top">
                  <RowHead className="pt-1.5">
                    <span className="flex items-center gap-1.5">
                      {machine.name}
                      <MachineBadge badge={badges.get(machine.key)} />
                    </span>
                  </RowHead>
                  {roles.map((role) => (
                    <BindingCell
                      key={role}
                      name={`${machine.name} ${role}`}
                      binding={bound.get(role)}
                      planned={plan?.cells.find((cell) => cell.machine === machine.key && cell.role === role)}
                      sources={sources}
                      isOpen={open?.machine === machine.key && open.role === role}
                      onOpen={() => setOpen({ machine: machine.key, role })}
                    />
                  ))}
                </tr>
              );
            })}
          </tbody>
        </Table>
      </TableScroll>
      <p className="mt-1.5 text-note text-ink-3">
        A pattern names a source and a port (<code>M1:4</code>) or a unit (<code>Controllers/11</code>). In braces
        stands a formula over <code>n</code>, the number in the machine&rsquo;s name, and <code>i</code>, its place:{" "}
        <code>{"M{ceil(n / 2)}:{(n - 1) % 2 * 3 + 1}"}</code>.
      </p>
      {openMachine && open ? (
        <Drawer
          label={`${openMachine.name} ${open.role}`}
          storageKey="binding-drawer"
          initialHeight={300}
          className="mt-4 border-b border-rule"
          onClose={() => setOpen(undefined)}
          head={
            <h3 className="text-small font-semibold">
              {openMachine.name} {open.role}
            </h3>
          }
        >
          <BindingPanel
            key={`${open.machine} ${open.role}`}
            machine={open.machine}
            role={open.role}
            bound={listBoundRoles(space, open.machine).find((one) => one.role === open.role)}
            sources={sources}
            devices={devices}
            actions={machineActions(open.machine)}
          />
        </Drawer>
      ) : null}
    </section>
  );
}

function MachineBadge({ badge }: { badge: Badge | undefined }) {
  return badge ? <FindingBadge severity={badge.severity} count={badge.count} title={badge.title} /> : null;
}

function patternHint(sources: readonly PlannedSource[]): string {
  return `${sources.find((source) => isIoLinkMaster(source.kind))?.name ?? "M1"}:{n}`;
}

type CellProps = {
  name: string;
  binding: Binding | undefined;
  planned: RollOutCell | undefined;
  sources: readonly PlannedSource[];
  isOpen: boolean;
  onOpen: () => void;
};

function BindingCell({ name, binding, planned, sources, isOpen, onOpen }: CellProps) {
  const source = sources.find((one) => one.id === binding?.sourceId);
  const place = binding ? formatPlace(binding, source?.name ?? "a source that is gone") : "not bound";
  return (
    <Td
      className={cx(
        "p-0!",
        isOpen && "bg-copper-wash",
        planned?.conflicts.length ? "bg-error-wash" : planned?.isChanged && "bg-changed-wash",
      )}
    >
      <button
        type="button"
        aria-label={`${name}: ${place}`}
        aria-expanded={isOpen}
        onClick={onOpen}
        className="w-full px-2 py-1.5 text-left hover:bg-bench focus-visible:-outline-offset-2"
      >
        {planned ? (
          <span className="block">
            {planned.isChanged && planned.present ? (
              <span className="mr-1.5 font-mono text-ink-3 line-through">{place}</span>
            ) : null}
            <span className={cx("font-mono", planned.isChanged && "font-semibold")}>{planned.text || "–"}</span>
          </span>
        ) : (
          <span className={cx("font-mono", !binding && "text-ink-3")}>{place}</span>
        )}
        {!planned && binding?.serialNumber ? (
          <span className="block font-mono text-note text-ink-3">serial {binding.serialNumber}</span>
        ) : null}
        {planned?.conflicts.map((conflict) => (
          <span key={conflict.code} className="block text-note text-error">
            {formatProblem(conflict)}
          </span>
        ))}
      </button>
    </Td>
  );
}

export function formatPlace(binding: Binding, source: string): string {
  if (binding.port !== undefined) return `${source}:${binding.port}`;
  return binding.unitId === undefined ? source : `${source}/${binding.unitId}`;
}

const kindWords = { same: "the same device", compatible: "a compatible device", other: "another device" } as const;

function Replacements({ replacements }: { replacements: readonly LoggedReplacement[] }) {
  return (
    <Block title="Replaced devices">
      <TableScroll label="Replaced devices">
        <Table caption="Devices that were replaced, newest first">
          <thead>
            <tr>
              <Th>When</Th>
              <Th>Machine</Th>
              <Th>Role</Th>
              <Th>By</Th>
              <Th>From</Th>
              <Th>To</Th>
              <Th>Reason</Th>
              <Th right>Point checks due</Th>
              <Th>Who</Th>
            </tr>
          </thead>
          <tbody>
            {replacements.map((one) => (
              <Tr key={one.id}>
                <Td mono>{one.at.slice(0, 16).replace("T", " ")}</Td>
                <RowHead>{one.machineName}</RowHead>
                <Td>{one.role}</Td>
                <Td>{kindWords[one.kind]}</Td>
                <Td mono>{one.from}</Td>
                <Td mono>{one.to}</Td>
                <Td className="text-ink-2">{one.reason}</Td>
                <Td right mono title={one.targets.join(", ")}>
                  {one.targets.length}
                </Td>
                <Td>{one.person}</Td>
              </Tr>
            ))}
          </tbody>
        </Table>
      </TableScroll>
    </Block>
  );
}
