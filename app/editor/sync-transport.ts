/** What the store asks of the server. The requests themselves live outside: the store knows neither network nor clock. */
import type { Problem } from "../domain/core/result";
import type { IdBlock } from "../domain/editing/allocate-node-id";
import type { BlockFor } from "../domain/editing/id-stock";
import type { Operation, Transaction } from "../domain/editing/operation";

export type OutgoingTransaction = {
  readonly clientSeq: number;
  readonly label: string;
  readonly operations: readonly Operation[];
};
export type AcceptedTransaction = { readonly clientSeq: number; readonly seq: number; readonly at: string };

export type PostOutcome =
  | { readonly kind: "accepted"; readonly head: number; readonly accepted: readonly AcceptedTransaction[] }
  /** Others were quicker: what came after the base, own transactions that got through before among them. */
  | { readonly kind: "stale"; readonly head: number; readonly between: readonly Transaction[] }
  | { readonly kind: "refused"; readonly problems: readonly Problem[] }
  /** No answer, or one that a repetition may better. */
  | { readonly kind: "unreachable" }
  /** The session ended or the right was taken away; nothing is sent any more. */
  | { readonly kind: "forbidden"; readonly status: number };

export type IdLease = {
  /** Absent: the range has no number left. */
  readonly block?: IdBlock;
  /** String identifiers that were given and taken away before this window opened, where the model names nodes by paths. */
  readonly given?: readonly string[];
};

export interface SyncTransport {
  post(base: number, transactions: readonly OutgoingTransaction[]): Promise<PostOutcome>;
  /** All transactions after `seq`, oldest first; undefined while the server cannot be reached. */
  listSince(seq: number): Promise<readonly Transaction[] | undefined>;
  /** Ids for a class with a range of its own, or for all others; undefined while the server cannot be reached. */
  lease(wanted: BlockFor): Promise<IdLease | undefined>;
}

/** Runs something later; answers the function that calls it off. */
export type Scheduler = (run: () => void, milliseconds: number) => () => void;
