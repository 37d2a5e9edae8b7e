/** Endpoints that the team may look at, and the places that it may reach. */
import { and, asc, eq } from "drizzle-orm";
import { getDatabase, type Statement } from "../client.server";
import type { LiveTarget } from "../../domain/live/live-target";
import { endpoint, endpointAllowance } from "../schema/live";

export type EndpointRow = typeof endpoint.$inferSelect;
export type EndpointAllowanceRow = typeof endpointAllowance.$inferSelect;

const WIRE_MODES = { none: "None", sign: "Sign", "sign-and-encrypt": "SignAndEncrypt" } as const;

/** The endpoint as Live looks at it. */
export function toEndpointTarget(row: EndpointRow): LiveTarget {
  return {
    kind: "endpoint",
    id: row.id,
    organizationId: row.organizationId,
    name: row.name,
    endpointUrl: row.url,
    isOpen: true,
    phase: "open",
    isProtected: row.securityMode !== "none",
    securityMode: WIRE_MODES[row.securityMode as keyof typeof WIRE_MODES] ?? "None",
    landingNode: null,
    modelId: null,
  };
}

export async function listEndpoints(organizationId: string): Promise<EndpointRow[]> {
  return getDatabase().select().from(endpoint).where(eq(endpoint.organizationId, organizationId)).orderBy(asc(endpoint.name));
}

export async function findEndpoint(id: string): Promise<EndpointRow | undefined> {
  return getDatabase().query.endpoint.findFirst({ where: eq(endpoint.id, id) });
}

export async function findEndpointByName(organizationId: string, name: string): Promise<EndpointRow | undefined> {
  return getDatabase().query.endpoint.findFirst({ where: and(eq(endpoint.organizationId, organizationId), eq(endpoint.name, name)) });
}

export function saveEndpointStatement(row: typeof endpoint.$inferInsert): Statement {
  const { id: _id, ...change } = row;
  return getDatabase().insert(endpoint).values(row).onConflictDoUpdate({ target: endpoint.id, set: change });
}

export function removeEndpointStatement(id: string): Statement {
  return getDatabase().delete(endpoint).where(eq(endpoint.id, id));
}

export async function listAllowances(organizationId: string): Promise<EndpointAllowanceRow[]> {
  return getDatabase().select().from(endpointAllowance).where(eq(endpointAllowance.organizationId, organizationId)).orderBy(asc(endpointAllowance.host), asc(endpointAllowance.portFrom));
}

export async function findAllowance(id: string): Promise<EndpointAllowanceRow | undefined> {
  return getDatabase().query.endpointAllowance.findFirst({ where: eq(endpointAllowance.id, id) });
}

export function addAllowanceStatement(row: typeof endpointAllowance.$inferInsert): Statement {
  return getDatabase().insert(endpointAllowance).values(row).onConflictDoNothing();
}

export function removeAllowanceStatement(id: string): Statement {
  return getDatabase().delete(endpointAllowance).where(eq(endpointAllowance.id, id));
}
