/** The server behind an id of Live, with the permission to see it: a test server, or an endpoint of the team. */
import { assertMay, type Caller } from "../auth/caller.server";
import type { Action } from "../auth/permissions";
import { findEndpoint, toEndpointTarget } from "../db/repositories/endpoints.server";
import { toLiveTarget, type LiveTarget } from "../domain/live/live-target";
import { getSupervisor } from "../opcua/supervisor.server";

export async function findLiveTarget(id: string): Promise<LiveTarget | undefined> {
  const server = getSupervisor().get(id);
  if (server) return toLiveTarget(server);
  const row = await findEndpoint(id);
  return row && toEndpointTarget(row);
}

/** Throws 404 or 403 as assertMay does. */
export async function requireLiveTarget(caller: Caller, id: string | undefined, action: Action): Promise<LiveTarget> {
  const target = id === undefined ? undefined : await findLiveTarget(id);
  assertMay(caller, action, target?.organizationId);
  return target as LiveTarget;
}
