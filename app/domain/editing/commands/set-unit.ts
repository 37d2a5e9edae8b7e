/**
 * `setUnit` and `setRange`: the Properties EngineeringUnits and EURange of a Variable (OPC 10000-8 §5.3.2, §5.6). They are
 * made where they are missing, with the types of the standard and the rule of the Variable's place.
 */
import type { AddressSpace } from "../../address-space/address-space";
import { findProperty } from "../../address-space/browse";
import { getDataType, type Node } from "../../address-space/node";
import { OPC_UA_NAMESPACE, type NodeKey } from "../../address-space/node-id";
import { qualifiedName } from "../../address-space/qualified-name";
import { StandardDataType, StandardReferenceType, StandardType } from "../../address-space/standard-ids";
import { isSubtypeOf } from "../../address-space/type-hierarchy";
import { problem, type Problem, type Result } from "../../core/result";
import { SpaceDataTypes } from "../../nodeset/values/data-type-shapes";
import { makeEuInformation, makeRange, type EUInformation, type Range } from "../../nodeset/values/standard-values";
import type { Variant } from "../../nodeset/values/variant";
import { writeValue } from "../../nodeset/values/write-value";
import { EditDraft, type CommandContext, type Edit } from "../edit-draft";
import { placeChild } from "../placement";
import { deleteNodesOn } from "./delete-nodes";

export type SetUnitIntent = {
  readonly variable: NodeKey;
  /** Absent takes the Property away. */ readonly unit?: EUInformation;
};
export type SetRangeIntent = { readonly variable: NodeKey; readonly range?: Range };

/** Problems: `unit.no-variable`, `unit.not-numeric`, those of apply. */
export function setUnit(space: AddressSpace, context: CommandContext, intent: SetUnitIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  if (intent.unit) setUnitOn(draft, intent.variable, intent.unit);
  else removeProperty(draft, intent.variable, "EngineeringUnits");
  return draft.finish();
}

/** Problems: `unit.no-variable`, `unit.not-numeric`, `range.order`, `range.not-finite`. */
export function setRange(space: AddressSpace, context: CommandContext, intent: SetRangeIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  if (intent.range) setRangeOn(draft, intent.variable, intent.range);
  else removeProperty(draft, intent.variable, "EURange");
  return draft.finish();
}

export function setUnitOn(draft: EditDraft, variable: NodeKey, unit: EUInformation): void {
  setPropertyOn(draft, variable, {
    name: "EngineeringUnits",
    dataType: StandardDataType.EUInformation,
    value: makeEuInformation(unit),
  });
}

export function setRangeOn(draft: EditDraft, variable: NodeKey, range: Range): void {
  if (!Number.isFinite(range.low) || !Number.isFinite(range.high)) draft.fail(problem("range.not-finite"));
  else if (range.low > range.high) draft.fail(problem("range.order", { low: range.low, high: range.high }));
  setPropertyOn(draft, variable, { name: "EURange", dataType: StandardDataType.Range, value: makeRange(range) });
}

type StandardProperty = { readonly name: string; readonly dataType: NodeKey; readonly value: Variant };

function setPropertyOn(draft: EditDraft, variable: NodeKey, property: StandardProperty): void {
  if (draft.hasFailed) return;
  const node = draft.space.getNode(variable);
  const found = checkNumeric(draft.space, node, variable);
  if (found || !node) {
    if (found) draft.fail(found);
    return;
  }
  const known = findProperty(draft.space, variable, property.name);
  const value = writeValue(property.value, new SpaceDataTypes(draft.space));
  if (known) draft.set(known.key, "value", value);
  else addStandardProperty(draft, node, { ...property, attributes: { value } });
}

/** Numbers have units (OPC 10000-8 §5.3.2); so may a structure and what is still abstract. */
function checkNumeric(space: AddressSpace, node: Node | undefined, key: NodeKey): Problem | undefined {
  if (node?.nodeClass !== "Variable" && node?.nodeClass !== "VariableType")
    return problem("unit.no-variable", { node: key });
  const dataType = getDataType(node);
  const fits =
    dataType === StandardDataType.BaseDataType ||
    isSubtypeOf(space, dataType, StandardDataType.Number) ||
    isSubtypeOf(space, dataType, StandardDataType.Structure);
  return fits ? undefined : problem("unit.not-numeric", { name: node.browseName.name }, { node: key });
}

export type NewStandardProperty = {
  readonly name: string;
  readonly dataType: NodeKey;
  readonly attributes?: Readonly<Record<string, unknown>>;
};

/** Adds a Property whose BrowseName is the standard's; below types and declarations with a modelling rule. */
export function addStandardProperty(
  draft: EditDraft,
  parent: Node,
  property: NewStandardProperty,
): NodeKey | undefined {
  const child = { nodeClass: "Variable", typeDefinition: StandardType.PropertyType } as const;
  const placement = placeChild(draft.space, parent, child, {});
  if (!placement.ok) {
    draft.fail(placement.problem);
    return undefined;
  }
  const definition = {
    type: StandardReferenceType.HasTypeDefinition,
    target: StandardType.PropertyType,
    isForward: true,
  };
  return draft.add({
    nodeClass: "Variable",
    browseName: qualifiedName(OPC_UA_NAMESPACE, property.name),
    references: [...placement.references, definition, ...placement.rules],
    attributes: { parent: parent.key, dataType: property.dataType, ...property.attributes },
  });
}

export function removeProperty(draft: EditDraft, parent: NodeKey, name: string): void {
  const known = findProperty(draft.space, parent, name);
  if (known) deleteNodesOn(draft, [known.key], { allowUses: true });
}
