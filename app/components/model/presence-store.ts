/** Who else has this model open, where they are and what they have selected. */
import type { NodeKey } from "~/domain/address-space/node-id";
import { subscribeToTopic } from "../shell/event-stream";
import type { ModelTransport } from "./model-transport";
import type { ViewStore } from "./view-store";

export type PresentPerson = {
  readonly userId: string;
  readonly name: string;
  readonly initials: string;
  readonly clientId: string;
  readonly place: string;
  readonly selection: readonly NodeKey[];
};

const NOBODY: readonly PresentPerson[] = [];
const TELL_EVERY = 20_000;
const TELL_DELAY = 400;

export class PresenceStore {
  #people = NOBODY;
  #place = "";
  #tell: (() => void) | undefined;
  readonly #listeners = new Set<() => void>();

  /** Other windows; one's own is left out. */
  readonly getPeople = (): readonly PresentPerson[] => this.#people;

  readonly subscribe = (listener: () => void): (() => void) => {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  };

  /** The page that this window shows: `sheet`, `register`. */
  setPlace(place: string): void {
    if (place === this.#place) return;
    this.#place = place;
    this.#tell?.();
  }

  follow(modelId: string, transport: ModelTransport, view: ViewStore): () => void {
    let selection = view.getState().selection;
    let delay: ReturnType<typeof setTimeout> | undefined;
    const tell = (): void => {
      delay = undefined;
      if (document.visibilityState === "visible") void transport.tellPresence(this.#place, view.getState().selection);
    };
    this.#tell = () => {
      delay ??= setTimeout(tell, TELL_DELAY);
    };
    const endTopic = subscribeToTopic(`presence:${modelId}`, (data) => this.#hear(data, transport.clientId));
    const endView = view.subscribe(() => {
      if (view.getState().selection === selection) return;
      selection = view.getState().selection;
      this.#tell?.();
    });
    const timer = setInterval(tell, TELL_EVERY);
    this.#tell();
    return () => {
      clearTimeout(delay);
      clearInterval(timer);
      endTopic();
      endView();
      this.#tell = undefined;
    };
  }

  #hear(data: unknown, ownClientId: string): void {
    const people = readPeople(data).filter((person) => person.clientId !== ownClientId);
    this.#people = people.length === 0 ? NOBODY : people;
    for (const listener of [...this.#listeners]) listener();
  }
}

/** What is not whole is left out: presence is a courtesy. */
function readPeople(data: unknown): PresentPerson[] {
  const { people } = (data ?? {}) as { people?: unknown };
  if (!Array.isArray(people)) return [];
  return people.flatMap((entry: unknown) => {
    const person = (entry ?? {}) as Partial<PresentPerson>;
    const { userId, name, initials, clientId, place, selection } = person;
    const texts = [userId, name, initials, clientId, place];
    if (!texts.every((text) => typeof text === "string") || !Array.isArray(selection)) return [];
    return [person as PresentPerson];
  });
}
