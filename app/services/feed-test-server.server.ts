/** Feeds a test server from the live sources of its organisation: pollers here, mappings in its process. */
import { setTimeout as wait } from "node:timers/promises";
import type { AddressSpace } from "../domain/address-space/address-space";
import { formatProblem } from "../domain/core/problem-texts";
import { makeFeed, type Feed } from "../domain/mapping/make-feed";
import { ReadingMemory, toInputs } from "../domain/mapping/plan-readings";
import { getSupervisor } from "../opcua/supervisor.server";
import { logError } from "../utils/log.server";
import { singleton } from "../utils/singleton.server";
import { openSource } from "./live-sources.server";
import { loadPlannedSources } from "./load-planned-sources.server";

const START_POLL_MS = 100;

/** Ends of what runs, by test server. */
const getFeeds = () => singleton("test-server-feeds", () => new Map<string, () => void>());

/** What the model's machines are fed by; its machines are empty when no type is mapped. */
export async function planFeed(organizationId: string, space: AddressSpace): Promise<Feed> {
  return makeFeed(space, await loadPlannedSources(organizationId));
}

/** Polls until the server is gone. A source that cannot be reached leaves its Variables waiting; it is tried again. */
export async function feedTestServer(testServerId: string, organizationId: string, feed: Feed): Promise<void> {
  endFeed(testServerId);
  const ends: (() => void)[] = [];
  const supervisor = getSupervisor();
  getFeeds().set(testServerId, () => {
    for (const end of ends) end();
  });
  // Slow readings come once a minute: the first must find the server running.
  while (supervisor.get(testServerId)?.state === "starting") await wait(START_POLL_MS);
  const memory = new ReadingMemory();
  for (const planned of feed.readings) {
    const poller = await openSource(organizationId, planned.sourceId);
    if (!poller.ok) {
      logError(new Error(poller.problems.map(formatProblem).join(" ")), "a source of a test server");
      continue;
    }
    ends.push(
      poller.value.add(planned.item, planned.period, (reading) => {
        const state = supervisor.get(testServerId)?.state;
        if (state === undefined || state === "stopped" || state === "failed") return endFeed(testServerId);
        const inputs = toInputs(planned, reading, memory);
        if (inputs.length > 0) supervisor.feed(testServerId, inputs);
      }),
    );
  }
}

export function endFeed(testServerId: string): void {
  getFeeds().get(testServerId)?.();
  getFeeds().delete(testServerId);
}
