/**
 * Edits of a DataType as a whole: `setBaseType` hangs it below another DataType of the same kind, `setAbstract` takes the
 * encodings of a structure away or makes and numbers them (OPC 10000-3 §5.8.4: abstract DataTypes have no encodings).
 */
import type { AddressSpace } from "../../address-space/address-space";
import type { NodeKey } from "../../address-space/node-id";
import { StandardDataType, StandardReferenceType } from "../../address-space/standard-ids";
import { findSupertype, isSubtypeOf } from "../../address-space/type-hierarchy";
import { problem, type Problem, type Result } from "../../core/result";
import { checkInheritedFields } from "../inherited-fields";
import { EditDraft, type CommandContext, type Edit } from "../edit-draft";
import { addEncodings, listEncodings } from "./add-structure";
import { deleteNodesOn } from "./delete-nodes";

const { HasSubtype } = StandardReferenceType;

export type SetBaseTypeIntent = { readonly dataType: NodeKey; readonly supertype: NodeKey };

/** Problems: `data-type.no-data-type`, `data-type.own-subtype`, `data-type.other-kind`, those of inherited fields. */
export function setBaseType(space: AddressSpace, context: CommandContext, intent: SetBaseTypeIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  const { dataType, supertype } = intent;
  const old = findSupertype(space, dataType);
  const found = findObstacle(space, intent);
  if (found) draft.fail(found);
  else if (old !== supertype) {
    if (old !== undefined) draft.removeReference({ source: old, type: HasSubtype, target: dataType });
    draft.addReference({ source: supertype, type: HasSubtype, target: dataType }, "target");
  }
  return draft.finish();
}

/** DataTypes whose values are of different kinds; a type stays below its own. */
const KINDS = [
  StandardDataType.Union,
  StandardDataType.OptionSet,
  StandardDataType.Structure,
  StandardDataType.Enumeration,
] as const;

function findObstacle(space: AddressSpace, { dataType, supertype }: SetBaseTypeIntent): Problem | undefined {
  const node = space.getNode(dataType);
  if (node?.nodeClass !== "DataType" || space.getNode(supertype)?.nodeClass !== "DataType")
    return problem("data-type.no-data-type", { node: node?.nodeClass === "DataType" ? supertype : dataType });
  if (isSubtypeOf(space, supertype, dataType)) return problem("data-type.own-subtype", { node: supertype });
  const kindOf = (key: NodeKey): NodeKey | undefined => KINDS.find((kind) => isSubtypeOf(space, key, kind));
  if (kindOf(dataType) !== kindOf(supertype)) return problem("data-type.other-kind", { node: dataType, supertype });
  return checkInheritedFields(space, supertype, node.definition?.isOptionSet ? [] : (node.definition?.fields ?? []));
}

export type SetAbstractIntent = { readonly dataType: NodeKey; readonly isAbstract: boolean };

/** Problem: `data-type.no-data-type`. */
export function setAbstract(space: AddressSpace, context: CommandContext, intent: SetAbstractIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  const { dataType, isAbstract } = intent;
  if (space.getNode(dataType)?.nodeClass !== "DataType") {
    draft.fail(problem("data-type.no-data-type", { node: dataType }));
    return draft.finish();
  }
  draft.set(dataType, "isAbstract", isAbstract ? true : undefined);
  if (isSubtypeOf(space, dataType, StandardDataType.Structure)) {
    if (isAbstract) deleteNodesOn(draft, listEncodings(space, dataType));
    else addEncodings(draft, dataType);
  }
  return draft.finish();
}
