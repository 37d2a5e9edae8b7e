/** Variants of the standard's structures that engineers edit by name (OPC 10000-8 §5.6, OPC 10000-3 §8.6, §8.14). */
import type { NodeId, NodeKey } from "../../address-space/node-id";
import type { LocalizedText } from "../../address-space/qualified-name";
import { StandardDataType } from "../../address-space/standard-ids";
import { array, scalar, structure, type StructureValue, type Variant } from "./variant";

/** OPC 10000-8 §5.6.3: `unitId` −1 where there is none. */
export type EUInformation = {
  readonly namespaceUri: string;
  readonly unitId: number;
  readonly displayName: LocalizedText;
  readonly description: LocalizedText;
};

/** OPC 10000-8 §5.6.2. */
export type Range = { readonly low: number; readonly high: number };

/** OPC 10000-3 §8.6. `dataType` is the NodeId, since a value in a file names no keys. */
export type Argument = {
  readonly name: string;
  readonly dataType: NodeId;
  readonly valueRank: number;
  readonly arrayDimensions?: readonly number[];
  readonly description?: LocalizedText;
};

/** OPC 10000-3 §8.14. */
export type EnumValue = {
  readonly value: number | bigint;
  readonly displayName: LocalizedText;
  readonly description?: LocalizedText;
};

export function makeEuInformation(unit: EUInformation): Variant {
  return toVariant(
    structure(StandardDataType.EUInformation, {
      NamespaceUri: scalar("String", unit.namespaceUri),
      UnitId: scalar("Int32", unit.unitId),
      DisplayName: scalar("LocalizedText", unit.displayName),
      Description: scalar("LocalizedText", unit.description),
    }),
  );
}

export function makeRange(range: Range): Variant {
  return toVariant(
    structure(StandardDataType.Range, { Low: scalar("Double", range.low), High: scalar("Double", range.high) }),
  );
}

export function makeArguments(list: readonly Argument[]): Variant {
  return array(
    "ExtensionObject",
    list.map((argument) =>
      structure(StandardDataType.Argument, {
        Name: scalar("String", argument.name),
        DataType: scalar("NodeId", argument.dataType),
        ValueRank: scalar("Int32", argument.valueRank),
        ArrayDimensions: array("UInt32", argument.arrayDimensions ?? []),
        Description: scalar("LocalizedText", argument.description ?? { text: "" }),
      }),
    ),
  );
}

export function makeEnumValues(values: readonly EnumValue[]): Variant {
  return array(
    "ExtensionObject",
    values.map((entry) =>
      structure(StandardDataType.EnumValueType, {
        Value: scalar("Int64", BigInt(entry.value)),
        DisplayName: scalar("LocalizedText", entry.displayName),
        Description: scalar("LocalizedText", entry.description ?? { text: "" }),
      }),
    ),
  );
}

export function makeTexts(texts: readonly LocalizedText[]): Variant {
  return array("LocalizedText", texts);
}

function toVariant(value: StructureValue): Variant {
  return scalar("ExtensionObject", value);
}

/** The typed contents of the same structures; undefined where the Variant is something else. */
export function findEuInformation(variant: Variant | undefined): EUInformation | undefined {
  const fields = findFields(variant, StandardDataType.EUInformation);
  if (!fields) return undefined;
  return {
    namespaceUri: getText(fields["NamespaceUri"]),
    unitId: getNumber(fields["UnitId"]),
    displayName: getLocalizedText(fields["DisplayName"]),
    description: getLocalizedText(fields["Description"]),
  };
}

export function findRange(variant: Variant | undefined): Range | undefined {
  const fields = findFields(variant, StandardDataType.Range);
  return fields && { low: getNumber(fields["Low"]), high: getNumber(fields["High"]) };
}

export function findArguments(variant: Variant | undefined): Argument[] | undefined {
  return findStructures(variant, StandardDataType.Argument)?.map((fields) => ({
    name: getText(fields["Name"]),
    dataType: getNodeId(fields["DataType"]),
    valueRank: getNumber(fields["ValueRank"]),
    arrayDimensions: getNumbers(fields["ArrayDimensions"]),
    description: getLocalizedText(fields["Description"]),
  }));
}

export function findEnumValues(variant: Variant | undefined): EnumValue[] | undefined {
  return findStructures(variant, StandardDataType.EnumValueType)?.map((fields) => ({
    value: getNumber(fields["Value"]),
    displayName: getLocalizedText(fields["DisplayName"]),
    description: getLocalizedText(fields["Description"]),
  }));
}

type Fields = StructureValue["fields"];

function findFields(variant: Variant | undefined, dataType: NodeKey): Fields | undefined {
  if (variant?.type !== "ExtensionObject" || variant.shape !== "scalar") return undefined;
  return variant.value?.kind === "structure" && variant.value.dataType === dataType ? variant.value.fields : undefined;
}

function findStructures(variant: Variant | undefined, dataType: NodeKey): Fields[] | undefined {
  if (variant?.type !== "ExtensionObject" || variant.shape !== "array") return undefined;
  const found = variant.values.flatMap((v) => (v?.kind === "structure" && v.dataType === dataType ? [v.fields] : []));
  return found.length === variant.values.length ? found : undefined;
}

function getText(variant: Variant | undefined): string {
  return variant?.type === "String" && variant.shape === "scalar" ? (variant.value ?? "") : "";
}

function getNumber(variant: Variant | undefined): number {
  const value = variant?.shape === "scalar" ? variant.value : undefined;
  return typeof value === "number" || typeof value === "bigint" ? Number(value) : 0;
}

function getNumbers(variant: Variant | undefined): number[] {
  return variant?.type === "UInt32" && variant.shape === "array" ? [...variant.values] : [];
}

function getLocalizedText(variant: Variant | undefined): LocalizedText {
  return variant?.type === "LocalizedText" && variant.shape === "scalar" && variant.value
    ? variant.value
    : { text: "" };
}

function getNodeId(variant: Variant | undefined): NodeId {
  const fallback: NodeId = { namespaceUri: "http://opcfoundation.org/UA/", type: "i", identifier: 0 };
  return variant?.type === "NodeId" && variant.shape === "scalar" ? variant.value : fallback;
}
