/** Definitions of DataTypes and arguments of Methods, each as one change. */
import type { AddressSpace } from "../address-space/address-space";
import { findProperty } from "../address-space/browse";
import { hasValueAttributes, type DataTypeField, type DataTypeNode } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import { StandardDataType } from "../address-space/standard-ids";
import { isSubtypeOf } from "../address-space/type-hierarchy";
import type { ChangeKind } from "./change";
import { isSameXml, readXmlText } from "./compare-xml";
import { formatTexts, nameOf } from "./describe-facts";
import type { NodeMatch, NodePair } from "./match-nodes";
import { ratings, type Rating } from "./ratings";

export type Difference = {
  readonly kind: ChangeKind;
  readonly detail?: string;
  readonly rating: Rating;
  readonly before: string | null;
  readonly after: string | null;
};

type Sides = { readonly before: AddressSpace; readonly after: AddressSpace; readonly match: NodeMatch };

/** Enumerations and option sets by value, structures by field; texts alone are neutral. */
export function compareDefinitions(sides: Sides, pair: NodePair): Difference[] {
  const [old, now] = [pair.before, pair.after];
  if (old.nodeClass !== "DataType" || now.nodeClass !== "DataType") return [];
  const isEnumeration = isSubtypeOf(sides.after, now.key, StandardDataType.Enumeration);
  const isOptionSet = (old.definition?.isOptionSet ?? now.definition?.isOptionSet) === true;
  const format =
    isEnumeration || isOptionSet
      ? formatEnumField
      : (f: DataTypeField, s: AddressSpace) => formatField(f, s, sides.match, s === sides.before);
  const [left, right] = [listFields(old, sides.before, format), listFields(now, sides.after, format)];
  const kind = isEnumeration || isOptionSet ? "enumeration-changed" : "structure-changed";
  if (left.join("\n") !== right.join("\n")) {
    const rating = isOptionSet ? ratings.optionSet : isEnumeration ? ratings.enumeration : ratings.structure;
    return [{ kind, rating, before: left.join("; ") || null, after: right.join("; ") || null }];
  }
  if (!isSameFieldTexts(old, now) || !isSameEnumTexts(sides, pair)) {
    return [
      {
        kind,
        detail: "texts",
        rating: ratings.enumerationText,
        before: formatFieldTexts(old),
        after: formatFieldTexts(now),
      },
    ];
  }
  return [];
}

function listFields(
  node: DataTypeNode,
  space: AddressSpace,
  format: (field: DataTypeField, space: AddressSpace) => string,
): string[] {
  const flags = [node.definition?.isUnion ? "union" : "", node.definition?.isOptionSet ? "option set" : ""].filter(
    Boolean,
  );
  return [...flags, ...(node.definition?.fields ?? []).map((field) => format(field, space))];
}

function formatEnumField(field: DataTypeField): string {
  return `${field.value ?? -1} ${field.name}`;
}

function formatField(field: DataTypeField, space: AddressSpace, match: NodeMatch, isBefore: boolean): string {
  const type = field.dataType ?? StandardDataType.BaseDataType;
  const rank = field.valueRank ?? -1;
  const dimensions = field.arrayDimensions
    ? `[${field.arrayDimensions}]`
    : rank >= 0
      ? "[]".repeat(Math.max(1, rank))
      : "";
  const flags = `${field.isOptional ? " optional" : ""}${field.allowSubTypes ? " or subtypes" : ""}`;
  return `${field.name}: ${nameOf(space, type)}${dimensions}${flags}${isBefore || match.toAfter(type) === type ? "" : " "}`;
}

function isSameFieldTexts(old: DataTypeNode, now: DataTypeNode): boolean {
  return formatFieldTexts(old) === formatFieldTexts(now);
}

function formatFieldTexts(node: DataTypeNode): string | null {
  const fields = node.definition?.fields ?? [];
  return (
    fields.map((f) => `${f.name} ${formatTexts(f.displayName) ?? ""} ${formatTexts(f.description) ?? ""}`).join("; ") ||
    null
  );
}

const ENUM_PROPERTIES = ["EnumStrings", "EnumValues", "OptionSetValues"];

function isSameEnumTexts(sides: Sides, pair: NodePair): boolean {
  return ENUM_PROPERTIES.every((name) => {
    const [old, now] = [
      findProperty(sides.before, pair.before.key, name),
      findProperty(sides.after, pair.after.key, name),
    ];
    const valueOf = (node: typeof old) => (node && hasValueAttributes(node) ? node.value : undefined);
    return isSameXml(valueOf(old), valueOf(now));
  });
}

/** Whether this Property belongs to its owner's definition and is told there. */
export function isDefinitionProperty(name: string): boolean {
  return ENUM_PROPERTIES.includes(name);
}

const ARGUMENT_PROPERTIES = ["InputArguments", "OutputArguments"] as const;

export function isArgumentProperty(name: string): boolean {
  return name === "InputArguments" || name === "OutputArguments";
}

/** Arguments by order, name, type and rank; a change of their descriptions alone is neutral. */
export function compareArguments(sides: Sides, pair: NodePair): Difference[] {
  if (pair.before.nodeClass !== "Method" || pair.after.nodeClass !== "Method") return [];
  return ARGUMENT_PROPERTIES.flatMap((name): Difference[] => {
    const [old, now] = [
      readArguments(sides.before, pair.before.key, name),
      readArguments(sides.after, pair.after.key, name),
    ];
    if (old.signature !== now.signature) {
      return [
        {
          kind: "arguments-changed",
          detail: name,
          rating: ratings.arguments,
          before: old.signature,
          after: now.signature,
        },
      ];
    }
    if (old.texts === now.texts) return [];
    return [
      {
        kind: "arguments-changed",
        detail: `${name}: description`,
        rating: ratings.argumentText,
        before: old.texts,
        after: now.texts,
      },
    ];
  });
}

function readArguments(
  space: AddressSpace,
  method: NodeKey,
  name: string,
): { signature: string | null; texts: string | null } {
  const property = findProperty(space, method, name);
  const body = property && hasValueAttributes(property) && property.value ? readXmlText(property.value) : undefined;
  if (!body) return { signature: null, texts: null };
  const signatures: string[] = [];
  const texts: string[] = [];
  const visit = (e: NonNullable<typeof body>): void => {
    if (e.name !== "Argument") return e.children.forEach(visit);
    const child = (n: string): string => e.children.find((c) => c.name === n)?.text.trim() ?? "";
    const typeId =
      e.children
        .find((c) => c.name === "DataType")
        ?.children.find((c) => c.name === "Identifier")
        ?.text.trim() ?? "";
    const rank = child("ValueRank") || "-1";
    signatures.push(
      `${child("Name")}: ${nameOf(space, typeId as NodeKey) ?? typeId}${rank === "-1" ? "" : ` rank ${rank}`}`,
    );
    const description = e.children.find((c) => c.name === "Description");
    texts.push(description?.children.map((c) => c.text).join(" ") ?? "");
  };
  visit(body);
  return { signature: signatures.join(", ") || null, texts: texts.join("; ") || null };
}
