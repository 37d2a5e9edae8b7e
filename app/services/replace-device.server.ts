/**
 * Replacing a device of a machine: the impact first, then the binding with the new serial number, the log, and, for a
 * device that is another, the type's role and rows. Machines stand on a frozen revision of their types: they follow when
 * somebody takes the next one.
 */
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import { writeBatch } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import { addReplacementStatement, listReplacementRows } from "../db/repositories/devices.server";
import { findModelByNamespace, type ModelRow } from "../db/repositories/models.server";
import { getDisplayName } from "../domain/address-space/browse";
import { getOwnNamespace } from "../domain/address-space/model-header";
import type { NodeKey } from "../domain/address-space/node-id";
import { fail, ok, problem, type Result } from "../domain/core/result";
import type { Operation } from "../domain/editing/operation";
import { findMappedType, listBoundRoles } from "../domain/mapping/bindings";
import { previewReplacement, replaceDevice, type Replacement } from "../domain/mapping/replace-device";
import { newId } from "../utils/ids.server";
import { requireDeviceDescription } from "./device-library.server";
import { appendTransactions, loadWorkingModel, type WorkingModel } from "./working-model.server";

const id = z.string().min(1).max(50);

export const replacementSchema = z.strictObject({
  machine: z
    .string()
    .min(1)
    .max(5_000)
    .transform((text) => text as NodeKey),
  role: z.string().min(1).max(100),
  deviceDescriptionId: id,
  serialNumber: z.string().trim().min(1).max(200),
  reason: z.string().trim().max(2_000).default(""),
});
export type ReplacementIntent = z.infer<typeof replacementSchema>;

/** What it would mean. Problems: `request.not-found`, `device.missing`, those of the preview. */
export async function previewDeviceReplacement(model: ModelRow, intent: Omit<ReplacementIntent, "serialNumber" | "reason">): Promise<Result<Replacement>> {
  const working = await loadWorkingModel(model.id);
  if (!working) return fail(problem("request.not-found"));
  const device = await requireDeviceDescription(model.organizationId, intent.deviceDescriptionId);
  if (!device.ok) return device;
  return previewReplacement(working.space, intent.machine, intent.role, device.value, intent.deviceDescriptionId);
}

/** Does it. Problems: those of the preview, `replace.not-bound`, `transactions.stale`. */
export async function replaceDeviceOf(caller: Caller, model: ModelRow, intent: ReplacementIntent): Promise<Result<{ id: string; kind: Replacement["kind"] }>> {
  const preview = await previewDeviceReplacement(model, intent);
  if (!preview.ok) return preview;
  const working = (await loadWorkingModel(model.id)) as WorkingModel;
  const { space } = working;
  const before = listBoundRoles(space, intent.machine).find((b) => b.role === intent.role);
  const made = replaceDevice(space, intent.machine, preview.value, intent.serialNumber);
  if (!made.ok) return made;
  const type = findMappedType(space, intent.machine);
  if (made.value.type.length > 0 && type !== undefined) {
    const saved = await saveInTypes(caller, model, working, type, made.value.type);
    if (!saved.ok) return saved;
  }
  const saved = await append(caller, model.id, working.seq, made.value.machine);
  if (!saved.ok) return saved;
  const node = space.getNode(intent.machine);
  const machineName = node ? getDisplayName(node) : intent.machine;
  const row = {
    id: newId(),
    organizationId: model.organizationId,
    modelId: model.id,
    machineKey: intent.machine,
    machineName,
    role: intent.role,
    kind: preview.value.kind,
    before: { ...before?.binding, vendorId: before?.value.vendorId, deviceId: before?.value.deviceId, productName: before?.value.productName },
    after: { serialNumber: intent.serialNumber, vendorId: preview.value.value.vendorId, deviceId: preview.value.value.deviceId, productName: preview.value.value.productName },
    reason: intent.reason,
    targets: preview.value.pointChecks,
    person: caller.name,
    at: new Date(),
  };
  await writeBatch([
    addReplacementStatement(row),
    addAuditStatement({
      organizationId: model.organizationId,
      userId: caller.userId,
      userName: caller.name,
      action: "device.replace",
      subject: { kind: "model", id: model.id, name: model.name },
      details: { machine: machineName, role: intent.role, kind: row.kind, from: before?.binding?.serialNumber ?? "", to: intent.serialNumber },
    }),
  ]);
  return ok({ id: row.id, kind: row.kind });
}

/** The type may stand in another model of the team. */
async function saveInTypes(caller: Caller, model: ModelRow, working: WorkingModel, type: NodeKey, operations: readonly Operation[]): Promise<Result<null>> {
  if (working.space.isOwn(type)) return append(caller, model.id, working.seq, operations);
  const layer = working.space.layers.find((l) => l.nodes.has(type));
  const types = layer && (await findModelByNamespace(model.organizationId, getOwnNamespace(layer.header)));
  const state = types && (await loadWorkingModel(types.id));
  if (!types || !state) return fail(problem("request.not-found"));
  return append(caller, types.id, state.seq, operations);
}

async function append(caller: Caller, modelId: string, base: number, operations: readonly Operation[]): Promise<Result<null>> {
  const transactions = [{ clientSeq: 1, label: "replace-device", operations }];
  const outcome = await appendTransactions(modelId, caller, { clientId: `replace-${newId()}`, base, transactions });
  if (outcome.kind === "accepted") return ok(null);
  return fail(...(outcome.kind === "refused" ? outcome.problems : [problem("transactions.stale")]));
}

export type LoggedReplacement = {
  readonly id: string;
  readonly modelId: string;
  readonly machineKey: string;
  readonly machineName: string;
  readonly role: string;
  readonly kind: Replacement["kind"];
  readonly from: string;
  readonly to: string;
  readonly reason: string;
  /** Paths whose point check is due since then. */
  readonly targets: readonly string[];
  readonly person: string;
  readonly at: string;
};

/** Newest first. */
export async function listReplacements(organizationId: string): Promise<LoggedReplacement[]> {
  return (await listReplacementRows(organizationId)).map((row) => ({
    id: row.id,
    modelId: row.modelId,
    machineKey: row.machineKey,
    machineName: row.machineName,
    role: row.role,
    kind: row.kind,
    from: nameDevice(row.before),
    to: nameDevice(row.after),
    reason: row.reason,
    targets: row.targets,
    person: row.person,
    at: row.at.toISOString(),
  }));
}

function nameDevice(device: Readonly<Record<string, unknown>>): string {
  return [device["productName"], device["serialNumber"]].filter((part) => typeof part === "string" && part !== "").join(" ");
}
