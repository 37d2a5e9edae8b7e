/** `setIdPolicy`: how the model chooses NodeIds from now on. Nodes that are there keep theirs; see `renumberNodes`. */
import type { AddressSpace } from "../../address-space/address-space";
import { checkIdPolicy, type IdPolicy } from "../../address-space/id-policy";
import type { Result } from "../../core/result";
import { EditDraft, type CommandContext, type Edit } from "../edit-draft";

export type SetIdPolicyIntent = { readonly policy: IdPolicy };

/** Problems: those of `checkIdPolicy`. */
export function setIdPolicy(space: AddressSpace, context: CommandContext, { policy }: SetIdPolicyIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  for (const found of checkIdPolicy(policy)) draft.fail(found);
  if (JSON.stringify(space.own.header.idPolicy) !== JSON.stringify(policy))
    draft.do({ kind: "setHeader", field: "idPolicy", value: policy });
  return draft.finish();
}
