/**
 * One event stream a browser tab; topics are multiplexed onto it, since browsers allow six connections an origin.
 *
 * A topic's prefix names its provider, which decides who may listen, may open a source while somebody listens (a
 * subscription at an OPC UA server), and may replay what a tab missed. A stream that cannot keep up gets, of topics whose
 * newest message replaces the older ones, only the newest; of the others it keeps a bounded queue, and when that is full
 * the stream ends: the browser then reconnects with `Last-Event-ID` and is given what it missed.
 */
import type { Caller } from "../auth/caller.server";
import { newId } from "../utils/ids.server";
import { logError } from "../utils/log.server";
import { onShutdown } from "../utils/shutdown.server";
import { singleton } from "../utils/singleton.server";

export type TopicMessage = { readonly topic: string; readonly data: unknown; readonly seq?: number };
export type Emit = (data: unknown, seq?: number) => void;
export type Dispose = () => void | Promise<void>;

export interface TopicProvider {
  /** Whether this person may listen; a refusal looks like a topic that does not exist. */
  authorise(caller: Caller, topic: string): boolean | Promise<boolean>;
  /** Called when the first stream listens; the answer is called when the last one has left. */
  open?(topic: string, emit: Emit): Dispose | Promise<Dispose>;
  /** Messages of the topic after this place in the global sequence, oldest first. */
  replay?(topic: string, afterSeq: number): Promise<readonly { seq: number; data: unknown }[]>;
  /** The newest message replaces older ones: late listeners get it at once, slow ones get only it. */
  readonly keepsNewestOnly?: boolean;
  /** Told when a stream begins or ends to listen. */
  joined?(topic: string, listener: Listener): void;
  left?(topic: string, listener: Listener): void;
}

export type Listener = { readonly streamId: string; readonly userId: string; readonly name: string };

type Stream = {
  readonly listener: Listener;
  readonly caller: Caller;
  readonly topics: Set<string>;
  /** The last event that the tab had seen when it reconnected. */
  readonly resumeAfter: number | undefined;
  send(message: TopicMessage, coalesce: boolean): void;
  close(): void;
};

/** `published`: places in the global sequence that were sent, so that what another reader finds again is not. */
type OpenTopic = { readonly streams: Set<Stream>; readonly published: Set<number>; readonly disposed: Promise<Dispose | undefined>; newest?: TopicMessage };

type Hub = {
  readonly providers: Map<string, TopicProvider>;
  readonly streams: Map<string, Stream>;
  readonly open: Map<string, OpenTopic>;
};

const HEARTBEAT_MS = 15_000;
const MAX_QUEUE = 2_000;
const MAX_TOPICS = 2_000;
const BUFFER_BYTES = 64 * 1024;
const REMEMBERED = 1_000;

function getHub(): Hub {
  return singleton("event-hub", () => {
    const hub: Hub = { providers: new Map(), streams: new Map(), open: new Map() };
    onShutdown("event streams", closeAllStreams);
    return hub;
  });
}

const prefixOf = (topic: string): string => topic.slice(0, Math.max(0, topic.indexOf(":")));

/** Registers or replaces the provider of topics `<prefix>:…`. */
export function registerTopicProvider(prefix: string, provider: TopicProvider): void {
  getHub().providers.set(prefix, provider);
}

/** Sends to everybody who listens; nothing is kept unless the provider keeps its newest. */
export function publish(topic: string, data: unknown, seq?: number): void {
  const hub = getHub();
  const open = hub.open.get(topic);
  if (!open) return;
  if (seq !== undefined) {
    if (open.published.has(seq)) return;
    open.published.add(seq);
    if (open.published.size > REMEMBERED) open.published.delete(Math.min(...open.published));
  }
  const message: TopicMessage = { topic, data, ...(seq === undefined ? {} : { seq }) };
  const coalesce = hub.providers.get(prefixOf(topic))?.keepsNewestOnly === true;
  if (coalesce) open.newest = message;
  for (const stream of open.streams) stream.send(message, coalesce);
}

/** Whether some tab listens to the topic. */
export function hasListeners(topic: string): boolean {
  return getHub().open.has(topic);
}

