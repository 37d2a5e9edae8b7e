import type { TestServerState } from "../domain/simulation/test-server-state";
import { getSupervisor } from "../opcua/supervisor.server";

/** The organisation's test servers, the newest first; of one model when it is named. */
export function listTestServers(organizationId: string, modelId?: string): TestServerState[] {
  return getSupervisor()
    .list()
    .filter((server) => server.organizationId === organizationId && (modelId === undefined || server.modelId === modelId))
    .reverse();
}
