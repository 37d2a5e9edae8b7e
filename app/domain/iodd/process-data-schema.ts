/** zod schema of a process data image, for documents that carry layouts from one program to another. */
import { z } from "zod";
import type { ProcessDataImage } from "./device-description";

const textsSchema = z.record(z.string().max(20), z.string().max(2_000));
const scalarSchema = z.union([z.number(), z.boolean(), z.string().max(400)]);
const valued = {
  singleValues: z.array(z.strictObject({ value: scalarSchema, name: textsSchema.optional() })).max(10_000),
  ranges: z.array(z.strictObject({ lower: z.number(), upper: z.number(), name: textsSchema.optional() })).max(1_000),
};

const simpleDatatypeSchema = z.discriminatedUnion("kind", [
  z.strictObject({ kind: z.literal("BooleanT"), ...valued }),
  z.strictObject({ kind: z.literal("UIntegerT"), bitLength: z.number().int().min(2).max(64), ...valued }),
  z.strictObject({ kind: z.literal("IntegerT"), bitLength: z.number().int().min(2).max(64), ...valued }),
  z.strictObject({ kind: z.literal("Float32T"), ...valued }),
  z.strictObject({
    kind: z.literal("StringT"),
    fixedLength: z.number().int().min(1).max(232),
    encoding: z.enum(["UTF-8", "US-ASCII"]),
  }),
  z.strictObject({ kind: z.literal("OctetStringT"), fixedLength: z.number().int().min(1).max(232) }),
  z.strictObject({ kind: z.literal("TimeT") }),
  z.strictObject({ kind: z.literal("TimeSpanT") }),
]);

const recordItemSchema = z.strictObject({
  subindex: z.number().int().min(1).max(255),
  bitOffset: z.number().int().min(0).max(1_856),
  type: simpleDatatypeSchema,
  name: textsSchema.optional(),
  description: textsSchema.optional(),
  accessRightRestriction: z.enum(["ro", "wo"]).optional(),
});

const datatypeSchema = z.union([
  simpleDatatypeSchema,
  z.strictObject({
    kind: z.literal("RecordT"),
    bitLength: z.number().int().min(1).max(1_856),
    items: z.array(recordItemSchema).max(255),
  }),
  z.strictObject({ kind: z.literal("ArrayT"), count: z.number().int().min(1).max(255), element: simpleDatatypeSchema }),
]);

const displayInfoSchema = z.strictObject({
  displayFormat: z.string().max(20).optional(),
  gradient: z.number().optional(),
  offset: z.number().optional(),
  unitCode: z.number().int().optional(),
});

export const processDataImageSchema = z.strictObject({
  id: z.string().min(1).max(400),
  bitLength: z.number().int().min(1).max(256),
  type: datatypeSchema,
  name: textsSchema.optional(),
  /** Scaling and unit by subindex; 0 is the whole of a plain datatype. */
  info: z.record(z.string().regex(/^\d{1,3}$/), displayInfoSchema),
}) satisfies z.ZodType<unknown, unknown>;

/** The schema's output is the domain's type: numbers as keys of a record are text in JSON. */
export function toProcessDataImage(value: z.infer<typeof processDataImageSchema>): ProcessDataImage {
  return value as ProcessDataImage;
}