/** The answer to `GET /events`. `lastEventId` is what the browser says that it has seen. */
export function openEventStream(caller: Caller, signal: AbortSignal, lastEventId: string | null): Response {
  const encoder = new TextEncoder();
  const resumeAfter = lastEventId !== null && /^\d{1,15}$/.test(lastEventId) ? Number(lastEventId) : undefined;
  const streamId = newId();
  const waiting: string[] = [];
  const newest = new Map<string, string>();
  let heartbeat: NodeJS.Timeout | undefined;
  let flush: () => void = () => undefined;
  let finish: () => void = () => undefined;
  const stream: Stream = {
    listener: { streamId, userId: caller.userId, name: caller.name },
    caller,
    topics: new Set(),
    resumeAfter,
    send(message, coalesce) {
      if (coalesce) newest.set(message.topic, formatEvent(message));
      else if (waiting.push(formatEvent(message)) > MAX_QUEUE) return finish();
      flush();
    },
    close: () => finish(),
  };
  const body = new ReadableStream<Uint8Array>(
    {
      start(controller) {
        let isOpen = true;
        const write = (text: string) => controller.enqueue(encoder.encode(text));
        flush = () => {
          while (isOpen && (controller.desiredSize ?? 0) > 0) {
            const next = waiting.shift() ?? takeFirst(newest);
            if (next === undefined) return;
            write(next);
          }
        };
        finish = () => {
          if (!isOpen) return;
          isOpen = false;
          clearInterval(heartbeat);
          dropStream(stream);
          try {
            controller.close();
          } catch {
            // The reader had cancelled already; nothing is left to close.
          }
        };
        write(`retry: 1000\nevent: hello\ndata: ${JSON.stringify({ streamId })}\n\n`);
        heartbeat = setInterval(() => {
          if (isOpen && (controller.desiredSize ?? 0) > 0) write(": still here\n\n");
        }, HEARTBEAT_MS);
        heartbeat.unref();
        getHub().streams.set(streamId, stream);
        signal.addEventListener("abort", () => finish(), { once: true });
      },
      pull: () => flush(),
      cancel: () => finish(),
    },
    new ByteLengthQueuingStrategy({ highWaterMark: BUFFER_BYTES }),
  );
  return new Response(body, {
    headers: {
      "content-type": "text/event-stream; charset=utf-8",
      "cache-control": "no-cache, no-transform",
      "x-accel-buffering": "no",
    },
  });
}

function takeFirst(map: Map<string, string>): string | undefined {
  const [first] = map;
  if (first) map.delete(first[0]);
  return first?.[1];
}

function formatEvent({ topic, data, seq }: TopicMessage): string {
  const id = seq === undefined ? "" : `id: ${seq}\n`;
  return `${id}data: ${JSON.stringify({ topic, ...(seq === undefined ? {} : { seq }), data })}\n\n`;
}

export type TopicsChange = { readonly add: readonly string[]; readonly remove: readonly string[] };

/**
 * Changes what a stream listens to. Answers the topics that were refused (unknown or not the caller's), or undefined
 * when the stream is not open or belongs to somebody else.
 */
export async function changeTopics(caller: Caller, streamId: string, change: TopicsChange): Promise<string[] | undefined> {
  const stream = getHub().streams.get(streamId);
  if (!stream || stream.caller.userId !== caller.userId) return undefined;
  for (const topic of change.remove) leaveTopic(stream, topic);
  const refused: string[] = [];
  for (const topic of change.add) {
    if (stream.topics.has(topic)) continue;
    const provider = getHub().providers.get(prefixOf(topic));
    const isAllowed = provider && stream.topics.size < MAX_TOPICS && (await provider.authorise(caller, topic));
    if (isAllowed) await joinTopic(stream, topic, provider);
    else refused.push(topic);
  }
  return refused;
}

async function joinTopic(stream: Stream, topic: string, provider: TopicProvider): Promise<void> {
  const hub = getHub();
  if (!hub.streams.has(stream.listener.streamId)) return;
  stream.topics.add(topic);
  let open = hub.open.get(topic);
  if (open) {
    open.streams.add(stream);
    if (open.newest) stream.send(open.newest, true);
  } else {
    open = { streams: new Set([stream]), published: new Set(), disposed: openSource(topic, provider) };
    hub.open.set(topic, open);
  }
  provider.joined?.(topic, stream.listener);
  if (stream.resumeAfter === undefined || !provider.replay) return;
  // A message that is published during the replay may arrive twice; its sequence number lets the tab drop one.
  for (const missed of await provider.replay(topic, stream.resumeAfter)) {
    stream.send({ topic, data: missed.data, seq: missed.seq }, false);
  }
}

async function openSource(topic: string, provider: TopicProvider): Promise<Dispose | undefined> {
  try {
    // The topic is entered in the hub first, so that a source that emits at once is heard.
    await Promise.resolve();
    return await provider.open?.(topic, (data, seq) => publish(topic, data, seq));
  } catch (error) {
    logError(error, `topic ${topic}`);
    return undefined;
  }
}

function leaveTopic(stream: Stream, topic: string): void {
  const hub = getHub();
  if (!stream.topics.delete(topic)) return;
  const open = hub.open.get(topic);
  open?.streams.delete(stream);
  hub.providers.get(prefixOf(topic))?.left?.(topic, stream.listener);
  if (!open || open.streams.size > 0) return;
  hub.open.delete(topic);
  void open.disposed.then((dispose) => dispose?.()).catch((error: unknown) => logError(error, `topic ${topic}`));
}

function dropStream(stream: Stream): void {
  getHub().streams.delete(stream.listener.streamId);
  for (const topic of [...stream.topics]) leaveTopic(stream, topic);
}

/** Ends the streams of somebody whose rights have changed; their tabs reconnect with the rights that they have now. */
export function closeStreamsOf(userId: string): void {
  for (const stream of [...getHub().streams.values()]) if (stream.caller.userId === userId) stream.close();
}

/** Ends all streams, for shutdown; answers after their sources have been disposed of. */
export async function closeAllStreams(): Promise<void> {
  const hub = getHub();
  const sources = [...hub.open.values()].map((open) => open.disposed);
  for (const stream of [...hub.streams.values()]) stream.close();
  await Promise.allSettled(sources);
}

/** How many streams and topics are open, for tests and the log. */
export function countOpenStreams(): { streams: number; topics: number } {
  const hub = getHub();
  return { streams: hub.streams.size, topics: hub.open.size };
}
