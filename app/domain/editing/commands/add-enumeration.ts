/**
 * Enumerations: a DataType below Enumeration with its Definition and the Property that repeats it for clients, EnumStrings
 * for values 0, 1, 2 … without gaps, else EnumValues (OPC 10000-3 §8.14, §5.8.3). `addEnumeration` makes one,
 * `setEnumerationFields` keeps Definition and Property in step.
 */
import type { AddressSpace } from "../../address-space/address-space";
import { findProperty } from "../../address-space/browse";
import type { DataTypeField, DataTypeNode } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import { qualifiedName, type LocalizedText } from "../../address-space/qualified-name";
import { StandardDataType } from "../../address-space/standard-ids";
import { findSupertype, isSubtypeOf } from "../../address-space/type-hierarchy";
import { problem, type Result } from "../../core/result";
import { SpaceDataTypes } from "../../nodeset/values/data-type-shapes";
import { makeEnumValues, makeTexts } from "../../nodeset/values/standard-values";
import { writeValue } from "../../nodeset/values/write-value";
import { EditDraft, type CommandContext, type Edit } from "../edit-draft";
import { checkInheritedFields } from "../inherited-fields";
import { keepUnnamed } from "../kept-fields";
import { addTypeTo } from "./add-type";
import { addStandardProperty, removeProperty } from "./set-unit";

export type EnumerationField = {
  readonly name: string;
  readonly value: number;
  readonly displayName?: readonly LocalizedText[];
  readonly description?: readonly LocalizedText[];
  /** Its name before, where this edit renames it. */
  readonly was?: string;
};

export type AddEnumerationIntent = {
  readonly name: string;
  readonly fields: readonly EnumerationField[];
  readonly description?: readonly LocalizedText[];
  /** Enumeration by default. */
  readonly supertype?: NodeKey;
};

/** Problems: `name.*`, `enumeration.no-fields`, `enumeration.name-taken`, `enumeration.value-taken`, `enumeration.value-range`, `enumeration.extends`. */
export function addEnumeration(
  space: AddressSpace,
  context: CommandContext,
  intent: AddEnumerationIntent,
): Result<Edit> {
  const draft = new EditDraft(space, context);
  checkFields(draft, intent.fields, intent.supertype);
  if (draft.hasFailed) return draft.finish();
  const name = qualifiedName(draft.ownNamespace, intent.name);
  const definition = { name, fields: intent.fields.map(toField) };
  const key = addTypeTo(
    draft,
    { ...intent, supertype: intent.supertype ?? StandardDataType.Enumeration },
    { definition },
  );
  if (key !== undefined) setFieldsProperty(draft, key, intent.fields);
  return draft.finish();
}

export type SetEnumerationFieldsIntent = { readonly dataType: NodeKey; readonly fields: readonly EnumerationField[] };

/** Problems: `enumeration.no-enumeration` and those of `addEnumeration`. */
export function setEnumerationFields(
  space: AddressSpace,
  context: CommandContext,
  intent: SetEnumerationFieldsIntent,
): Result<Edit> {
  const draft = new EditDraft(space, context);
  const node = space.getNode(intent.dataType);
  if (node?.nodeClass !== "DataType" || !isSubtypeOf(space, node.key, StandardDataType.Enumeration)) {
    draft.fail(problem("enumeration.no-enumeration", { node: intent.dataType }));
    return draft.finish();
  }
  checkFields(draft, intent.fields, findSupertype(space, node.key));
  draft.set(node.key, "definition", {
    ...getDefinition(node),
    fields: intent.fields.map((f) => keepUnnamed(node, f, toField(f))),
  });
  setFieldsProperty(draft, node.key, intent.fields);
  return draft.finish();
}

function getDefinition(node: DataTypeNode): NonNullable<DataTypeNode["definition"]> {
  return node.definition ?? { name: node.browseName, fields: [] };
}

function checkFields(draft: EditDraft, fields: readonly EnumerationField[], supertype: NodeKey | undefined): void {
  if (fields.length === 0) draft.fail(problem("enumeration.no-fields"));
  const names = new Set<string>();
  const values = new Set<number>();
  for (const { name, value } of fields) {
    if (name.trim() === "") draft.fail(problem("name.empty"));
    if (names.has(name)) draft.fail(problem("enumeration.name-taken", { name }));
    if (values.has(value)) draft.fail(problem("enumeration.value-taken", { value }));
    if (!Number.isInteger(value) || value < -2_147_483_648 || value > 2_147_483_647)
      draft.fail(problem("enumeration.value-range", { name, value }));
    names.add(name);
    values.add(value);
  }
  const extended = supertype === undefined ? undefined : checkInheritedFields(draft.space, supertype, fields);
  if (extended) draft.fail(extended);
}

function toField({ name, value, displayName, description }: EnumerationField): DataTypeField {
  return { name, value, ...(displayName ? { displayName } : {}), ...(description ? { description } : {}) };
}

/** Exactly one of the two Properties (§5.8.3). */
function setFieldsProperty(draft: EditDraft, key: NodeKey, fields: readonly EnumerationField[]): void {
  if (draft.hasFailed) return;
  const ranked = [...fields].sort((a, b) => a.value - b.value);
  const isPlain = ranked.every((field, i) => field.value === i);
  const texts = ranked.map((field): LocalizedText => field.displayName?.[0] ?? { text: field.name });
  const variant = isPlain
    ? makeTexts(texts)
    : makeEnumValues(
        ranked.map((field, i) => ({ value: field.value, displayName: texts[i] as LocalizedText, ...describe(field) })),
      );
  const name = isPlain ? "EnumStrings" : "EnumValues";
  removeProperty(draft, key, isPlain ? "EnumValues" : "EnumStrings");
  setListProperty(
    draft,
    key,
    { name, dataType: isPlain ? StandardDataType.LocalizedText : StandardDataType.EnumValueType },
    variant,
  );
}

function describe(field: EnumerationField): { description?: LocalizedText } {
  const first = field.description?.[0];
  return first ? { description: first } : {};
}

/** Sets a one-dimensional Property of the standard, or makes it. */
export function setListProperty(
  draft: EditDraft,
  parent: NodeKey,
  property: { readonly name: string; readonly dataType: NodeKey },
  variant: Parameters<typeof writeValue>[0],
): void {
  const node = draft.space.getNode(parent);
  if (draft.hasFailed || !node) return;
  const value = writeValue(variant, new SpaceDataTypes(draft.space));
  const known = findProperty(draft.space, parent, property.name);
  if (known) draft.set(known.key, "value", value);
  else addStandardProperty(draft, node, { ...property, attributes: { value, valueRank: 1, arrayDimensions: "0" } });
}
