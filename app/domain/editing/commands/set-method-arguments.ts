/** `setMethodArguments`: the Properties InputArguments and OutputArguments of a Method (OPC 10000-3 §5.7.1, §8.6). */
import type { AddressSpace } from "../../address-space/address-space";
import { findProperty } from "../../address-space/browse";
import type { NodeKey } from "../../address-space/node-id";
import { StandardDataType } from "../../address-space/standard-ids";
import { problem, type Result } from "../../core/result";
import { SpaceDataTypes } from "../../nodeset/values/data-type-shapes";
import { makeArguments, type Argument } from "../../nodeset/values/standard-values";
import { writeValue } from "../../nodeset/values/write-value";
import { EditDraft, type CommandContext, type Edit } from "../edit-draft";
import { addStandardProperty, removeProperty } from "./set-unit";

export type ArgumentIntent = {
  readonly name: string;
  readonly dataType: NodeKey;
  /** −1, scalar, by default. */
  readonly valueRank?: number;
  readonly arrayDimensions?: readonly number[];
  readonly description?: Argument["description"];
};

export type SetMethodArgumentsIntent = {
  readonly method: NodeKey;
  readonly input: readonly ArgumentIntent[];
  readonly output: readonly ArgumentIntent[];
};

/** An empty list takes the Property away. Problems: `argument.no-method`, `argument.name-taken`, `argument.data-type`, `name.empty`. */
export function setMethodArguments(
  space: AddressSpace,
  context: CommandContext,
  intent: SetMethodArgumentsIntent,
): Result<Edit> {
  const draft = new EditDraft(space, context);
  setMethodArgumentsOn(draft, intent.method, intent);
  return draft.finish();
}

export function setMethodArgumentsOn(
  draft: EditDraft,
  method: NodeKey,
  { input, output }: Pick<SetMethodArgumentsIntent, "input" | "output">,
): void {
  if (draft.space.getNode(method)?.nodeClass !== "Method") draft.fail(problem("argument.no-method", { node: method }));
  checkArguments(draft, [...input, ...output]);
  setList(draft, method, "InputArguments", input);
  setList(draft, method, "OutputArguments", output);
}

/** Names are unique over inputs and outputs together (§5.7.1). */
function checkArguments(draft: EditDraft, list: readonly ArgumentIntent[]): void {
  const names = new Set<string>();
  for (const { name, dataType } of list) {
    if (name.trim() === "") draft.fail(problem("name.empty"));
    if (names.has(name)) draft.fail(problem("argument.name-taken", { name }));
    names.add(name);
    if (draft.space.getNode(dataType)?.nodeClass !== "DataType")
      draft.fail(problem("argument.data-type", { name, node: dataType }));
  }
}

function setList(draft: EditDraft, method: NodeKey, name: string, list: readonly ArgumentIntent[]): void {
  const node = draft.space.getNode(method);
  if (draft.hasFailed || !node) return;
  if (list.length === 0) {
    removeProperty(draft, method, name);
    return;
  }
  const value = writeValue(makeArguments(list.map((a) => toArgument(draft.space, a))), new SpaceDataTypes(draft.space));
  const attributes = { value, valueRank: 1, arrayDimensions: "0" };
  const known = findProperty(draft.space, method, name);
  if (known) draft.set(known.key, "value", value);
  else addStandardProperty(draft, node, { name, dataType: StandardDataType.Argument, attributes });
}

function toArgument(space: AddressSpace, intent: ArgumentIntent): Argument {
  const valueRank = intent.valueRank ?? -1;
  return {
    name: intent.name,
    dataType: space.requireNode(intent.dataType).nodeId,
    valueRank,
    arrayDimensions: valueRank > 0 ? (intent.arrayDimensions ?? new Array<number>(valueRank).fill(0)) : [],
    ...(intent.description ? { description: intent.description } : {}),
  };
}
