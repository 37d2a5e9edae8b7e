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

export type Slot = { readers: Computation[]; lastReader: Computation | undefined };

export function newSlot(): Slot {
  return { readers: [], lastReader: undefined };
}

/** Notes a read; reading twice in a row costs one comparison. */
export function noteRead(slot: Slot, reader: Computation | undefined): void {
  if (!reader || slot.lastReader === reader) return;
  slot.lastReader = reader;
  slot.readers.push(reader);
}

/** Ends everything that depends on the slot and empties it; the subjects of ended checks are added to `dirty`. */
export function dropSlot(slot: Slot, dirty: Set<Subject>): void {
  const open = [slot];
  for (let at = open.pop(); at; at = open.pop()) {
    const { readers } = at;
    at.readers = [];
    at.lastReader = undefined;
    for (const reader of readers) {
      if (reader.isEnded) continue;
      reader.isEnded = true;
      reader.forget?.();
      if (reader.subject !== undefined) dirty.add(reader.subject);
      if (reader.answer) open.push(reader.answer);
    }
  }
}
