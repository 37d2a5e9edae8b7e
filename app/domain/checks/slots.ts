/**
 * Slots note who read them. A computation is the check of one node, the check of the model, or a remembered lookup;
 * dropping a slot ends all computations that read it, lookups that read these, and so on, and answers the checks met.
 */
import type { NodeKey } from "../address-space/node-id";

export type Subject = NodeKey | "model";

export type Computation = {
  /** For checks. */
  readonly subject?: Subject;
  /** For lookups: the slot of the answer, and how to forget it. */
  readonly answer?: Slot;
  readonly forget?: () => void;
  isEnded: boolean;
};

export class Slot {
  #readers: Computation[] | undefined = undefined;
  #lastReader: Computation | undefined = undefined;

  /** Notes a read; reading twice in a row costs one comparison. */
  note(reader: Computation | undefined): void {
    if (reader === undefined || this.#lastReader === reader) return;
    this.#lastReader = reader;
    if (this.#readers) this.#readers.push(reader);
    else this.#readers = [reader];
  }

  takeReaders(): readonly Computation[] {
    const readers = this.#readers ?? [];
    this.#readers = undefined;
    this.#lastReader = undefined;
    return readers;
  }
}

/** Ends everything that depends on the slot and empties it; the subjects of ended checks are added to `dirty`. */
export function dropSlot(slot: Slot, dirty: Set<Subject>): void {
  const open = [slot];
  for (let at = open.pop(); at; at = open.pop()) {
    for (const reader of at.takeReaders()) {
      if (reader.isEnded) continue;
      reader.isEnded = true;
      reader.forget?.();
      if (reader.subject !== undefined) dirty.add(reader.subject);
      if (reader.answer) open.push(reader.answer);
    }
  }
}
