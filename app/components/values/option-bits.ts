/** Bits of option sets (OPC 10000-3 §8.40): unsigned integers, or the structure OptionSet with value and valid bits. Pure. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { findText } from "~/domain/address-space/qualified-name";
import { listSupertypes } from "~/domain/address-space/type-hierarchy";
import { toBase64, toBytes } from "./leaf-text";

export type OptionBit = { readonly bit: number; readonly name: string; readonly description: string };

/** The named bits of a DataType and of its supertypes; undefined where it is no option set. */
export function findOptionBits(space: AddressSpace, dataType: NodeKey): readonly OptionBit[] | undefined {
  const fields = [dataType, ...listSupertypes(space, dataType)].flatMap((key) => {
    const node = space.getNode(key);
    return node?.nodeClass === "DataType" && node.definition?.isOptionSet ? node.definition.fields : [];
  });
  if (fields.length === 0) return undefined;
  return fields
    .map((field) => ({ bit: field.value ?? 0, name: field.name, description: findText(field.description ?? []) ?? "" }))
    .sort((a, b) => a.bit - b.bit);
}

export function hasBit(value: number | bigint, bit: number): boolean {
  return ((BigInt(value) >> BigInt(bit)) & 1n) === 1n;
}

/** Of the same JavaScript type as the value. */
export function withBit<T extends number | bigint>(value: T, bit: number, isSet: boolean): T {
  const mask = 1n << BigInt(bit);
  const next = isSet ? BigInt(value) | mask : BigInt(value) & ~mask;
  return (typeof value === "bigint" ? next : Number(next)) as T;
}

/** Bits that are set and have no name. */
export function listUnnamedBits(value: number | bigint, bits: readonly OptionBit[]): number[] {
  const named = new Set(bits.map((b) => b.bit));
  return Array.from({ length: 64 }, (_, bit) => bit).filter((bit) => hasBit(value, bit) && !named.has(bit));
}

/** In a ByteString bit 0 is the lowest bit of the first byte. */
export function hasByteBit(base64: string | null, bit: number): boolean {
  return ((toBytes(base64 ?? "")[bit >> 3] ?? 0) & (1 << (bit & 7))) !== 0;
}

export function withByteBit(base64: string | null, bit: number, isSet: boolean): string {
  const bytes = toBytes(base64 ?? "");
  while (bytes.length <= bit >> 3) bytes.push(0);
  const old = bytes[bit >> 3] ?? 0;
  bytes[bit >> 3] = isSet ? old | (1 << (bit & 7)) : old & ~(1 << (bit & 7));
  return toBase64(bytes);
}
