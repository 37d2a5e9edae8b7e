/**
 * Slots note who read them. A reader is the check of one subject, or a remembered lookup; dropping a slot ends all that
 * read it, lookups that read these, and so on, and answers the subjects met.
 */
import type { NodeKey } from "../address-space/node-id";

/** What is checked in one go: a node, the model's header, the wiring of the machines. */
export type Subject = NodeKey | "model" | "wiring";

/** The check of one subject. */
export class SubjectReader {
  readonly subject: Subject;
  isEnded = false;

  constructor(subject: Subject) {
    this.subject = subject;
  }
}

export type Reader = SubjectReader | Answer;

export class Slot {
  #readers: Reader[] | undefined = undefined;
  #lastReader: Reader | undefined = undefined;

  /** Notes a read; reading twice in a row costs one comparison. */
  note(reader: Reader): void {
    if (this.#lastReader === reader) return;
    this.#lastReader = reader;
    if (this.#readers) this.#readers.push(reader);
    else this.#readers = [reader];
  }

  takeReaders(): readonly Reader[] {
    const readers = this.#readers ?? [];
    this.#readers = undefined;
    this.#lastReader = undefined;
    return readers;
  }
}

/** The answer of a lookup, in the place where it is remembered: a slot for those who ask, a reader of what it came from. */
export class Answer extends Slot {
  value: unknown = undefined;
  isEnded = false;
  readonly #home: unknown[];
  readonly #place: number;

  constructor(home: unknown[], place: number) {
    super();
    this.#home = home;
    this.#place = place;
  }

  forget(): void {
    if (this.#home[this.#place] === this) this.#home[this.#place] = undefined;
  }
}

/** Ends everything that depends on the slot and empties it; the subjects of ended checks are added to `dirty`. */
export function dropSlot(slot: Slot, dirty: Set<Subject>): void {
  const open = [slot];
  for (let at = open.pop(); at; at = open.pop()) {
    for (const reader of at.takeReaders()) {
      if (reader.isEnded) continue;
      reader.isEnded = true;
      if (reader instanceof Answer) {
        reader.forget();
        open.push(reader);
      } else dirty.add(reader.subject);
    }
  }
}
