/**
 * Shapes of nodes and headers as zod schemas, strict: an unknown member is an error on both sides of the wire. They hold
 * the shape and the ranges of the types; whatever a reader may have kept from a published file passes, since an undo
 * sends it back as it was. What a model should hold beyond that is the checker's business.
 */
import * as z from "zod/mini";
import { parseNodeId, MAX_NUMERIC_IDENTIFIER, type NodeId, type NodeKey } from "../address-space/node-id";
import {
  checkIdPolicy,
  HIGHEST_ALLOCATED,
  NODE_CLASSES,
  PATH_SEPARATORS,
  type IdPolicy,
} from "../address-space/id-policy";
import type { ModelEntry, ModelHeader } from "../address-space/model-header";
import type { Node } from "../address-space/node";
import { isWritableText } from "../nodeset/values/scalar-text";
import { readFragment } from "../nodeset/values/xml-fragment";
import type { AttributeName } from "./operation";

const MAX_TEXT = 16_000_000;
/** Characters that no XML file can hold (XML 1.0 §2.2): with one of these a model could not be exported any more. */
const text = z.string().check(z.maxLength(MAX_TEXT), z.refine(isWritableText, "Holds characters that XML cannot hold"));
const someText = text.check(z.minLength(1));
const natural = z.int().check(z.minimum(0));
const uint16 = z.int().check(z.minimum(0), z.maximum(65_535));
const uint32 = z.int().check(z.minimum(0), z.maximum(4_294_967_295));
const int32 = z.int().check(z.minimum(-2_147_483_648), z.maximum(2_147_483_647));

export const nodeKeySchema = z.custom<NodeKey>(
  (value) => typeof value === "string" && parseNodeId(value, []).ok,
  "Expected a node key such as i=58 or nsu=URI;i=1",
);

export const nodeIdSchema: z.ZodMiniType<NodeId> = z
  .strictObject({
    namespaceUri: someText,
    type: z.enum(["i", "s", "g", "b"]),
    identifier: z.union([z.int().check(z.minimum(0), z.maximum(MAX_NUMERIC_IDENTIFIER)), text]),
  })
  .check(
    z.refine(
      (id) =>
        parseNodeId(`${id.type}=${id.identifier}`, []).ok && (id.type === "i") === (typeof id.identifier === "number"),
      "The identifier does not fit its type",
    ),
  );

const qualifiedName = z.strictObject({ namespaceUri: someText, name: text });
const localizedText = z.strictObject({ locale: z.optional(text), text });
const localizedTexts = z.array(localizedText);
const XML_NAME = /^[\p{L}_][\p{L}\p{N}_.-]*(?::[\p{L}_][\p{L}\p{N}_.-]*)?$/u;
export const otherAttributesSchema = z.record(z.string().check(z.regex(XML_NAME)), text);
const prefixes = z.record(z.string().check(z.refine((name) => name === "" || XML_NAME.test(name))), text);
const xmlText = z
  .strictObject({ xml: text, prefixes: z.optional(prefixes), attributes: z.optional(otherAttributesSchema) })
  .check(z.refine((value) => readFragment(value).ok, "Is not well-formed XML"));
const rolePermission = z.strictObject({ role: nodeKeySchema, permissions: uint32 });

const declaredReference = z.strictObject({
  type: nodeKeySchema,
  target: nodeKeySchema,
  isForward: z.boolean(),
  serverUri: z.optional(text),
  otherAttributes: z.optional(otherAttributesSchema),
});
/** As the reader keeps it: a comment, a processing instruction, or stray text. */
const mark = text.check(z.refine((value) => readFragment({ xml: value }).ok, "Is not well-formed XML"));
const leftovers = z.array(
  z.strictObject({
    at: text,
    attributes: z.optional(otherAttributesSchema),
    elements: z.optional(z.array(xmlText)),
    before: z.optional(z.array(mark)),
    inside: z.optional(z.array(mark)),
  }),
);

const dataTypeField = z.strictObject({
  name: text,
  symbolicName: z.optional(text),
  displayName: z.optional(localizedTexts),
  description: z.optional(localizedTexts),
  dataType: z.optional(nodeKeySchema),
  valueRank: z.optional(int32),
  arrayDimensions: z.optional(text),
  maxStringLength: z.optional(uint32),
  value: z.optional(z.int()),
  isOptional: z.optional(z.boolean()),
  allowSubTypes: z.optional(z.boolean()),
  otherAttributes: z.optional(otherAttributesSchema),
  otherElements: z.optional(z.array(xmlText)),
});

const dataTypeDefinition = z.strictObject({
  name: qualifiedName,
  symbolicName: z.optional(text),
  isUnion: z.optional(z.boolean()),
  isOptionSet: z.optional(z.boolean()),
  baseType: z.optional(text),
  fields: z.array(dataTypeField),
  otherAttributes: z.optional(otherAttributesSchema),
  otherElements: z.optional(z.array(xmlText)),
});

const baseShape = {
  nodeId: nodeIdSchema,
  order: natural,
  browseName: qualifiedName,
  symbolicName: z.optional(text),
  displayName: localizedTexts,
  description: z.optional(localizedTexts),
  category: z.optional(z.array(text)),
  documentation: z.optional(text),
  releaseStatus: z.optional(z.enum(["Released", "Draft", "Deprecated"])),
  writeMask: z.optional(uint32),
  userWriteMask: z.optional(uint32),
  accessRestrictions: z.optional(uint16),
  hasNoPermissions: z.optional(z.boolean()),
  rolePermissions: z.optional(z.array(rolePermission)),
  extensions: z.optional(z.array(xmlText)),
  otherAttributes: z.optional(otherAttributesSchema),
  otherElements: z.optional(z.array(xmlText)),
  leftovers: z.optional(leftovers),
};

