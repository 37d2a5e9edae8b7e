/**
 * What values of a DataType look like: which built-in type carries them and, for structures, which fields in which order
 * (OPC 10000-3 §8.47–8.52, OPC 10000-6 §F.12–F.13).
 */
import type { AddressSpace } from "../../address-space/address-space";
import { getOwnNamespace } from "../../address-space/model-header";
import type { DataTypeField, DataTypeNode } from "../../address-space/node";
import { formatNodeId, OPC_UA_NAMESPACE, standardKey, type NodeKey } from "../../address-space/node-id";
import { StandardDataType, StandardReferenceType } from "../../address-space/standard-ids";
import { listSupertypes } from "../../address-space/type-hierarchy";
import { TYPES_XML_NAMESPACE } from "../nodeset-xml";
import { BUILT_IN_TYPES, type BuiltInType } from "./variant";

export type StructureField = {
  readonly name: string;
  readonly dataType: NodeKey;
  /** What carries the field's value; undefined where its DataType is not loaded. */
  readonly builtInType: BuiltInType | undefined;
  /** For fields whose values are structures of exactly this DataType: written in place, without TypeId. */
  readonly isInline: boolean;
  readonly isEnumeration: boolean;
  readonly valueRank: number;
  readonly isOptional: boolean;
  /** Names of the elements inside an array, and the XML namespace of everything inside the field's element. */
  readonly itemName: string;
  readonly contentNamespace: string;
};

export type StructureShape = {
  readonly dataType: NodeKey;
  /** The name of the body's element and its XML namespace. */
  readonly elementName: string;
  readonly xmlNamespace: string;
  readonly isUnion: boolean;
  readonly hasOptionalFields: boolean;
  /** Inherited fields first. */
  readonly fields: readonly StructureField[];
  /** NodeId text of the Default XML encoding, else of the DataType. */
  readonly typeId: string;
};

/** Answers questions about the DataTypes that are loaded. Made once per address space and asked many times. */
export interface DataTypeLookup {
  /** By the NodeId text of an encoding Object or of the DataType itself. */
  findStructureByTypeId(typeId: string): StructureShape | undefined;
  findStructure(dataType: NodeKey): StructureShape | undefined;
  /** undefined where the DataType is not loaded. */
  findBuiltInType(dataType: NodeKey): BuiltInType | undefined;
  findEnumerationNames(dataType: NodeKey): ReadonlyMap<number, string> | undefined;
  /** The bits that an option set names, as a number; undefined for other DataTypes. */
  findOptionMask(dataType: NodeKey): bigint | undefined;
}

const BUILT_IN_BY_KEY = new Map<NodeKey, BuiltInType>(BUILT_IN_TYPES.map((name, i) => [standardKey(i + 1), name]));
/** No published option set comes near; a number beyond is a slip that must cost no memory. */
const MOST_BITS = 4096;
const ABSTRACT_NUMBERS = new Set<NodeKey>([
  StandardDataType.Number,
  StandardDataType.Integer,
  StandardDataType.UInteger,
]);

/** The four structures that files contain most; known even where namespace 0 is not loaded (OPC 10000-3 §8.6, §8.14; OPC 10000-8 §5.6). */
const KNOWN_STRUCTURES: readonly (readonly [
  NodeKey,
  string,
  string,
  readonly (readonly [string, number, number?])[],
])[] = [
  [
    StandardDataType.Argument,
    "Argument",
    "i=297",
    [
      ["Name", 12],
      ["DataType", 17],
      ["ValueRank", 6],
      ["ArrayDimensions", 7, 1],
      ["Description", 21],
    ],
  ],
  [
    StandardDataType.EnumValueType,
    "EnumValueType",
    "i=7616",
    [
      ["Value", 8],
      ["DisplayName", 21],
      ["Description", 21],
    ],
  ],
  [
    StandardDataType.EUInformation,
    "EUInformation",
    "i=888",
    [
      ["NamespaceUri", 12],
      ["UnitId", 6],
      ["DisplayName", 21],
      ["Description", 21],
    ],
  ],
  [
    StandardDataType.Range,
    "Range",
    "i=885",
    [
      ["Low", 11],
      ["High", 11],
    ],
  ],
];

