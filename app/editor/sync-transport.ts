/** What the store asks of the server. The requests themselves live outside: the store knows neither network nor clock. */
import type { Problem } from "../domain/core/result";
import type { IdBlock } from "../domain/editing/allocate-node-id";
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

export interface SyncTransport {
  post(base: number, transactions: readonly OutgoingTransaction[]): Promise<PostOutcome>;
  /** All transactions after `seq`, oldest first; undefined while the server cannot be reached. */
  listSince(seq: number): Promise<readonly Transaction[] | undefined>;
  lease(): Promise<IdBlock | undefined>;
}

/** Runs something later; answers the function that calls it off. */
export type Scheduler = (run: () => void, milliseconds: number) => () => void;
