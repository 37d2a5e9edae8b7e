/**
 * Process data: bits → raw → value with unit and status.
 *
 * A frame plan is made once from a process data image; decoding a frame then runs one closure a field. Kinds:
 *   BooleanT     bit; alone in an octet 0 is false and everything else true (OPC 30120 §12.2.1)
 *   UIntegerT, IntegerT 2…64 bit; above 46 bits as bigint; scaled by gradient and offset of the user interface
 *   Float32T     IEEE 754, big endian
 *   StringT      cut at the first zero octet
 *   OctetStringT, arrays  octets, elements
 *   TimeT        milliseconds since 1970-01-01 UTC; TimeSpanT milliseconds (OPC 30120 §12.2.6, §12.2.7)
 * Special values stand on the raw value and are tested before any scaling: first the IODD's SingleValues, then, only
 * when the device names a measuring profile, that profile's three values.
 */
import { fail, ok, problem, type Result } from "../core/result";
import type { DisplayInfo, IoddSimpleDatatype, ProcessDataImage, RecordItem } from "../iodd/device-description";
import { findIoddUnit, type IoddUnit } from "../iodd/iodd-units";
import { countBits } from "../iodd/read-datatypes";
import {
  makeSignedReader,
  makeUnsignedReader,
  MAX_NUMBER_BITS,
  readBigSigned,
  readBigUnsigned,
  readOctets,
} from "./bits";
import { readText } from "./read-text";
import { makeScaler } from "./scale";
import { findSpecialValue, type SpecialValue } from "./special-values";
import { LIMIT_HIGH, LIMIT_LOW, StatusCode } from "./status";

export type FieldValue =
  number | bigint | boolean | string | Uint8Array | null | readonly (number | bigint | boolean)[];

/** What one field of one frame says. `text` is the name of the single value that was met. */
export type DecodedValue = {
  readonly raw: FieldValue;
  readonly value: FieldValue;
  readonly unit: IoddUnit | undefined;
  readonly text: string | undefined;
  readonly status: number;
};

export type FieldPlan = {
  /** Member name, unique in the image: the item's name with `_` for spaces, followed by `_subindex` where needed. */
  readonly id: string;
  readonly subindex: number;
  readonly bitOffset: number;
  readonly bitLength: number;
  readonly type: IoddSimpleDatatype;
  readonly unit: IoddUnit | undefined;
  readonly gradient: number;
  readonly offset: number;
  readonly decode: (octets: Uint8Array) => DecodedValue;
};

export type FramePlan = { readonly id: string; readonly octets: number; readonly fields: readonly FieldPlan[] };

export type PlanOptions = {
  /** Decimal profile identifiers of the device, for profile values that the IODD does not list. */
  readonly profileCharacteristic?: readonly number[];
  readonly language?: string;
};

/** Makes the plan. Fields that do not lie in the image are left out; the IODD reader reports them. */
export function planFrame(image: ProcessDataImage, options: PlanOptions = {}): FramePlan {
  const octets = Math.ceil(image.bitLength / 8);
  const items = listItems(image);
  const names = items.map((item) => toMemberName(item, image, options.language));
  const fields: FieldPlan[] = [];
  items.forEach((item, index) => {
    if (item.bitOffset + countBits(item.type) > octets * 8) return;
    const name = names[index] ?? image.id;
    const isUnique = names.filter((other) => other === name).length === 1;
    const id = isUnique ? name : `${name}_${item.subindex}`;
    fields.push(planField(id, item, image.info[item.subindex] ?? {}, octets, options));
  });
  return { id: image.id, octets, fields };
}

function listItems(image: ProcessDataImage): readonly RecordItem[] {
  const { type } = image;
  const named = image.name ? { name: image.name } : {};
  switch (type.kind) {
    case "RecordT":
      return type.items;
    case "ArrayT": {
      const bits = countBits(type.element);
      return Array.from({ length: type.count }, (_, i) => ({
        subindex: i + 1,
        bitOffset: (type.count - 1 - i) * bits,
        type: type.element,
        ...named,
      }));
    }
    case "ProcessDataInUnionT":
    case "ProcessDataOutUnionT":
      return [];
    default:
      return [{ subindex: 0, bitOffset: 0, type, ...named }];
  }
}

