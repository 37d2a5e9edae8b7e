/**
 * The way from an id on a page to the shared session with the server behind it. The OPC UA client is loaded with the first
 * use: it costs a second or two, and most requests never need it.
 */
import { join } from "node:path";
import { findEndpoint } from "../db/repositories/endpoints.server";
import { fail, ok, problem, type Result } from "../domain/core/result";
import type { EndpointClient } from "../opcua/client/endpoint-client.server";
import { ANONYMOUS, PROTECTED, UNPROTECTED, type EndpointSecurity, type EndpointSettings } from "../opcua/client/endpoint-settings";
import { getSupervisor } from "../opcua/supervisor.server";
import { getEnvironment } from "../utils/env.server";
import { singleton } from "../utils/singleton.server";
import { readEndpointToken, requireReachable } from "./endpoint-access.server";

type Pool = { getEndpointClient: (settings: EndpointSettings) => EndpointClient; disposeClient: (id: string) => Promise<void> };
const pool = singleton<{ loading?: Promise<Pool> }>("endpoint-client-pool", () => ({}));

/** Loads the client ahead of its first use: whoever started a server looks at it next. */
export function loadClient(): Promise<Pool> {
  return (pool.loading ??= import("../opcua/client/client-pool.server"));
}

/** The shared session with a running test server or an endpoint. Problems: `test-server.not-running`, those of requireReachable. */
export async function openEndpoint(id: string): Promise<Result<EndpointClient>> {
  const settings = await findSettings(id);
  if (!settings.ok) return settings;
  const { getEndpointClient } = await loadClient();
  return ok(getEndpointClient(settings.value));
}

/** Closes the session with a server that is gone; does nothing when there was none. */
export async function closeEndpointSession(id: string): Promise<void> {
  await (await pool.loading)?.disposeClient(id);
}

async function findSettings(id: string): Promise<Result<EndpointSettings>> {
  const pkiFolder = join(getEnvironment().dataFolder, "pki", "client");
  const supervisor = getSupervisor();
  const state = supervisor.get(id);
  if (state) {
    if (state.state !== "running" || state.endpointUrl === null) return fail(problem("test-server.not-running"));
    const security = state.security.includes("basic256sha256") ? PROTECTED : UNPROTECTED;
    return ok({ id, endpointUrl: state.endpointUrl, security, token: ANONYMOUS, certificate: supervisor.getCertificate(id), pkiFolder });
  }
  const row = await findEndpoint(id);
  if (!row) return fail(problem("test-server.not-running"));
  const reachable = await requireReachable(row.organizationId, row.url);
  if (!reachable.ok) return reachable;
  return ok({
    id,
    endpointUrl: row.url,
    security: { mode: row.securityMode as EndpointSecurity["mode"], policy: row.securityPolicy as EndpointSecurity["policy"] },
    token: readEndpointToken(row),
    certificate: row.serverCertificate === null ? undefined : Buffer.from(row.serverCertificate, "base64"),
    pkiFolder,
  });
}

/** Runs a question to the server; an endpoint that does not answer is a problem, not an exception. */
export async function askEndpoint<T>(id: string, ask: (client: EndpointClient) => Promise<Result<T>>): Promise<Result<T>> {
  const client = await openEndpoint(id);
  if (!client.ok) return client;
  try {
    return await ask(client.value);
  } catch (error) {
    const detail = error instanceof Error ? error.message.split("\n")[0] ?? "" : "no reason given";
    return fail(problem("endpoint.unreachable", { endpointUrl: client.value.settings.endpointUrl, detail }));
  }
}