const knownShapes: readonly StructureShape[] = KNOWN_STRUCTURES.map(([dataType, elementName, typeId, fields]) => ({
  dataType,
  elementName,
  xmlNamespace: TYPES_XML_NAMESPACE,
  isUnion: false,
  hasOptionalFields: false,
  typeId,
  fields: fields.map(([name, id, valueRank = -1]) => ({
    name,
    dataType: standardKey(id),
    builtInType: BUILT_IN_BY_KEY.get(standardKey(id)),
    isInline: false,
    isEnumeration: false,
    valueRank,
    isOptional: false,
    itemName: BUILT_IN_BY_KEY.get(standardKey(id)) ?? "",
    contentNamespace: TYPES_XML_NAMESPACE,
  })),
}));

/** The lookup for an address space. */
export class SpaceDataTypes implements DataTypeLookup {
  readonly #space: AddressSpace;
  readonly #shapes = new Map<NodeKey, StructureShape | undefined>();

  constructor(space: AddressSpace) {
    this.#space = space;
    for (const shape of knownShapes) this.#shapes.set(shape.dataType, shape);
  }

  findStructureByTypeId(typeId: string): StructureShape | undefined {
    const known = knownShapes.find((shape) => shape.typeId === typeId);
    if (known) return known;
    const node = this.#findByText(typeId);
    if (!node) return undefined;
    if (node.nodeClass === "DataType") return this.findStructure(node.key);
    const encoding = this.#space.edgesTo(node.key).find((e) => e.type === StandardReferenceType.HasEncoding);
    return encoding ? this.findStructure(encoding.source) : undefined;
  }

