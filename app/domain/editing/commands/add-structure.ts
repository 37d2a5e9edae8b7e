/**
 * Structures, unions and option sets (OPC 10000-3 §8.47–8.52, §8.40, OPC 10000-6 §F.12). A concrete structure gets its
 * encoding Objects Default Binary, Default XML and Default JSON with the inverse HasEncoding at the encoding (§5.8.4);
 * an option set gets OptionSetValues. `setStructureFields` and `setOptionSetBits` change them later.
 */
import type { AddressSpace } from "../../address-space/address-space";
import type { DataTypeField, DataTypeNode } from "../../address-space/node";
import { OPC_UA_NAMESPACE, standardKey, type NodeKey } from "../../address-space/node-id";
import { qualifiedName, type LocalizedText } from "../../address-space/qualified-name";
import { StandardDataType, StandardReferenceType, StandardType } from "../../address-space/standard-ids";
import { findSupertype, isSubtypeOf } from "../../address-space/type-hierarchy";
import { problem, type Result } from "../../core/result";
import { makeTexts } from "../../nodeset/values/standard-values";
import { EditDraft, type CommandContext, type Edit } from "../edit-draft";
import { checkInheritedFields } from "../inherited-fields";
import { keepUnnamed } from "../kept-fields";
import { setListProperty } from "./add-enumeration";
import { addTypeTo } from "./add-type";
import { toDimensionsText } from "./set-value-rank";

export type StructureFieldIntent = {
  readonly name: string;
  readonly dataType: NodeKey;
  readonly valueRank?: number;
  readonly arrayDimensions?: readonly number[];
  readonly maxStringLength?: number;
  /** Not in unions (OPC 10000-6 Table F.13). */
  readonly isOptional?: boolean;
  readonly allowSubTypes?: boolean;
  readonly description?: readonly LocalizedText[];
  /** Its name before, where this edit renames it: what else a file says of the field stays with it. */
  readonly was?: string;
};

export type AddStructureIntent = {
  readonly name: string;
  readonly fields: readonly StructureFieldIntent[];
  readonly description?: readonly LocalizedText[];
  /** Structure by default, Union for unions. */
  readonly supertype?: NodeKey;
  readonly isUnion?: boolean;
  readonly isAbstract?: boolean;
};

/** BrowseName and SymbolicName, as the published NodeSets have them. */
const ENCODINGS = [
  ["Default Binary", "DefaultBinary"],
  ["Default XML", "DefaultXml"],
  ["Default JSON", "DefaultJson"],
] as const;

/** Problems: `name.*`, `structure.*`. */
export function addStructure(space: AddressSpace, context: CommandContext, intent: AddStructureIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  const isUnion = intent.isUnion ?? false;
  const supertype = intent.supertype ?? (isUnion ? StandardDataType.Union : StandardDataType.Structure);
  checkFields(draft, intent.fields, isUnion, supertype);
  if (!isSubtypeOf(space, supertype, StandardDataType.Structure))
    draft.fail(problem("structure.supertype", { node: supertype }));
  if (draft.hasFailed) return draft.finish();
  const name = qualifiedName(draft.ownNamespace, intent.name);
  const definition = {
    name,
    ...(isUnion ? { isUnion: true } : {}),
    fields: intent.fields.map((f) => toField(space, f)),
  };
  const key = addTypeTo(draft, { ...intent, supertype }, { definition });
  if (key !== undefined && !intent.isAbstract) addEncodings(draft, key);
  return draft.finish();
}

/** Those of the three encoding Objects that the structure does not have yet. */
export function addEncodings(draft: EditDraft, dataType: NodeKey): void {
  const encodings = listEncodings(draft.space, dataType).map((key) => draft.space.getNode(key)?.browseName.name);
  for (const [name, symbol] of ENCODINGS) if (!encodings.includes(name)) addEncoding(draft, dataType, name, symbol);
}

export function listEncodings(space: AddressSpace, dataType: NodeKey): NodeKey[] {
  const edges = space.edgesFrom(dataType).filter((edge) => edge.type === StandardReferenceType.HasEncoding);
  return edges.map((edge) => edge.target);
}

