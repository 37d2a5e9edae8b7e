/** Sources, their ports, gateways and the machines that these publish: everything that is planned outside of models. */
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import { writeBatch, type Statement } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import { findModel } from "../db/repositories/models.server";
import {
  assignMachineStatement,
  findGatewayRow,
  findSourceRow,
  listGatewayRows,
  listSourceRows,
  releaseMachineStatement,
  removeGatewayStatement,
  removePortStatement,
  removeSourceStatement,
  saveGatewayStatement,
  savePortStatement,
  saveSourceStatement,
} from "../db/repositories/sources.server";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { isIoLinkMaster, listMissingAddress, portPlanSchema, sourceAddressSchema, sourceSchema, type SourceKind } from "../domain/mapping/source-settings";
import { newId } from "../utils/ids.server";

export const saveSourceSchema = z.strictObject({ id: z.string().max(50).optional(), ...sourceSchema.shape });
export type SourceIntent = z.infer<typeof saveSourceSchema>;

export const savePortSchema = z.strictObject({
  sourceId: z.string().max(50),
  port: z.int().min(1).max(64),
  /** Absent: nothing is planned there any more. */
  plan: portPlanSchema.optional(),
});
export type PortIntent = z.infer<typeof savePortSchema>;

export const saveGatewaySchema = z.strictObject({
  id: z.string().max(50).optional(),
  name: z.string().trim().min(1).max(100),
  endpointUrl: z.string().trim().max(2_000).regex(/^opc\.tcp:\/\/[^\s/]+/i, "Begins with opc.tcp://").nullable().default(null),
  note: z.string().trim().max(2_000).default(""),
});
export type GatewayIntent = z.infer<typeof saveGatewaySchema>;

export const assignMachineSchema = z.strictObject({
  modelId: z.string().max(50),
  machineKey: z.string().min(1).max(5_000),
  /** Absent: published by none. */
  gatewayId: z.string().max(50).optional(),
});
export type MachineAssignment = z.infer<typeof assignMachineSchema>;

/** Problems: `source.name-taken`, `source.address` for what the kind of source needs, `request.not-found`. */
export async function saveSource(caller: Caller, organizationId: string, intent: SourceIntent): Promise<Result<{ id: string }>> {
  const missing = listMissingAddress(intent);
  if (missing.length > 0) return fail(...missing.map((field) => problem("source.address", { field }, { attribute: field })));
  const rows = await listSourceRows(organizationId);
  const before = rows.find((row) => row.id === intent.id);
  if (intent.id !== undefined && !before) return fail(problem("request.not-found"));
  if (rows.some((row) => row.name === intent.name && row.id !== intent.id)) return fail(problem("source.name-taken", { name: intent.name }));
  const id = before?.id ?? newId();
  const { name, kind, address, note } = intent;
  await writeBatch([
    saveSourceStatement({ id, organizationId, name, kind, address, note, updatedBy: caller.name, updatedAt: new Date() }),
    audit(caller, organizationId, before ? "source.change" : "source.add", { kind: "source", id, name }, { kind }),
  ]);
  return ok({ id });
}

/** Bindings that name it stay and are found by the checker. Problem: `request.not-found`. */
export async function removeSource(caller: Caller, organizationId: string, id: string): Promise<Result<null>> {
  const row = await findSourceRow(id);
  if (row?.organizationId !== organizationId) return fail(problem("request.not-found"));
  await writeBatch([removeSourceStatement(id), audit(caller, organizationId, "source.remove", { kind: "source", id, name: row.name })]);
  return ok(null);
}

/** Plans a port or empties it. Problems: `request.not-found`, `source.no-ports`, `source.no-such-port`. */
export async function savePort(caller: Caller, organizationId: string, { sourceId, port, plan }: PortIntent): Promise<Result<null>> {
  const row = await findSourceRow(sourceId);
  if (row?.organizationId !== organizationId) return fail(problem("request.not-found"));
  const { portCount = 0 } = sourceAddressSchema.parse(row.address);
  if (!isIoLinkMaster(row.kind as SourceKind)) return fail(problem("source.no-ports", { name: row.name }));
  if (port > portCount) return fail(problem("source.no-such-port", { name: row.name, port, portCount }));
  const change: Statement = plan
    ? savePortStatement({ sourceId, port, plan, updatedBy: caller.name, updatedAt: new Date() })
    : removePortStatement(sourceId, port);
  await writeBatch([change, audit(caller, organizationId, "source.plan-port", { kind: "source", id: sourceId, name: row.name }, { port })]);
  return ok(null);
}

/** Problems: `gateway.name-taken`, `request.not-found`. */
export async function saveGateway(caller: Caller, organizationId: string, intent: GatewayIntent): Promise<Result<{ id: string }>> {
  const rows = await listGatewayRows(organizationId);
  const before = rows.find((row) => row.id === intent.id);
  if (intent.id !== undefined && !before) return fail(problem("request.not-found"));
  if (rows.some((row) => row.name === intent.name && row.id !== intent.id)) return fail(problem("gateway.name-taken", { name: intent.name }));
  const id = before?.id ?? newId();
  const { name, endpointUrl, note } = intent;
  await writeBatch([
    saveGatewayStatement({ id, organizationId, name, endpointUrl, note, updatedBy: caller.name, updatedAt: new Date() }),
    audit(caller, organizationId, before ? "gateway.change" : "gateway.add", { kind: "gateway", id, name }),
  ]);
  return ok({ id });
}

/** Problem: `request.not-found`. */
export async function removeGateway(caller: Caller, organizationId: string, id: string): Promise<Result<null>> {
  const row = await findGatewayRow(id);
  if (row?.organizationId !== organizationId) return fail(problem("request.not-found"));
  await writeBatch([removeGatewayStatement(id), audit(caller, organizationId, "gateway.remove", { kind: "gateway", id, name: row.name })]);
  return ok(null);
}

/** Lets one gateway publish a machine, or none. Problem: `request.not-found`. */
export async function assignMachine(caller: Caller, organizationId: string, intent: MachineAssignment): Promise<Result<null>> {
  const { modelId, machineKey, gatewayId } = intent;
  const model = await findModel(modelId);
  const row = gatewayId === undefined ? undefined : await findGatewayRow(gatewayId);
  const isForeign = model?.organizationId !== organizationId || (gatewayId !== undefined && row?.organizationId !== organizationId);
  if (isForeign) return fail(problem("request.not-found"));
  const change: Statement = gatewayId === undefined ? releaseMachineStatement(modelId, machineKey) : assignMachineStatement({ modelId, machineKey, gatewayId });
  const subject = { kind: "gateway", id: gatewayId ?? "", name: row?.name ?? "" };
  await writeBatch([change, audit(caller, organizationId, "gateway.assign", subject, { modelId, machineKey })]);
  return ok(null);
}

function audit(
  caller: Caller,
  organizationId: string,
  action: string,
  subject: { readonly kind: string; readonly id: string; readonly name: string },
  details: Record<string, unknown> = {},
) {
  return addAuditStatement({ organizationId, userId: caller.userId, userName: caller.name, action, subject, details });
}
