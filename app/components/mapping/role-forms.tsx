import { useState, type FormEvent } from "react";
import { Button } from "~/components/ui/button";
import { Field, Input, Select } from "~/components/ui/field";
import type { DeviceSummary } from "~/services/read-devices.server";
import type { DeviceDescription } from "~/domain/iodd/device-description";
import { makeDeviceRole } from "~/domain/mapping/commands";
import type { Role } from "~/domain/mapping/mapping-parts";
import { roleKindWords } from "./role-block";

type Kind = Role["kind"];

/** The role of a device: the description is fetched once and its layouts are kept in the mapping. */
export async function loadDeviceRole(device: DeviceSummary, condition?: string): Promise<Role | undefined> {
  const response = await fetch(`/devices/${device.id}/description`);
  if (!response.ok) return undefined;
  const description = (await response.json()) as DeviceDescription;
  return {
    ...makeDeviceRole(description, device.id, condition),
    productName: device.productIds[0] ?? device.deviceName,
  };
}

type Props = {
  devices: readonly DeviceSummary[];
  onAdd: (name: string, role: Role) => boolean;
  onDone: () => void;
};

/** A source by its role on every machine of the type: "creel sensor". */
export function AddRoleForm({ devices, onAdd, onDone }: Props) {
  const [name, setName] = useState("");
  const [kind, setKind] = useState<Kind>("io-link-device");
  const [deviceId, setDeviceId] = useState(devices[0]?.id ?? "");
  const [failure, setFailure] = useState<string | undefined>(undefined);
  const device = devices.find((one) => one.id === deviceId);

  async function submit(event: FormEvent): Promise<void> {
    event.preventDefault();
    setFailure(undefined);
    const role: Role | undefined = kind === "io-link-device" && device ? await loadDeviceRole(device) : { kind };
    if (!role) setFailure("The device description could not be read. Try again.");
    else if (onAdd(name, role)) onDone();
  }
  return (
    <form onSubmit={(event) => void submit(event)} className="grid w-80 gap-3 p-3">
      <Field label="Role" hint="What it is on every machine of the type: creel sensor, meter.">
        {(tied) => (
          <Input
            {...tied}
            value={name}
            autoFocus
            required
            maxLength={100}
            onChange={(event) => setName(event.currentTarget.value)}
          />
        )}
      </Field>
      <Field label="Kind of source">
        {(tied) => (
          <Select {...tied} value={kind} onChange={(event) => setKind(event.currentTarget.value as Kind)}>
            {(Object.keys(roleKindWords) as Kind[]).map((one) => (
              <option key={one} value={one}>
                {roleKindWords[one]}
              </option>
            ))}
          </Select>
        )}
      </Field>
      {kind === "io-link-device" ? (
        <Field
          label="Device"
          hint={devices.length === 0 ? "The library is empty: add an IODD on the Devices page." : undefined}
          errors={failure ? [failure] : undefined}
        >
          {(tied) => (
            <Select {...tied} value={deviceId} onChange={(event) => setDeviceId(event.currentTarget.value)}>
              {devices.map((one) => (
                <option key={one.id} value={one.id}>
                  {one.productIds[0] ?? one.deviceName}, {one.deviceName}, {one.documentVersion}
                </option>
              ))}
            </Select>
          )}
        </Field>
      ) : null}
      <div className="flex justify-end gap-2">
        <Button onClick={onDone}>Cancel</Button>
        <Button
          type="submit"
          tone="main"
          blockedBy={
            name.trim() === ""
              ? "it needs a name"
              : kind === "io-link-device" && !device
                ? "choose a device"
                : undefined
          }
        >
          Add the source
        </Button>
      </div>
    </form>
  );
}
