/**
 * Rebase: what becomes of edits that a window has made but the server has not accepted, when edits of others came first.
 *
 * Each pending transaction is tried in order on the state that the others left. It is refused when it conflicts with one
 * of the transactions that came between (conflict-units.ts), when it builds upon a refused one, or when its
 * preconditions no longer hold. The rest keeps its operations unchanged, which is what keeps intent: an operation names
 * nodes by key and never by place in the model. A refused transaction is handed back with the reason and the edit it met,
 * so that the window can show both and offer to do it again; nothing is dropped silently. The server decides with the
 * same function, so a transaction that passes here passes there.
 */
import type { AddressSpace } from "../address-space/address-space";
import { problem, type Problem } from "../core/result";
import { collectConflictUnits, describeUnit, findConflict, type ConflictUnits } from "./conflict-units";
import { applyWithInverse } from "./invert-operation";
import type { Operation } from "./operation";

/** An edit of somebody else that came between; a stored Transaction is one. */
export type ForeignEdit = {
  readonly operations: readonly Operation[];
  readonly author?: string;
  readonly label?: string;
  readonly seq?: number;
};

export type PendingEdit = { readonly operations: readonly Operation[] };

export type RefusedEdit<P> = {
  readonly pending: P;
  readonly problems: readonly Problem[];
  /** The edit that it met, absent where it fell with an earlier pending one. */
  readonly conflictsWith?: ForeignEdit;
};

export type Rebased<P> = {
  /** `space` with the kept edits on top. */
  readonly space: AddressSpace;
  readonly kept: readonly { readonly pending: P; readonly inverse: readonly Operation[] }[];
  readonly refused: readonly RefusedEdit<P>[];
};

/**
 * `space` is the state after `between`. Problems of refused edits: `operation.stale` (at: node, attribute; data: author),
 * `rebase.builds-on-refused`, else those of `applyOperations`.
 */
export function rebase<P extends PendingEdit>(
  space: AddressSpace,
  between: readonly ForeignEdit[],
  pending: readonly P[],
): Rebased<P> {
  const foreign = between.map((edit) => ({ edit, units: collectConflictUnits(edit.operations) }));
  const fallen: ConflictUnits[] = [];
  const kept: { pending: P; inverse: readonly Operation[] }[] = [];
  const refused: RefusedEdit<P>[] = [];
  let current = space;
  for (const edit of pending) {
    const units = collectConflictUnits(edit.operations);
    const refusal = findForeignConflict(foreign, units) ?? findFallenBase(fallen, units);
    const applied = refusal ? undefined : applyWithInverse(current, edit.operations);
    if (applied?.ok) {
      current = applied.value.space;
      kept.push({ pending: edit, inverse: applied.value.inverse });
    } else {
      fallen.push(units);
      refused.push({ pending: edit, ...(refusal ?? { problems: applied?.problems ?? [] }) });
    }
  }
  return { space: current, kept, refused };
}

type Refusal = Pick<RefusedEdit<PendingEdit>, "problems" | "conflictsWith">;

function findForeignConflict(
  foreign: readonly { edit: ForeignEdit; units: ConflictUnits }[],
  units: ConflictUnits,
): Refusal | undefined {
  for (const { edit, units: theirs } of foreign) {
    const met = findConflict(theirs, units);
    if (met !== undefined) return { problems: [toStaleProblem(met, edit)], conflictsWith: edit };
  }
  return undefined;
}

function findFallenBase(fallen: readonly ConflictUnits[], units: ConflictUnits): Refusal | undefined {
  if (!fallen.some((theirs) => findConflict(theirs, units) !== undefined)) return undefined;
  return { problems: [problem("rebase.builds-on-refused")] };
}

/** The problem for two edits that meet at a unit. */
export function toStaleProblem(met: string, edit: ForeignEdit): Problem {
  const { node, attribute } = describeUnit(met);
  const data = { attribute, node: node ?? "", author: edit.author ?? "", label: edit.label ?? "" };
  return problem("operation.stale", data, node === undefined ? { attribute } : { node, attribute });
}
