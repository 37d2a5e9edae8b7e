/** What an EditorStore is made of, and what it tells. */
import type { AddressSpace } from "../domain/address-space/address-space";
import type { IdBlock } from "../domain/editing/allocate-node-id";
import type { Transaction } from "../domain/editing/operation";
import type { RefusedEdit } from "../domain/editing/rebase";
import type { OutgoingTransaction, Scheduler, SyncTransport } from "./sync-transport";

/** `blocked`: signed out, or the right to edit was taken away; `offline`: the server does not answer, edits queue. */
export type SyncState = "saved" | "saving" | "offline" | "blocked";

export type EditorState = {
  readonly space: AddressSpace;
  /** Sequence number of the confirmed state. */
  readonly seq: number;
  readonly pendingCount: number;
  readonly sync: SyncState;
  /** ISO 8601 time of the last acknowledged edit of this window. */
  readonly savedAt: string | undefined;
  readonly undoLabel: string | undefined;
  readonly redoLabel: string | undefined;
};

/** Edits that were not acknowledged, ids that were not used, and the sequence number that both were seen at. */
export type UnsavedEdits = {
  readonly pending: readonly OutgoingTransaction[];
  readonly blocks: readonly IdBlock[];
  readonly base: number;
};

export type EditorOptions = {
  readonly space: AddressSpace;
  readonly seq: number;
  readonly clientId: string;
  /** False: nothing is leased or sent, the window only follows. */
  readonly canEdit: boolean;
  readonly transport: SyncTransport;
  readonly schedule: Scheduler;
  /** What an earlier page of this window left behind; see `listUnsaved`. */
  readonly restored?: UnsavedEdits;
  /** Told of edits that could not be kept. */
  readonly onRefused?: (refused: readonly RefusedEdit<OutgoingTransaction>[]) => void;
  /** Told of each foreign transaction after it was applied. */
  readonly onForeign?: (transaction: Transaction) => void;
};
