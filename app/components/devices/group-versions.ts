/** The device library as people look for it: one product, its versions side by side, newest first. Pure. */

type Versioned = {
  readonly id: string;
  readonly vendorId: number;
  readonly deviceId: number;
  readonly vendorName: string;
  readonly deviceName: string;
  readonly productIds: readonly string[];
  readonly schemaVersion: string;
  readonly documentVersion: string;
  readonly releaseDate: string;
};

export type DeviceGroup<T> = { readonly key: string; readonly newest: T; readonly versions: readonly T[] };

export function groupVersions<T extends Versioned>(devices: readonly T[]): DeviceGroup<T>[] {
  const groups = new Map<string, T[]>();
  for (const device of devices) {
    const key = `${device.vendorId}/${device.deviceId}`;
    const group = groups.get(key);
    if (group) group.push(device);
    else groups.set(key, [device]);
  }
  return [...groups]
    .map(([key, versions]) => {
      const sorted = versions.sort(
        (a, b) =>
          compareText(b.releaseDate, a.releaseDate) ||
          compareText(b.documentVersion, a.documentVersion) ||
          compareText(b.schemaVersion, a.schemaVersion),
      );
      return { key, newest: sorted[0] as T, versions: sorted };
    })
    .sort(
      (a, b) =>
        compareText(a.newest.vendorName, b.newest.vendorName) ||
        compareText(a.newest.productIds[0] ?? "", b.newest.productIds[0] ?? "") ||
        a.newest.deviceId - b.newest.deviceId,
    );
}

function compareText(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}

/** Devices whose words hold all words of the query. */
export function searchDevices<T extends Versioned>(devices: readonly T[], query: string): T[] {
  const words = query.toLowerCase().split(/\s+/).filter(Boolean);
  return devices.filter((device) => {
    const text = [device.vendorName, device.deviceName, ...device.productIds, device.vendorId, device.deviceId]
      .join(" ")
      .toLowerCase();
    return words.every((word) => text.includes(word));
  });
}
