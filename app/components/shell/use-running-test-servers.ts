import { useEffect, useState } from "react";
import { subscribeToTopic } from "./event-stream";

export type RunningServer = { readonly id: string; readonly state: string };

const alive: ReadonlySet<string> = new Set(["starting", "running"]);

/** How many test servers of the organisation are up or starting; follows the event stream. */
export function useRunningTestServers(organizationId: string, initial: readonly RunningServer[]): number {
  const [changes, setChanges] = useState<ReadonlyMap<string, string>>(new Map());
  useEffect(() => {
    setChanges(new Map());
    return subscribeToTopic(`test-servers:${organizationId}`, (data) => {
      if (!isRunningServer(data)) return;
      setChanges((known) => new Map(known).set(data.id, data.state));
    });
  }, [organizationId, initial]);
  const states = new Map(initial.map((server) => [server.id, server.state]));
  for (const [id, state] of changes) states.set(id, state);
  return [...states.values()].filter((state) => alive.has(state)).length;
}

function isRunningServer(data: unknown): data is RunningServer {
  return (
    typeof data === "object" &&
    data !== null &&
    "id" in data &&
    "state" in data &&
    typeof data.id === "string" &&
    typeof data.state === "string"
  );
}
