/**
 * The device library: uploaded files are kept byte for byte, what was read of them is derived and may be made anew. One
 * ZIP may hold several descriptions; several versions of one device stand side by side.
 */
import type { Caller } from "../auth/caller.server";
import { writeBatch, type Statement } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import { addBlobStatement, findBlob, toBlob } from "../db/repositories/blobs.server";
import { addDeviceStatement, findDeviceRow, listDevicesOfFile, removeDeviceStatement, type DeviceRow } from "../db/repositories/devices.server";
import { fail, ok, problem, type Problem, type Result } from "../domain/core/result";
import type { DeviceDescription } from "../domain/iodd/device-description";
import { readDevicePackage, readPackagePicture, type DevicePackage } from "../domain/iodd/read-package";
import { newId } from "../utils/ids.server";

export type AddedDevices = { readonly devices: readonly DeviceRow[]; readonly problems: readonly Problem[] };

export type DeviceFile = { readonly bytes: Uint8Array; readonly fileName: string };

/** Adds all descriptions of a file, or nothing. A file that is there already answers what it gave then. Problems: those of `readDevicePackage`. */
export async function addDeviceFile(caller: Caller, organizationId: string, file: DeviceFile): Promise<Result<AddedDevices>> {
  const read = readDevicePackage(file.bytes, file.fileName);
  if (!read.ok) return read;
  const now = new Date();
  const fileBlob = await toBlob(file.bytes);
  const statements: Statement[] = [addBlobStatement(fileBlob, now)];
  for (const entry of read.value.devices) {
    const description = await toBlob(JSON.stringify(entry.device));
    const problems = read.problems.filter((p) => p.at?.file === entry.fileName);
    statements.push(
      addBlobStatement(description, now),
      addDeviceStatement({
        ...describeDevice(entry.device),
        id: newId(),
        organizationId,
        fileName: file.fileName.slice(0, 200),
        entryName: entry.fileName,
        fileHash: fileBlob.hash,
        descriptionHash: description.hash,
        pictures: [...read.value.pictures.keys()].slice(0, 200),
        problems: problems.slice(0, 500),
        uploadedBy: caller.name,
        at: now,
      }),
    );
  }
  statements.push(addAuditStatement(auditOf(caller, organizationId, "device.add", fileBlob.hash, file.fileName, nameDevices(read.value))));
  await writeBatch(statements as [Statement, ...Statement[]]);
  return ok({ devices: await listDevicesOfFile(organizationId, fileBlob.hash), problems: read.problems }, read.problems);
}

function describeDevice(device: DeviceDescription) {
  const name = Object.values(device.deviceName ?? {})[0] ?? device.variants[0]?.productId ?? `Device ${device.deviceId}`;
  const { vendorId, deviceId, vendorName, schemaVersion, documentVersion, releaseDate } = device;
  const productIds = device.variants.map((v) => v.productId);
  const languages = [...device.languages];
  return { vendorId, deviceId, vendorName, deviceName: name, productIds, schemaVersion, documentVersion, releaseDate, languages };
}

function nameDevices({ devices }: DevicePackage): Record<string, unknown> {
  return { devices: devices.map(({ device }) => `${device.vendorId}/${device.deviceId} ${device.documentVersion}`) };
}

/** Mappings keep the layouts that they were made with, so that nothing stops working. */
export async function removeDevice(caller: Caller, row: DeviceRow): Promise<void> {
  const { id, organizationId, fileName, vendorId, deviceId } = row;
  await writeBatch([
    removeDeviceStatement(id),
    addAuditStatement(auditOf(caller, organizationId, "device.remove", id, fileName, { vendorId, deviceId })),
  ]);
}

function auditOf(caller: Caller, organizationId: string, action: string, id: string, name: string, details: Record<string, unknown>) {
  return { organizationId, userId: caller.userId, userName: caller.name, action, subject: { kind: "device", id, name }, details };
}

/** The file as it was uploaded. */
export async function readDeviceFile(row: DeviceRow): Promise<DeviceFile> {
  const bytes = await findBlob(row.fileHash);
  if (!bytes) throw new Error(`The file ${row.fileHash} of a device is missing`);
  return { bytes, fileName: row.fileName };
}

/** What was read of the file. */
export async function loadDeviceDescription(row: DeviceRow): Promise<DeviceDescription> {
  const bytes = await findBlob(row.descriptionHash);
  if (!bytes) throw new Error(`The description ${row.descriptionHash} of a device is missing`);
  return JSON.parse(bytes.toString("utf8")) as DeviceDescription;
}

/** The description behind an id, for services that get one from a mapping. Problem: `device.missing`. */
export async function requireDeviceDescription(organizationId: string, id: string): Promise<Result<DeviceDescription>> {
  const row = await findDeviceRow(id);
  if (row?.organizationId !== organizationId) return fail(problem("device.missing"));
  return ok(await loadDeviceDescription(row));
}

export type DevicePicture = { readonly bytes: Uint8Array; readonly type: "image/png" | "image/jpeg" };

/** A picture of the package, if it is one by its first octets, whatever its name says. Vector graphics may hold scripts and are not served. */
export async function readDevicePicture(row: DeviceRow, name: string): Promise<DevicePicture | undefined> {
  if (!row.pictures.includes(name)) return undefined;
  const { bytes } = await readDeviceFile(row);
  const picture = readPackagePicture(bytes, name);
  const type = picture && findPictureType(picture);
  return picture && type ? { bytes: picture, type } : undefined;
}

function findPictureType(bytes: Uint8Array): DevicePicture["type"] | undefined {
  const startsWith = (...octets: number[]): boolean => octets.every((octet, i) => bytes[i] === octet);
  if (startsWith(0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a)) return "image/png";
  return startsWith(0xff, 0xd8, 0xff) ? "image/jpeg" : undefined;
}