function toMemberName(item: RecordItem, image: ProcessDataImage, language = "en"): string {
  const name = item.name?.[language] ?? Object.values(item.name ?? {})[0];
  if (name !== undefined && name.trim() !== "") return name.trim().replace(/\s+/g, "_");
  return item.subindex === 0 ? image.id : `item_${item.subindex}`;
}

function planField(id: string, item: RecordItem, info: DisplayInfo, octets: number, options: PlanOptions): FieldPlan {
  const { type, bitOffset, subindex } = item;
  const bitLength = countBits(type);
  const unit = info.unitCode === undefined ? undefined : findIoddUnit(info.unitCode);
  const gradient = info.gradient ?? 1;
  const offset = info.offset ?? 0;
  const decode = makeDecoder({
    type,
    bitOffset,
    bitLength,
    octets,
    isWhole: subindex === 0,
    unit,
    gradient,
    offset,
    options,
  });
  return { id, subindex, bitOffset, bitLength, type, unit, gradient, offset, decode };
}

type DecoderInput = {
  readonly type: IoddSimpleDatatype;
  readonly bitOffset: number;
  readonly bitLength: number;
  readonly octets: number;
  /** The field is the whole image and not an item of a record. */
  readonly isWhole: boolean;
  readonly unit: IoddUnit | undefined;
  readonly gradient: number;
  readonly offset: number;
  readonly options: PlanOptions;
};

function makeDecoder(input: DecoderInput): FieldPlan["decode"] {
  const { type, bitOffset, bitLength, octets, unit } = input;
  switch (type.kind) {
    case "BooleanT":
      return makeBooleanDecoder(input);
    case "UIntegerT":
    case "IntegerT":
      return bitLength > MAX_NUMBER_BITS ? makeBigDecoder(input) : makeIntegerDecoder(input);
    case "Float32T": {
      const read = makeUnsignedReader(octets, bitOffset, 32);
      const scale = makeScaler(input);
      const view = new DataView(new ArrayBuffer(4));
      return (o) => {
        view.setUint32(0, read(o));
        const raw = view.getFloat32(0);
        return { raw, value: scale(raw), unit, text: undefined, status: StatusCode.Good };
      };
    }
    case "StringT":
      return (o) =>
        good(readOctets(o, bitOffset, type.fixedLength), readText(readOctets(o, bitOffset, type.fixedLength)));
    case "OctetStringT":
      return (o) => {
        const raw = readOctets(o, bitOffset, type.fixedLength);
        return good(raw, raw);
      };
    case "TimeT":
      return (o) => good(readBigUnsigned(o, bitOffset, 64), toTime(readBigUnsigned(o, bitOffset, 64)));
    case "TimeSpanT":
      return (o) => {
        const raw = readBigSigned(o, bitOffset, 64);
        return good(raw, (Number(raw) * 1000) / 2 ** 32);
      };
  }
}

function good(raw: FieldValue, value: FieldValue): DecodedValue {
  return { raw, value, unit: undefined, text: undefined, status: StatusCode.Good };
}

function makeBooleanDecoder({ type, bitOffset, octets, isWhole, options }: DecoderInput): FieldPlan["decode"] {
  const read = makeUnsignedReader(octets, bitOffset, 1);
  const textOf = (value: boolean): string | undefined => {
    const single = "singleValues" in type ? type.singleValues.find((s) => s.value === value) : undefined;
    return single?.name?.[options.language ?? "en"] ?? Object.values(single?.name ?? {})[0];
  };
  const on: DecodedValue = { raw: 1, value: true, unit: undefined, text: textOf(true), status: StatusCode.Good };
  const off: DecodedValue = { raw: 0, value: false, unit: undefined, text: textOf(false), status: StatusCode.Good };
  // A Boolean that is the whole image takes the whole octet; inside a record it is one bit.
  return isWhole ? (o) => (o.every((octet) => octet === 0) ? off : on) : (o) => (read(o) === 0 ? off : on);
}

