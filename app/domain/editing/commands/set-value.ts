/** `setValue`: the Value of a Variable or VariableType, checked against its DataType and ValueRank (OPC 10000-3 §5.6.2). */
import type { AddressSpace } from "../../address-space/address-space";
import { getDataType, getValueRank, hasValueAttributes, type XmlText } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import { problem, type Problem, type Result } from "../../core/result";
import { SpaceDataTypes } from "../../nodeset/values/data-type-shapes";
import { checkVariant } from "../../nodeset/values/check-variant";
import { readValue } from "../../nodeset/values/read-value";
import { rewriteValue } from "../../nodeset/values/rewrite-value";
import { isSameValue } from "../../nodeset/values/same-value";
import { isWritableText } from "../../nodeset/values/scalar-text";
import type { Variant } from "../../nodeset/values/variant";
import { writeValue } from "../../nodeset/values/write-value";
import { EditDraft, type CommandContext, type Edit } from "../edit-draft";

export type SetValueIntent = {
  readonly node: NodeKey;
  /** Absent takes the value away. */
  readonly value?: Variant;
};

/** Problems: `value.no-variable`, `value.type`, `value.rank`, `value.range`, `value.character`. */
export function setValue(space: AddressSpace, context: CommandContext, intent: SetValueIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  setValueOn(draft, intent.node, intent.value);
  return draft.finish();
}

/** The same on a draft. */
export function setValueOn(draft: EditDraft, key: NodeKey, value: Variant | undefined): void {
  if (draft.hasFailed) return;
  if (value === undefined) {
    draft.set(key, "value", undefined);
    return;
  }
  const misfit = findMisfit(draft.space, key, value);
  if (misfit) {
    draft.fail(misfit);
    return;
  }
  const types = new SpaceDataTypes(draft.space);
  const written = writeLike(draft.space, key, value, types);
  if (isWritableText(written.xml)) draft.set(key, "value", written);
  else draft.fail(problem("value.character", undefined, { node: key, attribute: "value" }));
}

/** Like the text that a file gave the value: what stays the same keeps it, to the last space. */
function writeLike(space: AddressSpace, key: NodeKey, value: Variant, types: SpaceDataTypes): XmlText {
  const node = space.getNode(key);
  const text = node && hasValueAttributes(node) ? node.value : undefined;
  const read = text && readValue(text, types);
  if (!text || !read?.ok) return writeValue(value, types);
  return isSameValue(read.value, value) ? text : rewriteValue(text, read.value, value, types);
}

function findMisfit(space: AddressSpace, key: NodeKey, value: Variant): Problem | undefined {
  const node = space.getNode(key);
  if (!node || !hasValueAttributes(node)) return problem("value.no-variable", { node: key });
  return checkVariant(value, { dataType: getDataType(node), valueRank: getValueRank(node) }, new SpaceDataTypes(space));
}

/** Takes a value away that does not fit what the Variable now is, and tells so. */
export function dropMisfitValue(draft: EditDraft, key: NodeKey, dataType: NodeKey): void {
  const node = draft.space.getNode(key);
  if (draft.hasFailed || !node || !hasValueAttributes(node) || !node.value) return;
  const types = new SpaceDataTypes(draft.space);
  const read = readValue(node.value, types);
  const fits = read.ok && checkVariant(read.value, { dataType, valueRank: getValueRank(node) }, types) === undefined;
  if (fits) return;
  draft.set(key, "value", undefined);
  draft.note(problem.hint("value.dropped", { name: node.browseName.name }, { node: key }));
}