function addEncoding(draft: EditDraft, dataType: NodeKey, name: string, symbolicName: string): void {
  draft.add({
    nodeClass: "Object",
    browseName: qualifiedName(OPC_UA_NAMESPACE, name),
    references: [
      { type: StandardReferenceType.HasEncoding, target: dataType, isForward: false },
      { type: StandardReferenceType.HasTypeDefinition, target: StandardType.DataTypeEncodingType, isForward: true },
    ],
    attributes: { symbolicName },
  });
}

export type SetStructureFieldsIntent = { readonly dataType: NodeKey; readonly fields: readonly StructureFieldIntent[] };

/** Problems: `structure.no-structure` and those of `addStructure`. */
export function setStructureFields(
  space: AddressSpace,
  context: CommandContext,
  intent: SetStructureFieldsIntent,
): Result<Edit> {
  const draft = new EditDraft(space, context);
  const node = space.getNode(intent.dataType);
  if (node?.nodeClass !== "DataType" || !isSubtypeOf(space, node.key, StandardDataType.Structure)) {
    draft.fail(problem("structure.no-structure", { node: intent.dataType }));
    return draft.finish();
  }
  checkFields(draft, intent.fields, node.definition?.isUnion ?? false, findSupertype(space, node.key));
  const fields = intent.fields.map((f) => keepUnnamed(node, f, toField(space, f)));
  draft.set(node.key, "definition", { ...(node.definition ?? { name: node.browseName }), fields });
  return draft.finish();
}

function checkFields(
  draft: EditDraft,
  fields: readonly StructureFieldIntent[],
  isUnion: boolean,
  supertype: NodeKey | undefined,
): void {
  const names = new Set<string>();
  for (const { name, dataType, isOptional, valueRank } of fields) {
    if (name.trim() === "") draft.fail(problem("name.empty"));
    if (names.has(name)) draft.fail(problem("structure.name-taken", { name }));
    names.add(name);
    if (draft.space.getNode(dataType)?.nodeClass !== "DataType")
      draft.fail(problem("structure.data-type", { name, node: dataType }));
    if (isUnion && isOptional) draft.fail(problem("structure.optional-in-union", { name }));
    if (valueRank !== undefined && valueRank !== -1 && valueRank < 1)
      draft.fail(problem("structure.rank", { name, valueRank }));
  }
  const repeated = supertype === undefined ? undefined : checkInheritedFields(draft.space, supertype, fields);
  if (repeated) draft.fail(repeated);
}

/** Abstract types that a field may name without AllowSubTypes (OPC 10000-6 §F.13). */
const ALWAYS_OPEN: ReadonlySet<NodeKey> = new Set([
  StandardDataType.BaseDataType,
  StandardDataType.Structure,
  StandardDataType.Number,
  StandardDataType.Integer,
  StandardDataType.UInteger,
]);

function toField(space: AddressSpace, intent: StructureFieldIntent): DataTypeField {
  const { name, dataType, valueRank, arrayDimensions, maxStringLength, isOptional, description } = intent;
  const node = space.getNode(dataType) as DataTypeNode | undefined;
  const allowSubTypes = intent.allowSubTypes ?? (node?.isAbstract === true && !ALWAYS_OPEN.has(dataType));
  const dimensions = valueRank === undefined ? undefined : toDimensionsText(valueRank, arrayDimensions);
  return {
    name,
    dataType,
    ...(valueRank === undefined || valueRank === -1 ? {} : { valueRank }),
    ...(dimensions === undefined ? {} : { arrayDimensions: dimensions }),
    ...(maxStringLength === undefined ? {} : { maxStringLength }),
    ...(isOptional ? { isOptional } : {}),
    ...(allowSubTypes ? { allowSubTypes } : {}),
    ...(description ? { description } : {}),
  };
}

export type OptionSetBit = {
  readonly name: string;
  readonly bit: number;
  readonly description?: readonly LocalizedText[];
  readonly was?: string;
};

