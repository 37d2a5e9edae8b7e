/** `setValueRank`: rank and dimensions of a Variable or VariableType, kept in step (OPC 10000-3 §5.6.2). */
import type { AddressSpace } from "../../address-space/address-space";
import { getDataType, hasValueAttributes } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import { problem, type Result } from "../../core/result";
import { EditDraft, type CommandContext, type Edit } from "../edit-draft";
import { dropMisfitValue } from "./set-value";

export type SetValueRankIntent = {
  readonly node: NodeKey;
  /** −3 … n; see OPC 10000-3 §5.6.2. */
  readonly valueRank: number;
  /** One number a dimension, 0 for any length; unknown lengths by default. */
  readonly arrayDimensions?: readonly number[];
};

/** Problems: `value.no-variable`, `value.rank-range`, `value.dimension-count`; hint `value.dropped`. */
export function setValueRank(space: AddressSpace, context: CommandContext, intent: SetValueRankIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  const node = space.getNode(intent.node);
  const { valueRank, arrayDimensions } = intent;
  if (!node || !hasValueAttributes(node)) draft.fail(problem("value.no-variable", { node: intent.node }));
  else if (!Number.isInteger(valueRank) || valueRank < -3) draft.fail(problem("value.rank-range", { valueRank }));
  else if (arrayDimensions && valueRank > 0 && arrayDimensions.length !== valueRank) {
    draft.fail(problem("value.dimension-count", { valueRank, count: arrayDimensions.length }));
  } else {
    draft.set(intent.node, "valueRank", valueRank === -1 ? undefined : valueRank);
    draft.set(intent.node, "arrayDimensions", toDimensionsText(valueRank, arrayDimensions));
    dropMisfitValue(draft, intent.node, getDataType(node));
  }
  return draft.finish();
}

/** ArrayDimensions as files write them: `0,3`; absent for scalars and for ranks without a fixed number of dimensions. */
export function toDimensionsText(valueRank: number, dimensions?: readonly number[]): string | undefined {
  if (valueRank < 1) return undefined;
  return (dimensions ?? new Array<number>(valueRank).fill(0)).join(",");
}
