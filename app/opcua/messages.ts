/**
 * Messages between the application and the process of a test server. Both ends parse what they get: the other end may be
 * of another build, or broken. Everything that the child needs travels in `start`; it reads files, never the database.
 */
import { z } from "zod";
import { processDataImageSchema } from "~/domain/iodd/process-data-schema";
import { mappingSchema } from "~/domain/mapping/mapping";

const motionSchema = z.discriminatedUnion("kind", [
  z.object({ kind: z.literal("sine"), low: z.number(), high: z.number(), period: z.number().positive(), phase: z.number() }),
  z.object({ kind: z.literal("ramp"), low: z.number(), high: z.number(), period: z.number().positive(), phase: z.number() }),
  z.object({ kind: z.literal("rise"), low: z.number(), high: z.number(), perSecond: z.number().positive(), phase: z.number() }),
  z.object({ kind: z.literal("steps"), values: z.array(z.number()).min(1), secondsEach: z.number().positive(), phase: z.number() }),
  z.object({ kind: z.literal("count"), start: z.number(), perSecond: z.number().positive(), last: z.number().positive() }),
  z.object({ kind: z.literal("clock") }),
  z.object({ kind: z.literal("static") }),
]);

const builtInTypeSchema = z.enum([
  "Boolean", "SByte", "Byte", "Int16", "UInt16", "Int32", "UInt32", "Int64", "UInt64", "Float", "Double", "String",
  "DateTime", "Guid", "ByteString", "XmlElement", "NodeId", "ExpandedNodeId", "StatusCode", "QualifiedName",
  "LocalizedText", "ExtensionObject", "DataValue", "Variant", "DiagnosticInfo",
]);

export const simulatedVariableSchema = z.object({
  nodeId: z.string(),
  path: z.string(),
  builtInType: builtInTypeSchema,
  dataType: z.string(),
  dimensions: z.array(z.number().int().positive()),
  motion: motionSchema,
  hasValue: z.boolean(),
  isProperty: z.boolean(),
});

const layoutSchema = z.object({
  role: z.string(),
  direction: z.enum(["in", "out"]),
  image: processDataImageSchema,
  profileCharacteristic: z.array(z.number()),
});
const rangeSchema = z.object({ low: z.number(), high: z.number() });

/** Upper ends of the steps in which delays are counted, ms. */
export const DELAY_STEPS = [1, 2, 5, 10, 20, 30, 50, 100, 200, 500] as const;

/** A machine whose Variables a mapping feeds. */
const fedMachineSchema = z.object({
  machine: z.string(),
  mapping: mappingSchema,
  layouts: z.array(layoutSchema),
  ranges: z.record(z.string(), z.object({ range: rangeSchema.optional(), instrumentRange: rangeSchema.optional() })),
  unbound: z.array(z.string()),
  nodes: z.array(z.object({ target: z.string(), nodeId: z.string(), builtInType: builtInTypeSchema })),
});

const inputBase = { machine: z.string(), time: z.number() };
const feedInputSchema = z.discriminatedUnion("kind", [
  z.object({ kind: z.literal("frame"), ...inputBase, role: z.string(), direction: z.enum(["in", "out"]), octets: z.instanceof(Uint8Array), isValid: z.boolean() }),
  z.object({ kind: z.literal("sample"), ...inputBase, channel: z.string(), value: z.union([z.number(), z.bigint(), z.boolean(), z.string(), z.null()]), status: z.number() }),
  z.object({ kind: z.literal("role"), ...inputBase, role: z.string(), state: z.enum(["not-connected", "wrong-device", "device-failure"]), holds: z.boolean() }),
]);

export const startSchema = z.object({
  kind: z.literal("start"),
  id: z.string(),
  applicationName: z.string(),
  applicationUri: z.string(),
  /** Folder of the server's own keys and certificates. */
  pkiFolder: z.string(),
  host: z.string(),
  /** 0 takes a free one. */
  port: z.number().int().min(0).max(65535),
  security: z.array(z.enum(["basic256sha256", "none"])).min(1),
  userName: z.string(),
  password: z.string(),
  simulatedQuality: z.enum(["uncertain", "good"]),
  /** NodeSet2 files in the order of their requirements, the base first. */
  nodeSetFiles: z.array(z.string()).min(1),
  simulation: z.array(simulatedVariableSchema),
  /** Methods that answer with typed results; the others say that they are not implemented. */
  methods: z.array(z.string()),
  maxSessions: z.number().int().positive(),
  /** Machines that live sources feed; their other Variables then wait without a value instead of moving. */
  feed: z.array(fedMachineSchema).optional(),
});
export type StartMessage = z.infer<typeof startSchema>;

export const toChildSchema = z.discriminatedUnion("kind", [
  startSchema,
  z.object({ kind: z.literal("inputs"), inputs: z.array(feedInputSchema) }),
  z.object({ kind: z.literal("stop") }),
]);
export type ToChildMessage = z.infer<typeof toChildSchema>;

const sessionSchema = z.object({
  name: z.string(),
  user: z.string(),
  security: z.string(),
  since: z.string(),
  subscriptions: z.number().int(),
  monitoredItems: z.number().int(),
});

export const toParentSchema = z.discriminatedUnion("kind", [
  z.object({ kind: z.literal("progress"), stage: z.enum(["process", "certificate", "nodesets", "simulation", "endpoint"]) }),
  z.object({
    kind: z.literal("ready"),
    endpointUrl: z.string(),
    certificateThumbprint: z.string(),
    /** DER as base64, so that our own client trusts this server and no other. */
    certificate: z.string(),
    moving: z.number().int(),
    fixed: z.number().int(),
    /** NodeIds of the plan that the server does not have. */
    missing: z.array(z.string()),
  }),
  z.object({ kind: z.literal("sessions"), sessions: z.array(sessionSchema) }),
  /** Resident memory, MB, and share of one processor over the last seconds, 0 … 1. */
  z.object({ kind: z.literal("load"), memory: z.number(), processor: z.number() }),
  z.object({ kind: z.literal("log"), level: z.enum(["info", "warning", "error"]), text: z.string() }),
  z.object({
    kind: z.literal("failed"),
    code: z.string(),
    data: z.record(z.string(), z.union([z.string(), z.number(), z.boolean()])),
  }),
  z.object({
    kind: z.literal("feed"),
    /** Since the start: inputs that came, Variables that changed by them. */
    inputs: z.number().int(),
    changes: z.number().int(),
    /** From acquisition to the Variable's change over the last second, ms; null when nothing came. */
    delay: z.object({ p50: z.number(), p99: z.number(), highest: z.number() }).nullable(),
    /** All delays since the start, counted below each of DELAY_STEPS, the last beyond. */
    histogram: z.array(z.number().int()),
  }),
  z.object({ kind: z.literal("stopped") }),
]);
export type ToParentMessage = z.infer<typeof toParentSchema>;
