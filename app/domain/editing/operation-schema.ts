/**
 * The JSON form of operations, checked on both sides of the wire. `operationSchema.parse(JSON.parse(JSON.stringify(op)))`
 * equals `op` for every operation that a command or an inverse makes.
 */
import { z } from "zod";
import { mappingParts } from "../address-space/mapping-entry";
import type { ModelHeader } from "../address-space/model-header";
import { mappingPartSchemas } from "../mapping/mapping-parts";
import { isRequiredAttribute } from "./attribute-names";
import { attributeSchemas, headerShape, nodeIdSchema, nodeKeySchema, nodeSchema, otherAttributesSchema } from "./node-schema";
import type { AttributeName, Operation } from "./operation";

const place = z.int().min(0);
const edge = { source: nodeKeySchema, type: nodeKeySchema, target: nodeKeySchema };
const attributeName = z.enum(Object.keys(attributeSchemas) as [AttributeName, ...AttributeName[]]);
const headerField = z.enum(Object.keys(headerShape) as [keyof ModelHeader, ...(keyof ModelHeader)[]]);

const setAttribute = z
  .strictObject({
    kind: z.literal("setAttribute"),
    key: nodeKeySchema,
    attribute: attributeName,
    value: z.unknown().optional(),
  })
  .superRefine((operation, context) => {
    if (operation.value === undefined && !isRequiredAttribute(operation.attribute)) return;
    copyIssues(attributeSchemas[operation.attribute], operation.value, context);
  });

const setHeader = z
  .strictObject({ kind: z.literal("setHeader"), field: headerField, value: z.unknown().optional() })
  .superRefine((operation, context) => copyIssues(headerShape[operation.field], operation.value, context));

const setMapping = z
  .strictObject({
    kind: z.literal("setMapping"),
    part: z.enum(mappingParts),
    owner: nodeKeySchema,
    id: z.string().min(1).max(10_000),
    value: z.unknown().optional(),
    isDangling: z.literal(true).optional(),
  })
  .superRefine((operation, context) => {
    if (operation.value !== undefined) copyIssues(mappingPartSchemas[operation.part], operation.value, context);
  });

function copyIssues(schema: z.core.$ZodType, value: unknown, context: z.RefinementCtx): void {
  const result = z.safeParse(schema, value);
  if (result.success) return;
  for (const issue of result.error.issues) {
    context.addIssue({ code: "custom", message: issue.message, path: ["value", ...issue.path] });
  }
}

export const operationSchema: z.ZodType<Operation> = z.discriminatedUnion("kind", [
  z.strictObject({ kind: z.literal("addNode"), node: nodeSchema, isDangling: z.literal(true).optional() }),
  z.strictObject({ kind: z.literal("removeNode"), key: nodeKeySchema }),
  setAttribute,
  z.strictObject({
    kind: z.literal("renumber"),
    changes: z.array(z.strictObject({ key: nodeKeySchema, nodeId: nodeIdSchema })).min(1),
  }),
  z.strictObject({
    kind: z.literal("addReference"),
    ...edge,
    declaredAt: z.enum(["source", "target", "both"]),
    sourceIndex: place.optional(),
    targetIndex: place.optional(),
    sourceAttributes: z.optional(otherAttributesSchema),
    targetAttributes: z.optional(otherAttributesSchema),
    repeats: z.strictObject({ source: z.array(place), target: z.array(place) }).optional(),
    isDangling: z.literal(true).optional(),
  }),
  z.strictObject({ kind: z.literal("removeReference"), ...edge }),
  setHeader,
  setMapping,
]);

/** The most operations in one transaction: more than the deepest instantiation needs, little enough to answer quickly. */
export const MAX_OPERATIONS = 100_000;

export const operationsSchema: z.ZodType<Operation[]> = z.array(operationSchema).min(1).max(MAX_OPERATIONS);
