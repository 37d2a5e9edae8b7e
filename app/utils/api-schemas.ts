/** The JSON of /api/v1. Routes answer what these say, and the OpenAPI document is made of them. */
import { z } from "zod";
import type { Comparison } from "../domain/compare/change";

export const modelSchema = z
  .object({
    id: z.string(),
    name: z.string(),
    kind: z.enum(["types", "machines"]),
    namespaceUri: z.string(),
    version: z.string().nullable(),
  })
  .meta({ id: "Model", description: "One namespace that the organisation writes." });

const severitySchema = z.enum(["error", "warning", "hint"]);
const placeFields = { line: z.int().min(1), column: z.int().min(1) };

export const findingSchema = z
  .object({
    rule: z.string().meta({ examples: ["R023"] }),
    severity: severitySchema,
    nodeId: z.string().meta({ description: "With nsu=, never an index; empty when the model as a whole is meant." }),
    browseName: z.string(),
    path: z.string(),
    attribute: z.string().optional().meta({ examples: ["dataType"] }),
    ...placeFields,
    message: z.string(),
    clause: z.string().meta({ description: "Part, edition and section of the standard." }),
    facts: z.array(z.string()),
    consequence: z.string().optional().meta({ description: "What happens in practice if nobody mends it." }),
  })
  .meta({ id: "Finding" });

export const findingsSchema = z
  .object({
    file: z.string(),
    counts: z.object({ error: z.int(), warning: z.int(), hint: z.int() }),
    findings: z.array(findingSchema),
    problems: z.array(z.object({ code: z.string(), message: z.string(), ...placeFields })),
  })
  .meta({ id: "Findings", description: "The report that the command line prints, too; lines are those of the export." });

export const problemDocumentSchema = z
  .object({
    type: z.string(),
    title: z.string(),
    status: z.int(),
    code: z.string().optional(),
    detail: z.string().optional(),
    problems: z.array(
      z.looseObject({
        code: z.string(),
        severity: severitySchema,
        message: z.string(),
        line: z.int().optional(),
        column: z.int().optional(),
      }),
    ),
  })
  .meta({ id: "Problem", description: "A problem document after RFC 9457." });

export const revisionSchema = z
  .object({
    number: z.int().min(0),
    seq: z.int().min(0).meta({ description: "The last transaction that it holds." }),
    hash: z.string().meta({ description: "SHA-256 of the contents; equal contents have equal hashes." }),
    message: z.string(),
    author: z.string(),
    at: z.iso.datetime(),
    nodeCount: z.int(),
    counts: z.object({ error: z.int(), warning: z.int(), hint: z.int() }).nullable(),
    changes: z
      .object({ breaking: z.int(), additive: z.int(), neutral: z.int() })
      .nullable()
      .meta({ description: "How much changed by meaning since the revision before; null where nobody counted." }),
    pinned: z.array(z.object({ modelUri: z.string(), version: z.string().nullable(), publicationDate: z.string().nullable() })),
  })
  .meta({ id: "Revision", description: "A frozen state of a model; number 0 is what it began with." });

const ratingSchema = z.enum(["breaking", "additive", "neutral"]);

export const comparisonSchema = z
  .object({
    changes: z.array(
      z.object({
        kind: z.string(),
        nodeId: z.string().nullable().meta({ description: "With nsu=; null when the model as a whole changed." }),
        path: z.string(),
        detail: z.string().nullable(),
        rating: ratingSchema,
        reason: z.string(),
        clause: z.string(),
        before: z.string().nullable(),
        after: z.string().nullable(),
      }),
    ),
    rating: ratingSchema.nullable().meta({ description: "The worst one; null when nothing changed." }),
    proposedVersion: z.string().nullable(),
  })
  .meta({ id: "Comparison", description: "What changed by meaning: breaking first, then additive, then neutral." });

export type ComparisonJson = z.infer<typeof comparisonSchema>;

export function toComparisonJson({ changes, rating, proposedVersion }: Comparison): ComparisonJson {
  return {
    changes: changes.map(({ kind, nodeId, path, detail, rating: rated, reason, clause, before, after }) => ({
      kind,
      nodeId: nodeId ?? null,
      path,
      detail: detail ?? null,
      rating: rated,
      reason,
      clause,
      before,
      after,
    })),
    rating: rating ?? null,
    proposedVersion: proposedVersion ?? null,
  };
}

export type RevisionJson = z.infer<typeof revisionSchema>;
export type ModelJson = z.infer<typeof modelSchema>;

export function toModelJson(row: ModelJson): ModelJson {
  const { id, name, kind, namespaceUri, version } = row;
  return { id, name, kind, namespaceUri, version };
}
