/** Arbitrary models with every attribute that a NodeSet2 file can hold, for laws of reading and writing. */
import fc from "fast-check";
import type { ModelEntry, ModelHeader } from "~/domain/address-space/model-header";
import type { DataTypeField, DeclaredReference, Node, NodeClass } from "~/domain/address-space/node";
import { formatNodeId, toNodeKey, type NodeId, type NodeKey } from "~/domain/address-space/node-id";
import type { LocalizedText } from "~/domain/address-space/qualified-name";
import { NODE_ATTRIBUTES, type AttributeType } from "~/domain/nodeset/attribute-tables";

export const NAMESPACES = ["http://merrow.example/own/", "http://merrow.example/other;50%/", "urn:merrow:third"];
const STANDARD = "http://opcfoundation.org/UA/";

/** Any text that XML can hold, awkward characters more often than by chance. */
export const text: fc.Arbitrary<string> = fc
  .array(
    fc.oneof(
      fc.constantFrom("<", ">", "&", '"', "'", "\n", "\t", "\r", " ", ";", "]]>", ":", "1:", "é", "漢", "🪢", "&amp;"),
      fc.string({ maxLength: 3 }),
    ),
    { maxLength: 6 },
  )
  .map((parts) => parts.join("").replace(/[^\t\n\r\u{20}-\u{D7FF}\u{E000}-\u{FFFD}\u{10000}-\u{10FFFF}]/gu, ""));

/** A string identifier; white space at its ends and line breaks are told apart nowhere in OPC UA's own texts. */
const identifier = text.map((one) => one.replace(/\s+/g, " ").trim()).filter((one) => one !== "");

const nodeId: fc.Arbitrary<NodeId> = fc
  .tuple(
    fc.constantFrom(...NAMESPACES),
    fc.oneof(
      fc.nat(4294967295).map((id) => ({ type: "i" as const, identifier: id })),
      identifier.map((id) => ({ type: "s" as const, identifier: id })),
      fc.uuid().map((id) => ({ type: "g" as const, identifier: id })),
      fc
        .uint8Array({ minLength: 1, maxLength: 6 })
        .map((id) => ({ type: "b" as const, identifier: Buffer.from(id).toString("base64") })),
    ),
  )
  .map(([namespaceUri, id]) => ({ namespaceUri, ...id }));

const key: fc.Arbitrary<NodeKey> = fc.oneof(
  nodeId.map(toNodeKey),
  fc.constantFrom(35, 40, 45, 46, 47, 58, 63, 12, 884).map((id) => `i=${id}` as NodeKey),
);

const qualifiedName = fc.record({ namespaceUri: fc.constantFrom(STANDARD, ...NAMESPACES), name: text });
const localizedText: fc.Arbitrary<LocalizedText> = fc.oneof(
  fc.record({ text }),
  fc.record({ locale: fc.constantFrom("", "en", "de-DE"), text }),
);

const reference: fc.Arbitrary<DeclaredReference> = fc
  .record({
    type: key,
    target: key,
    isForward: fc.boolean(),
    serverUri: fc.option(fc.constantFrom("urn:a", "urn:b"), { nil: undefined, freq: 6 }),
  })
  .map(({ serverUri, ...rest }) => (serverUri === undefined ? rest : { ...rest, serverUri }));

const valueText = text.map((one) =>
  one.replaceAll("&", "&amp;").replaceAll("<", "&lt;").replaceAll("]]>", "").replaceAll("\r", ""),
);
const value = fc.oneof(
  valueText.map((one) => ({ xml: `<String xmlns="http://opcfoundation.org/UA/2008/02/Types.xsd">${one}</String>` })),
  nodeId.map((id) => ({
    xml: `<NodeId xmlns="http://opcfoundation.org/UA/2008/02/Types.xsd"><Identifier>${formatNodeId(id).replaceAll("&", "&amp;").replaceAll("<", "&lt;").replaceAll(">", "&gt;")}</Identifier></NodeId>`,
  })),
  fc.constantFrom(...NAMESPACES).map((uri) => ({
    xml: `<u:QualifiedName><u:NamespaceIndex>${uri}</u:NamespaceIndex><u:Name>N</u:Name></u:QualifiedName>`,
    prefixes: { u: "http://opcfoundation.org/UA/2008/02/Types.xsd" },
  })),
);

const field: fc.Arbitrary<DataTypeField> = fc.record(
  {
    name: text,
    symbolicName: fc.constantFrom("F", "G_1"),
    displayName: fc.array(localizedText, { minLength: 1, maxLength: 2 }),
    description: fc.array(localizedText, { minLength: 1, maxLength: 2 }),
    dataType: key,
    valueRank: fc.integer({ min: -3, max: 5 }),
    arrayDimensions: fc.constantFrom("", "0", "2,3"),
    maxStringLength: fc.nat(4294967295),
    value: fc.integer({ min: -2147483648, max: 2147483647 }),
    isOptional: fc.boolean(),
    allowSubTypes: fc.boolean(),
  },
  { requiredKeys: ["name"] },
);

