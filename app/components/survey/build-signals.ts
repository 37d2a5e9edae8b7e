/** Decided signals become members of the type, in one edit; the survey then names the member that each became. Pure. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { StandardDataType } from "~/domain/address-space/standard-ids";
import { ok, type Problem, type Result } from "~/domain/core/result";
import { applyOperations } from "~/domain/editing/apply-operation";
import type { CommandContext } from "~/domain/editing/edit-draft";
import type { Operation } from "~/domain/editing/operation";
import { addSignals } from "~/domain/editing/starters/add-signals";
import { toBrowseName } from "~/domain/editing/starters/read-signal-list";
import { setPart } from "~/domain/mapping/commands";
import { listTargets } from "~/domain/mapping/list-targets";
import type { SurveySignal } from "~/domain/mapping/mapping-parts";
import { unitByCode } from "~/domain/units/units";

export type SignalEntry = { readonly id: string; readonly value: SurveySignal };

export type BuiltSignals = {
  readonly operations: readonly Operation[];
  readonly built: readonly { readonly id: string; readonly target: string }[];
};

/** Problems: those of the commands; a member of the name that is there already is taken as it is. */
export function buildSignals(
  space: AddressSpace,
  context: CommandContext,
  type: NodeKey,
  entries: readonly SignalEntry[],
): Result<BuiltSignals> {
  const operations: Operation[] = [];
  const problems: Problem[] = [];
  const built: { id: string; target: string }[] = [];
  let current = space;
  for (const { id, value } of entries) {
    if (!findMember(current, type, value)) {
      const edit = addSignals(current, context, { type: { key: type }, signals: [toSignal(value)] });
      if (!edit.ok) return edit;
      const applied = applyOperations(current, edit.value.operations);
      if (!applied.ok) return applied;
      operations.push(...edit.value.operations);
      problems.push(...edit.problems);
      current = applied.value;
    }
    const target = findMember(current, type, value)?.target;
    if (target === undefined) continue;
    const marked = setPart("signal", type, id, { ...value, state: "built", target });
    if (!marked.ok) return marked;
    operations.push(...marked.value);
    built.push({ id, target });
  }
  return ok({ operations, built }, problems);
}

function findMember(space: AddressSpace, type: NodeKey, { name, group }: SurveySignal) {
  const path = [...(group === "" ? [] : [toBrowseName(group)]), toBrowseName(name)].join("/");
  return listTargets(space, type).find((target) => target.path === path);
}

function toSignal({ name, group, dataType, unit, range, note }: SurveySignal) {
  return {
    line: 1,
    name: toBrowseName(name),
    title: name,
    group: group === "" ? undefined : toBrowseName(group),
    dataType: findDataType(dataType),
    unit: unit === undefined ? undefined : unitByCode(unit),
    range,
    description: note,
    isOptional: false,
    isWritable: false,
  };
}

/** Float where the survey says nothing: what a sensor measures is a number. */
function findDataType(name: string | undefined): NodeKey {
  const known: Readonly<Record<string, NodeKey>> = StandardDataType;
  return (name === undefined ? undefined : known[name]) ?? StandardDataType.Float;
}
