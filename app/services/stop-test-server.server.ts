import { writeBatch } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import type { TestServerState } from "../domain/simulation/test-server-state";
import { getSupervisor } from "../opcua/supervisor.server";

/** Stops a test server, or takes a failed one off the list; answers when its process and its port are gone. */
export async function stopTestServer(server: TestServerState, by: { readonly userId: string; readonly name: string }): Promise<void> {
  await getSupervisor().stop(server.id);
  const audit = addAuditStatement({
    organizationId: server.organizationId,
    userId: by.userId,
    userName: by.name,
    action: "test-server.stop",
    subject: { kind: "model", id: server.modelId, name: server.modelName },
    details: { testServer: server.id },
  });
  await writeBatch([audit]);
}
