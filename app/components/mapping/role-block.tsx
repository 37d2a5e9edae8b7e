import { MoreHorizontal } from "lucide-react";
import { useMemo, useRef } from "react";
import { FrameRuler } from "~/components/frames/frame-ruler";
import type { FieldReading } from "~/components/frames/read-fields";
import { cx } from "~/components/ui/cx";
import { IconButton } from "~/components/ui/button";
import { Input } from "~/components/ui/field";
import { Menu, type MenuEntry } from "~/components/ui/menu";
import type { Direction } from "~/domain/iodd/device-description";
import { viewRoleFrame } from "./view-role-frame";
import type { RoleView } from "./mapping-scene";
import type { FieldReference } from "./use-mapping-actions";

export const roleKindWords = {
  "io-link-device": "IO-Link device",
  "modbus-unit": "Modbus unit",
  "opc-ua-server": "OPC UA server",
  "rest-service": "REST service",
  "tag-server": "tag server",
} as const;

export type FrameState = {
  readonly octets: Uint8Array;
  readonly readings: ReadonlyMap<number, FieldReading> | undefined;
};

type Props = {
  view: RoleView;
  frames: ReadonlyMap<string, FrameState>;
  picked: FieldReference | undefined;
  menu: readonly MenuEntry[];
  /** Given while the role's name is being changed; undefined leaves it as it was. */
  onRename: ((name: string | undefined) => void) | undefined;
  /** The source of the selected row, for its mark. */
  selectedPin: string | undefined;
  onPickField: (reference: FieldReference) => void;
  onDragField: (reference: FieldReference | undefined) => void;
  onPickMember: (id: string) => void;
};

/** One source by its role: its process data as a ruler, and what else of it is read. */
export function RoleBlock({
  view,
  frames,
  picked,
  menu,
  onRename,
  selectedPin,
  onPickField,
  onDragField,
  onPickMember,
}: Props) {
  const { name, role, points } = view;
  const directions = (["in", "out"] as const).filter((direction) => role.layouts?.[direction] !== undefined);
  return (
    <section aria-label={`Source ${name}`} className="border-t border-ink pt-2 pb-4">
      <header className="mb-2 flex min-h-7 items-center gap-2">
        {onRename ? (
          <RenameField name={name} onRename={onRename} />
        ) : (
          <h3 className="text-body font-semibold">{name}</h3>
        )}
        <span className="text-small text-ink-2">
          {role.productName ?? roleKindWords[role.kind]}
          {role.vendorId !== undefined && role.deviceId !== undefined ? (
            <span className="ml-1.5 font-mono text-note text-ink-3">
              {role.vendorId} · {role.deviceId}
            </span>
          ) : null}
        </span>
        <span className="ml-auto">
          <Menu
            label={`Actions of ${name}`}
            align="end"
            trigger={<IconButton icon={MoreHorizontal} label={`Actions of ${name}`} size="small" />}
            entries={menu}
          />
        </span>
      </header>
      {directions.map((direction) => (
        <RoleFrame
          key={direction}
          view={view}
          direction={direction}
          state={frames.get(`${name}\n${direction}`)}
          picked={picked?.role === name && picked.direction === direction ? picked.subindex : undefined}
          onPickField={onPickField}
          onDragField={onDragField}
        />
      ))}
      {points.length > 0 ? (
        <ul aria-label={`Other values of ${name}`} className="grid gap-0.5">
          {points.map((point) => (
            <li key={point.pin}>
              <button
                type="button"
                data-pin={point.pin}
                onClick={() => point.members[0] && onPickMember(point.members[0].id)}
                className={cx(
                  "flex h-6 w-full items-center justify-end gap-2 border-r-[3px] pr-2 text-right font-mono text-small hover:bg-bench",
                  selectedPin === point.pin ? "border-copper bg-copper-wash text-copper" : "border-ink",
                )}
              >
                <span className="truncate">{point.text}</span>
              </button>
            </li>
          ))}
        </ul>
      ) : null}
      {directions.length === 0 && points.length === 0 ? (
        <p className="text-small text-ink-3">
          {role.kind === "io-link-device"
            ? "No device description is attached: choose the device in the menu."
            : "Nothing of it is read yet: choose a Variable and say what feeds it."}
        </p>
      ) : null}
    </section>
  );
}

function RenameField({ name, onRename }: { name: string; onRename: (name: string | undefined) => void }) {
  const isDone = useRef(false);
  function finish(text: string | undefined): void {
    if (isDone.current) return;
    isDone.current = true;
    onRename(text);
  }
  return (
    <Input
      size="small"
      className="w-56!"
      aria-label={`New name of ${name}`}
      defaultValue={name}
      autoFocus
      maxLength={100}
      onFocus={(event) => event.currentTarget.select()}
      onBlur={(event) => finish(event.currentTarget.value)}
      onKeyDown={(event) => {
        if (event.key === "Enter") finish(event.currentTarget.value);
        else if (event.key === "Escape") finish(undefined);
      }}
    />
  );
}

function RoleFrame({
  view,
  direction,
  state,
  picked,
  onPickField,
  onDragField,
}: {
  view: RoleView;
  direction: Direction;
  state: FrameState | undefined;
  picked: number | undefined;
  onPickField: Props["onPickField"];
  onDragField: Props["onDragField"];
}) {
  const frame = viewRoleFrame(view.role, direction);
  const feeds = useMemo(() => {
    const found = new Map<number, string>();
    for (const [key, members] of view.fed) {
      const [side, subindex] = key.split("/");
      if (side === direction) found.set(Number(subindex), members.map((member) => member.target.path).join(", "));
    }
    return found;
  }, [view, direction]);
  const wires = useMemo(
    () => ({
      prefix: `${view.name}/${direction}/`,
      counts: new Map(
        [...view.fed]
          .filter(([key]) => key.startsWith(`${direction}/`))
          .map(([key, members]) => [Number(key.split("/")[1]), members.length]),
      ),
    }),
    [view, direction],
  );
  if (!frame) return null;
  const reference = (subindex: number): FieldReference => ({ role: view.name, direction, subindex });
  return (
    <div className="mb-2">
      <p className="mb-1 text-note text-ink-3">
        Process data {direction}, <span className="font-mono">{frame.octets * 8}</span> bit
        {direction === "out" ? ": what was set" : ""}
      </p>
      <FrameRuler
        label={`${view.name}, process data ${direction}`}
        view={frame}
        octets={state?.octets}
        readings={state?.readings}
        picked={picked === undefined ? undefined : new Set([picked])}
        feeds={feeds}
        wires={wires}
        quiet
        onPick={(field) => onPickField(reference(field.subindex))}
        onDragStart={(field, event) => {
          event.dataTransfer.setData("text/plain", `${view.name}: ${field.name}`);
          event.dataTransfer.effectAllowed = "link";
          onDragField(reference(field.subindex));
        }}
        onDragEnd={() => onDragField(undefined)}
      />
    </div>
  );
}
