/**
 * Values and the DataTypes that they are of: what an edit of a DataType does to the values of Variables and VariableTypes,
 * told before it is done, and the edit that makes them fit again. A structure that loses a field cannot be read any more;
 * one that gains a field lacks it; an enumeration that loses a value leaves that value without a name.
 */
import type { AddressSpace } from "../address-space/address-space";
import {
  getDataType,
  getValueRank,
  hasValueAttributes,
  type VariableNode,
  type VariableTypeNode,
} from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import { StandardDataType } from "../address-space/standard-ids";
import { collectSubtypes } from "../address-space/type-hierarchy";
import type { Result } from "../core/result";
import { checkVariant } from "../nodeset/values/check-variant";
import { SpaceDataTypes, type DataTypeLookup, type StructureField } from "../nodeset/values/data-type-shapes";
import { makeField, makeItem, makeStructure, type ValueMaker } from "../nodeset/values/initial-value";
import { readValue } from "../nodeset/values/read-value";
import { parseScalarText } from "../nodeset/values/scalar-text";
import type { BuiltInType, DataValue, Scalar, StructureValue, Variant } from "../nodeset/values/variant";
import { writeValue } from "../nodeset/values/write-value";
import { EditDraft, type CommandContext, type Edit } from "./edit-draft";

/** `unreadable`: its XML does not fit any more; `incomplete`: it lacks a field; `unnamed`: a number without a text or a bit without a name. */
export type ValueMisfit = { readonly node: NodeKey; readonly kind: "unreadable" | "incomplete" | "unnamed" };

type ValueNode = VariableNode | VariableTypeNode;

/** Own values that fit before and do not after, where only the DataType changed. In the order of the model. */
export function listValueMisfits(before: AddressSpace, after: AddressSpace, dataType: NodeKey): ValueMisfit[] {
  const affected = collectAffected(before, dataType);
  const types = { before: new SpaceDataTypes(before), after: new SpaceDataTypes(after) };
  const typeIds = [...affected].flatMap((key) => types.before.findStructure(key)?.typeId ?? []);
  const found: ValueMisfit[] = [];
  for (const node of before.listOwnNodes()) {
    if (!hasValueAttributes(node) || !node.value) continue;
    const { xml } = node.value;
    if (!affected.has(getDataType(node)) && !typeIds.some((id) => xml.includes(id))) continue;
    const kind = findMisfit(node, types);
    if (kind) found.push({ node: node.key, kind });
  }
  return found;
}

/** The DataType, its subtypes, and own structures that hold one of them in a field. */
function collectAffected(space: AddressSpace, dataType: NodeKey): Set<NodeKey> {
  const affected = new Set(collectSubtypes(space, dataType));
  for (let size = 0; size !== affected.size;) {
    size = affected.size;
    for (const node of space.listOwnNodes()) {
      if (node.nodeClass !== "DataType" || affected.has(node.key)) continue;
      const holds = node.definition?.fields.some((f) => f.dataType !== undefined && affected.has(f.dataType));
      if (holds) for (const key of collectSubtypes(space, node.key)) affected.add(key);
    }
  }
  return affected;
}

type Lookups = { readonly before: SpaceDataTypes; readonly after: SpaceDataTypes };

function findMisfit(node: ValueNode, types: Lookups): ValueMisfit["kind"] | undefined {
  if (!node.value) return undefined;
  const old = readValue(node.value, types.before);
  if (!old.ok) return undefined;
  const declared = { dataType: getDataType(node), valueRank: getValueRank(node) };
  const now = readValue(node.value, types.after);
  const isFit = (lookup: SpaceDataTypes, value: Variant): boolean =>
    checkVariant(value, declared, lookup) === undefined;
  if (!now.ok || countRaw(now.value) > countRaw(old.value)) return "unreadable";
  if (isFit(types.before, old.value) && !isFit(types.after, now.value)) return "unreadable";
  // As they would be written: a field more, another number of a union's field, another text of an enumeration.
  if (writeValue(old.value, types.before).xml !== writeValue(now.value, types.after).xml) return "incomplete";
  const { dataType } = declared;
  return countUnnamed(now.value, dataType, types.after) > countUnnamed(old.value, dataType, types.before)
    ? "unnamed"
    : undefined;
}

/** Every item of a value with the DataType that is known of it. */
function* walkItems(
  variant: Variant,
  dataType: NodeKey | undefined,
  types: Structures,
): Generator<{ item: Scalar; type: BuiltInType; dataType: NodeKey | undefined }> {
  const items: readonly Scalar[] = variant.shape === "scalar" ? [variant.value] : variant.values;
  for (const item of items) {
    yield { item, type: variant.type, dataType };
    if (item === null || typeof item !== "object") continue;
    if (variant.type === "Variant") yield* walkItems(item as Variant, undefined, types);
    const inner = variant.type === "DataValue" ? (item as DataValue).value : undefined;
    if (inner) yield* walkItems(inner, undefined, types);
    if (variant.type !== "ExtensionObject" || !("fields" in item)) continue;
    const structure = item as StructureValue;
    const shape = types.findStructure(structure.dataType);
    for (const [name, field] of Object.entries(structure.fields))
      yield* walkItems(field, shape?.fields.find((f) => f.name === name)?.dataType, types);
  }
}

