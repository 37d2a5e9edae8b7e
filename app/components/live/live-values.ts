/**
 * The live values of one server as this tab holds them: the newest sample per node, a bounded trend for nodes on the watch
 * strip, and whether the stream runs. Plain code without React, so that one row can be told without drawing the others.
 */
import type { Sample } from "~/domain/live/sample";
import { onConnectionChange, subscribeToTopic } from "../shell/event-stream";

export type LiveValue = {
  readonly sample: Sample;
  /** Clock of this tab, ms. */
  readonly receivedAt: number;
};

/** What keeps values from coming: nothing, the tab's stream, the server behind it, or the person. */
export type StreamState = "running" | "stopped" | "lost" | "paused";

export type TrendPoint = { readonly at: number; readonly value: number | null; readonly severity: Sample["status"]["severity"]; readonly isSimulated: boolean };

const TREND_LENGTH = 4_000;
const TREND_TIME = 31 * 60_000;

type Watched = {
  value: LiveValue | undefined;
  readonly listeners: Set<() => void>;
  end: (() => void) | undefined;
};

export class LiveValues {
  readonly #serverId: string;
  readonly #nodes = new Map<string, Watched>();
  readonly #trends = new Map<string, TrendPoint[]>();
  readonly #streamListeners = new Set<() => void>();
  #isOpen = true;
  #isConnected = true;
  #isPaused = false;
  #stoppedAt: number | undefined;
  #ends: (() => void)[] = [];

  constructor(serverId: string) {
    this.#serverId = serverId;
  }

  /** Begins to follow the stream's own state; answers the end of everything. */
  open(): () => void {
    this.#ends = [
      onConnectionChange((state) => this.#setStream(() => (this.#isOpen = state === "open"))),
      subscribeToTopic(`connection:${this.#serverId}`, (data) => {
        const { state } = data as { state: string };
        this.#setStream(() => (this.#isConnected = state !== "lost"));
      }),
    ];
    return () => {
      for (const end of this.#ends) end();
      for (const watched of this.#nodes.values()) watched.end?.();
      this.#ends = [];
      this.#nodes.clear();
    };
  }

  get stream(): StreamState {
    if (this.#isPaused) return "paused";
    if (!this.#isOpen) return "stopped";
    return this.#isConnected ? "running" : "lost";
  }

  /** When the stream stopped; undefined while it runs. */
  get stoppedAt(): number | undefined {
    return this.#stoppedAt;
  }

  /** How many nodes this tab watches now. */
  get watchedCount(): number {
    return this.#nodes.size;
  }

  onStream(listener: () => void): () => void {
    this.#streamListeners.add(listener);
    return () => this.#streamListeners.delete(listener);
  }

  /** The server ended, or is there again. */
  setServerRunning(isRunning: boolean): void {
    this.#setStream(() => (this.#isConnected = isRunning));
  }

  setPaused(isPaused: boolean): void {
    this.#setStream(() => (this.#isPaused = isPaused));
    for (const [nodeId, watched] of this.#nodes) {
      if (isPaused) {
        watched.end?.();
        watched.end = undefined;
      } else watched.end ??= this.#subscribe(nodeId, watched);
    }
  }

  get(nodeId: string): LiveValue | undefined {
    return this.#nodes.get(nodeId)?.value;
  }

  /** Listens to a node; the topic is asked for while somebody listens. */
  watch(nodeId: string, listener: () => void): () => void {
    let watched = this.#nodes.get(nodeId);
    if (!watched) {
      watched = { value: undefined, listeners: new Set(), end: undefined };
      this.#nodes.set(nodeId, watched);
      if (!this.#isPaused) watched.end = this.#subscribe(nodeId, watched);
      this.#tellStream();
    }
    const entry = watched;
    entry.listeners.add(listener);
    return () => {
      entry.listeners.delete(listener);
      if (entry.listeners.size > 0) return;
      entry.end?.();
      entry.end = undefined;
      if (this.#nodes.get(nodeId) === entry) this.#nodes.delete(nodeId);
      this.#tellStream();
    };
  }

  /** Keeps the past of a node from now on. */
  keepTrend(nodeId: string): () => void {
    if (!this.#trends.has(nodeId)) this.#trends.set(nodeId, []);
    const endWatch = this.watch(nodeId, () => undefined);
    return () => {
      endWatch();
      this.#trends.delete(nodeId);
    };
  }

  getTrend(nodeId: string): readonly TrendPoint[] {
    return this.#trends.get(nodeId) ?? [];
  }

  #subscribe(nodeId: string, watched: Watched): () => void {
    return subscribeToTopic(`value:${this.#serverId}:${nodeId}`, (data) => {
      watched.value = { sample: data as Sample, receivedAt: Date.now() };
      this.#note(nodeId, watched.value);
      for (const listener of watched.listeners) listener();
    });
  }

  #note(nodeId: string, { sample, receivedAt }: LiveValue): void {
    const trend = this.#trends.get(nodeId);
    if (!trend) return;
    const { severity, name } = sample.status;
    trend.push({ at: receivedAt, value: toFigure(sample), severity, isSimulated: name === "Uncertain_SimulatedValue" });
    const oldest = receivedAt - TREND_TIME;
    while (trend.length > TREND_LENGTH || (trend[0] && trend[0].at < oldest)) trend.shift();
  }

  #setStream(change: () => void): void {
    const before = this.stream;
    change();
    if (this.stream === before) return;
    this.#stoppedAt = this.stream === "running" ? undefined : (this.#stoppedAt ?? Date.now());
    this.#tellStream();
  }

  #tellStream(): void {
    for (const listener of this.#streamListeners) listener();
  }
}

/** What a trend draws of a sample: figures, and truth values as 0 and 1; a bad value is a gap. */
function toFigure({ value, status }: Sample): number | null {
  if (status.severity === "bad") return null;
  if (typeof value === "boolean") return value ? 1 : 0;
  return typeof value === "number" && Number.isFinite(value) ? value : null;
}

/** Age of a value: how old it was when it left the server, and the time since it came. Clocks of two hosts are never compared. */
export function getAge({ sample, receivedAt }: LiveValue, now: number): number {
  const { sourceTimestamp, serverTimestamp } = sample;
  const before = sourceTimestamp !== null && serverTimestamp !== null ? Math.max(0, Date.parse(serverTimestamp) - Date.parse(sourceTimestamp)) : 0;
  return before + Math.max(0, now - receivedAt);
}
