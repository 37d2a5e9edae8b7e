/**
 * Commands that add members: `addObject`, `addVariable`, `addProperty`, `addMethod`. Below a type or an instance
 * declaration the member gets a modelling rule (Mandatory unless another is wished), below an instance none. Members that
 * the type definition makes mandatory are made too.
 */
import type { AddressSpace } from "../../address-space/address-space";
import type { DeclaredReference } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import { qualifiedName, type LocalizedText } from "../../address-space/qualified-name";
import { StandardDataType, StandardType } from "../../address-space/standard-ids";
import { problem, type Result } from "../../core/result";
import { addInstance, type InstantiateIntent } from "../../instantiation/instantiate";
import type { EUInformation, Range } from "../../nodeset/values/standard-values";
import type { Variant } from "../../nodeset/values/variant";
import { EditDraft, type CommandContext, type Edit } from "../edit-draft";
import { checkName, checkSiblingName } from "../names";
import { placeChild } from "../placement";
import { setRangeOn, setUnitOn } from "./set-unit";
import { setMethodArgumentsOn, type ArgumentIntent } from "./set-method-arguments";
import { toDimensionsText } from "./set-value-rank";
import { setValueOn } from "./set-value";

type MemberIntent = Pick<
  InstantiateIntent,
  "parent" | "name" | "namespaceUri" | "referenceType" | "rule" | "displayName" | "description"
>;

export type AddObjectIntent = MemberIntent &
  Pick<InstantiateIntent, "optional" | "named" | "methods" | "interfaces"> & {
    /** BaseObjectType by default. */
    readonly typeDefinition?: NodeKey;
  };

/** Problems as `instantiate`. */
export function addObject(space: AddressSpace, context: CommandContext, intent: AddObjectIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  addInstance(draft, { ...intent, type: intent.typeDefinition ?? StandardType.BaseObjectType });
  return draft.finish();
}

export type AddVariableIntent = MemberIntent &
  Pick<InstantiateIntent, "optional" | "named"> & {
    /** BaseDataVariableType by default. */
    readonly typeDefinition?: NodeKey;
    /** The type definition's by default. */
    readonly dataType?: NodeKey;
    readonly valueRank?: number;
    readonly arrayDimensions?: readonly number[];
    readonly accessLevel?: number;
    readonly value?: Variant;
    /** Sets or makes the Properties EngineeringUnits and EURange. */
    readonly unit?: EUInformation;
    readonly range?: Range;
  };

/** Problems as `instantiate`, `setUnit`, `setRange`, `setValue`. */
export function addVariable(space: AddressSpace, context: CommandContext, intent: AddVariableIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  addVariableTo(draft, intent);
  return draft.finish();
}

function addVariableTo(draft: EditDraft, intent: AddVariableIntent): NodeKey | undefined {
  const type = intent.typeDefinition ?? StandardType.BaseDataVariableType;
  const key = addInstance(draft, { ...intent, type, attributes: listValueAttributes(intent) });
  if (key === undefined) return undefined;
  if (intent.value) setValueOn(draft, key, intent.value);
  if (intent.unit) setUnitOn(draft, key, intent.unit);
  if (intent.range) setRangeOn(draft, key, intent.range);
  return key;
}

function listValueAttributes(intent: AddVariableIntent): Record<string, unknown> {
  const { dataType, valueRank, arrayDimensions, accessLevel } = intent;
  const attributes: Record<string, unknown> = {};
  if (dataType !== undefined) attributes["dataType"] = dataType;
  if (valueRank !== undefined && valueRank !== -1) attributes["valueRank"] = valueRank;
  if (valueRank !== undefined || arrayDimensions)
    attributes["arrayDimensions"] = toDimensionsText(valueRank ?? -1, arrayDimensions);
  if (accessLevel !== undefined) attributes["accessLevel"] = accessLevel;
  return attributes;
}

export type AddPropertyIntent = Omit<
  AddVariableIntent,
  "typeDefinition" | "unit" | "range" | "optional" | "named" | "referenceType"
>;

/** A Property: PropertyType by HasProperty, String by default. */
export function addProperty(space: AddressSpace, context: CommandContext, intent: AddPropertyIntent): Result<Edit> {
  const dataType = intent.dataType ?? StandardDataType.String;
  return addVariable(space, context, { ...intent, dataType, typeDefinition: StandardType.PropertyType });
}

export type AddMethodIntent = MemberIntent & {
  readonly inputArguments?: readonly ArgumentIntent[];
  readonly outputArguments?: readonly ArgumentIntent[];
};

/** A Method with its argument Properties. Problems: `name.*`, `reference.*`, `argument.*`. */
export function addMethod(space: AddressSpace, context: CommandContext, intent: AddMethodIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  const key = addMethodTo(draft, intent);
  if (key !== undefined)
    setMethodArgumentsOn(draft, key, { input: intent.inputArguments ?? [], output: intent.outputArguments ?? [] });
  return draft.finish();
}

function addMethodTo(draft: EditDraft, intent: AddMethodIntent): NodeKey | undefined {
  const parent = draft.space.getNode(intent.parent);
  const browseName = qualifiedName(intent.namespaceUri ?? draft.ownNamespace, intent.name);
  const placement = parent && placeChild(draft.space, parent, { nodeClass: "Method" }, intent);
  const found = checkName(intent.name) ?? checkSiblingName(draft.space, intent.parent, browseName);
  if (found) draft.fail(found);
  else if (!placement) draft.fail(problem("operation.node-missing", { node: intent.parent }));
  else if (!placement.ok) draft.fail(placement.problem);
  if (draft.hasFailed || !placement?.ok) return undefined;
  const references: DeclaredReference[] = [...placement.references, ...placement.rules];
  return draft.add({
    nodeClass: "Method",
    browseName,
    ...listTexts(intent),
    references,
    attributes: { parent: intent.parent },
  });
}

function listTexts(intent: MemberIntent): {
  displayName?: readonly LocalizedText[];
  description?: readonly LocalizedText[];
} {
  return {
    ...(intent.displayName ? { displayName: intent.displayName } : {}),
    ...(intent.description ? { description: intent.description } : {}),
  };
}
