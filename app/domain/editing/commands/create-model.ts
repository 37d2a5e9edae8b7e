/**
 * A new model: header with namespace table, Models row and required models, and the namespace metadata Object below
 * Server/Namespaces (OPC 10000-5 §6.3.13, §6.3.14; OPC 10000-6 §F.2). `addNamespaceMetadata` adds the Object to a model
 * that was imported without one.
 */
import { AddressSpace, buildLayer, type Layer } from "../../address-space/address-space";
import { findTypeDefinition, listEdgesTo } from "../../address-space/browse";
import { getOwnNamespace, type ModelEntry, type ModelHeader } from "../../address-space/model-header";
import type { Node } from "../../address-space/node";
import { OPC_UA_NAMESPACE, standardKey, type NodeKey } from "../../address-space/node-id";
import { qualifiedName } from "../../address-space/qualified-name";
import {
  StandardDataType,
  StandardObject,
  StandardReferenceType,
  StandardType,
} from "../../address-space/standard-ids";
import { fail, ok, problem, type Problem, type Result } from "../../core/result";
import { SpaceDataTypes, toXmlSchemaUri } from "../../nodeset/values/data-type-shapes";
import { array, scalar, type Variant } from "../../nodeset/values/variant";
import { writeValue } from "../../nodeset/values/write-value";
import { EditDraft, type CommandContext, type Edit } from "../edit-draft";

export type CreateModelIntent = {
  readonly namespaceUri: string;
  readonly version: string;
  /** ISO 8601 with zone: `2024-05-01T00:00:00Z`. */
  readonly publicationDate: string;
  /** Rows for the models that this one requires, namespace 0 among them; their own required models are left out. */
  readonly requiredModels: readonly ModelEntry[];
};

export type ModelContent = { readonly header: ModelHeader; readonly nodes: readonly Node[] };

/** `required`: the layers of the required models, namespace 0 first. Problems: `model.uri`, `model.uri-taken`, `model.date`. */
export function createModel(
  required: readonly Layer[],
  context: CommandContext,
  intent: CreateModelIntent,
): Result<ModelContent> {
  const found = checkIntent(required, intent);
  if (found) return fail(found);
  const header = createHeader(intent);
  const draft = new EditDraft(AddressSpace.of(required, buildLayer(header, [])), context);
  addMetadata(draft);
  const result = draft.finish();
  return result.ok ? ok({ header, nodes: draft.space.listOwnNodes() }) : result;
}

function checkIntent(
  required: readonly Layer[],
  { namespaceUri, publicationDate }: CreateModelIntent,
): Problem | undefined {
  if (!isUri(namespaceUri)) return problem("model.uri", { uri: namespaceUri });
  const taken =
    namespaceUri === OPC_UA_NAMESPACE || required.some((l) => l.header.models.some((m) => m.modelUri === namespaceUri));
  if (taken) return problem("model.uri-taken", { uri: namespaceUri });
  if (!/^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d(?:\.\d+)?(?:Z|[+-]\d\d:\d\d)$/.test(publicationDate))
    return problem("model.date", { date: publicationDate });
  return undefined;
}