function makeIntegerDecoder(input: DecoderInput): FieldPlan["decode"] {
  const { type, bitOffset, bitLength, octets, unit, options } = input;
  if (type.kind !== "UIntegerT" && type.kind !== "IntegerT") throw new RangeError(type.kind);
  const read =
    type.kind === "IntegerT"
      ? makeSignedReader(octets, bitOffset, bitLength)
      : makeUnsignedReader(octets, bitOffset, bitLength);
  const scale = makeScaler(input);
  const special = makeSpecialTable(type, options);
  const [lower, upper] = findLimits(type.ranges);
  return (o) => {
    const raw = read(o);
    const met = special?.get(raw);
    if (met) {
      return met.status === StatusCode.Good
        ? { raw, value: scale(raw), unit, text: met.text, status: StatusCode.Good }
        : { raw, value: null, unit, text: met.text, status: met.status };
    }
    let status: number = StatusCode.Good;
    if (raw < lower) status = StatusCode.Uncertain_EngineeringUnitsExceeded | LIMIT_LOW;
    else if (raw > upper) status = StatusCode.Uncertain_EngineeringUnitsExceeded | LIMIT_HIGH;
    return { raw, value: scale(raw), unit, text: undefined, status };
  };
}

function makeSpecialTable(
  type: Extract<IoddSimpleDatatype, { kind: "UIntegerT" | "IntegerT" }>,
  options: PlanOptions,
): Map<number, SpecialValue> | undefined {
  const table = new Map<number, SpecialValue>();
  for (const special of findSpecialValue(type, options.profileCharacteristic ?? [], options.language ?? "en")) {
    table.set(special.raw, special);
  }
  return table.size === 0 ? undefined : table;
}

/** The span of all ranges together; everything when the IODD gives none. */
function findLimits(ranges: readonly { readonly lower: number; readonly upper: number }[]): readonly [number, number] {
  if (ranges.length === 0) return [-Infinity, Infinity];
  return [Math.min(...ranges.map((r) => r.lower)), Math.max(...ranges.map((r) => r.upper))];
}

function makeBigDecoder({ type, bitOffset, bitLength, unit, gradient, offset }: DecoderInput): FieldPlan["decode"] {
  const read = type.kind === "IntegerT" ? readBigSigned : readBigUnsigned;
  const isScaled = gradient !== 1 || offset !== 0;
  return (o) => {
    const raw = read(o, bitOffset, bitLength);
    return {
      raw,
      value: isScaled ? Number(raw) * gradient + offset : raw,
      unit,
      text: undefined,
      status: StatusCode.Good,
    };
  };
}

const SECONDS_1900_TO_1970 = 2_208_988_800n;
/** Seconds below this count from 2036-02-07 06:28:16 (OPC 30120 §12.2.6.1). */
const FIRST_SECOND_OF_1984 = 0x9dff4400n;

function toTime(raw: bigint): number {
  const seconds = raw >> 32n;
  const fraction = Number(raw & 0xffffffffn) / 2 ** 32;
  const since1900 = seconds < FIRST_SECOND_OF_1984 ? seconds + (1n << 32n) : seconds;
  return Number(since1900 - SECONDS_1900_TO_1970) * 1000 + fraction * 1000;
}

/** Decodes one frame; `decode.length` when it is shorter or longer than described. */
export function decodeFrame(plan: FramePlan, octets: Uint8Array): Result<DecodedValue[]> {
  if (octets.length !== plan.octets) {
    return fail(problem("decode.length", { octets: octets.length, id: plan.id, expected: plan.octets }));
  }
  const values = new Array<DecodedValue>(plan.fields.length);
  for (let i = 0; i < plan.fields.length; i++) {
    const field = plan.fields[i];
    if (field) values[i] = field.decode(octets);
  }
  return ok(values);
}
