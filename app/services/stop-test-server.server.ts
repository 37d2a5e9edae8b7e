import { getSupervisor } from "../opcua/supervisor.server";

/** Stops a test server, or takes a failed one off the list; answers when its process and its port are gone. */
export async function stopTestServer(id: string): Promise<void> {
  await getSupervisor().stop(id);
}
