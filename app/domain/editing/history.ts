/**
 * Undo and redo of one person's own transactions in one window.
 *
 * Others edit the same model meanwhile, so undo does not step back in the model's list: it makes a new transaction of the
 * inverse operations. That is right only while nobody else touched the same units since; foreign edits are therefore
 * told to the history, which marks the own edits that they meet. A marked edit can no longer be undone: `undo` answers
 * with the problem and the entry leaves the stack, so that the edit before it can be undone with the next press. Redo is
 * the inverse of the undo, under the same rule. Nothing here knows the network; a pending transaction may be undone.
 */
import type { AddressSpace } from "../address-space/address-space";
import { fail, ok, problem, type Problem, type Result } from "../core/result";
import { collectConflictUnits, findConflict } from "./conflict-units";
import { applyWithInverse, type Applied } from "./invert-operation";
import type { Operation } from "./operation";
import { toStaleProblem, type ForeignEdit } from "./rebase";

/** One own edit. `id` is the window's own number for it (its clientSeq). */
export type HistoryEntry = {
  readonly id: number;
  readonly label: string;
  readonly operations: readonly Operation[];
  readonly inverse: readonly Operation[];
  /** Why it can no longer be taken back. */
  readonly blocked?: Problem;
};

export type History = { readonly undoable: readonly HistoryEntry[]; readonly redoable: readonly HistoryEntry[] };

export const EMPTY_HISTORY: History = { undoable: [], redoable: [] };

/** Steps that are remembered; older ones stay in the model's list of transactions and its revisions. */
const MAX_STEPS = 500;

/** After a new own edit; what was undone before can no longer be redone. */
export function recordOwn(history: History, entry: HistoryEntry): History {
  return { undoable: [...history.undoable, entry].slice(-MAX_STEPS), redoable: [] };
}

/** After an edit of somebody else. */
export function recordForeign(history: History, edit: ForeignEdit): History {
  const theirs = collectConflictUnits(edit.operations);
  const mark = (entry: HistoryEntry): HistoryEntry => {
    if (entry.blocked) return entry;
    const met = findConflict(theirs, collectConflictUnits(entry.operations));
    return met === undefined ? entry : { ...entry, blocked: toStaleProblem(met, edit) };
  };
  return { undoable: history.undoable.map(mark), redoable: history.redoable.map(mark) };
}

/** Forgets an own edit that the server refused. */
export function forget(history: History, id: number): History {
  const keep = (entry: HistoryEntry): boolean => entry.id !== id;
  return { undoable: history.undoable.filter(keep), redoable: history.redoable.filter(keep) };
}

export type HistoryStep = {
  /** What happened to the stacks, also when the step failed. */
  readonly history: History;
  /** The transaction to send and the state with it, or why there is none. */
  readonly outcome: Result<Applied & { readonly label: string; readonly operations: readonly Operation[] }>;
};

/** Takes the newest own edit back; `id` is the number of the transaction that this makes. Problems: `history.nothing-to-undo`, `operation.stale`, those of apply. */
export function undo(history: History, space: AddressSpace, id: number): HistoryStep {
  return step(history, space, { from: "undoable", to: "redoable", id, empty: "history.nothing-to-undo" });
}

/** Does the newest undone edit again. Problems: `history.nothing-to-redo`, `operation.stale`, those of apply. */
export function redo(history: History, space: AddressSpace, id: number): HistoryStep {
  return step(history, space, { from: "redoable", to: "undoable", id, empty: "history.nothing-to-redo" });
}

type Direction = { from: keyof History; to: keyof History; id: number; empty: string };

function step(history: History, space: AddressSpace, { from, to, id, empty }: Direction): HistoryStep {
  const entry = history[from].at(-1);
  if (!entry) return { history, outcome: fail(problem(empty)) };
  const shortened = { ...history, [from]: history[from].slice(0, -1) };
  if (entry.blocked) return { history: shortened, outcome: fail(entry.blocked) };
  const applied = applyWithInverse(space, entry.inverse);
  if (!applied.ok) return { history: shortened, outcome: applied };
  const { inverse } = applied.value;
  const reversed: HistoryEntry = { id, label: entry.label, operations: entry.inverse, inverse };
  return {
    history: { ...shortened, [to]: [...history[to], reversed] },
    outcome: ok({ ...applied.value, label: from === "undoable" ? "undo" : "redo", operations: entry.inverse }),
  };
}
