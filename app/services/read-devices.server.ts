/** The device library as its pages show it. */
import { findDeviceRow, listDeviceRows, type DeviceRow } from "../db/repositories/devices.server";
import { listModels } from "../db/repositories/models.server";
import type { DeviceDescription } from "../domain/iodd/device-description";
import { listOwners, listParts } from "../domain/mapping/mapping-entries";
import { toProblemJson, type ProblemJson } from "../utils/problem-response.server";
import { loadDeviceDescription } from "./device-library.server";
import { loadWorkingModel } from "./working-model.server";

export type DeviceSummary = {
  readonly id: string;
  readonly vendorId: number;
  readonly deviceId: number;
  readonly vendorName: string;
  readonly deviceName: string;
  readonly productIds: readonly string[];
  readonly schemaVersion: string;
  readonly documentVersion: string;
  readonly releaseDate: string;
  readonly languages: readonly string[];
  readonly fileName: string;
  readonly hash: string;
  readonly problems: { readonly error: number; readonly warning: number };
  readonly pictures: readonly string[];
  readonly by: string;
  readonly at: string;
  /** Roles of machine types that were made from it. */
  readonly usedBy: readonly DeviceUse[];
};

export type DeviceUse = { readonly modelId: string; readonly model: string; readonly type: string; readonly role: string };

export type DevicePage = {
  readonly summary: DeviceSummary;
  readonly description: DeviceDescription;
  readonly problems: readonly ProblemJson[];
};

/** By maker and name, the newest version of a device first. */
export async function listDevices(organizationId: string): Promise<DeviceSummary[]> {
  const uses = await listDeviceUses(organizationId);
  return (await listDeviceRows(organizationId)).map((row) => toSummary(row, uses));
}

/** Undefined when the organisation has no such device. */
export async function getDevice(organizationId: string, id: string): Promise<DevicePage | undefined> {
  const row = await findDeviceRow(id);
  if (row?.organizationId !== organizationId) return undefined;
  const description = await loadDeviceDescription(row);
  return { summary: toSummary(row, await listDeviceUses(organizationId)), description, problems: row.problems.map(toProblemJson) };
}

/** By id of the description. */
async function listDeviceUses(organizationId: string): Promise<Map<string, DeviceUse[]>> {
  const uses = new Map<string, DeviceUse[]>();
  for (const model of await listModels(organizationId)) {
    const working = model.kind === "types" ? await loadWorkingModel(model.id) : undefined;
    if (!working) continue;
    for (const owner of listOwners(working.space, "role")) {
      const type = working.space.getNode(owner)?.browseName.name ?? owner;
      for (const { id: role, value } of listParts(working.space, "role", owner)) {
        const id = value.deviceDescriptionId;
        if (id !== undefined) uses.set(id, [...(uses.get(id) ?? []), { modelId: model.id, model: model.name, type, role }]);
      }
    }
  }
  return uses;
}

function toSummary(row: DeviceRow, uses: ReadonlyMap<string, readonly DeviceUse[]>): DeviceSummary {
  const count = (severity: "error" | "warning"): number => row.problems.filter((p) => p.severity === severity).length;
  const { id, vendorId, deviceId, vendorName, deviceName, productIds, schemaVersion, documentVersion, releaseDate } = row;
  return {
    id,
    vendorId,
    deviceId,
    vendorName,
    deviceName,
    productIds,
    schemaVersion,
    documentVersion,
    releaseDate,
    languages: row.languages,
    fileName: row.fileName,
    hash: row.fileHash,
    problems: { error: count("error"), warning: count("warning") },
    pictures: row.pictures,
    by: row.uploadedBy,
    at: row.at.toISOString(),
    usedBy: uses.get(row.id) ?? [],
  };
}
