/** What a NodeSet2 file says of itself, beside its nodes (OPC 10000-6 §F.3–F.5). */
import type { IdPolicy } from "./id-policy";
import type { NodeKey } from "./node-id";
import type { Leftover, RolePermission, XmlText } from "./node";

/** A row of the Models table. Dates and versions are kept as written. */
export type ModelEntry = {
  readonly modelUri: string;
  readonly version?: string;
  readonly modelVersion?: string;
  readonly publicationDate?: string;
  readonly xmlSchemaUri?: string;
  readonly accessRestrictions?: number;
  readonly rolePermissions?: readonly RolePermission[];
  readonly requiredModels: readonly ModelEntry[];
  readonly otherAttributes?: Readonly<Record<string, string>>;
  readonly otherElements?: readonly XmlText[];
};

/** The head of one NodeSet. `namespaceUris` is the file's own table without namespace 0, in the order of the file. */
export type ModelHeader = {
  readonly namespaceUris: readonly string[];
  readonly serverUris?: readonly string[];
  readonly models: readonly ModelEntry[];
  /** As in the file; absent (a model that no file was read for) means that the writer makes the usual ones. */
  readonly aliases?: readonly (readonly [alias: string, key: NodeKey])[];
  readonly extensions?: readonly XmlText[];
  readonly lastModified?: string;
  /** Comments before the root element: licences stand there. */
  readonly headComments?: readonly string[];
  /** Namespace declarations and unknown attributes of the root element, as written. */
  readonly rootAttributes?: Readonly<Record<string, string>>;
  readonly otherElements?: readonly XmlText[];
  /** Of the root ("") and of the tables of the head: `Models/Model:URI`, `Aliases/Alias:HasComponent`. */
  readonly leftovers?: readonly Leftover[];
  /** How new NodeIds are chosen; absent is numbers one after the other. Not part of a file. */
  readonly idPolicy?: IdPolicy;
};

/** The namespace that the model defines: the first row of Models, else the first namespace of the table. */
export function getOwnNamespace(header: ModelHeader): string {
  const uri = header.models[0]?.modelUri ?? header.namespaceUris[0];
  if (uri === undefined) throw new RangeError("A model without a namespace");
  return uri;
}
