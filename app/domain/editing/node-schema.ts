/**
 * Shapes of nodes and headers as zod schemas, strict: an unknown member is an error on both sides of the wire. They hold
 * the shape and the ranges of the types; whatever a reader may have kept from a published file passes, since an undo
 * sends it back as it was. What a model should hold beyond that is the checker's business.
 */
import { z } from "zod";
import { parseNodeId, MAX_NUMERIC_IDENTIFIER, type NodeId, type NodeKey } from "../address-space/node-id";
import type { ModelEntry, ModelHeader } from "../address-space/model-header";
import type { Node, NodeClass } from "../address-space/node";
import { isWritableText } from "../nodeset/values/scalar-text";
import { readFragment } from "../nodeset/values/xml-fragment";
import type { AttributeName } from "./operation";

const MAX_TEXT = 16_000_000;
/** Characters that no XML file can hold (XML 1.0 §2.2): with one of these a model could not be exported any more. */
const text = z.string().max(MAX_TEXT).refine(isWritableText, "Holds characters that XML cannot hold");
const uint16 = z.int().min(0).max(65_535);
const uint32 = z.int().min(0).max(4_294_967_295);
const int32 = z.int().min(-2_147_483_648).max(2_147_483_647);

export const nodeKeySchema = z.custom<NodeKey>(
  (value) => typeof value === "string" && parseNodeId(value, []).ok,
  "Expected a node key such as i=58 or nsu=URI;i=1",
);

export const nodeIdSchema: z.ZodType<NodeId> = z
  .strictObject({
    namespaceUri: text.min(1),
    type: z.enum(["i", "s", "g", "b"]),
    identifier: z.union([z.int().min(0).max(MAX_NUMERIC_IDENTIFIER), text]),
  })
  .refine(
    (id) =>
      parseNodeId(`${id.type}=${id.identifier}`, []).ok && (id.type === "i") === (typeof id.identifier === "number"),
    {
      message: "The identifier does not fit its type",
    },
  );

const qualifiedName = z.strictObject({ namespaceUri: text.min(1), name: text });
const localizedText = z.strictObject({ locale: text.optional(), text });
const localizedTexts = z.array(localizedText);
const XML_NAME = /^[\p{L}_][\p{L}\p{N}_.-]*(?::[\p{L}_][\p{L}\p{N}_.-]*)?$/u;
const otherAttributes = z.record(z.string().regex(XML_NAME), text);
const prefixes = z.record(
  z.string().refine((name) => name === "" || XML_NAME.test(name)),
  text,
);
const xmlText = z
  .strictObject({ xml: text, prefixes: prefixes.optional(), attributes: otherAttributes.optional() })
  .refine((value) => readFragment(value).ok, "Is not well-formed XML");
const rolePermission = z.strictObject({ role: nodeKeySchema, permissions: uint32 });

const declaredReference = z.strictObject({
  type: nodeKeySchema,
  target: nodeKeySchema,
  isForward: z.boolean(),
  serverUri: text.optional(),
});

const dataTypeField = z.strictObject({
  name: text,
  symbolicName: text.optional(),
  displayName: localizedTexts.optional(),
  description: localizedTexts.optional(),
  dataType: nodeKeySchema.optional(),
  valueRank: int32.optional(),
  arrayDimensions: text.optional(),
  maxStringLength: uint32.optional(),
  value: z.int().optional(),
  isOptional: z.boolean().optional(),
  allowSubTypes: z.boolean().optional(),
  otherAttributes: otherAttributes.optional(),
});

const dataTypeDefinition = z.strictObject({
  name: qualifiedName,
  symbolicName: text.optional(),
  isUnion: z.boolean().optional(),
  isOptionSet: z.boolean().optional(),
  baseType: text.optional(),
  fields: z.array(dataTypeField),
  otherAttributes: otherAttributes.optional(),
});

const baseShape = {
  nodeId: nodeIdSchema,
  order: z.int().min(0),
  browseName: qualifiedName,
  symbolicName: text.optional(),
  displayName: localizedTexts,
  description: localizedTexts.optional(),
  category: z.array(text).optional(),
  documentation: text.optional(),
  releaseStatus: z.enum(["Released", "Draft", "Deprecated"]).optional(),
  writeMask: uint32.optional(),
  userWriteMask: uint32.optional(),
  accessRestrictions: uint16.optional(),
  hasNoPermissions: z.boolean().optional(),
  rolePermissions: z.array(rolePermission).optional(),
  extensions: z.array(xmlText).optional(),
  otherAttributes: otherAttributes.optional(),
  otherElements: z.array(xmlText).optional(),
};