const attributeValues: Readonly<Record<AttributeType, fc.Arbitrary<unknown>>> = {
  text,
  boolean: fc.boolean(),
  byte: fc.nat(255),
  uint16: fc.nat(65535),
  uint32: fc.nat(4294967295),
  int32: fc.integer({ min: -2147483648, max: 2147483647 }),
  double: fc.double({ noNaN: true, noDefaultInfinity: true, min: 0 }).map((one) => one + 0),
  nodeId: key,
  arrayDimensions: fc.constantFrom("", "0", "0,0", "4294967295"),
  releaseStatus: fc.constantFrom("Released", "Draft", "Deprecated"),
  purpose: fc.constantFrom("Normal", "ServicesOnly", "CodeGenerator"),
};

function fieldsOf(nodeClass: NodeClass): fc.Arbitrary<object> {
  const specs = [...NODE_ATTRIBUTES[nodeClass].values()];
  return fc.record(Object.fromEntries(specs.map(({ field: name, type }) => [name, attributeValues[type]])), {
    requiredKeys: [],
  });
}

function specificsOf(nodeClass: NodeClass): fc.Arbitrary<object> {
  const texts = fc.array(localizedText, { minLength: 1, maxLength: 2 });
  switch (nodeClass) {
    case "Variable":
    case "VariableType":
      return fc.record({ value }, { requiredKeys: [] });
    case "Method":
      return fc.record(
        {
          argumentDescriptions: fc.array(fc.record({ name: text, description: texts }), { minLength: 1, maxLength: 2 }),
        },
        { requiredKeys: [] },
      );
    case "DataType":
      return fc.record(
        { definition: fc.record({ name: qualifiedName, fields: fc.array(field, { maxLength: 3 }) }) },
        { requiredKeys: [] },
      );
    case "ReferenceType":
      return fc.record({ inverseName: texts }, { requiredKeys: [] });
    default:
      return fc.constant({});
  }
}

const CLASSES: readonly NodeClass[] = [
  "Object",
  "Variable",
  "Method",
  "View",
  "ObjectType",
  "VariableType",
  "DataType",
  "ReferenceType",
];

const node: fc.Arbitrary<Node> = fc.constantFrom(...CLASSES).chain((nodeClass) =>
  fc
    .tuple(
      nodeId,
      fc.record({
        browseName: qualifiedName,
        displayName: fc.array(localizedText, { maxLength: 3 }),
        references: fc.array(reference, { maxLength: 4 }),
      }),
      fc.record(
        {
          description: fc.array(localizedText, { minLength: 1, maxLength: 2 }),
          category: fc.array(text, { minLength: 1, maxLength: 2 }),
          documentation: text,
          rolePermissions: fc.array(fc.record({ role: key, permissions: fc.nat(4294967295) }), { maxLength: 2 }),
        },
        { requiredKeys: [] },
      ),
      fieldsOf(nodeClass),
      specificsOf(nodeClass),
    )
    .map(
      ([id, common, optional, fields, specific]) =>
        ({
          key: toNodeKey(id),
          nodeId: id,
          order: 0,
          nodeClass,
          ...common,
          ...optional,
          ...fields,
          ...specific,
        }) as Node,
    ),
);

/** Nodes with different ids, in order. */
export const nodes: fc.Arbitrary<readonly Node[]> = fc
  .uniqueArray(node, { maxLength: 6, selector: (one) => one.key })
  .map((list) => list.map((one, order) => ({ ...one, order })));

const modelEntry: fc.Arbitrary<ModelEntry> = fc
  .record(
    {
      version: text,
      modelVersion: fc.constantFrom("1.0.0", "0.1.0-a+b"),
      publicationDate: fc.constantFrom("2026-01-01T00:00:00Z", "2026-01-01"),
      accessRestrictions: fc.nat(65535),
    },
    { requiredKeys: [] },
  )
  .map((entry) => ({
    modelUri: NAMESPACES[0] ?? "",
    ...entry,
    requiredModels: [{ modelUri: STANDARD, requiredModels: [] }],
  }));

export const header: fc.Arbitrary<ModelHeader> = fc
  .tuple(modelEntry, fc.shuffledSubarray(NAMESPACES, { minLength: NAMESPACES.length }))
  .map(([model, namespaceUris]) => ({
    namespaceUris,
    serverUris: ["urn:b", "urn:a"],
    models: [model],
    aliases: [["HasComponent", "i=47" as NodeKey]],
    rootAttributes: { xmlns: "http://opcfoundation.org/UA/2011/03/UANodeSet.xsd" },
  }));
