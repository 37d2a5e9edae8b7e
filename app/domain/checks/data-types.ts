/** Questions about DataTypes: what their values are encoded as (OPC 10000-6 §5.1.2), their fields with inherited ones. */
import type { DataTypeField } from "../address-space/node";
import { parseNodeId, standardKey, type NodeKey } from "../address-space/node-id";
import { StandardDataType as D, StandardReferenceType } from "../address-space/standard-ids";
import { BUILT_IN_TYPES } from "../nodeset/values/variant";
import { makeLookup, type CheckContext } from "./check-context";
import { isChainLoaded, isKindOf, listSupertypes } from "./lookups";

const Decimal = standardKey(50);

/** Built-in types have the numeric ids 1 … 25 in namespace 0, in this order. */
const BUILT_IN = new Map<NodeKey, string>(BUILT_IN_TYPES.map((name, i) => [standardKey(i + 1), name] as const));

const SIGNED = ["SByte", "Int16", "Int32", "Int64"];
const UNSIGNED = ["Byte", "UInt16", "UInt32", "UInt64"];

/** Names of the built-in types that a value of the DataType may have; "any" for BaseDataType. */
export type AllowedBuiltIns = ReadonlySet<string> | "any";

const allowedBuiltIns = makeLookup<AllowedBuiltIns | undefined>((ctx, dataType) => {
  for (const at of [dataType, ...listSupertypes(ctx, dataType)]) {
    if (at === D.BaseDataType) return "any";
    if (at === D.Enumeration) return new Set(["Int32"]);
    if (at === Decimal) return new Set(["ExtensionObject"]);
    if (at === D.Number) return new Set([...SIGNED, ...UNSIGNED, "Float", "Double", "ExtensionObject"]);
    if (at === D.Integer) return new Set(SIGNED);
    if (at === D.UInteger) return new Set(UNSIGNED);
    const name = BUILT_IN.get(at);
    if (name !== undefined) return new Set([name]);
  }
  return undefined;
});

/** Undefined when the DataType, or a type above it, is not loaded. */
export function findAllowedBuiltIns(ctx: CheckContext, dataType: NodeKey): AllowedBuiltIns | undefined {
  return ctx.lookUp(allowedBuiltIns, dataType);
}

/** Whether values of the DataType are numbers; undefined when that cannot be known. */
export function isNumeric(ctx: CheckContext, dataType: NodeKey): boolean | undefined {
  if (isKindOf(ctx, dataType, D.Number)) return true;
  return isChainLoaded(ctx, dataType) ? false : undefined;
}

const fields = makeLookup<readonly DataTypeField[]>((ctx, dataType) => {
  const chain = [dataType, ...listSupertypes(ctx, dataType)].reverse();
  return chain.flatMap((type) => {
    const node = ctx.node(type);
    return node?.nodeClass === "DataType" ? (node.definition?.fields ?? []) : [];
  });
});

/** The fields of a Structure or Union, inherited ones first. */
export function listFields(ctx: CheckContext, dataType: NodeKey): readonly DataTypeField[] {
  return ctx.lookUp(fields, dataType);
}

/** `name (nsu=…)` of a DataType, for messages. */
export function nameDataType(ctx: CheckContext, dataType: NodeKey): string {
  return ctx.node(dataType)?.browseName.name ?? dataType;
}

/** Of TypeIds, which are NodeId texts like keys. */
const typeIdDataType = makeLookup<NodeKey | undefined>((ctx, typeId) => {
  const parsed = parseNodeId(typeId, []);
  if (!parsed.ok) return undefined;
  const key = ctx.findWithNodeId(parsed.value);
  if (key === undefined) return undefined;
  if (ctx.classOf(key) === "DataType") return key;
  return ctx.otherEdgesTo(key).find((e) => e.type === StandardReferenceType.HasEncoding)?.source;
});

/** The DataType behind a TypeId of a value: one of its encodings, or the DataType itself. Undefined when it is not loaded. */
export function findDataTypeOf(ctx: CheckContext, typeId: string): NodeKey | undefined {
  return ctx.lookUp(typeIdDataType, typeId as NodeKey);
}
