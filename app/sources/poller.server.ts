/**
 * Reads what somebody asked for of one source, again and again, each item at its period; shared by all who ask, since a
 * small master has few connections to give. An item that is still being read is not asked again. While a source is out
 * of reach nothing is offered, and it is tried again after growing pauses: one probe at a time, then everything goes on.
 */
import { toItemKey, type LiveSource, type SourceItem, type SourceReading } from "../domain/mapping/live-source";
import { sourceOutage } from "../domain/mapping/source-problem-texts";

export type SourceState = {
  readonly kind: "idle" | "connected" | "lost";
  /** Milliseconds since 1970: when it became so. */
  readonly since: number;
  /** Why it is lost. */
  readonly message: string;
};

type Listener = (reading: SourceReading) => void;
type Entry = { readonly item: SourceItem; readonly listeners: Map<Listener, number>; timer: NodeJS.Timeout | undefined; isRunning: boolean; next: number };

const RETRY_DELAYS = [500, 1_000, 2_000, 5_000, 10_000];
const LEAST_PERIOD = 10;

export class Poller {
  readonly #source: LiveSource;
  readonly #entries = new Map<string, Entry>();
  readonly #listeners = new Set<(state: SourceState) => void>();
  #state: SourceState = { kind: "idle", since: Date.now(), message: "" };
  #attempt = 0;
  #pausedUntil = 0;
  #isProbing = false;
  #isClosed = false;

  constructor(source: LiveSource) {
    this.#source = source;
  }

  get state(): SourceState {
    return this.#state;
  }

  get isIdle(): boolean {
    return this.#entries.size === 0;
  }

  onState(listener: (state: SourceState) => void): () => void {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  }

  /** Answers the end of it. The shortest of the periods asked for holds. */
  add(item: SourceItem, periodMs: number, listener: Listener): () => void {
    const key = toItemKey(item);
    let entry = this.#entries.get(key);
    if (!entry) {
      entry = { item, listeners: new Map(), timer: undefined, isRunning: false, next: Date.now() };
      this.#entries.set(key, entry);
    }
    const owner = entry;
    // The same function may be given twice; each giving ends by itself.
    const own: Listener = (reading) => listener(reading);
    owner.listeners.set(own, Math.max(LEAST_PERIOD, periodMs));
    if (!owner.isRunning) this.#schedule(owner, 0);
    return () => {
      owner.listeners.delete(own);
      if (owner.listeners.size > 0) return;
      clearTimeout(owner.timer);
      this.#entries.delete(key);
    };
  }

  /** One reading now, beside all others. */
  read(item: SourceItem): Promise<SourceReading> {
    return this.#source.read(item);
  }

  async close(): Promise<void> {
    this.#isClosed = true;
    for (const entry of this.#entries.values()) clearTimeout(entry.timer);
    this.#entries.clear();
    await this.#source.close();
  }

  #schedule(entry: Entry, delay: number): void {
    clearTimeout(entry.timer);
    if (this.#isClosed || entry.listeners.size === 0) return;
    entry.timer = setTimeout(() => void this.#run(entry), delay);
  }

  async #run(entry: Entry): Promise<void> {
    const started = Date.now();
    const wait = this.#pausedUntil - started;
    if (wait > 0 || this.#isProbing) return this.#schedule(entry, Math.max(wait, 50));
    const isProbe = this.#attempt > 0;
    if (isProbe) this.#isProbing = true;
    entry.isRunning = true;
    const reading = await this.#source.read(entry.item);
    entry.isRunning = false;
    if (isProbe) this.#isProbing = false;
    if (this.#isClosed) return;
    this.#judge(reading);
    for (const listener of entry.listeners.keys()) listener(reading);
    const period = Math.min(...entry.listeners.values());
    // Kept in step with the clock: a slow answer does not move all that follow.
    entry.next = Math.max(entry.next + period, started + 1);
    if (entry.next < Date.now()) entry.next = Date.now();
    this.#schedule(entry, entry.next - Date.now());
  }

  #judge(reading: SourceReading): void {
    const isLost = !reading.ok && sourceOutage.has(reading.problem.code);
    if (!isLost) {
      this.#attempt = 0;
      return this.#setState("connected", "");
    }
    const delay = RETRY_DELAYS[Math.min(this.#attempt, RETRY_DELAYS.length - 1)] ?? 10_000;
    if (Date.now() >= this.#pausedUntil) {
      this.#attempt++;
      this.#pausedUntil = Date.now() + delay;
    }
    this.#setState("lost", String(reading.problem.data?.["message"] ?? ""));
  }

  #setState(kind: SourceState["kind"], message: string): void {
    if (this.#state.kind === kind) return;
    this.#state = { kind, since: Date.now(), message };
    for (const listener of this.#listeners) listener(this.#state);
  }
}
