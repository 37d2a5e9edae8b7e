/** Device descriptions of an organisation, and the log of devices that were replaced. */
import { and, asc, desc, eq } from "drizzle-orm";
import { getDatabase } from "../client.server";
import { deviceDescription, deviceReplacement } from "../schema/sources";

export type DeviceRow = typeof deviceDescription.$inferSelect;
export type ReplacementRow = typeof deviceReplacement.$inferSelect;

export async function listDeviceRows(organizationId: string): Promise<DeviceRow[]> {
  return getDatabase()
    .select()
    .from(deviceDescription)
    .where(eq(deviceDescription.organizationId, organizationId))
    .orderBy(
      asc(deviceDescription.vendorName),
      asc(deviceDescription.deviceName),
      desc(deviceDescription.releaseDate),
      desc(deviceDescription.schemaVersion),
    );
}

export async function findDeviceRow(id: string): Promise<DeviceRow | undefined> {
  const [row] = await getDatabase().select().from(deviceDescription).where(eq(deviceDescription.id, id));
  return row;
}

export async function listDevicesOfFile(organizationId: string, fileHash: string): Promise<DeviceRow[]> {
  return getDatabase()
    .select()
    .from(deviceDescription)
    .where(and(eq(deviceDescription.organizationId, organizationId), eq(deviceDescription.fileHash, fileHash)));
}

/** Another request may have been quicker with the same file; then its row stays. */
export function addDeviceStatement(row: DeviceRow) {
  return getDatabase().insert(deviceDescription).values(row).onConflictDoNothing();
}

export function removeDeviceStatement(id: string) {
  return getDatabase().delete(deviceDescription).where(eq(deviceDescription.id, id));
}

export function addReplacementStatement(row: ReplacementRow) {
  return getDatabase().insert(deviceReplacement).values(row);
}

/** Newest first. */
export async function listReplacementRows(organizationId: string): Promise<ReplacementRow[]> {
  return getDatabase()
    .select()
    .from(deviceReplacement)
    .where(eq(deviceReplacement.organizationId, organizationId))
    .orderBy(desc(deviceReplacement.at));
}
