/**
 * A mapping: for each fed Variable of a machine type, where its value comes from, what is done to it, and which quality
 * it carries. It belongs to a machine type and names its sources by role ("creel sensor"); a machine binds each role to a
 * port or an address. All of it is plain JSON.
 */
import { z } from "zod";

/** What a role stands for on every machine. `deviceKey` is vendorId/deviceId where a certain product is meant. */
export const sourceRoleSchema = z.strictObject({
  role: z.string().min(1).max(100),
  kind: z.enum(["io-link-device", "modbus-unit", "opc-ua-server", "rest-service", "tag-server"]),
  vendorId: z.number().int().min(1).max(65_535).optional(),
  deviceId: z.number().int().min(1).max(16_777_215).optional(),
  description: z.string().max(1_000).optional(),
  productName: z.string().max(2_000).optional(),
  portClass: z.enum(["A", "B"]).optional(),
  /** Wanted cycle time in milliseconds. */
  cycleMs: z.number().positive().max(60_000).optional(),
  /** The present value of the parameter that decides between several layouts. */
  condition: z.string().max(200).optional(),
});

export const registerTypes = ["UInt16", "Int16", "UInt32", "Int32", "UInt64", "Int64", "Float32", "Float64"] as const;

/**
 * Order of the octets of a value that spans registers, named by the example octets A B C D (A most significant): ABCD
 * high word first, CDAB low word first, BADC and DCBA the same with swapped octets. Not part of the Modbus specification.
 */
export const octetOrders = ["ABCD", "CDAB", "BADC", "DCBA"] as const;

const role = z.string().min(1).max(100);

const registerReferenceSchema = z.strictObject({
  kind: z.literal("register"),
  role,
  table: z.enum(["coil", "discrete-input", "holding-register", "input-register"]),
  /** Zero-based wire address. */
  address: z.number().int().min(0).max(65_535),
  type: z.enum(registerTypes).optional(),
  order: z.enum(octetOrders).optional(),
  /** Counts from the least significant bit of the register. */
  bit: z.number().int().min(0).max(15).optional(),
});

const tagReferenceSchema = z.strictObject({ kind: z.literal("tag"), role, name: z.string().min(1).max(1_000) });

/** Member names and array indices from the root of a JSON answer. */
const jsonPathReferenceSchema = z.strictObject({
  kind: z.literal("json-path"),
  role,
  path: z
    .array(z.union([z.string().max(200), z.number().int().min(0)]))
    .min(1)
    .max(32),
});

/** NodeId text with `nsu=`. */
const nodeReferenceSchema = z.strictObject({
  kind: z.literal("opc-ua-node"),
  role,
  nodeId: z.string().min(3).max(5_000),
});

/** What a list of a controller's values can name; the role is said when the list is used. */
export const tagPlaceSchema = z.discriminatedUnion("kind", [
  registerReferenceSchema.omit({ role: true }),
  tagReferenceSchema.omit({ role: true }),
  jsonPathReferenceSchema.omit({ role: true }),
  nodeReferenceSchema.omit({ role: true }),
]);

export const inputReferenceSchema = z.discriminatedUnion("kind", [
  /** A field of process data. `subindex` 0 is the whole of a plain datatype; `image` names one of several layouts. */
  z.strictObject({
    kind: z.literal("process-data"),
    role,
    direction: z.enum(["in", "out"]),
    subindex: z.number().int().min(0).max(255),
    image: z.string().max(200).optional(),
  }),
  /** An ISDU parameter; slow, read on demand. */
  z.strictObject({
    kind: z.literal("parameter"),
    role,
    index: z.number().int().min(0).max(65_535),
    subindex: z.number().int().min(0).max(255),
    /** How its octets are read; absent: text where they can be text, else an unsigned integer. */
    encoding: z.enum(["text", "unsigned", "signed", "float", "boolean"]).optional(),
  }),
  z.strictObject({ kind: z.literal("port-status"), role }),
  z.strictObject({ kind: z.literal("validity"), role, direction: z.enum(["in", "out"]) }),
  /** The worst device status of the roles, as DI DeviceHealthEnumeration. */
  z.strictObject({ kind: z.literal("device-status"), roles: z.array(role).min(1).max(32) }),
  z.strictObject({ kind: z.literal("event-code"), role, code: z.number().int().min(0).max(65_535) }),
  registerReferenceSchema,
  tagReferenceSchema,
  jsonPathReferenceSchema,
  nodeReferenceSchema,
  z.strictObject({ kind: z.literal("constant"), value: z.union([z.number(), z.boolean(), z.string().max(10_000)]) }),
]);

export const sourceReferenceSchema = z.union([
  inputReferenceSchema,
  /** An expression over named inputs: other sources, or members of the same type that the mapping feeds. */
  z.strictObject({
    kind: z.literal("formula"),
    expression: z.string().min(1).max(1_000),
    inputs: z
      .record(
        z
          .string()
          .regex(/^[A-Za-z_][A-Za-z0-9_]*$/)
          .max(60),
        z.union([
          inputReferenceSchema,
          z.strictObject({ kind: z.literal("member"), target: z.string().min(1).max(5_000) }),
        ]),
      )
      .refine((inputs) => Object.keys(inputs).length <= 32),
  }),
]);

