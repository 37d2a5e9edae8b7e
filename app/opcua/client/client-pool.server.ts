/** The shared sessions of this process, one per endpoint. They are closed at shutdown. */
import { onShutdown } from "~/utils/shutdown.server";
import { singleton } from "~/utils/singleton.server";
import { EndpointClient } from "./endpoint-client.server";
import type { EndpointSettings } from "./endpoint-settings";

function getClients(): Map<string, EndpointClient> {
  return singleton("endpoint-clients", () => {
    onShutdown("endpoint sessions", disposeClients);
    process.on("unhandledRejection", ignoreCancelled);
    return new Map();
  });
}

/**
 * The library reads data type definitions behind a request and lets that work fail by itself when the session closes
 * meanwhile. That must not end the application; every other rejection still does what it would have done.
 */
function ignoreCancelled(reason: unknown): void {
  if (reason instanceof Error && reason.message.startsWith("Transaction has been canceled")) return;
  throw reason;
}

/** The client of an endpoint; a new one when there is none, or when the endpoint's address changed. */
export function getEndpointClient(settings: EndpointSettings): EndpointClient {
  const clients = getClients();
  const known = clients.get(settings.id);
  if (known && known.settings.endpointUrl === settings.endpointUrl) return known;
  void known?.dispose();
  const client: EndpointClient = new EndpointClient(settings, () => {
    if (clients.get(settings.id) === client) clients.delete(settings.id);
  });
  clients.set(settings.id, client);
  return client;
}

/** Closes the session to one endpoint, when there is one. */
export async function disposeClient(id: string): Promise<void> {
  await getClients().get(id)?.dispose();
}

async function disposeClients(): Promise<void> {
  await Promise.all([...getClients().values()].map((client) => client.dispose()));
}
