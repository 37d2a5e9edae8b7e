/** Endpoints of the team: named, trusted, and only where an administrator lets Ferrule go. */
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import { writeBatch } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import {
  addAllowanceStatement,
  findAllowance,
  findEndpoint,
  findEndpointByName,
  listEndpoints,
  removeAllowanceStatement,
  removeEndpointStatement,
  saveEndpointStatement,
  type EndpointRow,
} from "../db/repositories/endpoints.server";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { parseAllowanceHost } from "../domain/live/endpoint-address";
import type { Discovery } from "../domain/live/discovery";
import { securityModes, securityPolicies } from "../opcua/client/endpoint-settings";
import { newId } from "../utils/ids.server";
import { requireReachable, sealEndpointSecret } from "./endpoint-access.server";
import { closeEndpointSession } from "./live-endpoint.server";

const base64 = z.string().max(20_000).regex(/^[A-Za-z0-9+/=\s]*$/);

export const endpointIntentSchema = z.strictObject({
  /** Absent for a new one. */
  id: z.string().max(100).optional(),
  name: z.string().trim().min(1).max(100),
  url: z.string().trim().min(1).max(500),
  securityMode: z.enum(securityModes),
  securityPolicy: z.enum(securityPolicies),
  tokenKind: z.enum(["anonymous", "user-name", "certificate"]),
  userName: z.string().trim().max(200).optional(),
  /** Password, or the private key in PEM; absent keeps the one that is stored. */
  secret: z.string().max(20_000).optional(),
  userCertificate: base64.optional(),
  serverCertificate: base64.optional(),
  gatewayId: z.string().max(100).optional(),
  note: z.string().max(1_000).default(""),
});
export type EndpointIntent = z.infer<typeof endpointIntentSchema>;

export const allowanceIntentSchema = z.strictObject({
  host: z.string().trim().min(1).max(250),
  portFrom: z.coerce.number().int().min(1).max(65_535),
  portTo: z.coerce.number().int().min(1).max(65_535),
  note: z.string().max(500).default(""),
});
export type AllowanceIntent = z.infer<typeof allowanceIntentSchema>;

/** What a server offers. Problems: those of requireReachable, `endpoint.unreachable`. */
export async function discoverServer(organizationId: string, url: string): Promise<Result<Discovery>> {
  const reachable = await requireReachable(organizationId, url);
  if (!reachable.ok) return reachable;
  const { discoverEndpoints } = await import("../opcua/client/discover.server");
  try {
    return ok(await discoverEndpoints(url));
  } catch (error) {
    return fail(problem("endpoint.unreachable", { endpointUrl: url, detail: error instanceof Error ? (error.message.split("\n")[0] ?? "") : "" }));
  }
}

