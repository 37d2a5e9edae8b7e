/**
 * What a model keeps of its mapping, part by part. A machine type has roles, rows, check cases and surveyed signals; a
 * machine has bindings of the roles and exceptions from the type's rows.
 *
 * Rows and formulas name Variables by *target text*: the key of the instance declaration, which survives renaming and
 * moving, and for a member that only a foreign type declares the key of the member above it with the browse path below,
 * parted by a line feed (list-targets.ts).
 */
import { z } from "zod";
import type { MappingPart } from "../address-space/mapping-entry";
import { processDataImageSchema } from "../iodd/process-data-schema";
import { inputReferenceSchema, rowContentSchema, sourceRoleSchema, type RowContent } from "./mapping";

const text = z.string().max(2_000);
const id = z.string().min(1).max(200);
const target = z.string().min(1).max(10_000);

/** What stands behind a role on every machine, with the layouts of its process data, so that no library is needed to run. */
export const roleSchema = sourceRoleSchema.omit({ role: true }).extend({
  /** The description in the device library that the layouts were taken from. */
  deviceDescriptionId: id.optional(),
  profileCharacteristic: z.array(z.number().int()).max(100).optional(),
  layouts: z
    .strictObject({ in: processDataImageSchema.optional(), out: processDataImageSchema.optional() })
    .optional(),
  /** Names that it had before: bindings made under one of them still hold. */
  formerNames: z.array(z.string().max(100)).max(50).optional(),
});

const scalar = z.union([z.number(), z.boolean(), z.string().max(10_000), z.null()]);

/** Recorded input with the node values expected from it. */
export const checkCaseSchema = z.strictObject({
  name: z.string().min(1).max(200),
  frames: z
    .array(
      z.strictObject({
        role: z.string().min(1).max(100),
        direction: z.enum(["in", "out"]),
        /** Pairs in transmission order. */
        hex: z.string().regex(/^(?:[0-9A-Fa-f]{2}\s*)+$/).max(500),
        isValid: z.boolean().optional(),
      }),
    )
    .max(100),
  samples: z
    .array(
      z.strictObject({
        reference: inputReferenceSchema,
        value: scalar,
        /** OPC UA status code; 0 when absent. */
        status: z.number().int().min(0).max(0xffffffff).optional(),
      }),
    )
    .max(500),
  expected: z
    .array(
      z.strictObject({
        target,
        value: scalar,
        /** How far a number may lie beside the expected one; 0 when absent. */
        tolerance: z.number().min(0).optional(),
        status: z.number().int().min(0).max(0xffffffff),
      }),
    )
    .min(1)
    .max(500),
  note: text.optional(),
});

export const signalStates = ["wanted", "open", "decided", "built", "dropped"] as const;

/** What a machine type should tell, who wants it, and what delivers it. */
export const surveySignalSchema = z.strictObject({
  name: z.string().min(1).max(512),
  /** One of the sub-objects of the type, such as Process or Energy. */
  group: z.string().max(200),
  wantedBy: z.array(z.string().min(1).max(200)).max(50),
  state: z.enum(signalStates),
  delivery: z.strictObject({
    kind: z.enum(["present", "buy", "none"]),
    text,
    deviceDescriptionId: id.optional(),
  }),
  evidence: z.array(z.strictObject({ kind: z.enum(["photo", "page", "note"]), text, url: text.optional() })).max(50),
  dataType: z.string().max(200).optional(),
  /** UN/CEFACT common code. */
  unit: z.string().min(2).max(4).optional(),
  range: z.strictObject({ low: z.number(), high: z.number() }).optional(),
  note: text.optional(),
  /** The member that it became. */
  target: target.optional(),
});

/** Where a role of the type is found on one machine. Which members count depends on the kind of source. */
export const bindingSchema = z.strictObject({
  sourceId: id,
  port: z.number().int().min(1).max(255).optional(),
  unitId: z.number().int().min(0).max(255).optional(),
  /** Added to every register address of the role's rows. */
  addressOffset: z.number().int().min(-65_535).max(65_535).optional(),
  /** Put before every tag name or browse path of the role's rows. */
  path: z.string().max(2_000).optional(),
  deviceAlias: z.string().max(200).optional(),
  serialNumber: z.string().max(200).optional(),
  deviceDescriptionId: id.optional(),
});

/** A machine that differs from its type in one row: another source or transform, or none at all. */
export const rowExceptionSchema = z.strictObject({
  reason: z.string().min(1).max(2_000),
  isMissing: z.literal(true).optional(),
  row: rowContentSchema.partial().optional(),
});

export const mappingPartSchemas = {
  role: roleSchema,
  row: rowContentSchema,
  "check-case": checkCaseSchema,
  signal: surveySignalSchema,
  binding: bindingSchema,
  exception: rowExceptionSchema,
} as const satisfies Record<MappingPart, z.ZodType>;

export type Role = z.infer<typeof roleSchema>;
export type CheckCase = z.infer<typeof checkCaseSchema>;
export type SurveySignal = z.infer<typeof surveySignalSchema>;
export type Binding = z.infer<typeof bindingSchema>;
export type RowException = z.infer<typeof rowExceptionSchema>;

export type MappingPartValues = {
  readonly role: Role;
  readonly row: RowContent;
  readonly "check-case": CheckCase;
  readonly signal: SurveySignal;
  readonly binding: Binding;
  readonly exception: RowException;
};
