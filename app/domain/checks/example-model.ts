/**
 * Builds the small models that rules show as examples and that tests check. What is not said is made as a good model has
 * it: display names, type definitions, references with their inverse on the child, ParentNodeId, namespace metadata. So
 * an example says only what it is about.
 */
import type { ModelEntry, ModelHeader } from "../address-space/model-header";
import type { DataTypeDefinition, DeclaredReference, Node, NodeClass, XmlText } from "../address-space/node";
import {
  numericNodeId,
  OPC_UA_NAMESPACE,
  standardKey,
  toNodeKey,
  type NodeId,
  type NodeKey,
} from "../address-space/node-id";
import { qualifiedName, type QualifiedName } from "../address-space/qualified-name";
import {
  StandardDataType as D,
  StandardModellingRule as M,
  StandardObject,
  StandardReferenceType as R,
  StandardType as T,
} from "../address-space/standard-ids";
import { list, scalar } from "./example-values";
import type { Wiring } from "./wiring";

export const EXAMPLE_URI = "http://example.org/UA/Press/";

/** Names of the modelling rules for short. */
export type RuleName = keyof typeof M;

type Common = {
  /** The node above; the reference is declared at this node as its inverse, as files do. */
  readonly parent?: NodeKey;
  /** HasComponent, or HasProperty for Properties, unless said. */
  readonly reference?: NodeKey;
  readonly rule?: RuleName;
  readonly nodeId?: NodeId;
  /** Further attributes as they stand in the node. */
  readonly set?: Readonly<Record<string, unknown>>;
};

type Instance = Common & { readonly type?: NodeKey };
type ValueParts = {
  readonly dataType?: NodeKey;
  readonly valueRank?: number;
  readonly arrayDimensions?: string;
  readonly value?: XmlText;
};
type TypeParts = Common & { readonly supertype?: NodeKey; readonly isAbstract?: boolean };

/** Builder of one own model; every method answers the key of the node that it made. */
export class ExampleModel {
  readonly uri: string;
  header: ModelHeader;
  /** For the examples of rules about mappings and sources. */
  wiring: Wiring | undefined;
  readonly #nodes = new Map<NodeKey, Node>();
  #nextId = 1001;
  #hasMetadata = true;

  constructor(uri: string = EXAMPLE_URI) {
    this.uri = uri;
    this.header = {
      namespaceUris: [uri],
      models: [
        {
          modelUri: uri,
          version: "1.0.0",
          modelVersion: "1.0.0",
          publicationDate: "2026-05-01T00:00:00Z",
          xmlSchemaUri: `${uri}Types.xsd`,
          requiredModels: [
            {
              modelUri: OPC_UA_NAMESPACE,
              version: "1.05.03",
              publicationDate: "2023-12-15T00:00:00Z",
              requiredModels: [],
            },
          ],
        },
      ],
    };
  }

  objectType(name: string, parts: TypeParts = {}): NodeKey {
    return this.#type("ObjectType", name, T.BaseObjectType, parts, {});
  }

  variableType(name: string, parts: TypeParts & ValueParts = {}): NodeKey {
    return this.#type("VariableType", name, T.BaseDataVariableType, parts, valuesOf(parts));
  }

  dataType(name: string, parts: TypeParts & { readonly definition?: Omit<DataTypeDefinition, "name"> } = {}): NodeKey {
    const definition = parts.definition && { name: this.name(name), ...parts.definition };
    return this.#type("DataType", name, D.Structure, parts, definition ? { definition } : {});
  }

