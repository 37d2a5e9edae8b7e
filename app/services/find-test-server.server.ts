/** A test server of a route together with the permission to see it; what is not the caller's does not exist. */
import { assertMay, type Caller } from "../auth/caller.server";
import type { Action } from "../auth/permissions";
import { getSupervisor } from "../opcua/supervisor.server";
import type { LogLine, TestServerState } from "../domain/simulation/test-server-state";

/** Throws 404 or 403 as assertMay does. */
export function requireTestServer(caller: Caller, id: string | undefined, action: Action): TestServerState {
  const server = id === undefined ? undefined : getSupervisor().get(id);
  assertMay(caller, action, server?.organizationId);
  return server as TestServerState;
}

export function readTestServerLog(id: string): readonly LogLine[] {
  return getSupervisor().getLog(id);
}
