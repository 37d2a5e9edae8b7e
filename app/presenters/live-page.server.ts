import { listModels } from "../db/repositories/models.server";
import type { TestServerState } from "../domain/simulation/test-server-state";
import { listTestServers } from "./list-test-servers.server";

export type LivePage = {
  readonly servers: readonly TestServerState[];
  /** Models that a test server could be started on. */
  readonly models: readonly { readonly id: string; readonly name: string }[];
};

/** What Live shows before a server is chosen. */
export async function readLivePage(organizationId: string): Promise<LivePage> {
  const models = await listModels(organizationId);
  return { servers: listTestServers(organizationId), models: models.map(({ id, name }) => ({ id, name })) };
}
