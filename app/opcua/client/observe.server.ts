/** Watches Variables for a while on a subscription of its own, to see whether their values come, are good and come in time. */
import { AttributeIds, type ClientMonitoredItemBase, ClientMonitoredItemGroup, type ClientSession, ClientSubscription, DataChangeFilter, DataChangeTrigger, type DataValue, DeadbandType, TimestampsToReturn } from "node-opcua";
import type { Observation } from "~/domain/as-built/as-built";
import { ObservationTally } from "~/domain/as-built/observation-tally";
import { toWireNodeId } from "../node-ids";
import type { EndpointClient } from "./endpoint-client.server";

export type ObserveTarget = { readonly nodeId: string; readonly path: string; readonly promisedPeriod?: number };

export type ObserveOptions = {
  readonly milliseconds: number;
  readonly shouldStop?: () => boolean;
  readonly onProgress?: (done: number, of: number) => void;
};

const PUBLISHING = 250;
const SAMPLING = 100;
/** Samples kept between two publishes: with the fastest sampling none of them is lost. */
const QUEUE = 10;
const ITEMS_A_REQUEST = 500;
const LOOK = 200;

/** What each target did; one that the server does not know, or does not let watch, has no samples. */
export async function observeVariables(client: EndpointClient, targets: readonly ObserveTarget[], options: ObserveOptions): Promise<Observation[]> {
  const release = client.hold();
  try {
    const { session, namespaces } = await client.use((session, namespaces) => Promise.resolve({ session, namespaces }));
    return await observe(session, namespaces, targets, options);
  } finally {
    release();
  }
}

async function observe(session: ClientSession, namespaces: readonly string[], targets: readonly ObserveTarget[], options: ObserveOptions): Promise<Observation[]> {
  const subscription = ClientSubscription.create(session, {
    requestedPublishingInterval: PUBLISHING,
    requestedLifetimeCount: 240,
    requestedMaxKeepAliveCount: 20,
    maxNotificationsPerPublish: 0,
    publishingEnabled: true,
    priority: 1,
  });
  try {
    const start = Date.now();
    const tallies = targets.map(({ nodeId, path }) => new ObservationTally(nodeId, path, start));
    monitorAll(subscription, namespaces, targets, tallies);
    const end = start + options.milliseconds;
    while (Date.now() < end && !options.shouldStop?.()) {
      await new Promise((resolve) => setTimeout(resolve, Math.min(LOOK, end - Date.now())));
      options.onProgress?.(Math.min(Date.now() - start, options.milliseconds), options.milliseconds);
    }
    const now = Date.now();
    return tallies.map((tally, i) => tally.end(now, targets[i]?.promisedPeriod));
  } finally {
    await subscription.terminate().catch(() => undefined);
  }
}

function monitorAll(subscription: ClientSubscription, namespaces: readonly string[], targets: readonly ObserveTarget[], tallies: readonly ObservationTally[]): void {
  const known = targets.flatMap(({ nodeId }, i) => {
    const wire = toWireNodeId(nodeId, namespaces);
    return wire.ok ? [{ tally: tallies[i], item: { nodeId: wire.value, attributeId: AttributeIds.Value } }] : [];
  });
  // Equal values with a new time count as well: a source that repeats itself is alive.
  const filter = new DataChangeFilter({ trigger: DataChangeTrigger.StatusValueTimestamp, deadbandType: DeadbandType.None, deadbandValue: 0 });
  for (let at = 0; at < known.length; at += ITEMS_A_REQUEST) {
    const batch = known.slice(at, at + ITEMS_A_REQUEST);
    const parameters = { samplingInterval: SAMPLING, queueSize: QUEUE, discardOldest: true, filter };
    const group = ClientMonitoredItemGroup.create(subscription, batch.map(({ item }) => item), parameters, TimestampsToReturn.Both);
    group.on("changed", (_item: ClientMonitoredItemBase, value: DataValue, index: number) => {
      batch[index]?.tally?.offer(Date.now(), value.statusCode.value, value.statusCode.name);
    });
  }
}
