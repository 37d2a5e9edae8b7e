/**
 * The tab's one event stream. Browsers allow six connections to one origin, so everything that is pushed to a tab comes
 * through a single EventSource on which topics are multiplexed. A topic is asked for while somebody listens to it; after a
 * lost connection the server gives the stream a new id and all topics are asked for again.
 */
export type ConnectionState = "open" | "closed";
export type TopicListener = (data: unknown, seq: number | undefined) => void;

type Message = { topic: string; seq?: number; data: unknown };

const RECONNECT_DELAYS = [500, 1000, 2000, 5000];
const IDLE_CLOSE_DELAY = 3000;

class EventStream {
  readonly #listeners = new Map<string, Set<TopicListener>>();
  readonly #watchers = new Set<(state: ConnectionState) => void>();
  #source: EventSource | undefined;
  #streamId: string | undefined;
  #attempt = 0;
  #retry: ReturnType<typeof setTimeout> | undefined;
  #idle: ReturnType<typeof setTimeout> | undefined;
  #pendingAdd = new Set<string>();
  #pendingRemove = new Set<string>();
  #isPosting = false;

  subscribe(topic: string, listener: TopicListener): () => void {
    clearTimeout(this.#idle);
    const listeners = this.#listeners.get(topic) ?? new Set();
    listeners.add(listener);
    if (listeners.size === 1) {
      this.#listeners.set(topic, listeners);
      this.#pendingRemove.delete(topic);
      this.#pendingAdd.add(topic);
      this.#open();
      this.#scheduleTopics();
    }
    return () => {
      if (!listeners.delete(listener) || listeners.size > 0) return;
      this.#listeners.delete(topic);
      if (!this.#pendingAdd.delete(topic)) this.#pendingRemove.add(topic);
      this.#scheduleTopics();
      if (this.#listeners.size === 0) this.#idle = setTimeout(() => this.#close(), IDLE_CLOSE_DELAY);
    };
  }

  watch(listener: (state: ConnectionState) => void): () => void {
    this.#watchers.add(listener);
    return () => this.#watchers.delete(listener);
  }

  #open(): void {
    if (this.#source) return;
    const source = new EventSource("/events");
    this.#source = source;
    source.addEventListener("hello", (event) => {
      this.#attempt = 0;
      this.#streamId = (JSON.parse((event as MessageEvent<string>).data) as { streamId: string }).streamId;
      this.#pendingAdd = new Set(this.#listeners.keys());
      this.#pendingRemove.clear();
      this.#scheduleTopics();
      this.#tell("open");
    });
    source.onmessage = (event: MessageEvent<string>) => {
      const message = JSON.parse(event.data) as Message;
      for (const listener of [...(this.#listeners.get(message.topic) ?? [])]) listener(message.data, message.seq);
    };
    source.onerror = () => this.#lost();
  }

  /** The browser's own retry knows no growing delay and gives up after an error status, so the stream is made anew. */
  #lost(): void {
    this.#close();
    if (this.#listeners.size === 0) return;
    const delay = RECONNECT_DELAYS[Math.min(this.#attempt++, RECONNECT_DELAYS.length - 1)];
    clearTimeout(this.#retry);
    this.#retry = setTimeout(() => this.#open(), delay);
  }

  #close(): void {
    this.#source?.close();
    this.#source = undefined;
    this.#streamId = undefined;
    this.#tell("closed");
  }

  #tell(state: ConnectionState): void {
    for (const watcher of [...this.#watchers]) watcher(state);
  }

  /** Collects all changes of one turn of the event loop into one request. */
  #scheduleTopics(): void {
    queueMicrotask(() => void this.#postTopics());
  }

  async #postTopics(): Promise<void> {
    const streamId = this.#streamId;
    if (streamId === undefined || this.#isPosting) return;
    if (this.#pendingAdd.size === 0 && this.#pendingRemove.size === 0) return;
    const body = { streamId, add: [...this.#pendingAdd], remove: [...this.#pendingRemove] };
    this.#pendingAdd.clear();
    this.#pendingRemove.clear();
    this.#isPosting = true;
    try {
      const answer = await fetch("/events/topics", {
        method: "POST",
        headers: { "content-type": "application/json" },
        body: JSON.stringify(body),
      });
      if (answer.status === 404) this.#lost();
    } catch {
      this.#lost();
    } finally {
      this.#isPosting = false;
      this.#scheduleTopics();
    }
  }
}

const key = Symbol.for("ferrule.event-stream");
const holder = globalThis as typeof globalThis & { [key]?: EventStream };

function getEventStream(): EventStream {
  return (holder[key] ??= new EventStream());
}

/** Listens to a topic; answers the function that ends it. Browser only. */
export function subscribeToTopic(topic: string, listener: TopicListener): () => void {
  return getEventStream().subscribe(topic, listener);
}

/** Tells when the stream opens and is lost. A listener that missed messages asks the server for them on "open". */
export function onConnectionChange(listener: (state: ConnectionState) => void): () => void {
  return getEventStream().watch(listener);
}