  referenceType(
    name: string,
    parts: TypeParts & { readonly inverseName?: string; readonly symmetric?: boolean } = {},
  ): NodeKey {
    return this.#type("ReferenceType", name, R.NonHierarchicalReferences, parts, {
      ...(parts.inverseName === undefined ? {} : { inverseName: [{ text: parts.inverseName }] }),
      ...(parts.symmetric === undefined ? {} : { symmetric: parts.symmetric }),
    });
  }

  /** An Object; without `parent` it stands below the Objects folder. */
  object(name: string, parts: Instance = {}): NodeKey {
    const placed =
      parts.parent === undefined ? { ...parts, parent: StandardObject.ObjectsFolder, reference: R.Organizes } : parts;
    return this.#instance("Object", name, placed, R.HasComponent, parts.type ?? T.BaseObjectType, {});
  }

  variable(name: string, parts: Instance & ValueParts = {}): NodeKey {
    return this.#instance("Variable", name, parts, R.HasComponent, parts.type ?? T.BaseDataVariableType, {
      dataType: parts.dataType ?? D.Double,
      ...valuesOf(parts),
    });
  }

  property(name: string, parts: Instance & ValueParts = {}): NodeKey {
    return this.#instance("Variable", name, parts, R.HasProperty, parts.type ?? T.PropertyType, {
      dataType: parts.dataType ?? D.String,
      ...valuesOf(parts),
    });
  }

  method(name: string, parts: Common = {}): NodeKey {
    return this.#instance("Method", name, parts, R.HasComponent, undefined, {});
  }

  view(name: string, parts: Common = {}): NodeKey {
    const placed = { parent: StandardObject.ViewsFolder, reference: R.Organizes, ...parts };
    return this.#instance("View", name, placed, R.Organizes, undefined, {});
  }

  /** Declares a reference at its source, or at its target where only that one is own. */
  reference(source: NodeKey, type: NodeKey, target: NodeKey): void {
    if (this.#nodes.has(source)) this.#addReference(source, { type, target, isForward: true });
    else this.#addReference(target, { type, target: source, isForward: false });
  }

  /** Takes away all references of a type that a node declares, in either direction. */
  removeReferences(key: NodeKey, type: NodeKey): void {
    this.#patch(key, { references: this.get(key).references.filter((r) => r.type !== type) });
  }

  /** Sets attributes as they stand in the node; undefined takes one away. */
  set(key: NodeKey, attributes: Readonly<Record<string, unknown>>): void {
    this.#patch(key, attributes);
  }

  /** Changes the row of the Models table. */
  setModel(entry: Partial<ModelEntry>): void {
    const [model] = this.header.models;
    if (model) this.header = { ...this.header, models: [{ ...model, ...entry }] };
  }

  setHeader(header: Partial<ModelHeader>): void {
    this.header = { ...this.header, ...header };
  }

  withoutMetadata(): void {
    this.#hasMetadata = false;
  }

  get(key: NodeKey): Node {
    const node = this.#nodes.get(key);
    if (!node) throw new RangeError(`No node ${key} in this example`);
    return node;
  }

  /** What was made so far. */
  listKeys(): NodeKey[] {
    return [...this.#nodes.keys()];
  }

  /** A BrowseName: `Speed` in the own namespace, `0:EURange` in namespace 0. */
  name(text: string): QualifiedName {
    return text.startsWith("0:") ? qualifiedName(OPC_UA_NAMESPACE, text.slice(2)) : qualifiedName(this.uri, text);
  }

  /** Header and nodes, with the namespace metadata object of OPC 10000-6 §F.2. */
  build(): { header: ModelHeader; nodes: Node[] } {
    if (this.#hasMetadata) this.metadata();
    return { header: this.header, nodes: [...this.#nodes.values()] };
  }

  /** The namespace metadata object with its Properties (OPC 10000-5 §6.3.13); `without` leaves one out. */
  metadata(options: { readonly uri?: string; readonly without?: string } = {}): NodeKey {
    this.#hasMetadata = false;
    const uri = options.uri ?? this.uri;
    const [model] = this.header.models;
    const parent = this.object(uri, { parent: StandardObject.ServerNamespaces, type: T.NamespaceMetadataType });
    const property = (name: string, dataType: NodeKey, parts: ValueParts): void => {
      if (name !== options.without) this.property(`0:${name}`, { parent, dataType, ...parts });
    };
    property("NamespaceUri", D.String, { value: scalar("String", uri) });
    property("NamespaceVersion", D.String, { value: scalar("String", model?.version ?? "") });
    property("NamespacePublicationDate", D.DateTime, {
      value: scalar("DateTime", model?.publicationDate ?? "0001-01-01T00:00:00Z"),
    });
    if (model?.modelVersion !== undefined)
      property("ModelVersion", standardKey(24263), { value: scalar("String", model.modelVersion) });
    property("IsNamespaceSubset", D.Boolean, { value: scalar("Boolean", false) });
    property("StaticNodeIdTypes", standardKey(256), { valueRank: 1, arrayDimensions: "0", value: list("Int32", 0) });
    property("StaticNumericNodeIdRange", standardKey(291), {
      valueRank: 1,
      arrayDimensions: "0",
      value: list("String", "1:65535"),
    });
    property("StaticStringNodeIdPattern", D.String, { value: scalar("String", "") });
    return parent;
  }

  #type(
    nodeClass: NodeClass,
    name: string,
    root: NodeKey,
    parts: TypeParts,
    attributes: Readonly<Record<string, unknown>>,
  ): NodeKey {
    const references = [{ type: R.HasSubtype, target: parts.supertype ?? root, isForward: false }];
    const isAbstract = parts.isAbstract === undefined ? {} : { isAbstract: parts.isAbstract };
    return this.#add(nodeClass, name, parts, references, { ...isAbstract, ...attributes });
  }

  #instance(
    nodeClass: NodeClass,
    name: string,
    parts: Common,
    reference: NodeKey,
    type: NodeKey | undefined,
    attributes: Readonly<Record<string, unknown>>,
  ): NodeKey {
    const references: DeclaredReference[] = [];
    if (type !== undefined) references.push({ type: R.HasTypeDefinition, target: type, isForward: true });
    if (parts.rule) references.push({ type: R.HasModellingRule, target: M[parts.rule], isForward: true });
    if (parts.parent !== undefined)
      references.push({ type: parts.reference ?? reference, target: parts.parent, isForward: false });
    return this.#add(nodeClass, name, parts, references, {
      ...(parts.parent === undefined ? {} : { parent: parts.parent }),
      ...attributes,
    });
  }

  #add(
    nodeClass: NodeClass,
    name: string,
    parts: Common,
    references: readonly DeclaredReference[],
    attributes: Readonly<Record<string, unknown>>,
  ): NodeKey {
    const nodeId = parts.nodeId ?? numericNodeId(this.uri, this.#nextId++);
    const key = this.#freeKey(nodeId);
    const browseName = this.name(name);
    const node = {
      key,
      nodeId,
      nodeClass,
      order: this.#nodes.size,
      browseName,
      displayName: [{ text: browseName.name }],
      references,
      ...attributes,
      ...parts.set,
    };
    this.#nodes.set(key, node as Node);
    return key;
  }

  /** Two nodes of one NodeId still are two nodes. */
  #freeKey(nodeId: NodeId): NodeKey {
    const key = toNodeKey(nodeId);
    return this.#nodes.has(key) ? (`${key}#${this.#nodes.size}` as NodeKey) : key;
  }

  #addReference(at: NodeKey, reference: DeclaredReference): void {
    this.#patch(at, { references: [...this.get(at).references, reference] });
  }

  #patch(key: NodeKey, attributes: Readonly<Record<string, unknown>>): void {
    const patched = Object.entries({ ...this.get(key), ...attributes }).filter(([, value]) => value !== undefined);
    this.#nodes.set(key, Object.fromEntries(patched) as Node);
  }
}

function valuesOf({ dataType, valueRank, arrayDimensions, value }: ValueParts): Readonly<Record<string, unknown>> {
  const given = Object.entries({ dataType, valueRank, arrayDimensions, value }).filter(
    ([, part]) => part !== undefined,
  );
  return Object.fromEntries(given);
}
