/** Commands that add types: `addType` below any supertype of the same class; the class follows from the supertype. */
import type { AddressSpace } from "../../address-space/address-space";
import { hasValueAttributes, isTypeNode, type DeclaredReference, type Node } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import { qualifiedName, type LocalizedText } from "../../address-space/qualified-name";
import { StandardReferenceType } from "../../address-space/standard-ids";
import { problem, type Result } from "../../core/result";
import { EditDraft, type CommandContext, type Edit } from "../edit-draft";
import { checkName, checkTypeName } from "../names";

export type AddTypeIntent = {
  /** An ObjectType, VariableType, DataType or ReferenceType of the own or a required model. */
  readonly supertype: NodeKey;
  readonly name: string;
  readonly isAbstract?: boolean;
  readonly description?: readonly LocalizedText[];
  /** ReferenceTypes only: the name from target to source; needed unless it is symmetric (OPC 10000-3 §5.3.2). */
  readonly inverseName?: readonly LocalizedText[];
  readonly symmetric?: boolean;
  /** VariableTypes only; inherited from the supertype by default. */
  readonly dataType?: NodeKey;
  readonly valueRank?: number;
  readonly arrayDimensions?: string;
};

/**
 * Derives a type. A VariableType starts with the DataType, ValueRank and ArrayDimensions of its supertype, which it may
 * only narrow. Problems: `type.no-supertype`, `type.inverse-name-missing`, `name.*`.
 */
export function addType(space: AddressSpace, context: CommandContext, intent: AddTypeIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  addTypeTo(draft, intent);
  return draft.finish();
}

/** The same on a draft; undefined when it failed. `attributes` are further ones of the class. */
export function addTypeTo(
  draft: EditDraft,
  intent: AddTypeIntent,
  attributes: Readonly<Record<string, unknown>> = {},
): NodeKey | undefined {
  const supertype = draft.space.getNode(intent.supertype);
  const browseName = qualifiedName(draft.ownNamespace, intent.name);
  const found =
    checkName(intent.name) ??
    (supertype && isTypeNode(supertype) ? undefined : problem("type.no-supertype", { node: intent.supertype })) ??
    checkTypeName(draft.space, browseName) ??
    (supertype && checkInverseName(supertype, intent));
  if (found || !supertype) {
    if (found) draft.fail(found);
    return undefined;
  }
  const references: DeclaredReference[] = [
    { type: StandardReferenceType.HasSubtype, target: supertype.key, isForward: false },
  ];
  return draft.add({
    nodeClass: supertype.nodeClass,
    browseName,
    ...(intent.description ? { description: intent.description } : {}),
    references,
    attributes: {
      ...(intent.isAbstract ? { isAbstract: true } : {}),
      ...listClassAttributes(supertype, intent),
      ...attributes,
    },
  });
}

function checkInverseName(supertype: Node, intent: AddTypeIntent): ReturnType<typeof checkName> {
  if (supertype.nodeClass !== "ReferenceType" || intent.symmetric) return undefined;
  const hasName = intent.inverseName?.some((text) => text.text.trim() !== "");
  return hasName ? undefined : problem("type.inverse-name-missing", { name: intent.name });
}

function listClassAttributes(supertype: Node, intent: AddTypeIntent): Record<string, unknown> {
  if (supertype.nodeClass === "ReferenceType") {
    return intent.symmetric ? { symmetric: true } : { inverseName: intent.inverseName };
  }
  if (!hasValueAttributes(supertype)) return {};
  return {
    dataType: intent.dataType ?? supertype.dataType,
    valueRank: intent.valueRank ?? supertype.valueRank,
    arrayDimensions: intent.arrayDimensions ?? supertype.arrayDimensions,
  };
}