const instanceShape = { ...baseShape, parent: nodeKeySchema.optional(), designToolOnly: z.boolean().optional() };
const valueShape = {
  value: xmlText.optional(),
  dataType: nodeKeySchema.optional(),
  valueRank: int32.optional(),
  arrayDimensions: text.optional(),
};
const isAbstract = z.boolean().optional();

/** What of each class may be set by itself: everything but key, class and references. */
const attributeShapes = {
  Object: { ...instanceShape, eventNotifier: uint32.optional() },
  View: { ...instanceShape, eventNotifier: uint32.optional(), containsNoLoops: z.boolean().optional() },
  Variable: {
    ...instanceShape,
    ...valueShape,
    accessLevel: uint32.optional(),
    userAccessLevel: uint32.optional(),
    minimumSamplingInterval: z.number().optional(),
    historizing: z.boolean().optional(),
    translations: z.array(xmlText).optional(),
  },
  Method: {
    ...instanceShape,
    executable: z.boolean().optional(),
    userExecutable: z.boolean().optional(),
    methodDeclaration: nodeKeySchema.optional(),
    argumentDescriptions: z.array(z.strictObject({ name: text, description: localizedTexts })).optional(),
  },
  ObjectType: { ...baseShape, isAbstract },
  VariableType: { ...baseShape, ...valueShape, isAbstract },
  DataType: {
    ...baseShape,
    isAbstract,
    purpose: z.enum(["Normal", "ServicesOnly", "CodeGenerator"]).optional(),
    definition: dataTypeDefinition.optional(),
  },
  ReferenceType: {
    ...baseShape,
    isAbstract,
    symmetric: z.boolean().optional(),
    inverseName: localizedTexts.optional(),
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
]) satisfies z.ZodType<Node>;

/** The schema of each attribute; one name means the same in every class that has it. */
export const attributeSchemas: Readonly<Record<AttributeName, z.ZodType>> = {
  ...attributeShapes.Object,
  ...attributeShapes.View,
  ...attributeShapes.Variable,
  ...attributeShapes.Method,
  ...attributeShapes.DataType,
  ...attributeShapes.ReferenceType,
};

const attributesByClass = new Map<NodeClass, ReadonlySet<string>>(
  Object.entries(attributeShapes).map(([nodeClass, shape]) => [nodeClass as NodeClass, new Set(Object.keys(shape))]),
);

/** Whether nodes of the class have the attribute (OPC 10000-6 Annex F, OPC 10000-3 §5.3–5.8). */
export function hasAttribute(nodeClass: NodeClass, attribute: AttributeName): boolean {
  return attributesByClass.get(nodeClass)?.has(attribute) ?? false;
}

/** Attributes that a node always has. */
export function isRequiredAttribute(attribute: AttributeName): boolean {
  return attribute === "nodeId" || attribute === "order" || attribute === "browseName" || attribute === "displayName";
}

export const modelEntrySchema: z.ZodType<ModelEntry> = z.strictObject({
  modelUri: text.min(1),
  version: text.optional(),
  modelVersion: text.optional(),
  publicationDate: text.optional(),
  xmlSchemaUri: text.optional(),
  accessRestrictions: uint16.optional(),
  rolePermissions: z.array(rolePermission).optional(),
  requiredModels: z.array(z.lazy(() => modelEntrySchema)),
  otherAttributes: otherAttributes.optional(),
});

export const headerShape = {
  namespaceUris: z.array(text.min(1)),
  serverUris: z.array(text).optional(),
  models: z.array(modelEntrySchema),
  aliases: z.array(z.tuple([text, nodeKeySchema])).optional(),
  extensions: z.array(xmlText).optional(),
  lastModified: text.optional(),
  headComments: z.array(text).optional(),
  rootAttributes: otherAttributes.optional(),
  otherElements: z.array(xmlText).optional(),
};

export const modelHeaderSchema = z.strictObject(headerShape) satisfies z.ZodType<ModelHeader>;
