/**
 * The way from an id on a page to the shared session with the server behind it. The OPC UA client is loaded with the first
 * use: it costs a second or two, and most requests never need it.
 */
import { join } from "node:path";
import { fail, ok, problem, type Result } from "../domain/core/result";
import type { EndpointClient } from "../opcua/client/endpoint-client.server";
import type { EndpointSettings } from "../opcua/client/endpoint-settings";
import { getSupervisor } from "../opcua/supervisor.server";
import { getEnvironment } from "../utils/env.server";
import { singleton } from "../utils/singleton.server";

type Pool = { getEndpointClient: (settings: EndpointSettings) => EndpointClient; disposeClient: (id: string) => Promise<void> };
const pool = singleton<{ loading?: Promise<Pool> }>("endpoint-client-pool", () => ({}));

/** Loads the client ahead of its first use: whoever started a server looks at it next. */
export function loadClient(): Promise<Pool> {
  return (pool.loading ??= import("../opcua/client/client-pool.server"));
}

/** The shared session with a running test server. Problem: `test-server.not-running`. */
export async function openEndpoint(testServerId: string): Promise<Result<EndpointClient>> {
  const settings = findSettings(testServerId);
  if (!settings) return fail(problem("test-server.not-running"));
  const { getEndpointClient } = await loadClient();
  return ok(getEndpointClient(settings));
}

/** Closes the session with a server that is gone; does nothing when there was none. */
export async function closeEndpointSession(testServerId: string): Promise<void> {
  await (await pool.loading)?.disposeClient(testServerId);
}

function findSettings(testServerId: string): EndpointSettings | undefined {
  const supervisor = getSupervisor();
  const state = supervisor.get(testServerId);
  if (state?.state !== "running" || state.endpointUrl === null) return undefined;
  return {
    id: state.id,
    endpointUrl: state.endpointUrl,
    security: state.security.includes("basic256sha256") ? "basic256sha256" : "none",
    certificate: supervisor.getCertificate(testServerId),
    pkiFolder: join(getEnvironment().dataFolder, "pki", "client"),
  };
}

/** Runs a question to the server; an endpoint that does not answer is a problem, not an exception. */
export async function askEndpoint<T>(testServerId: string, ask: (client: EndpointClient) => Promise<Result<T>>): Promise<Result<T>> {
  const client = await openEndpoint(testServerId);
  if (!client.ok) return client;
  try {
    return await ask(client.value);
  } catch (error) {
    const detail = error instanceof Error ? error.message.split("\n")[0] ?? "" : "no reason given";
    return fail(problem("endpoint.unreachable", { endpointUrl: client.value.settings.endpointUrl, detail }));
  }
}
