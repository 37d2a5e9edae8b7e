import { Field, Select } from "~/components/ui/field";
import { Button } from "~/components/ui/button";
import type { NodeKey } from "~/domain/address-space/node-id";
import type { BoundRole } from "~/domain/mapping/bindings";
import type { PlannedSource } from "~/domain/mapping/make-wiring";
import type { Binding } from "~/domain/mapping/mapping-parts";
import { isIoLinkMaster } from "~/domain/mapping/source-settings";
import type { DeviceSummary } from "~/services/read-devices.server";
import { CommitInput, FigureInput } from "./commit-input";
import { ReplaceDevice } from "./replace-device";
import type { MappingActions } from "./use-mapping-actions";

type Props = {
  machine: NodeKey;
  role: string;
  bound: BoundRole | undefined;
  sources: readonly PlannedSource[];
  devices: readonly DeviceSummary[];
  actions: MappingActions;
};

/** One role of one machine: its place, its serial number, and the way to replace the device. */
export function BindingPanel({ machine, role, bound, sources, devices, actions }: Props) {
  const binding = bound?.binding;
  const source = sources.find((one) => one.id === binding?.sourceId);
  const save = (next: Binding | undefined) => actions.set(next ? "bind-role" : "unbind-role", "binding", role, next);
  const change = (part: Partial<Binding>, ...gone: (keyof Binding)[]) => {
    if (!binding) return;
    const rest = Object.fromEntries(
      Object.entries(binding).filter(([key]) => !gone.includes(key as keyof Binding)),
    ) as Binding;
    save({ ...rest, ...part });
  };
  const isMaster = source !== undefined && isIoLinkMaster(source.kind);
  return (
    <div className="grid grid-cols-[minmax(280px,1fr)_minmax(0,2fr)] gap-6 px-5 py-3">
      <fieldset disabled={actions.blockedBy !== undefined} className="grid content-start gap-2">
        <legend className="mb-1 text-small font-semibold">Place</legend>
        <Field label="Source">
          {(tied) => (
            <Select
              {...tied}
              size="small"
              value={binding?.sourceId ?? ""}
              onChange={(event) => {
                const next = sources.find((one) => one.id === event.currentTarget.value);
                save(
                  next
                    ? {
                        sourceId: next.id,
                        ...(isIoLinkMaster(next.kind)
                          ? { port: 1 }
                          : next.kind === "modbus-unit"
                            ? { unitId: next.address.unitId ?? 1 }
                            : {}),
                      }
                    : undefined,
                );
              }}
            >
              <option value="">not bound</option>
              {sources.map((one) => (
                <option key={one.id} value={one.id}>
                  {one.name}
                </option>
              ))}
            </Select>
          )}
        </Field>
        {binding && isMaster ? (
          <div className="grid grid-cols-2 gap-3">
            <Field label="Port">
              {(tied) => (
                <Select
                  {...tied}
                  size="small"
                  value={binding.port ?? 1}
                  onChange={(event) => change({ port: Number(event.currentTarget.value) })}
                >
                  {Array.from({ length: source.address.portCount ?? 8 }, (_, i) => {
                    const planned = source.ports.find((one) => one.port === i + 1)?.device;
                    return (
                      <option key={i} value={i + 1}>
                        {i + 1}
                        {planned ? `, ${planned.name}` : ""}
                      </option>
                    );
                  })}
                </Select>
              )}
            </Field>
            <CommitInput
              label="Alias in the master"
              mono
              value={binding.deviceAlias ?? ""}
              hint={`empty: master${source.address.masterNumber ?? 1}port${binding.port ?? 1}`}
              onCommit={(text) => {
                if (text.trim() === "") change({}, "deviceAlias");
                else change({ deviceAlias: text.trim() });
                return undefined;
              }}
            />
          </div>
        ) : null}
        {binding && source?.kind === "modbus-unit" ? (
          <div className="grid grid-cols-2 gap-3">
            <FigureInput
              label="Unit id"
              isWhole
              low={0}
              high={255}
              value={binding.unitId}
              onClear={() => change({}, "unitId")}
              onCommit={(unitId) => change({ unitId })}
            />
            <FigureInput
              label="Added to every address"
              isWhole
              low={-65_535}
              high={65_535}
              value={binding.addressOffset}
              onClear={() => change({}, "addressOffset")}
              onCommit={(addressOffset) => change({ addressOffset })}
            />
          </div>
        ) : null}
        {binding && source && !isMaster && source.kind !== "modbus-unit" ? (
          <CommitInput
            label="Put before every name"
            mono
            value={binding.path ?? ""}
            onCommit={(text) => {
              if (text === "") change({}, "path");
              else change({ path: text });
              return undefined;
            }}
          />
        ) : null}
        {binding ? (
          <Button
            size="small"
            className="justify-self-start"
            blockedBy={actions.blockedBy}
            onClick={() => save(undefined)}
          >
            Unbind
          </Button>
        ) : (
          <p className="text-small text-ink-3">
            Until it is bound, every node that this role feeds is Bad_NotConnected on this machine.
          </p>
        )}
      </fieldset>
      <section aria-label="Device" className="min-w-0">
        <h4 className="mb-1 text-small font-semibold">Device</h4>
        {bound?.value.kind === "io-link-device" && binding ? (
          <ReplaceDevice machine={machine} role={role} bound={bound} devices={devices} blockedBy={actions.blockedBy} />
        ) : (
          <p className="text-small text-ink-2">
            {bound?.value.description ?? "This role is no IO-Link device, or not bound yet."}
          </p>
        )}
      </section>
    </div>
  );
}
