/**
 * Follows the supervisor: tells browsers what happens, keeps the rows that say who owns which server, and clears away what a
 * server leaves behind. Begun once in a process.
 */
import { saveLostTestServers, saveTestServer } from "../db/repositories/test-servers.server";
import type { TestServerState } from "../domain/simulation/test-server-state";
import { getSupervisor, type SupervisorEvent } from "../opcua/supervisor.server";
import { logError } from "../utils/log.server";
import { onShutdown } from "../utils/shutdown.server";
import { singleton } from "../utils/singleton.server";
import { publish } from "./event-hub.server";
import { closeEndpointSession, loadClient } from "./live-endpoint.server";
import { getTestServerFolder, removeTestServerFiles } from "./test-server-files.server";

const HEARTBEAT_INTERVAL = 10_000;
/** An owner that has not been heard of for this long is gone, and its servers went with it. */
const SILENCE_LIMIT = 60_000;

/** Begins to follow; does nothing when that has happened. */
export function followTestServers(): Promise<void> {
  return singleton("follow-test-servers", begin);
}

async function begin(): Promise<void> {
  const supervisor = getSupervisor();
  const end = supervisor.onChange(follow);
  const timer = setInterval(beat, HEARTBEAT_INTERVAL);
  timer.unref();
  onShutdown("test server rows", () => {
    clearInterval(timer);
    end();
  });
  const now = new Date();
  await saveLostTestServers(new Date(now.getTime() - SILENCE_LIMIT), now);
}

function follow(event: SupervisorEvent): void {
  switch (event.kind) {
    case "log":
      publish(`test-server:${event.id}`, { log: event.lines });
      return;
    case "state":
      tell(event.state);
      if (event.state.state === "running") void loadClient();
      void keepRow(event.state);
      return;
    case "removed":
      publish(`test-server:${event.state.id}`, { state: event.state, removed: true });
      publish(`test-servers:${event.state.organizationId}`, { id: event.state.id, state: "stopped" });
      void closeEndpointSession(event.state.id);
      void keepRow({ ...event.state, state: event.state.state === "failed" ? "failed" : "stopped" });
      void removeTestServerFiles(getTestServerFolder(event.state.id)).catch((error: unknown) => logError(error, "files of a test server"));
  }
}

function tell(state: TestServerState): void {
  publish(`test-server:${state.id}`, { state });
  publish(`test-servers:${state.organizationId}`, { id: state.id, state: state.state, modelId: state.modelId });
}

/** The last state of each server that its row shows already, so that progress and sessions write nothing. */
const rows = new Map<string, string>();

async function keepRow(state: TestServerState): Promise<void> {
  const isOver = state.state === "stopped" || state.state === "failed";
  if (rows.get(state.id) === state.state) return;
  rows.set(state.id, state.state);
  if (isOver) rows.delete(state.id);
  try {
    await saveTestServer(state.id, {
      state: state.state,
      endpointUrl: state.endpointUrl,
      problems: state.problems,
      ...(isOver ? { endedAt: new Date() } : {}),
    });
  } catch (error) {
    logError(error, "row of a test server");
  }
}

function beat(): void {
  const now = new Date();
  for (const { id, state } of getSupervisor().list()) {
    if (state !== "starting" && state !== "running") continue;
    void saveTestServer(id, { heartbeatAt: now }).catch((error: unknown) => logError(error, "heartbeat of a test server"));
  }
}
