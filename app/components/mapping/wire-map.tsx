import { Plus } from "lucide-react";
import { useMemo, useRef, useState } from "react";
import { useBadges } from "~/components/model/use-model";
import { Button, buttonClass } from "~/components/ui/button";
import { Empty } from "~/components/ui/empty";
import { Icon } from "~/components/ui/icon";
import type { MenuEntry } from "~/components/ui/menu";
import { Popover } from "~/components/ui/popover";
import type { DeviceSummary } from "~/services/read-devices.server";
import type { NodeReading } from "./bench-readings";
import { viewRoleFrame } from "./view-role-frame";
import { toPin, type MappingScene } from "./mapping-scene";
import { MemberList } from "./member-list";
import { RoleBlock, type FrameState } from "./role-block";
import { AddRoleForm, loadDeviceRole } from "./role-forms";
import type { FieldReference, MappingActions } from "./use-mapping-actions";
import { useWires } from "./use-wires";
import { WireLines } from "./wire-lines";

type Props = {
  scene: MappingScene;
  devices: readonly DeviceSummary[];
  actions: MappingActions;
  selected: string | undefined;
  onSelect: (id: string | undefined) => void;
  suggested: ReadonlySet<string>;
  readings: ReadonlyMap<string, NodeReading>;
  frames: ReadonlyMap<string, FrameState>;
};

/** Sources by role with their rulers at the left, the Variables of the type at the right, wires between. */
export function WireMap({ scene, devices, actions, selected, onSelect, suggested, readings, frames }: Props) {
  const drawing = useRef<HTMLDivElement>(null);
  const [picked, setPicked] = useState<FieldReference | undefined>(undefined);
  const dragged = useRef<FieldReference | undefined>(undefined);
  const [isDragging, setDragging] = useState(false);
  const [renaming, setRenaming] = useState<string | undefined>(undefined);
  const wires = useWires(drawing, scene.connections);
  const keys = useMemo(() => scene.members.map((member) => member.target.key), [scene]);
  const badges = useBadges(keys);
  const selectedRow = scene.members.find((member) => member.id === selected)?.row;
  const selectedWires = useMemo(
    () =>
      new Set(
        scene.connections.filter((connection) => connection.terminal === selected).map((connection) => connection.id),
      ),
    [scene, selected],
  );
  const outputs = useMemo(
    () =>
      new Set(
        scene.connections
          .filter(({ terminal }) => scene.members.find((m) => m.id === terminal)?.row?.direction === "out")
          .map(({ id }) => id),
      ),
    [scene],
  );
  const selectedPin =
    selectedRow && "role" in selectedRow.source ? toPin(selectedRow.source.role, selectedRow) : undefined;

  function pickField(reference: FieldReference): void {
    const isSame =
      picked?.role === reference.role &&
      picked.direction === reference.direction &&
      picked.subindex === reference.subindex;
    setPicked(isSame ? undefined : reference);
    if (isSame) return;
    const fed = scene.members.find(
      (member) =>
        member.row &&
        toPin(reference.role, member.row) === `${reference.role}/${reference.direction}/${reference.subindex}`,
    );
    const open = fed ?? scene.members.find((member) => !member.row);
    drawing.current
      ?.querySelector<HTMLElement>(`[data-member="${CSS.escape(fed?.id ?? open?.id ?? "")}"]`)
      ?.focus({ preventScroll: true });
  }
  function land(id: string): void {
    const reference = dragged.current ?? picked;
    dragged.current = undefined;
    setDragging(false);
    setPicked(undefined);
    const member = scene.members.find((one) => one.id === id);
    if (reference && member) actions.mapField(member.target.target, reference);
    onSelect(id);
  }
  const name = picked && nameField(scene, picked);

  return (
    <div className="min-h-0 flex-1 overflow-auto px-5 pb-6">
      <p role="status" className="flex min-h-7 items-center text-small text-ink-2">
        {name ? (
          <>
            <strong className="mr-1 font-semibold text-copper">{name}</strong> is picked: choose the Variable that it
            feeds with ↑ ↓ and Enter. Esc lets it go.
          </>
        ) : (
          "Drag a field onto a Variable, or pick it with Enter and then choose the Variable."
        )}
      </p>
      <div
        ref={drawing}
        className="relative grid min-w-240 grid-cols-[minmax(0,1fr)_auto_minmax(420px,480px)] items-start"
      >
        <WireLines wires={wires} selected={selectedWires} quiet={outputs} />
        <section aria-label="Sources" className="relative">
          {scene.roleViews.map((view) => (
            <RoleBlock
              key={view.name}
              view={view}
              frames={frames}
              picked={picked}
              menu={makeRoleMenu(view.name, scene, devices, actions, () => setRenaming(view.name))}
              onRename={
                renaming === view.name
                  ? (next) => {
                      setRenaming(undefined);
                      if (next !== undefined && next.trim() !== "" && next.trim() !== view.name)
                        actions.renameRole(view.name, next);
                    }
                  : undefined
              }
              selectedPin={selectedPin}
              onPickField={pickField}
              onDragField={(reference) => {
                dragged.current = reference;
                setDragging(reference !== undefined);
              }}
              onPickMember={onSelect}
            />
          ))}
          {scene.roleViews.length === 0 ? (
            <Empty title="No source yet" className="mb-3">
              Name the first source of this machine type by its role, such as “creel sensor”, and give it a device.
            </Empty>
          ) : null}
          <AddRole devices={devices} actions={actions} />
        </section>
        <div data-gutter style={{ width: 28 + Math.min(24, scene.connections.length) * 6 }} />
        <MemberList
          members={scene.members}
          roles={scene.roles}
          selected={selected}
          suggested={suggested}
          readings={readings}
          badges={badges}
          isWaiting={isDragging || picked !== undefined}
          onPick={land}
          onLeave={() => setPicked(undefined)}
        />
      </div>
    </div>
  );
}

