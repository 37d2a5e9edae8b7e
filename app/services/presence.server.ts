/**
 * Who has which model open and what they have selected. A tab is present while its stream listens to the topic; what it
 * tells of its place ends after a while without news. Nothing of this is stored.
 */
import type { Caller } from "../auth/caller.server";
import { singleton } from "../utils/singleton.server";
import { publish, type Listener } from "./event-hub.server";

export type PresentPerson = {
  readonly userId: string;
  readonly name: string;
  readonly initials: string;
  readonly clientId: string;
  readonly place: string;
  readonly selection: readonly string[];
};

type Entry = PresentPerson & { readonly toldAt: number };
type Presence = { readonly told: Map<string, Map<string, Entry>>; readonly listening: Map<string, Map<string, Set<string>>> };

const KEPT_MS = 60_000;

const getPresence = () => singleton<Presence>("presence", () => ({ told: new Map(), listening: new Map() }));

/** What one window tells of itself, each 20 s and whenever it changes. */
export function tellPresence(
  modelId: string,
  caller: Caller,
  news: { readonly clientId: string; readonly place: string; readonly selection: readonly string[] },
): void {
  const told = entriesOf(getPresence().told, modelId);
  const initials = caller.name.split(/\s+/).map((word) => word[0] ?? "").join("").slice(0, 2).toUpperCase();
  told.set(news.clientId, { userId: caller.userId, name: caller.name, initials, ...news, toldAt: Date.now() });
  publishPresence(modelId);
}

export function joinPresence(modelId: string, listener: Listener): void {
  const streams = entriesOf(getPresence().listening, modelId);
  streams.set(listener.userId, (streams.get(listener.userId) ?? new Set()).add(listener.streamId));
  publishPresence(modelId);
}

/** The last stream of a person takes along what their windows told. */
export function leavePresence(modelId: string, listener: Listener): void {
  const { listening, told } = getPresence();
  const streams = listening.get(modelId)?.get(listener.userId);
  streams?.delete(listener.streamId);
  if (streams && streams.size > 0) return;
  listening.get(modelId)?.delete(listener.userId);
  for (const [clientId, entry] of told.get(modelId) ?? []) {
    if (entry.userId === listener.userId) told.get(modelId)?.delete(clientId);
  }
  if (listening.get(modelId)?.size === 0) {
    listening.delete(modelId);
    told.delete(modelId);
  }
  publishPresence(modelId);
}

function entriesOf<V>(map: Map<string, Map<string, V>>, modelId: string): Map<string, V> {
  const entries = map.get(modelId) ?? new Map<string, V>();
  map.set(modelId, entries);
  return entries;
}

function publishPresence(modelId: string): void {
  const oldest = Date.now() - KEPT_MS;
  const told = getPresence().told.get(modelId) ?? new Map<string, Entry>();
  for (const [clientId, entry] of told) if (entry.toldAt < oldest) told.delete(clientId);
  const people = [...told.values()].map(({ toldAt: _, ...person }) => person);
  publish(`presence:${modelId}`, { people });
}