export const transformSchema = z.discriminatedUnion("kind", [
  /** value × gradient + offset. */
  z.strictObject({ kind: z.literal("linear"), gradient: z.number(), offset: z.number() }),
  /** From one UN/CEFACT unit to another of the same dimension. */
  z.strictObject({ kind: z.literal("unit"), from: z.string().min(2).max(4), to: z.string().min(2).max(4) }),
  /** One bit of an integer; bit 0 is the least significant. */
  z.strictObject({ kind: z.literal("bit"), bit: z.number().int().min(0).max(63), invert: z.boolean().optional() }),
  /** Raw values to an enumeration's values or to text; `otherwise` for all that are not listed, else Bad. */
  z.strictObject({
    kind: z.literal("value-map"),
    entries: z
      .array(
        z.strictObject({ from: z.union([z.number(), z.boolean(), z.string()]), to: z.union([z.number(), z.string()]) }),
      )
      .min(1)
      .max(1_000),
    otherwise: z.union([z.number(), z.string()]).optional(),
  }),
  /** Straight lines between points; outside it holds the end value and says so in the status. */
  z.strictObject({
    kind: z.literal("lookup"),
    points: z
      .array(z.tuple([z.number(), z.number()]))
      .min(2)
      .max(1_000),
  }),
  /** The old value stays until the new one differs by more. */
  z.strictObject({ kind: z.literal("deadband"), width: z.number().min(0) }),
  /** Mean of the last n samples. */
  z.strictObject({ kind: z.literal("average"), samples: z.number().int().min(2).max(10_000) }),
  /** A counter of limited width, made continuous: a step back is a wrap, or a reset when `resets` says so. */
  z.strictObject({ kind: z.literal("counter"), bits: z.number().int().min(1).max(53), resets: z.boolean().optional() }),
]);

export const qualityRulesSchema = z.strictObject({
  /** Process data marked invalid without a known reason: Bad, or Bad_SensorFailure. */
  invalid: z.enum(["Bad", "Bad_SensorFailure"]).optional(),
  /** A value beyond EURange stays Good unless this asks for Uncertain_EngineeringUnitsExceeded. */
  beyondRange: z.enum(["Good", "Uncertain_EngineeringUnitsExceeded"]).optional(),
  /** How many poll periods the last value is kept after the source fell silent (3). */
  keepPeriods: z.number().int().min(0).max(1_000).optional(),
  /** What follows then: no value (Bad_NoCommunication), or the last one for as long as it takes. */
  afterKeep: z.enum(["Bad_NoCommunication", "Uncertain_NoCommunicationLastUsable"]).optional(),
  /** A value outside of what the sensor measures: no value, or the sensor's limit with Uncertain_SensorNotAccurate. */
  outOfRange: z.enum(["Bad_SensorFailure", "Uncertain_SensorNotAccurate"]).optional(),
  /** A formula one of whose inputs is Bad: no value, or what the others give with Uncertain_SubNormal (averages). */
  badInput: z.enum(["Bad", "Uncertain_SubNormal"]).optional(),
});

/**
 * A row without its target: as the model keeps it under the target's name. An `out` row goes the other way: the Variable's
 * value, through the transforms, into an output of the source; it needs limits, beyond which nothing is written.
 */
export const rowContentSchema = z.strictObject({
  direction: z.enum(["in", "out"]).optional(),
  source: sourceReferenceSchema,
  transforms: z.array(transformSchema).max(16),
  quality: qualityRulesSchema.optional(),
  /** Shows the state of a safety signal: read only, never used for protection. */
  mirrorsSafetySignal: z.boolean().optional(),
  /** Milliseconds between readings that the mapping promises. */
  period: z.number().int().min(1).max(86_400_000).optional(),
  comment: z.string().max(2_000).optional(),
  limits: z.strictObject({ low: z.number(), high: z.number() }).optional(),
});

export const mappingRowSchema = z.strictObject({
  /** Browse names from the type down to the Variable: `Process/SpindleSpeed`; names with `/` are escaped as `&/`. */
  target: z.string().min(1).max(5_000),
  ...rowContentSchema.shape,
});

export const mappingSchema = z.strictObject({
  machineType: z.string().min(1).max(5_000),
  roles: z.array(sourceRoleSchema).max(200),
  rows: z.array(mappingRowSchema).max(5_000),
});

export type SourceRole = z.infer<typeof sourceRoleSchema>;
export type SourceReference = z.infer<typeof sourceReferenceSchema>;
export type InputReference = z.infer<typeof inputReferenceSchema>;
export type Transform = z.infer<typeof transformSchema>;
export type QualityRules = z.infer<typeof qualityRulesSchema>;
export type RowContent = z.infer<typeof rowContentSchema>;
export type MappingRow = z.infer<typeof mappingRowSchema>;
export type Mapping = z.infer<typeof mappingSchema>;
