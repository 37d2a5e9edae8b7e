/** Sources with their ports, and gateways with their machines. */
import { and, asc, eq } from "drizzle-orm";
import { getDatabase } from "../client.server";
import { gateway, gatewayMachine, source, sourcePort } from "../schema/sources";

export type SourceRow = typeof source.$inferSelect;
export type SourcePortRow = typeof sourcePort.$inferSelect;
export type GatewayRow = typeof gateway.$inferSelect;
export type GatewayMachineRow = typeof gatewayMachine.$inferSelect;

export async function listSourceRows(organizationId: string): Promise<SourceRow[]> {
  return getDatabase().select().from(source).where(eq(source.organizationId, organizationId)).orderBy(asc(source.name));
}

export async function findSourceRow(id: string): Promise<SourceRow | undefined> {
  const [row] = await getDatabase().select().from(source).where(eq(source.id, id));
  return row;
}

export async function findSourceByName(organizationId: string, name: string): Promise<SourceRow | undefined> {
  const [row] = await getDatabase()
    .select()
    .from(source)
    .where(and(eq(source.organizationId, organizationId), eq(source.name, name)));
  return row;
}

export function saveSourceStatement(row: SourceRow) {
  const { name, kind, address, note, updatedBy, updatedAt } = row;
  return getDatabase()
    .insert(source)
    .values(row)
    .onConflictDoUpdate({ target: source.id, set: { name, kind, address, note, updatedBy, updatedAt } });
}

export function removeSourceStatement(id: string) {
  return getDatabase().delete(source).where(eq(source.id, id));
}

/** The ports of all sources of the organisation. */
export async function listPortRows(organizationId: string): Promise<SourcePortRow[]> {
  const rows = await getDatabase()
    .select({ port: sourcePort })
    .from(sourcePort)
    .innerJoin(source, eq(source.id, sourcePort.sourceId))
    .where(eq(source.organizationId, organizationId))
    .orderBy(asc(sourcePort.sourceId), asc(sourcePort.port));
  return rows.map((row) => row.port);
}

export function savePortStatement(row: SourcePortRow) {
  const { plan, updatedBy, updatedAt } = row;
  return getDatabase()
    .insert(sourcePort)
    .values(row)
    .onConflictDoUpdate({ target: [sourcePort.sourceId, sourcePort.port], set: { plan, updatedBy, updatedAt } });
}

export function removePortStatement(sourceId: string, port: number) {
  return getDatabase()
    .delete(sourcePort)
    .where(and(eq(sourcePort.sourceId, sourceId), eq(sourcePort.port, port)));
}

export async function listGatewayRows(organizationId: string): Promise<GatewayRow[]> {
  return getDatabase().select().from(gateway).where(eq(gateway.organizationId, organizationId)).orderBy(asc(gateway.name));
}

export async function findGatewayRow(id: string): Promise<GatewayRow | undefined> {
  const [row] = await getDatabase().select().from(gateway).where(eq(gateway.id, id));
  return row;
}

export function saveGatewayStatement(row: GatewayRow) {
  const { name, endpointUrl, note, updatedBy, updatedAt } = row;
  return getDatabase()
    .insert(gateway)
    .values(row)
    .onConflictDoUpdate({ target: gateway.id, set: { name, endpointUrl, note, updatedBy, updatedAt } });
}

export function removeGatewayStatement(id: string) {
  return getDatabase().delete(gateway).where(eq(gateway.id, id));
}

export async function listGatewayMachines(organizationId: string): Promise<GatewayMachineRow[]> {
  const rows = await getDatabase()
    .select({ machine: gatewayMachine })
    .from(gatewayMachine)
    .innerJoin(gateway, eq(gateway.id, gatewayMachine.gatewayId))
    .where(eq(gateway.organizationId, organizationId));
  return rows.map((row) => row.machine);
}

export function assignMachineStatement(row: GatewayMachineRow) {
  return getDatabase()
    .insert(gatewayMachine)
    .values(row)
    .onConflictDoUpdate({ target: [gatewayMachine.modelId, gatewayMachine.machineKey], set: { gatewayId: row.gatewayId } });
}

export function releaseMachineStatement(modelId: string, machineKey: string) {
  return getDatabase()
    .delete(gatewayMachine)
    .where(and(eq(gatewayMachine.modelId, modelId), eq(gatewayMachine.machineKey, machineKey)));
}