  findStructure(dataType: NodeKey): StructureShape | undefined {
    if (!this.#shapes.has(dataType)) this.#shapes.set(dataType, this.#makeShape(dataType));
    return this.#shapes.get(dataType);
  }

  findBuiltInType(dataType: NodeKey): BuiltInType | undefined {
    for (const key of [dataType, ...listSupertypes(this.#space, dataType)]) {
      if (key === StandardDataType.Enumeration) return "Int32";
      if (key === StandardDataType.Structure) return "ExtensionObject";
      if (key === StandardDataType.BaseDataType || ABSTRACT_NUMBERS.has(key)) return "Variant";
      const builtIn = BUILT_IN_BY_KEY.get(key);
      if (builtIn) return builtIn;
    }
    return undefined;
  }

  findEnumerationNames(dataType: NodeKey): ReadonlyMap<number, string> | undefined {
    const node = this.#getDataType(dataType);
    if (!node?.definition || !listSupertypes(this.#space, dataType).includes(StandardDataType.Enumeration))
      return undefined;
    return new Map(node.definition.fields.map((f) => [f.value ?? -1, f.name]));
  }

  findOptionMask(dataType: NodeKey): bigint | undefined {
    let mask: bigint | undefined;
    for (const key of [dataType, ...listSupertypes(this.#space, dataType)]) {
      const definition = this.#getDataType(key)?.definition;
      if (definition?.isOptionSet !== true) continue;
      for (const field of definition.fields)
        mask = (mask ?? 0n) | (1n << BigInt(Math.min(MOST_BITS, Math.max(0, field.value ?? 0))));
    }
    return mask;
  }

  #findByText(typeId: string): { key: NodeKey; nodeClass: string } | undefined {
    const byKey = this.#space.getNode(typeId as NodeKey);
    if (byKey && formatNodeId(byKey.nodeId) === typeId) return byKey;
    for (let i = this.#space.layers.length - 1; i >= 0; i--) {
      const key = this.#space.layers[i]?.keysByNodeId.get(typeId);
      if (key) return this.#space.getNode(key);
    }
    return undefined;
  }

  #getDataType(key: NodeKey): DataTypeNode | undefined {
    const node = this.#space.getNode(key);
    return node?.nodeClass === "DataType" ? node : undefined;
  }

  #makeShape(dataType: NodeKey): StructureShape | undefined {
    const node = this.#getDataType(dataType);
    const chain = [dataType, ...listSupertypes(this.#space, dataType)];
    const root = chain.indexOf(StandardDataType.Structure);
    if (!node || root < 0) return undefined;
    // The fields of an option set's Definition are its bits; the structure has Value and ValidBits of OptionSet itself.
    const definitions = chain
      .slice(0, root)
      .map((key) => this.#getDataType(key)?.definition)
      .filter((d) => !d?.isOptionSet);
    const isUnion = definitions.some((d) => d?.isUnion === true) || chain.includes(StandardDataType.Union);
    const fields = definitions
      .reverse()
      .flatMap((d) => d?.fields ?? [])
      .map((f) => this.#makeField(f));
    return {
      dataType,
      elementName: toXmlName(node.browseName.name),
      xmlNamespace: this.#findXmlNamespace(node),
      isUnion,
      hasOptionalFields: !isUnion && fields.some((f) => f.isOptional),
      fields,
      typeId: this.#findTypeId(node),
    };
  }

  #makeField(field: DataTypeField): StructureField {
    const dataType = field.dataType ?? StandardDataType.BaseDataType;
    const builtInType = this.findBuiltInType(dataType);
    const node = this.#getDataType(dataType);
    const isAny = dataType === StandardDataType.Structure || field.allowSubTypes === true || node?.isAbstract === true;
    const isStructure = builtInType === "ExtensionObject";
    const isInline = isStructure && !isAny;
    const isEnumeration = listSupertypes(this.#space, dataType).includes(StandardDataType.Enumeration);
    // A field that allows subtypes of a simple type carries a Variant (OPC 10000-3 §8.49).
    const carrier = field.allowSubTypes === true && builtInType !== undefined && !isStructure ? "Variant" : builtInType;
    const isNamedByType = node !== undefined && (isInline || (isEnumeration && carrier !== "Variant"));
    return {
      name: field.name,
      dataType,
      builtInType: carrier,
      isInline,
      isEnumeration: isEnumeration && carrier !== "Variant",
      valueRank: field.valueRank ?? -1,
      isOptional: field.isOptional === true,
      itemName: isNamedByType ? toXmlName(node.browseName.name) : (carrier ?? ""),
      contentNamespace: isNamedByType ? this.#findXmlNamespace(node) : TYPES_XML_NAMESPACE,
    };
  }

  #findTypeId(node: DataTypeNode): string {
    const encodings = this.#space.edgesFrom(node.key).filter((e) => e.type === StandardReferenceType.HasEncoding);
    const xml = encodings.map((e) => this.#space.getNode(e.target)).find((n) => n?.browseName.name === "Default XML");
    return formatNodeId((xml ?? node).nodeId);
  }

  /** The model's XmlSchemaUri; where a model gives none, the usual form: its URI with `Types.xsd` behind it. */
  #findXmlNamespace(node: DataTypeNode): string {
    if (node.nodeId.namespaceUri === OPC_UA_NAMESPACE) return TYPES_XML_NAMESPACE;
    const layer = this.#space.layers.find(
      (l) => l.header.models.length > 0 && getOwnNamespace(l.header) === node.nodeId.namespaceUri,
    );
    const model = layer?.header.models.find((m) => m.modelUri === node.nodeId.namespaceUri);
    return model?.xmlSchemaUri ?? toXmlSchemaUri(node.nodeId.namespaceUri);
  }
}

/** The XML namespace for the structures of a model, as most published models form it. */
export function toXmlSchemaUri(modelUri: string): string {
  return `${modelUri.replace(/\/?$/, "/")}Types.xsd`;
}

/** OPC 10000-6 §5.1.13: what XML forbids in a name becomes `_`; one that may not begin a name gets `_` before it. */
export function toXmlName(name: string): string {
  const allowed = name.replace(/[^\p{L}\p{N}_.-]/gu, "_");
  return /^[\p{L}_]/u.test(allowed) ? allowed : `_${allowed}`;
}
