/** What the paths of the OpenAPI document are put together from: the schemas that routes check and answer with, problems, parameters. */
import { z } from "zod";
import { comparisonSchema, findingsSchema, modelSchema, problemDocumentSchema, revisionSchema } from "../utils/api-schemas";
import { deliverySchema, readerJsonSchema, releaseJsonSchema, reviewCommentSchema, reviewSchema } from "../utils/release-schemas";
import { testServerAnswerSchema } from "./describe-test-server.server";
import { asBuiltRunSchema, asBuiltSummarySchema } from "./read-as-built.server";

export const schemas = {
  Model: modelSchema,
  Findings: findingsSchema,
  Revision: revisionSchema,
  Comparison: comparisonSchema,
  Review: reviewSchema,
  ReviewComment: reviewCommentSchema,
  Release: releaseJsonSchema,
  Delivery: deliverySchema,
  Reader: readerJsonSchema,
  TestServer: testServerAnswerSchema,
  AsBuiltReport: asBuiltSummarySchema,
  AsBuiltRun: asBuiltRunSchema,
  Problem: problemDocumentSchema,
} as const;
export type SchemaName = keyof typeof schemas;

export type JsonObject = { readonly [name: string]: unknown };

export function toJsonSchema(schema: z.ZodType, io: "input" | "output" = "output"): JsonObject {
  const whole = z.toJSONSchema(schema, { io, reused: "inline" });
  return inlineDefinitions(Object.fromEntries(Object.entries(whole).filter(([name]) => name !== "$schema")));
}

/** zod puts schemas that carry an id under $defs; in this document each stands in components or inline. */
function inlineDefinitions(json: JsonObject): JsonObject {
  const { $defs, ...rest } = json as { $defs?: Record<string, JsonObject> } & JsonObject;
  if (!$defs) return rest;
  const resolve = (value: unknown): unknown => {
    if (Array.isArray(value)) return value.map(resolve);
    if (typeof value !== "object" || value === null) return value;
    const { $ref } = value as { $ref?: string };
    const target = $ref === undefined ? undefined : $defs[$ref.slice("#/$defs/".length)];
    if (target) return resolve(target);
    return Object.fromEntries(Object.entries(value).map(([key, inner]) => [key, resolve(inner)]));
  };
  return resolve(rest) as JsonObject;
}

export const refTo = (name: SchemaName) => ({ $ref: `#/components/schemas/${name}` });
export const json = (schema: JsonObject, description: string) => ({ description, content: { "application/json": { schema } } });

const problemMeanings: Readonly<Record<number, string>> = {
  400: "The request cannot be understood",
  401: "Nobody is signed in, or the token does not hold",
  403: "The roles or the token's scopes do not allow it, or the origin is foreign",
  404: "It does not exist, or belongs to another organisation",
  409: "In conflict with the present state",
  413: "Larger than 50 MB",
  415: "Wrong content type",
  422: "Cannot be processed; `problems` tell code, message and place",
  503: "Not available now",
};

export function problems(...codes: readonly number[]) {
  const content = { "application/problem+json": { schema: refTo("Problem") } };
  return Object.fromEntries(codes.map((code) => [String(code), { description: problemMeanings[code] ?? "Problem", content }]));
}

export const organization = {
  name: "organization",
  in: "query",
  required: false,
  schema: { type: "string" },
  description: "Needed only by a session of somebody who belongs to several organisations.",
};
export const pathId = (name: string) => ({ name, in: "path", required: true, schema: { type: "string" } });
export const choice = (name: string, values: readonly string[], description: string) => ({
  name,
  in: "query",
  schema: { type: "string", enum: values },
  description,
});
export const stateName = (name: string, description: string) => ({
  name,
  in: "query",
  required: true,
  schema: { type: "string", pattern: "^(working|[0-9]{1,9})$" },
  description: `${description} The number of a revision, or \`working\`.`,
});

export const inputOf = (schema: z.ZodType) => ({ required: true, content: { "application/json": { schema: toJsonSchema(schema, "input") } } });
