/**
 * The members of SARIF 2.1.0 (OASIS, errata 01) that logs of the checker use, as a JSON Schema: which are required, which
 * values they take, and that no others stand there. Written after the standard's own schema, of which no npm package that
 * we use carries a copy.
 */
const text = { type: "string" };
const count = { type: "integer", minimum: 0 };
const place = { type: "integer", minimum: 1 };
const level = { enum: ["none", "note", "warning", "error"] };
const message = object({ text }, ["text"]);
const artifactLocation = object({ uri: { type: "string", pattern: "^[^\\\\ ]*$" }, uriBaseId: text, index: count });

function object(properties: Readonly<Record<string, unknown>>, required: readonly string[] = []): object {
  return { type: "object", properties, required, additionalProperties: false };
}

const list = (items: unknown): object => ({ type: "array", items });

const location = object({
  physicalLocation: object(
    { artifactLocation, region: object({ startLine: place, startColumn: place }, ["startLine"]) },
    ["artifactLocation"],
  ),
  logicalLocations: list(
    object({
      name: text,
      fullyQualifiedName: text,
      decoratedName: text,
      kind: { enum: ["variable", "object", "type", "member", "namespace", "element", "attribute"] },
    }),
  ),
});

const suppression = object(
  {
    kind: { enum: ["inSource", "external"] },
    status: { enum: ["accepted", "underReview", "rejected"] },
    justification: text,
  },
  ["kind"],
);

const result = object(
  {
    ruleId: text,
    ruleIndex: count,
    level,
    message,
    locations: list(location),
    suppressions: list(suppression),
    partialFingerprints: { type: "object", additionalProperties: text },
  },
  ["message"],
);

const rule = object(
  {
    id: text,
    name: { type: "string", pattern: "^[A-Z][A-Za-z0-9]*$" },
    shortDescription: message,
    fullDescription: message,
    help: message,
    defaultConfiguration: object({ level }),
  },
  ["id"],
);

const notification = object({ level, descriptor: object({ id: text }), message, locations: list(location) }, [
  "message",
]);

const run = object(
  {
    tool: object({ driver: object({ name: text, semanticVersion: text, rules: list(rule) }, ["name"]) }, ["driver"]),
    columnKind: { enum: ["utf16CodeUnits", "unicodeCodePoints"] },
    artifacts: list(object({ location: artifactLocation, mimeType: text })),
    results: list(result),
    invocations: list(
      object({ executionSuccessful: { type: "boolean" }, toolExecutionNotifications: list(notification) }, [
        "executionSuccessful",
      ]),
    ),
  },
  ["tool"],
);

export const SARIF_PROFILE = object({ $schema: text, version: { const: "2.1.0" }, runs: list(run) }, [
  "version",
  "runs",
]);
