/**
 * `setAttribute`: an attribute that stands for itself (AccessLevel, IsAbstract, Historizing, EventNotifier …). What carries
 * others with it has a command of its own: names, data type, rank, value, references, NodeId.
 */
import type { AddressSpace } from "../../address-space/address-space";
import type { NodeKey } from "../../address-space/node-id";
import { problem, type Result } from "../../core/result";
import { EditDraft, type CommandContext, type Edit } from "../edit-draft";
import { isAttributeValue, type PlainAttribute } from "../attribute-values";
import { isRequiredAttribute } from "../attribute-names";
import type { AttributeName } from "../operation";

export type SetAttributeIntent = {
  readonly node: NodeKey;
  readonly attribute: PlainAttribute;
  /** Absent takes it away, its default then holds. */
  readonly value?: unknown;
};

/** Bits that the standard leaves free to use (OPC 10000-3 §8.57–8.59): reserved ones must stay zero. */
const ALLOWED_BITS: Readonly<Partial<Record<AttributeName, number>>> = {
  accessLevel: 0x3f7f,
  userAccessLevel: 0x3f7f,
  eventNotifier: 0x0d,
  accessRestrictions: 0x0f,
};

/** Problems: `attribute.value`, `attribute.reserved-bits`, `operation.*`. */
export function setAttribute(space: AddressSpace, context: CommandContext, intent: SetAttributeIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  const { node, attribute, value } = intent;
  const isGone = value === undefined && !isRequiredAttribute(attribute);
  if (!isGone && !isAttributeValue(attribute, value))
    draft.fail(problem("attribute.value", { attribute }, { node, attribute }));
  const allowed = ALLOWED_BITS[attribute];
  if (allowed !== undefined && typeof value === "number" && (value & ~allowed) !== 0) {
    draft.fail(problem("attribute.reserved-bits", { attribute, value }, { node, attribute }));
  }
  draft.set(node, attribute, value);
  return draft.finish();
}
