/** Enumerations and option sets as DataTypes tell them (OPC 10000-3 §5.8.3, §8.14, §8.40). */
import type { DataTypeField, DataTypeNode, Node, VariableNode } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import { findText } from "../address-space/qualified-name";
import { StandardDataType as D } from "../address-space/standard-ids";
import type { CheckContext } from "./check-context";
import type { ExampleModel } from "./example-model";
import { localizedTexts } from "./example-values";
import { findStandardProperty, isKindOf, listSupertypes } from "./lookups";
import { findValueRoot, listBodies, textOf } from "./value-xml";

export function isEnumeration(ctx: CheckContext, key: NodeKey): boolean {
  return listSupertypes(ctx, key).includes(D.Enumeration);
}

/** A bit mask of an UInteger type: its Definition says so, or it has OptionSetValues. */
export function isBitMask(node: DataTypeNode, ctx: CheckContext): boolean {
  if (!isKindOf(ctx, node.key, D.UInteger) || node.key === D.UInteger) return false;
  return node.definition?.isOptionSet === true || findStandardProperty(ctx, node.key, "OptionSetValues") !== undefined;
}

/** A concrete subtype of the OptionSet structure. */
export function isOptionSet(node: DataTypeNode, ctx: CheckContext): boolean {
  return listSupertypes(ctx, node.key).includes(D.OptionSet) && node.isAbstract !== true;
}

/** The value of a field; left out it counts as −1, the schema's default. */
export function valueOf(field: DataTypeField): number {
  return field.value ?? -1;
}

export function findVariable(ctx: CheckContext, key: NodeKey, property: string): VariableNode | undefined {
  const node: Node | undefined = findStandardProperty(ctx, key, property);
  return node?.nodeClass === "Variable" ? node : undefined;
}

/** Pairs of an EnumValues value. */
export function listEnumValues(property: VariableNode): { value: string; text: string }[] {
  return listBodies(property.value, "EnumValueType").map((body) => ({
    value: textOf(body, "Value") || "0",
    text: textOf(body, "DisplayName", "Text"),
  }));
}

/** Texts of an EnumStrings or OptionSetValues value; undefined where there is no value. */
export function listTexts(property: VariableNode): string[] | undefined {
  return findValueRoot(property.value)?.children.map((c) => textOf(c, "Text"));
}

/** The text for people of a field: DisplayName, else its name. */
export function fieldText(field: DataTypeField): string {
  return findText(field.displayName ?? []) ?? field.name;
}

/** For examples: an enumeration with EnumStrings. */
export function addEnumeration(
  m: ExampleModel,
  name: string,
  fields: readonly { name: string; value?: number }[],
  texts?: readonly string[],
): NodeKey {
  const type = m.dataType(name, { supertype: D.Enumeration, definition: { fields } });
  m.property("0:EnumStrings", {
    parent: type,
    dataType: D.LocalizedText,
    valueRank: 1,
    arrayDimensions: "0",
    value: localizedTexts(...(texts ?? fields.map((f) => f.name))),
  });
  return type;
}
