/** Several commands as one edit: each sees what the ones before it made; one that fails keeps all of them back. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { formatProblem } from "~/domain/core/problem-texts";
import { problem, type Problem, type Result } from "~/domain/core/result";
import { applyOperations } from "~/domain/editing/apply-operation";
import type { CommandContext, Edit } from "~/domain/editing/edit-draft";
import type { Operation } from "~/domain/editing/operation";

/** A command with its intent; a text says why there is none. */
export type EditStep = (space: AddressSpace, context: CommandContext) => Result<Edit> | string;

export type ComposedEdit =
  | { readonly ok: true; readonly operations: readonly Operation[]; readonly made: readonly NodeKey[]; readonly notes: readonly string[] }
  | { readonly ok: false; readonly reasons: readonly string[] };

export function composeEdit(space: AddressSpace, context: CommandContext, steps: readonly EditStep[]): ComposedEdit {
  const operations: Operation[] = [];
  const made: NodeKey[] = [];
  const notes: string[] = [];
  let current = space;
  for (const step of steps) {
    const edit = step(current, context);
    if (typeof edit === "string") return { ok: false, reasons: [edit] };
    if (!edit.ok) return { ok: false, reasons: describe(current, edit.problems) };
    const applied = applyOperations(current, edit.value.operations);
    if (!applied.ok) return { ok: false, reasons: describe(current, applied.problems) };
    current = applied.value;
    operations.push(...edit.value.operations);
    made.push(...edit.value.made);
    notes.push(...describe(current, edit.problems));
  }
  return { ok: true, operations, made, notes };
}

/** Sentences for people: keys in the data of a problem are replaced by names. */
export function describe(space: AddressSpace, problems: readonly Problem[]): string[] {
  return [...new Set(problems.map((found) => formatProblem(withNames(space, found))))];
}

function withNames(space: AddressSpace, found: Problem): Problem {
  const data = Object.entries(found.data ?? {}).map(([name, value]) => {
    const node = typeof value === "string" ? space.getNode(value as NodeKey) : undefined;
    return [name, node ? node.browseName.name : value] as const;
  });
  return { ...problem(found.code, Object.fromEntries(data), found.at), severity: found.severity };
}
