/**
 * The mapping document: everything that a gateway, or anybody else, needs to make node values of frames and registers,
 * without Ferrule. One JSON file for a machine type; our own format, versioned, with a published JSON Schema.
 */
import { z } from "zod";
import { fail, ok, problem, type Result } from "../core/result";
import type { Direction, ProcessDataImage } from "../iodd/device-description";
import { processDataImageSchema, toProcessDataImage } from "../iodd/process-data-schema";
import { mappingSchema } from "../mapping/mapping";
import { bindingSchema, checkCaseSchema } from "../mapping/mapping-parts";
import { sourceAddressSchema, sourceKinds } from "../mapping/source-settings";

export const MAPPING_DOCUMENT_FORMAT = "ferrule-mapping-document";
export const MAPPING_DOCUMENT_VERSION = 1;

const nodeSchema = z.strictObject({
  /** As in the mapping's rows. */
  target: z.string().min(1).max(5_000),
  /** NodeId text with `nsu=`. */
  nodeId: z.string().min(3).max(5_000),
  dataType: z.string().max(500),
  /** UN/CEFACT common code and the id of OPC UA's EUInformation. */
  unit: z.strictObject({ code: z.string().max(4), unitId: z.number().int(), symbol: z.string().max(100) }).nullable(),
  range: z.strictObject({ low: z.number(), high: z.number() }).nullable(),
});

const layoutSchema = z.strictObject({
  role: z.string().min(1).max(100),
  direction: z.enum(["in", "out"]),
  /** Decimal profile identifiers of the device: they say which raw values are no measurement. */
  profileCharacteristic: z.array(z.number().int()).max(100),
  image: processDataImageSchema,
});

/** Where one machine finds the roles; absent in the document of a type. */
const machineSchema = z.strictObject({
  name: z.string().max(2_000),
  nodeId: z.string().max(5_000),
  bindings: z
    .array(
      z.strictObject({
        role: z.string().min(1).max(100),
        ...bindingSchema.omit({ sourceId: true, deviceDescriptionId: true }).shape,
        source: z.strictObject({ name: z.string().max(100), kind: z.enum(sourceKinds), address: sourceAddressSchema }),
      }),
    )
    .max(200),
});

export const mappingDocumentSchema = z.strictObject({
  $schema: z.string().max(500).optional(),
  format: z.literal(MAPPING_DOCUMENT_FORMAT),
  formatVersion: z.literal(MAPPING_DOCUMENT_VERSION),
  model: z.strictObject({
    namespaceUri: z.string().min(1).max(2_000),
    version: z.string().max(200).nullable(),
    revision: z.string().max(200).nullable(),
  }),
  mapping: mappingSchema,
  layouts: z.array(layoutSchema).max(400),
  nodes: z.array(nodeSchema).max(5_000),
  machine: machineSchema.optional(),
  /** Recorded frames with the values expected from them; targets as in the rows. */
  checkCases: z.array(checkCaseSchema).max(1_000).optional(),
});

export type MappingDocument = z.infer<typeof mappingDocumentSchema>;

export const MAX_DOCUMENT_CHARACTERS = 20_000_000;

/** Problems: `document.too-large`, `document.no-json`, `document.format`, `document.invalid` with the place in the document. */
export function readMappingDocument(text: string): Result<MappingDocument> {
  if (text.length > MAX_DOCUMENT_CHARACTERS) {
    return fail(problem("document.too-large", { size: text.length, limit: MAX_DOCUMENT_CHARACTERS }));
  }
  const parsed = parseJson(text);
  if (!parsed.ok) return parsed;
  const head = parsed.value as { format?: unknown; formatVersion?: unknown } | null;
  if (head?.format !== MAPPING_DOCUMENT_FORMAT || head.formatVersion !== MAPPING_DOCUMENT_VERSION) {
    return fail(problem("document.format", { expected: `${MAPPING_DOCUMENT_FORMAT} ${MAPPING_DOCUMENT_VERSION}` }));
  }
  const checked = mappingDocumentSchema.safeParse(parsed.value);
  if (checked.success) return ok(checked.data);
  const issues = checked.error.issues.slice(0, 100);
  return fail(
    ...issues.map((issue) => problem("document.invalid", { message: issue.message }, { path: issue.path.join("/") })),
  );
}

function parseJson(text: string): Result<unknown> {
  try {
    return ok(JSON.parse(text));
  } catch (error) {
    return fail(problem("document.no-json", { message: error instanceof Error ? error.message : String(error) }));
  }
}

/** The document as text: two spaces, keys in the order of the schema, so that it diffs well. */
export function writeMappingDocument(document: MappingDocument): string {
  return `${JSON.stringify(document, null, 2)}\n`;
}

/** The layouts by role and direction, as the plan of a mapping asks for them. */
export function findLayout(
  document: MappingDocument,
  role: string,
  direction: Direction,
): { image: ProcessDataImage; profileCharacteristic: readonly number[] } | undefined {
  const found = document.layouts.find((l) => l.role === role && l.direction === direction);
  return found && { image: toProcessDataImage(found.image), profileCharacteristic: found.profileCharacteristic };
}

/** JSON Schema (draft 2020-12) of the document, made from the same schema that reads it. */
export function makeMappingDocumentSchema(): unknown {
  return {
    title: "Ferrule mapping document",
    description:
      "From sources of a machine type to the Variables of its OPC UA model, with layouts, transforms, units and quality.",
    ...z.toJSONSchema(mappingDocumentSchema),
  };
}
