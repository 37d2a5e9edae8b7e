/** Who else has this model open, where they are and what they have selected. */
import { z } from "zod";
import type { NodeKey } from "~/domain/address-space/node-id";
import { subscribeToTopic } from "../shell/event-stream";
import type { ModelTransport } from "./model-transport";
import type { ViewStore } from "./view-store";

const personSchema = z.object({
  userId: z.string(),
  name: z.string(),
  initials: z.string(),
  clientId: z.string(),
  place: z.string(),
  selection: z.array(z.string()).default([]),
});
const presenceSchema = z.object({ people: z.array(personSchema) });

export type PresentPerson = Omit<z.infer<typeof personSchema>, "selection"> & { readonly selection: readonly NodeKey[] };

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
    const parsed = presenceSchema.safeParse(data);
    if (!parsed.success) return;
    const people = parsed.data.people.filter((person) => person.clientId !== ownClientId);
    this.#people = people.length === 0 ? NOBODY : (people as unknown as PresentPerson[]);
    for (const listener of [...this.#listeners]) listener();
  }
}