const instanceShape = { ...baseShape, parent: z.optional(nodeKeySchema), designToolOnly: z.optional(z.boolean()) };
const valueShape = {
  value: z.optional(xmlText),
  dataType: z.optional(nodeKeySchema),
  valueRank: z.optional(int32),
  arrayDimensions: z.optional(text),
};
const isAbstract = z.optional(z.boolean());

/** What of each class may be set by itself: everything but key, class and references. */
const attributeShapes = {
  Object: { ...instanceShape, eventNotifier: z.optional(uint32) },
  View: { ...instanceShape, eventNotifier: z.optional(uint32), containsNoLoops: z.optional(z.boolean()) },
  Variable: {
    ...instanceShape,
    ...valueShape,
    accessLevel: z.optional(uint32),
    userAccessLevel: z.optional(uint32),
    minimumSamplingInterval: z.optional(z.number()),
    historizing: z.optional(z.boolean()),
    translations: z.optional(z.array(xmlText)),
  },
  Method: {
    ...instanceShape,
    executable: z.optional(z.boolean()),
    userExecutable: z.optional(z.boolean()),
    methodDeclaration: z.optional(nodeKeySchema),
    argumentDescriptions: z.optional(z.array(z.strictObject({ name: text, description: localizedTexts }))),
  },
  ObjectType: { ...baseShape, isAbstract },
  VariableType: { ...baseShape, ...valueShape, isAbstract },
  DataType: {
    ...baseShape,
    isAbstract,
    purpose: z.optional(z.enum(["Normal", "ServicesOnly", "CodeGenerator"])),
    definition: z.optional(dataTypeDefinition),
  },
  ReferenceType: {
    ...baseShape,
    isAbstract,
    symmetric: z.optional(z.boolean()),
    inverseName: z.optional(localizedTexts),
  },
} as const;

const identity = { key: nodeKeySchema, references: z.array(declaredReference) };

export const nodeSchema = z.discriminatedUnion("nodeClass", [
  z.strictObject({ nodeClass: z.literal("Object"), ...identity, ...attributeShapes.Object }),
  z.strictObject({ nodeClass: z.literal("View"), ...identity, ...attributeShapes.View }),
  z.strictObject({ nodeClass: z.literal("Variable"), ...identity, ...attributeShapes.Variable }),
  z.strictObject({ nodeClass: z.literal("Method"), ...identity, ...attributeShapes.Method }),
  z.strictObject({ nodeClass: z.literal("ObjectType"), ...identity, ...attributeShapes.ObjectType }),
  z.strictObject({ nodeClass: z.literal("VariableType"), ...identity, ...attributeShapes.VariableType }),
  z.strictObject({ nodeClass: z.literal("DataType"), ...identity, ...attributeShapes.DataType }),
  z.strictObject({ nodeClass: z.literal("ReferenceType"), ...identity, ...attributeShapes.ReferenceType }),
]) satisfies z.ZodMiniType<Node>;

/** The schema of each attribute; one name means the same in every class that has it. */
export const attributeSchemas: Readonly<Record<AttributeName, z.ZodMiniType>> = {
  ...attributeShapes.Object,
  ...attributeShapes.View,
  ...attributeShapes.Variable,
  ...attributeShapes.Method,
  ...attributeShapes.DataType,
  ...attributeShapes.ReferenceType,
};

export const modelEntrySchema: z.ZodMiniType<ModelEntry> = z.strictObject({
  modelUri: someText,
  version: z.optional(text),
  modelVersion: z.optional(text),
  publicationDate: z.optional(text),
  xmlSchemaUri: z.optional(text),
  accessRestrictions: z.optional(uint16),
  rolePermissions: z.optional(z.array(rolePermission)),
  requiredModels: z.array(z.lazy(() => modelEntrySchema)),
  otherAttributes: z.optional(otherAttributesSchema),
  otherElements: z.optional(z.array(xmlText)),
});

const idRange = z.strictObject({
  from: z.int().check(z.minimum(1), z.maximum(HIGHEST_ALLOCATED)),
  to: z.int().check(z.minimum(1), z.maximum(HIGHEST_ALLOCATED)),
});

export const idPolicySchema: z.ZodMiniType<IdPolicy> = z
  .discriminatedUnion("kind", [
    z.strictObject({ kind: z.literal("numbers") }),
    z.strictObject({ kind: z.literal("ranges"), ranges: z.partialRecord(z.enum(NODE_CLASSES), idRange) }),
    z.strictObject({
      kind: z.literal("paths"),
      pattern: text.check(z.maxLength(200)),
      separator: z.enum(PATH_SEPARATORS),
    }),
  ])
  .check(z.refine((policy) => checkIdPolicy(policy).length === 0, "Is no usable choice of NodeIds"));

export const headerShape = {
  namespaceUris: z.array(someText),
  serverUris: z.optional(z.array(text)),
  models: z.array(modelEntrySchema),
  aliases: z.optional(z.array(z.tuple([text, nodeKeySchema]))),
  extensions: z.optional(z.array(xmlText)),
  lastModified: z.optional(text),
  headComments: z.optional(z.array(text)),
  rootAttributes: z.optional(otherAttributesSchema),
  otherElements: z.optional(z.array(xmlText)),
  leftovers: z.optional(leftovers),
  idPolicy: z.optional(idPolicySchema),
};

export const modelHeaderSchema = z.strictObject(headerShape) satisfies z.ZodMiniType<ModelHeader>;
