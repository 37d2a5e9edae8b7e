import { listEndpoints, toEndpointTarget } from "../db/repositories/endpoints.server";
import { listModels } from "../db/repositories/models.server";
import type { LiveTarget } from "../domain/live/live-target";
import type { TestServerState } from "../domain/simulation/test-server-state";
import { listTestServers } from "./list-test-servers.server";

export type LivePage = {
  readonly servers: readonly TestServerState[];
  /** Servers that are none of ours. */
  readonly endpoints: readonly LiveTarget[];
  /** Models that a test server could be started on. */
  readonly models: readonly { readonly id: string; readonly name: string }[];
};

/** What Live shows before a server is chosen. */
export async function readLivePage(organizationId: string): Promise<LivePage> {
  const [models, endpoints] = await Promise.all([listModels(organizationId), listEndpoints(organizationId)]);
  return { servers: listTestServers(organizationId), endpoints: endpoints.map(toEndpointTarget), models: models.map(({ id, name }) => ({ id, name })) };
}
