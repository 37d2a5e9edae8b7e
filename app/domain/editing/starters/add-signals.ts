/** Signals of a list become members of a type: groups are Objects, signals Variables with unit and range. */
import type { AddressSpace } from "../../address-space/address-space";
import { findMember } from "../../address-space/browse";
import { getOwnNamespace } from "../../address-space/model-header";
import type { NodeKey } from "../../address-space/node-id";
import { StandardModellingRule, StandardType as T } from "../../address-space/standard-ids";
import type { Result } from "../../core/result";
import { toEuInformation } from "../../units/units";
import { addObject, addVariable } from "../commands/add-member";
import { addType } from "../commands/add-type";
import type { CommandContext, Edit } from "../edit-draft";
import { EditSequence } from "./edit-sequence";
import type { Signal } from "./read-signal-list";

export type AddSignalsIntent = {
  /** An own type that gets the members, or the name of a new one. */
  readonly type: { readonly key: NodeKey } | { readonly name: string };
  readonly signals: readonly Signal[];
};

/** Read and write, OPC 10000-3 §8.57 AccessLevelType. */
const READ_WRITE = 3;

/** The first node made is the type where it is new. Groups that are there already are filled. Problems: those of the commands. */
export function addSignals(
  space: AddressSpace,
  context: CommandContext,
  { type, signals }: AddSignalsIntent,
): Result<Edit> {
  const sequence = new EditSequence(space, context);
  const key =
    "key" in type ? type.key : sequence.do((s, c) => addType(s, c, { supertype: T.BaseObjectType, name: type.name }));
  if (key === undefined) return sequence.finish();
  for (const signal of signals) {
    const parent = openGroup(sequence, key, signal.group?.split("/") ?? []);
    if (parent === undefined) break;
    addSignal(sequence, parent, signal);
  }
  return sequence.finish();
}

/** The innermost group; those on the way that are not there are made. */
function openGroup(sequence: EditSequence, type: NodeKey, path: readonly string[]): NodeKey | undefined {
  let at: NodeKey | undefined = type;
  for (const name of path) {
    const parent: NodeKey | undefined = at;
    if (parent === undefined) return undefined;
    const there = findMember(sequence.space, parent, name, getOwnNamespace(sequence.space.own.header));
    at = there?.key ?? sequence.do((s, c) => addObject(s, c, { parent, name }));
  }
  return at;
}

/** Unit and range ask for different types (OPC 10000-8 §5.3.2): with both AnalogUnitRangeType, with one of them its own. */
function chooseType({ unit, range }: Signal): NodeKey {
  if (unit && range) return T.AnalogUnitRangeType;
  if (unit) return T.AnalogUnitType;
  return range ? T.AnalogItemType : T.BaseDataVariableType;
}

function addSignal(sequence: EditSequence, parent: NodeKey, signal: Signal): void {
  const { name, title, dataType, unit, range, description, isOptional, isWritable } = signal;
  sequence.do((s, c) =>
    addVariable(s, c, {
      parent,
      name,
      dataType,
      typeDefinition: chooseType(signal),
      rule: isOptional ? StandardModellingRule.Optional : StandardModellingRule.Mandatory,
      ...(title === name ? {} : { displayName: [{ locale: "en", text: title }] }),
      ...(description ? { description: [{ locale: "en", text: description }] } : {}),
      ...(unit ? { unit: toEuInformation(unit) } : {}),
      ...(range ? { range } : {}),
      ...(isWritable ? { accessLevel: READ_WRITE } : {}),
    }),
  );
}