/** Problems: those of requireReachable, `endpoint.name-taken`, `endpoint.token`, `endpoint.trust`. */
export async function saveEndpoint(author: Caller, organizationId: string, intent: EndpointIntent): Promise<Result<{ id: string }>> {
  const known = intent.id === undefined ? undefined : await findOwn(organizationId, intent.id);
  if (intent.id !== undefined && !known) return fail(problem("request.not-found"));
  const reachable = await requireReachable(organizationId, intent.url);
  if (!reachable.ok) return reachable;
  const twin = await findEndpointByName(organizationId, intent.name);
  if (twin && twin.id !== known?.id) return fail(problem("endpoint.name-taken", { name: intent.name }));
  // A secret is bound to the server that it was given for: another address needs it anew.
  const kept = known && known.url === intent.url && known.tokenKind === intent.tokenKind ? known.secret : null;
  const secret = intent.tokenKind === "anonymous" ? null : intent.secret ? sealEndpointSecret(intent.secret) : kept;
  const isToldWho = intent.tokenKind === "anonymous" || (secret !== null && (intent.tokenKind === "user-name" ? Boolean(intent.userName) : Boolean(intent.userCertificate ?? known?.userCertificate)));
  if (!isToldWho) return fail(problem("endpoint.token"));
  if (intent.securityMode !== "none" && !intent.serverCertificate) return fail(problem("endpoint.trust"));
  const id = known?.id ?? newId();
  const row = {
    id,
    organizationId,
    name: intent.name,
    url: intent.url,
    securityMode: intent.securityMode,
    securityPolicy: intent.securityPolicy,
    tokenKind: intent.tokenKind,
    userName: intent.tokenKind === "user-name" ? (intent.userName ?? null) : null,
    secret,
    userCertificate: intent.tokenKind === "certificate" ? (intent.userCertificate ?? known?.userCertificate ?? null) : null,
    serverCertificate: intent.serverCertificate ?? null,
    gatewayId: intent.gatewayId ?? null,
    note: intent.note,
    updatedBy: author.name,
    updatedAt: new Date(),
  };
  const { url, securityMode, securityPolicy, tokenKind } = row;
  await writeBatch([
    saveEndpointStatement(row),
    addAuditStatement({ ...describe(author, organizationId, "endpoint", id, intent.name), action: known ? "endpoint.change" : "endpoint.add", details: { url, securityMode, securityPolicy, tokenKind } }),
  ]);
  await closeEndpointSession(id);
  return ok({ id });
}

async function findOwn(organizationId: string, id: string): Promise<EndpointRow | undefined> {
  const row = await findEndpoint(id);
  return row?.organizationId === organizationId ? row : undefined;
}

/** Problem: `request.not-found`. */
export async function removeEndpoint(author: Caller, organizationId: string, id: string): Promise<Result<null>> {
  const row = await findOwn(organizationId, id);
  if (!row) return fail(problem("request.not-found"));
  await writeBatch([
    removeEndpointStatement(row.id),
    addAuditStatement({ ...describe(author, row.organizationId, "endpoint", row.id, row.name), action: "endpoint.remove", details: { url: row.url } }),
  ]);
  await closeEndpointSession(row.id);
  return ok(null);
}

/** Problems: `endpoint.allowance-host`, `endpoint.allowance-ports`. */
export async function allowPlace(author: Caller, organizationId: string, { portFrom, portTo, note, host }: AllowanceIntent): Promise<Result<null>> {
  const parsed = parseAllowanceHost(host);
  if (!parsed.ok) return parsed;
  if (portTo < portFrom) return fail(problem("endpoint.allowance-ports", { portFrom, portTo }));
  const id = newId();
  await writeBatch([
    addAllowanceStatement({ id, organizationId, host: parsed.value, portFrom, portTo, note, addedBy: author.name, addedAt: new Date() }),
    addAuditStatement({ ...describe(author, organizationId, "endpoint-allowance", id, parsed.value), action: "endpoint.allow", details: { portFrom, portTo } }),
  ]);
  return ok(null);
}

/** Takes a place off the list; sessions that no place covers any more are closed. Problem: `request.not-found`. */
export async function forbidPlace(author: Caller, organizationId: string, id: string): Promise<Result<null>> {
  const row = await findAllowance(id);
  if (row?.organizationId !== organizationId) return fail(problem("request.not-found"));
  await writeBatch([
    removeAllowanceStatement(row.id),
    addAuditStatement({ ...describe(author, row.organizationId, "endpoint-allowance", row.id, row.host), action: "endpoint.forbid", details: { portFrom: row.portFrom, portTo: row.portTo } }),
  ]);
  for (const endpoint of await listEndpoints(row.organizationId)) {
    if (!(await requireReachable(row.organizationId, endpoint.url)).ok) await closeEndpointSession(endpoint.id);
  }
  return ok(null);
}

function describe(author: Caller, organizationId: string, kind: string, id: string, name: string) {
  return { organizationId, userId: author.userId, userName: author.name, subject: { kind, id, name } };
}