type Structures = Pick<DataTypeLookup, "findStructure">;
const NO_TYPES: Structures = { findStructure: () => undefined };

function countRaw(variant: Variant): number {
  let count = 0;
  for (const { item } of walkItems(variant, undefined, NO_TYPES))
    if (typeof item === "object" && item !== null && "kind" in item && item.kind === "raw") count++;
  return count;
}

function countUnnamed(variant: Variant, dataType: NodeKey, types: SpaceDataTypes): number {
  let count = 0;
  for (const { item, dataType: of } of walkItems(variant, dataType, types)) {
    if (of === undefined || (typeof item !== "number" && typeof item !== "bigint")) continue;
    const names = types.findEnumerationNames(of);
    if (names && typeof item === "number" && !names.has(item)) count++;
    const mask = types.findOptionMask(of);
    if (mask !== undefined && (BigInt(item) & ~mask) !== 0n) count++;
  }
  return count;
}

export type ConvertValuesIntent = {
  /** The model before the DataType was edited. */
  readonly before: AddressSpace;
  readonly nodes: readonly NodeKey[];
  /** Old names of the edited structure's fields by their new ones, where they were renamed. */
  readonly renamed?: ReadonlyMap<string, string>;
};

/**
 * Rewrites values for the DataTypes as they are now: fields of the same name are kept, numbers and texts of another type
 * converted where they fit, new fields get the default of their type, and what has no place any more goes.
 */
export function convertValues(space: AddressSpace, context: CommandContext, intent: ConvertValuesIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  const old = new SpaceDataTypes(intent.before);
  const types = new SpaceDataTypes(space);
  const converter = new Converter({ space, types }, intent.renamed ?? new Map());
  for (const key of intent.nodes) {
    const node = intent.before.getNode(key);
    if (!node || !hasValueAttributes(node) || !node.value) continue;
    const read = readValue(node.value, old);
    if (!read.ok) continue;
    draft.set(key, "value", writeValue(converter.convert(read.value, getDataType(node)), types));
  }
  return draft.finish();
}

class Converter {
  readonly #maker: ValueMaker;
  readonly #renamed: ReadonlyMap<string, string>;

  constructor(maker: ValueMaker, renamed: ReadonlyMap<string, string>) {
    this.#maker = maker;
    this.#renamed = renamed;
  }

  convert(variant: Variant, dataType: NodeKey | undefined): Variant {
    const carrier = dataType === undefined ? undefined : this.#maker.types.findBuiltInType(dataType);
    const type = carrier === undefined || carrier === "Variant" ? variant.type : carrier;
    const one = (item: Scalar): Scalar => this.#item(variant.type, type, item, dataType);
    if (variant.shape === "scalar") return { ...variant, type, value: one(variant.value) } as Variant;
    return { ...variant, type, values: (variant.values as readonly Scalar[]).map(one) } as unknown as Variant;
  }

  #item(from: BuiltInType, to: BuiltInType, item: Scalar, dataType: NodeKey | undefined): Scalar {
    if (from !== to) return convertLeaf(item, to) ?? makeItem(this.#maker, to, dataType);
    if (to === "ExtensionObject" && item !== null && typeof item === "object" && "fields" in item)
      return this.#structure(item as StructureValue);
    if (typeof item === "number" && dataType !== undefined) return this.#named(item, dataType);
    return item;
  }

  /** A number that the enumeration does not have becomes its first; bits without a name are cleared. */
  #named(value: number, dataType: NodeKey): number {
    const { types } = this.#maker;
    const names = types.findEnumerationNames(dataType);
    if (names) return names.has(value) ? value : (names.keys().next().value ?? value);
    const mask = types.findOptionMask(dataType);
    return mask === undefined ? value : Number(BigInt(value) & mask);
  }

  #structure(value: StructureValue): StructureValue {
    const shape = this.#maker.types.findStructure(value.dataType);
    if (!shape) return value;
    const fields = shape.fields.flatMap((field) => {
      const old = value.fields[this.#renamed.get(field.name) ?? field.name] ?? value.fields[field.name];
      const kept = old && this.#field(old, field);
      if (kept) return [[field.name, kept] as const];
      return shape.isUnion || field.isOptional ? [] : [[field.name, makeField(this.#maker, field)] as const];
    });
    const fresh = makeStructure(this.#maker, value.dataType);
    return { ...(fresh ?? value), fields: Object.fromEntries(shape.isUnion ? fields.slice(0, 1) : fields) };
  }

  #field(old: Variant, field: StructureField): Variant | undefined {
    const isList = old.shape !== "scalar";
    if (isList !== field.valueRank >= 0) return undefined;
    if (field.builtInType === "Variant") return old.type === "Variant" ? old : undefined;
    return this.convert(old, field.dataType === StandardDataType.BaseDataType ? undefined : field.dataType);
  }
}

/** Numbers and texts turn into each other where the other type can hold them. */
function convertLeaf(item: Scalar, to: BuiltInType): Scalar | undefined {
  if (typeof item === "object") return undefined;
  const text = String(item);
  return to === "LocalizedText" ? { text } : parseScalarText(to, text);
}