function nameField(scene: MappingScene, { role, direction, subindex }: FieldReference): string | undefined {
  const known = scene.roles.get(role);
  const field = known && viewRoleFrame(known, direction)?.fields.find((one) => one.subindex === subindex);
  return field && `${field.name} of ${role}`;
}

function makeRoleMenu(
  name: string,
  scene: MappingScene,
  devices: readonly DeviceSummary[],
  actions: MappingActions,
  onRename: () => void,
): MenuEntry[] {
  const role = scene.roles.get(name);
  const isBlocked = actions.blockedBy !== undefined;
  return [
    {
      label: "Rename",
      disabled: isBlocked,
      onSelect: onRename,
    },
    { label: "Remove", disabled: isBlocked, danger: true, onSelect: () => void actions.removeRole(name) },
    ...(role?.kind === "io-link-device"
      ? [
          { kind: "rule" } as const,
          { kind: "head", label: "Device" } as const,
          ...devices.map((device): MenuEntry => ({
            kind: "choice",
            label: `${device.productIds[0] ?? device.deviceName}, ${device.documentVersion}`,
            checked: device.id === role.deviceDescriptionId,
            onSelect: () => {
              if (isBlocked) return;
              void loadDeviceRole(device).then((next) => next && actions.setRole(name, { ...role, ...next }));
            },
          })),
        ]
      : []),
  ];
}

function AddRole({ devices, actions }: { devices: readonly DeviceSummary[]; actions: MappingActions }) {
  const [open, setOpen] = useState(false);
  if (actions.blockedBy !== undefined)
    return (
      <Button icon={Plus} blockedBy={actions.blockedBy}>
        Source
      </Button>
    );
  return (
    <Popover
      label="Add a source"
      open={open}
      onOpenChange={setOpen}
      trigger={
        <button type="button" className={buttonClass()}>
          <Icon of={Plus} /> Source
        </button>
      }
    >
      <AddRoleForm
        devices={devices}
        onAdd={(name, role) => actions.addRole(name, role)}
        onDone={() => setOpen(false)}
      />
    </Popover>
  );
}