/** RFC 3986 §4.3: a scheme, then something without blanks. */
function isUri(text: string): boolean {
  return /^[A-Za-z][A-Za-z0-9+.-]*:[^\s<>"{}|\\^`]+$/.test(text);
}

function createHeader({ namespaceUri, version, publicationDate, requiredModels }: CreateModelIntent): ModelHeader {
  const required = requiredModels.map(toRequiredRow);
  const others = required.map((m) => m.modelUri).filter((uri) => uri !== OPC_UA_NAMESPACE);
  const row: ModelEntry = {
    modelUri: namespaceUri,
    xmlSchemaUri: toXmlSchemaUri(namespaceUri),
    version,
    publicationDate,
    requiredModels: required,
  };
  return { namespaceUris: [namespaceUri, ...others], models: [row] };
}

/** What a RequiredModel says: which model, in which version (OPC 10000-6 §F.5). */
export function toRequiredRow({ modelUri, version, modelVersion, publicationDate }: ModelEntry): ModelEntry {
  return {
    modelUri,
    ...(version === undefined ? {} : { version }),
    ...(modelVersion === undefined ? {} : { modelVersion }),
    ...(publicationDate === undefined ? {} : { publicationDate }),
    requiredModels: [],
  };
}

/** Problem: `model.metadata-exists`. */
export function addNamespaceMetadata(space: AddressSpace, context: CommandContext): Result<Edit> {
  const draft = new EditDraft(space, context);
  if (findNamespaceMetadata(space) === undefined) addMetadata(draft);
  else draft.fail(problem("model.metadata-exists", { uri: draft.ownNamespace }));
  return draft.finish();
}

/** The own namespace's metadata Object. */
export function findNamespaceMetadata(space: AddressSpace): NodeKey | undefined {
  const uri = getOwnNamespace(space.own.header);
  const candidates = listEdgesTo(space, StandardType.NamespaceMetadataType, StandardReferenceType.HasTypeDefinition);
  return candidates.map((e) => e.source).find((key) => space.isOwn(key) && space.getNode(key)?.browseName.name === uri);
}

/** The seven Properties that NamespaceMetadataType makes mandatory, with DataType and rank (OPC 10000-5 §6.3.13). */
function listMetadataProperties(space: AddressSpace): readonly [name: string, dataType: NodeKey, value: Variant][] {
  const model = space.own.header.models[0];
  return [
    ["NamespaceUri", StandardDataType.String, scalar("String", getOwnNamespace(space.own.header))],
    ["NamespaceVersion", StandardDataType.String, scalar("String", model?.version ?? "")],
    [
      "NamespacePublicationDate",
      StandardDataType.DateTime,
      scalar("DateTime", model?.publicationDate ?? "0001-01-01T00:00:00Z"),
    ],
    ["IsNamespaceSubset", StandardDataType.Boolean, scalar("Boolean", false)],
    // IdType 0 is Numeric: all numeric NodeIds mean the same node in every server that has this model.
    ["StaticNodeIdTypes", ID_TYPE, array("Int32", [0])],
    ["StaticNumericNodeIdRange", NUMERIC_RANGE, array("String", [])],
    ["StaticStringNodeIdPattern", StandardDataType.String, scalar("String", "")],
  ];
}

const ID_TYPE = standardKey(256);
const NUMERIC_RANGE = standardKey(291);

function addMetadata(draft: EditDraft): void {
  const uri = draft.ownNamespace;
  const object = draft.add({
    nodeClass: "Object",
    browseName: qualifiedName(uri, uri),
    references: [
      { type: StandardReferenceType.HasComponent, target: StandardObject.ServerNamespaces, isForward: false },
      { type: StandardReferenceType.HasTypeDefinition, target: StandardType.NamespaceMetadataType, isForward: true },
    ],
    attributes: { parent: StandardObject.ServerNamespaces },
  });
  if (object === undefined) return;
  const types = new SpaceDataTypes(draft.space);
  for (const [name, dataType, value] of listMetadataProperties(draft.space)) {
    draft.add({
      nodeClass: "Variable",
      browseName: qualifiedName(OPC_UA_NAMESPACE, name),
      references: [
        { type: StandardReferenceType.HasProperty, target: object, isForward: false },
        { type: StandardReferenceType.HasTypeDefinition, target: StandardType.PropertyType, isForward: true },
      ],
      attributes: {
        parent: object,
        dataType,
        ...(value.shape === "array" ? { valueRank: 1, arrayDimensions: "0" } : {}),
        value: writeValue(value, types),
      },
    });
  }
}

/** Sets the metadata Properties that repeat the Models row, where the Object has them. */
export function updateMetadata(draft: EditDraft): void {
  const object = findNamespaceMetadata(draft.space);
  if (object === undefined || findTypeDefinition(draft.space, object) === undefined) return;
  const types = new SpaceDataTypes(draft.space);
  for (const [name, , value] of listMetadataProperties(draft.space)) {
    if (name !== "NamespaceVersion" && name !== "NamespacePublicationDate") continue;
    const property = listEdgesFromObject(draft, object).find((n) => n.browseName.name === name);
    if (property) draft.set(property.key, "value", writeValue(value, types));
  }
}

function listEdgesFromObject(draft: EditDraft, object: NodeKey): Node[] {
  return draft.space
    .edgesFrom(object)
    .filter((e) => e.type === StandardReferenceType.HasProperty)
    .map((e) => draft.space.getNode(e.target))
    .filter((n) => n !== undefined);
}
