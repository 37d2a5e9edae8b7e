/** The OpenAPI 3.1 document of /api/v1, made of the schemas that the routes check and answer with. */
import { waiverFileSchema } from "../domain/checks/waiver-file";
import { freezeSchema } from "./freeze-revision.server";
import { asBuiltIntentSchema } from "./make-as-built.server";
import { testServerIntentSchema } from "./start-test-server.server";
import { choice, json, organization, pathId, problems, refTo, schemas, stateName, toJsonSchema, type JsonObject } from "./openapi-parts.server";
import { mappingPaths } from "./openapi-mapping.server";
import { releasePaths } from "./openapi-releases.server";

const nodeSetBody = { "application/xml": { schema: { type: "string", contentMediaType: "application/xml" } } };

const csvBody = { "text/csv": { schema: { type: "string", contentMediaType: "text/csv" } } };
const appliedNodeIds = {
  type: "object",
  required: ["changed", "unknown", "unnamed"],
  properties: {
    changed: { type: "integer", description: "Nodes that got another NodeId." },
    unknown: {
      type: "array",
      description: "Lines that name no node of the model.",
      items: { type: "object", required: ["symbol", "line"], properties: { symbol: { type: "string" }, line: { type: "integer" } } },
    },
    unnamed: { type: "integer", description: "Nodes that the list does not name; they keep theirs." },
  },
};

