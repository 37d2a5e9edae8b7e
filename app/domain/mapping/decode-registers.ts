/**
 * Values of Modbus registers. A register is 16 bit and travels high octet first (MODBUS Application Protocol V1.1b3, data
 * encoding); how a longer value spans registers is not part of that specification, so its order is always said.
 */
import type { InputReference } from "./mapping";

type RegisterType = NonNullable<Extract<InputReference, { kind: "register" }>["type"]>;
type OctetOrder = NonNullable<Extract<InputReference, { kind: "register" }>["order"]>;

const REGISTERS: Readonly<Record<RegisterType, number>> = {
  UInt16: 1,
  Int16: 1,
  UInt32: 2,
  Int32: 2,
  Float32: 2,
  UInt64: 4,
  Int64: 4,
  Float64: 4,
};

/** How many registers a value of the type takes. */
export function countRegisters(type: RegisterType): number {
  return REGISTERS[type];
}

/**
 * The value in registers as they were read, lowest address first. ABCD: most significant octet first; CDAB: words
 * swapped; BADC: octets in each word swapped; DCBA: both. Throws RangeError when the number of registers does not fit.
 */
export function decodeRegisters(
  words: readonly number[],
  type: RegisterType,
  order: OctetOrder = "ABCD",
): number | bigint {
  if (words.length !== REGISTERS[type]) throw new RangeError(`${type} takes ${REGISTERS[type]} registers`);
  const view = new DataView(new ArrayBuffer(words.length * 2));
  const swapsWords = order === "CDAB" || order === "DCBA";
  const swapsOctets = order === "BADC" || order === "DCBA";
  words.forEach((word, i) => {
    view.setUint16(2 * (swapsWords ? words.length - 1 - i : i), word & 0xffff, swapsOctets);
  });
  switch (type) {
    case "UInt16":
      return view.getUint16(0);
    case "Int16":
      return view.getInt16(0);
    case "UInt32":
      return view.getUint32(0);
    case "Int32":
      return view.getInt32(0);
    case "Float32":
      return view.getFloat32(0);
    case "UInt64":
      return view.getBigUint64(0);
    case "Int64":
      return view.getBigInt64(0);
    case "Float64":
      return view.getFloat64(0);
  }
}

/** The registers of a value: the reverse of decodeRegisters, for fakes and for checks. */
export function encodeRegisters(value: number | bigint, type: RegisterType, order: OctetOrder = "ABCD"): number[] {
  const count = REGISTERS[type];
  const view = new DataView(new ArrayBuffer(count * 2));
  switch (type) {
    case "UInt16":
    case "Int16":
      view.setUint16(0, Number(value));
      break;
    case "UInt32":
    case "Int32":
      view.setUint32(0, Number(value));
      break;
    case "Float32":
      view.setFloat32(0, Number(value));
      break;
    case "UInt64":
    case "Int64":
      view.setBigInt64(0, BigInt(value));
      break;
    case "Float64":
      view.setFloat64(0, Number(value));
      break;
  }
  const swapsOctets = order === "BADC" || order === "DCBA";
  const words = Array.from({ length: count }, (_, i) => view.getUint16(2 * i, swapsOctets));
  return order === "CDAB" || order === "DCBA" ? words.reverse() : words;
}
