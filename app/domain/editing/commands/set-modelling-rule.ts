/** `setModellingRule`: the rule of an Object, Variable or Method (OPC 10000-3 §6.4.4, §7.12). */
import type { AddressSpace } from "../../address-space/address-space";
import { isPlaceholder } from "../../address-space/instance-declarations";
import type { NodeKey } from "../../address-space/node-id";
import { StandardReferenceType } from "../../address-space/standard-ids";
import { problem, type Result } from "../../core/result";
import { EditDraft, type CommandContext, type Edit } from "../edit-draft";
import { checkReference } from "../lawful-references";

export type SetModellingRuleIntent = {
  readonly node: NodeKey;
  /** Absent takes the rule away. */ readonly rule?: NodeKey;
};

/** Hint `rule.placeholder-name` where a placeholder's name is not in angle brackets. Problems: `reference.*`, `operation.*`. */
export function setModellingRule(
  space: AddressSpace,
  context: CommandContext,
  { node, rule }: SetModellingRuleIntent,
): Result<Edit> {
  const draft = new EditDraft(space, context);
  const type = StandardReferenceType.HasModellingRule;
  const known = space.edgesFrom(node).filter((e) => e.type === type);
  if (known.length === 1 && known[0]?.target === rule) return draft.finish();
  for (const edge of known) draft.removeReference(edge);
  if (rule === undefined) return draft.finish();
  const refused = checkReference(draft.space, node, type, rule);
  if (refused) draft.fail(refused);
  draft.addReference({ source: node, type, target: rule }, "source");
  const name = space.getNode(node)?.browseName.name ?? "";
  if (isPlaceholder(rule) && !/^<.*>$/s.test(name))
    draft.note(problem.hint("rule.placeholder-name", { name }, { node }));
  return draft.finish();
}