const paths = {
  "/models": {
    get: {
      operationId: "listModels",
      summary: "The models of the organisation",
      parameters: [organization],
      responses: { 200: json({ type: "array", items: refTo("Model") }, "The models by name"), ...problems(400, 401, 403, 404) },
    },
    post: {
      operationId: "importModel",
      summary: "Make a model of a NodeSet2 file",
      parameters: [
        { name: "name", in: "query", required: false, schema: { type: "string", maxLength: 100 }, description: "Default: from the namespace." },
        { name: "kind", in: "query", required: false, schema: { type: "string", enum: ["types", "machines"] }, description: "Default: by what the file holds." },
        organization,
      ],
      requestBody: { required: true, content: nodeSetBody },
      responses: { 201: json(refTo("Model"), "The model"), ...problems(400, 401, 403, 404, 409, 413, 415, 422) },
    },
  },
  "/models/{modelId}": {
    parameters: [pathId("modelId")],
    get: { operationId: "getModel", summary: "One model", responses: { 200: json(refTo("Model"), "The model"), ...problems(401, 403, 404) } },
    delete: {
      operationId: "deleteModel",
      summary: "Delete a model with its history",
      responses: { 204: { description: "Deleted" }, ...problems(401, 403, 404, 409) },
    },
  },
  "/models/{modelId}/nodeset": {
    parameters: [pathId("modelId")],
    get: {
      operationId: "exportModel",
      summary: "The NodeSet2 file of the working state",
      parameters: [
        {
          name: "order",
          in: "query",
          required: false,
          schema: { type: "string", enum: ["file", "canonical"], default: "file" },
          description: "file: as it was imported, with what is new behind. canonical: types first, owners before what they own, else by NodeId.",
        },
      ],
      responses: { 200: { description: "The file", content: nodeSetBody }, ...problems(400, 401, 403, 404) },
    },
  },
  "/models/{modelId}/node-ids": {
    parameters: [pathId("modelId")],
    get: {
      operationId: "exportNodeIds",
      summary: "Symbol, identifier and node class of every node (OPC 10000-6 §A.3)",
      responses: { 200: { description: "The list", content: csvBody }, ...problems(401, 403, 404) },
    },
    put: {
      operationId: "applyNodeIds",
      summary: "Give the nodes that a list names the NodeIds of the list",
      requestBody: { required: true, content: csvBody },
      responses: { 200: json(appliedNodeIds, "What it changed"), ...problems(401, 403, 404, 409, 413, 415, 422) },
    },
  },
  "/models/{modelId}/findings": {
    parameters: [pathId("modelId")],
    get: {
      operationId: "listFindings",
      summary: "What the checker says of the working state, without what people have accepted",
      parameters: [
        choice("format", ["json", "sarif", "text"], "The form of the report; SARIF 2.1.0 tells accepted findings as suppressed."),
        choice("severity", ["error", "warning", "hint"], "Only findings of this severity and above."),
      ],
      responses: {
        200: {
          description: "The report",
          content: {
            "application/json": { schema: refTo("Findings") },
            "application/sarif+json": { schema: { type: "object" } },
            "text/plain": { schema: { type: "string" } },
          },
        },
        ...problems(401, 403, 404, 422),
      },
    },
  },
  "/models/{modelId}/waivers": {
    parameters: [pathId("modelId")],
    get: {
      operationId: "listWaivers",
      summary: "Accepted findings, as the file that the command line's --waivers reads",
      responses: { 200: json(toJsonSchema(waiverFileSchema), "The waivers"), ...problems(401, 403, 404) },
    },
  },
  "/models/{modelId}/revisions": {
    parameters: [pathId("modelId")],
    get: {
      operationId: "listRevisions",
      summary: "The frozen states of a model, newest first",
      responses: { 200: json({ type: "array", items: refTo("Revision") }, "The revisions"), ...problems(401, 403, 404) },
    },
    post: {
      operationId: "freezeRevision",
      summary: "Freeze the working state",
      requestBody: { required: true, content: { "application/json": { schema: toJsonSchema(freezeSchema, "input") } } },
      responses: { 201: json(refTo("Revision"), "The revision"), ...problems(400, 401, 403, 404, 409, 415, 422) },
    },
  },
  "/models/{modelId}/revisions/{number}/nodeset": {
    parameters: [pathId("modelId"), { name: "number", in: "path", required: true, schema: { type: "integer", minimum: 0 } }],
    get: {
      operationId: "exportRevision",
      summary: "The NodeSet2 file of a revision",
      responses: { 200: { description: "The file", content: nodeSetBody }, ...problems(401, 403, 404) },
    },
  },
  "/models/{modelId}/comparison": {
    parameters: [pathId("modelId"), stateName("from", "The earlier state."), stateName("to", "The later state.")],
    get: {
      operationId: "compareStates",
      summary: "What changed between two states, by meaning",
      responses: { 200: json(refTo("Comparison"), "The comparison"), ...problems(400, 401, 403, 404) },
    },
  },
  ...releasePaths,
  ...mappingPaths,
  "/models/{modelId}/test-servers": {
    parameters: [pathId("modelId")],
    get: {
      operationId: "listTestServers",
      summary: "The model's test servers",
      responses: { 200: json({ type: "array", items: refTo("TestServer") }, "The test servers"), ...problems(401, 403, 404) },
    },
    post: {
      operationId: "startTestServer",
      summary: "Start a test server on the working state",
      description: "Answers at once in state `starting`. A simulation, not for control.",
      requestBody: { required: false, content: { "application/json": { schema: toJsonSchema(testServerIntentSchema, "input") } } },
      responses: { 201: json(refTo("TestServer"), "The test server, starting"), ...problems(400, 401, 403, 404, 415, 422, 503) },
    },
  },
  "/models/{modelId}/as-built-reports": {
    parameters: [pathId("modelId")],
    get: {
      operationId: "listAsBuiltReports",
      summary: "Comparisons of live servers with states of the model, newest first",
      responses: { 200: json({ type: "array", items: refTo("AsBuiltReport") }, "The reports"), ...problems(401, 403, 404) },
    },
    post: {
      operationId: "startAsBuiltReport",
      summary: "Compare a live server with a state of the model",
      description: "Answers at once with the run; ask for it until it is done. `targetId` is a test server or an endpoint. Reads only.",
      requestBody: { required: true, content: { "application/json": { schema: toJsonSchema(asBuiltIntentSchema, "input") } } },
      responses: { 202: json(refTo("AsBuiltRun"), "The run"), ...problems(400, 401, 403, 404, 415, 422) },
    },
  },
  "/as-built-runs/{runId}": {
    parameters: [pathId("runId")],
    get: {
      operationId: "getAsBuiltRun",
      summary: "How far a comparison with a live server is",
      responses: { 200: json(refTo("AsBuiltRun"), "The run"), ...problems(401, 403, 404) },
    },
  },
  "/as-built-reports/{reportId}": {
    parameters: [pathId("reportId")],
    get: {
      operationId: "getAsBuiltReport",
      summary: "The evidence of one report, the very text that was hashed and signed",
      responses: { 200: json({ type: "object" }, "The report"), ...problems(401, 403, 404) },
    },
  },
  "/test-servers/{testServerId}": {
    parameters: [pathId("testServerId")],
    get: {
      operationId: "getTestServer",
      summary: "State of a test server; ask until it is running or failed",
      responses: { 200: json(refTo("TestServer"), "The test server"), ...problems(401, 403, 404) },
    },
    delete: {
      operationId: "stopTestServer",
      summary: "Stop a test server; its port is free afterwards",
      responses: { 204: { description: "Stopped" }, ...problems(401, 403, 404) },
    },
  },
} as const;

export function makeOpenApiDocument(): JsonObject {
  return {
    openapi: "3.1.0",
    info: {
      title: "Ferrule API",
      version: "1.0.0",
      description: "Models of machines for OPC UA: import, export, findings, test servers. Errors are problem documents (RFC 9457).",
    },
    servers: [{ url: "/api/v1" }],
    security: [{ session: [] }, { bearer: [] }],
    paths,
    components: {
      schemas: Object.fromEntries(Object.entries(schemas).map(([name, schema]) => [name, toJsonSchema(schema)])),
      securitySchemes: {
        session: { type: "apiKey", in: "cookie", name: "ferrule.session_token", description: "Sign in by POST /api/auth/sign-in/email." },
        bearer: { type: "http", scheme: "bearer", description: "A token of the Team page." },
      },
    },
  };
}
