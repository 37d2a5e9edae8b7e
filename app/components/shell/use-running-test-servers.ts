import { useEffect, useState } from "react";
import { subscribeToTopic } from "./event-stream";

export type RunningServer = { readonly id: string; readonly state: string; readonly modelId: string };

const alive: ReadonlySet<string> = new Set(["starting", "running"]);

/** The test servers of the organisation that are up or starting; follows the event stream. */
export function useRunningTestServers(organizationId: string, initial: readonly RunningServer[]): RunningServer[] {
  const [changes, setChanges] = useState<ReadonlyMap<string, RunningServer>>(new Map());
  useEffect(() => {
    setChanges(new Map());
    return subscribeToTopic(`test-servers:${organizationId}`, (data) => {
      const change = data as Omit<RunningServer, "modelId"> & { readonly modelId?: string };
      setChanges((known) => {
        const modelId = change.modelId ?? known.get(change.id)?.modelId ?? "";
        return new Map(known).set(change.id, { ...change, modelId });
      });
    });
  }, [organizationId, initial]);
  const servers = new Map(initial.map((server) => [server.id, server]));
  for (const [id, server] of changes) servers.set(id, server);
  return [...servers.values()].filter((server) => alive.has(server.state));
}
