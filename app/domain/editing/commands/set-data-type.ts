/** `setDataType`: the DataType of a Variable or VariableType; a value that no longer fits is dropped and told. */
import type { AddressSpace } from "../../address-space/address-space";
import { hasValueAttributes } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import { StandardDataType } from "../../address-space/standard-ids";
import { problem, type Result } from "../../core/result";
import { EditDraft, type CommandContext, type Edit } from "../edit-draft";
import { dropMisfitValue } from "./set-value";

export type SetDataTypeIntent = { readonly node: NodeKey; readonly dataType: NodeKey };

/** Problems: `value.no-variable`, `value.no-data-type`; hint `value.dropped`. */
export function setDataType(space: AddressSpace, context: CommandContext, intent: SetDataTypeIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  const node = space.getNode(intent.node);
  if (!node || !hasValueAttributes(node)) draft.fail(problem("value.no-variable", { node: intent.node }));
  else if (space.getNode(intent.dataType)?.nodeClass !== "DataType")
    draft.fail(problem("value.no-data-type", { node: intent.dataType }));
  else {
    draft.set(intent.node, "dataType", intent.dataType === StandardDataType.BaseDataType ? undefined : intent.dataType);
    dropMisfitValue(draft, intent.node, intent.dataType);
  }
  return draft.finish();
}
