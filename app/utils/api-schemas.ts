/** The JSON of /api/v1. Routes answer what these say, and the OpenAPI document is made of them. */
import { z } from "zod";

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
    ...placeFields,
    message: z.string(),
    clause: z.string().meta({ description: "Part, edition and section of the standard." }),
    facts: z.array(z.string()),
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

export type ModelJson = z.infer<typeof modelSchema>;

export function toModelJson(row: ModelJson): ModelJson {
  const { id, name, kind, namespaceUri, version } = row;
  return { id, name, kind, namespaceUri, version };
}