export type AddOptionSetIntent = {
  readonly name: string;
  readonly bits: readonly OptionSetBit[];
  /**
   * Bits in the value: 8, 16, 32 or 64, the DataType then derives from the unsigned integer of that size; `any` for a
   * structure below OptionSet, which also says which bits are valid.
   */
  readonly size: 8 | 16 | 32 | 64 | "any";
  readonly description?: readonly LocalizedText[];
};

const SUPERTYPE_BY_SIZE = {
  8: standardKey(3),
  16: standardKey(5),
  32: standardKey(7),
  64: standardKey(9),
  any: StandardDataType.OptionSet,
} as const;
/** Common sense, no source: a bit number beyond this is a slip. */
const MOST_BITS = 4096;

/** An option set (OPC 10000-3 §8.40). Problems: `name.*`, `option-set.*`. */
export function addOptionSet(space: AddressSpace, context: CommandContext, intent: AddOptionSetIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  checkBits(draft, intent.bits, intent.size === "any" ? MOST_BITS : intent.size);
  if (draft.hasFailed) return draft.finish();
  const name = qualifiedName(draft.ownNamespace, intent.name);
  const definition = { name, isOptionSet: true, fields: intent.bits.map(toBitField) };
  const key = addTypeTo(draft, { ...intent, supertype: SUPERTYPE_BY_SIZE[intent.size] }, { definition });
  if (key !== undefined && intent.size === "any") addEncodings(draft, key);
  if (key !== undefined) setOptionSetValues(draft, key, intent.bits);
  return draft.finish();
}

export type SetOptionSetBitsIntent = { readonly dataType: NodeKey; readonly bits: readonly OptionSetBit[] };

/** Problems: `option-set.no-option-set` and those of `addOptionSet`. */
export function setOptionSetBits(
  space: AddressSpace,
  context: CommandContext,
  intent: SetOptionSetBitsIntent,
): Result<Edit> {
  const draft = new EditDraft(space, context);
  const node = space.getNode(intent.dataType);
  if (node?.nodeClass !== "DataType" || !node.definition?.isOptionSet) {
    draft.fail(problem("option-set.no-option-set", { node: intent.dataType }));
    return draft.finish();
  }
  checkBits(draft, intent.bits, findSize(space, node.key));
  const fields = intent.bits.map((bit) => keepUnnamed(node, bit, toBitField(bit)));
  draft.set(node.key, "definition", { ...node.definition, fields });
  setOptionSetValues(draft, node.key, intent.bits);
  return draft.finish();
}

function findSize(space: AddressSpace, dataType: NodeKey): number {
  const sizes = [8, 16, 32, 64] as const;
  return sizes.find((size) => isSubtypeOf(space, dataType, SUPERTYPE_BY_SIZE[size])) ?? MOST_BITS;
}

function checkBits(draft: EditDraft, bits: readonly OptionSetBit[], size: number): void {
  const names = new Set<string>();
  const numbers = new Set<number>();
  for (const { name, bit } of bits) {
    if (name.trim() === "") draft.fail(problem("name.empty"));
    if (names.has(name)) draft.fail(problem("option-set.name-taken", { name }));
    if (numbers.has(bit)) draft.fail(problem("option-set.bit-taken", { bit }));
    if (!Number.isInteger(bit) || bit < 0 || bit >= size)
      draft.fail(problem("option-set.bit-range", { name, bit, size }));
    names.add(name);
    numbers.add(bit);
  }
}

function toBitField({ name, bit, description }: OptionSetBit): DataTypeField {
  return { name, value: bit, ...(description ? { description } : {}) };
}

/** One text a bit from bit 0; bits without a meaning have an empty text (OPC 10000-3 §8.40). */
function setOptionSetValues(draft: EditDraft, key: NodeKey, bits: readonly OptionSetBit[]): void {
  const highest = Math.max(-1, ...bits.map((b) => b.bit));
  const texts = Array.from({ length: highest + 1 }, (_, bit) => ({
    text: bits.find((b) => b.bit === bit)?.name ?? "",
  }));
  setListProperty(draft, key, { name: "OptionSetValues", dataType: StandardDataType.LocalizedText }, makeTexts(texts));
}
