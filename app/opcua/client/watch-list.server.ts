/**
 * What is watched at one endpoint: one monitored item per node, shared by all who watch it, on one subscription. Samples of
 * one publish are reduced to the newest per node before anybody is told, and how many were dropped is counted.
 */
import { AttributeIds, ClientMonitoredItem, type ClientSession, type ClientSubscription, type DataValue, type NodeId, TimestampsToReturn } from "node-opcua";
import type { Sample } from "~/domain/live/sample";
import { toWireNodeId } from "../node-ids";
import { decodeSample, type StateTexts } from "./decode-value";
import { PUBLISHING_INTERVAL, WATCH_LIMIT } from "./endpoint-settings";
import { readStateTexts } from "./read-states.server";

type Link = { session: ClientSession; subscription: ClientSubscription; namespaces: readonly string[] };

type Watch = {
  readonly nodeId: string;
  readonly listeners: Set<(sample: Sample) => void>;
  item: ClientMonitoredItem | undefined;
  states: StateTexts | undefined;
  pending: DataValue | undefined;
  last: Sample | undefined;
  coalesced: number;
};

export class WatchList {
  readonly #watches = new Map<string, Watch>();
  readonly #link: () => Promise<Link>;
  readonly #dirty = new Set<Watch>();
  #queue = new Set<Watch>();
  #isStarting = false;

  constructor(link: () => Promise<Link>) {
    this.#link = link;
  }

  get size(): number {
    return this.#watches.size;
  }

  /** Throws RangeError past the limit; callers ask `size` first. */
  add(nodeId: string, listener: (sample: Sample) => void): () => void {
    let watch = this.#watches.get(nodeId);
    if (!watch) {
      if (this.#watches.size >= WATCH_LIMIT) throw new RangeError(`More than ${WATCH_LIMIT} watched nodes`);
      watch = { nodeId, listeners: new Set(), item: undefined, states: undefined, pending: undefined, last: undefined, coalesced: 0 };
      this.#watches.set(nodeId, watch);
      this.#enqueue(watch);
    } else if (watch.last) {
      listener(watch.last);
    }
    watch.listeners.add(listener);
    const started = watch;
    return () => this.#leave(started, listener);
  }

  /** The connection is gone: items are void, what is watched stays. */
  suspend(): void {
    for (const watch of this.#watches.values()) watch.item = undefined;
    this.#queue.clear();
  }

  /** Starts everything that has no item on the present connection. */
  async restart(): Promise<void> {
    for (const watch of this.#watches.values()) if (!watch.item) this.#queue.add(watch);
    await this.#drain();
  }

  clear(): void {
    this.#watches.clear();
    this.#queue.clear();
    this.#dirty.clear();
  }

  #leave(watch: Watch, listener: (sample: Sample) => void): void {
    if (!watch.listeners.delete(listener) || watch.listeners.size > 0) return;
    if (this.#watches.get(watch.nodeId) === watch) this.#watches.delete(watch.nodeId);
    this.#queue.delete(watch);
    this.#dirty.delete(watch);
    void watch.item?.terminate().catch(() => undefined);
    watch.item = undefined;
  }

  #enqueue(watch: Watch): void {
    this.#queue.add(watch);
    // Collects what one page asks for in one turn.
    queueMicrotask(() => void this.#drain());
  }

  async #drain(): Promise<void> {
    if (this.#isStarting || this.#queue.size === 0) return;
    this.#isStarting = true;
    try {
      const link = await this.#link();
      while (this.#queue.size > 0) {
        const batch = [...this.#queue];
        this.#queue = new Set();
        await this.#start(link, batch);
      }
    } catch {
      // The connection failed; it starts everything anew once it stands.
    } finally {
      this.#isStarting = false;
    }
  }

  /** Values are read before anything is monitored: the page fills at once, and a node that cannot be monitored shows its status. */
  async #start(link: Link, batch: readonly Watch[]): Promise<void> {
    const targets = batch.flatMap((watch) => {
      const wireId = toWireNodeId(watch.nodeId, link.namespaces);
      return wireId.ok ? [{ watch, target: { nodeId: wireId.value, attributeId: AttributeIds.Value } }] : [];
    });
    if (targets.length === 0) return;
    const { session } = link;
    const [states, types] = await Promise.all([
      readStateTexts(session, batch.map((watch) => watch.nodeId), link.namespaces),
      session.read(targets.map(({ target }) => ({ ...target, attributeId: AttributeIds.DataType }))),
    ]);
    for (const { watch } of targets) watch.states = states.get(watch.nodeId);
    const plain = targets.filter((_, i) => isBuiltIn(types[i]));
    const values = plain.length > 0 ? await session.read(plain.map(({ target }) => target)) : [];
    plain.forEach(({ watch }, i) => this.#receiveFirst(watch, values[i]));
    // The first structure of a session makes the client read all definitions of the server; nobody else waits for that.
    for (const { watch, target } of targets.filter((one) => !plain.includes(one))) {
      void session.read(target).then((value) => this.#receiveFirst(watch, value)).catch(() => undefined);
    }
    for (const { watch, target } of targets) if (watch.listeners.size > 0) watch.item = this.#monitor(link, watch, target);
  }

  /** Somebody may have left meanwhile, and a newer value may have come. */
  #receiveFirst(watch: Watch, value: DataValue | undefined): void {
    if (value && watch.listeners.size > 0 && !watch.last) this.#receive(watch, value);
  }

  #monitor(link: Link, watch: Watch, target: { nodeId: NodeId; attributeId: AttributeIds }): ClientMonitoredItem {
    const parameters = { samplingInterval: PUBLISHING_INTERVAL, queueSize: 2, discardOldest: true };
    const item = ClientMonitoredItem.create(link.subscription, target, parameters, TimestampsToReturn.Both);
    item.on("changed", (value: DataValue) => {
      if (watch.item === item) this.#receive(watch, value);
    });
    return item;
  }

  #receive(watch: Watch, value: DataValue): void {
    if (watch.pending) watch.coalesced++;
    watch.pending = value;
    if (this.#dirty.size === 0) setImmediate(() => this.#flush());
    this.#dirty.add(watch);
  }

  #flush(): void {
    const watches = [...this.#dirty];
    this.#dirty.clear();
    for (const watch of watches) {
      if (!watch.pending) continue;
      const sample = decodeSample(watch.pending, watch.states, watch.coalesced);
      watch.pending = undefined;
      watch.last = sample;
      for (const listener of watch.listeners) listener(sample);
    }
  }
}

/** Whether a DataType attribute names a built-in type of namespace 0 other than Structure. */
function isBuiltIn(value: DataValue | undefined): boolean {
  const id = value?.value.value as NodeId | null | undefined;
  return !id || (id.namespace === 0 && typeof id.value === "number" && id.value <= 29 && id.value !== 22 && id.value !== 24);
}
