/** Devices, sources and mappings in the OpenAPI document. */
import { json, organization, pathId, problems } from "./openapi-parts.server";

const deviceSummary = {
  type: "object",
  required: ["id", "vendorId", "deviceId", "vendorName", "deviceName", "schemaVersion", "documentVersion", "releaseDate"],
  properties: {
    id: { type: "string" },
    vendorId: { type: "integer" },
    deviceId: { type: "integer" },
    vendorName: { type: "string" },
    deviceName: { type: "string" },
    schemaVersion: { type: "string" },
    documentVersion: { type: "string" },
    releaseDate: { type: "string" },
    hash: { type: "string", description: "SHA-256 of the uploaded file." },
  },
};
const ofMachine = {
  name: "of",
  in: "query",
  required: false,
  schema: { type: "string" },
  description: "A machine, or a machine type, by name or node key; may be left out when there is only one.",
};

export const mappingPaths = {
  "/devices": {
    get: {
      operationId: "listDevices",
      summary: "The device library",
      parameters: [organization],
      responses: { 200: json({ type: "array", items: deviceSummary }, "The devices"), ...problems(400, 401, 403, 404) },
    },
    post: {
      operationId: "addDevice",
      summary: "Add an IO-Link device description (IODD 1.0.1 or 1.1), as XML or ZIP",
      parameters: [organization, { name: "name", in: "query", required: false, schema: { type: "string" }, description: "The name of the file." }],
      requestBody: { required: true, content: { "application/zip": { schema: { type: "string", contentMediaType: "application/zip" } }, "application/xml": { schema: { type: "string" } } } },
      responses: { 201: json({ type: "object", properties: { devices: { type: "array", items: deviceSummary } } }, "What the file gave"), ...problems(400, 401, 403, 404, 413, 422) },
    },
  },
  "/devices/{deviceId}": {
    parameters: [pathId("deviceId")],
    get: {
      operationId: "getDevice",
      summary: "What was read of a device description",
      responses: { 200: json({ type: "object" }, "Identity, variants, variables, process data, events, menus, texts"), ...problems(401, 403, 404) },
    },
  },
  "/sources": {
    get: {
      operationId: "listSources",
      summary: "Sources with the plan of their ports, gateways, and what machines bind",
      parameters: [organization],
      responses: { 200: json({ type: "object" }, "The sources"), ...problems(400, 401, 403, 404) },
    },
  },
  "/models/{modelId}/mapping": {
    parameters: [pathId("modelId"), ofMachine],
    get: {
      operationId: "exportMapping",
      summary: "The mapping of a machine type, or of a machine with its NodeIds and addresses",
      parameters: [{ name: "format", in: "query", required: false, schema: { type: "string", enum: ["document", "csv", "thing-description"], default: "document" } }],
      responses: {
        200: { description: "The mapping", content: { "application/json": { schema: { type: "object" } }, "text/csv": { schema: { type: "string" } }, "application/td+json": { schema: { type: "object" } } } },
        ...problems(401, 403, 404, 422),
      },
    },
    put: {
      operationId: "importMapping",
      summary: "Give a machine type the mapping of a document, in one edit",
      requestBody: { required: true, content: { "application/json": { schema: { type: "object", description: "A mapping document, see /mapping-document-schema." } } } },
      responses: { 200: json({ type: "object", required: ["operations"], properties: { operations: { type: "integer" } } }, "How many operations it took"), ...problems(401, 403, 404, 413, 415, 422) },
    },
  },
  "/mapping-document-schema": {
    get: {
      operationId: "getMappingDocumentSchema",
      summary: "The JSON Schema of mapping documents",
      responses: { 200: { description: "The schema", content: { "application/schema+json": { schema: { type: "object" } } } }, ...problems(401) },
    },
  },
} as const;
