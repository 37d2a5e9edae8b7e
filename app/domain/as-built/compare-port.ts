/** Which device answers on a port, against the one that the role of a machine and the plan of the port want. */
import type { AsBuiltDifference } from "./as-built";

export type WantedDevice = {
  /** Machine and role. */
  readonly path: string;
  /** Port and source, for people. */
  readonly place: string;
  readonly vendorId: number;
  readonly deviceId: number;
  readonly serialNumber?: string;
};

export type FoundDevice = { readonly vendorId?: number; readonly deviceId?: number; readonly serialNumber?: string };

/** Ids tell the kind of device (common practice, no source), the serial number the very one. */
export function comparePort({ path, place, vendorId, deviceId, serialNumber }: WantedDevice, found: FoundDevice): AsBuiltDifference[] {
  const tell = (detail: string, released: string, seen: string | null): AsBuiltDifference[] => [
    { aspect: "device", kind: "device-differs", path, detail: `${place}: ${detail}`, released, found: seen },
  ];
  const wanted = formatIds(vendorId, deviceId);
  if (found.vendorId === undefined || found.deviceId === undefined) return tell("no device answers", wanted, null);
  if (found.vendorId !== vendorId || found.deviceId !== deviceId) return tell("another device", wanted, formatIds(found.vendorId, found.deviceId));
  if (!serialNumber || found.serialNumber === undefined || found.serialNumber === serialNumber) return [];
  return tell("another one of the same kind", `serial number ${serialNumber}`, `serial number ${found.serialNumber}`);
}

function formatIds(vendorId: number, deviceId: number): string {
  return `vendor ${vendorId}, device ${deviceId}`;
}
