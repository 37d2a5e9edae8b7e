/** Collects one node while its element is read. */
import { isNullNodeId, toNodeKey, formatNodeId, type NodeId, type NodeKey } from "../address-space/node-id";
import type {
  ArgumentDescription,
  DataTypeDefinition,
  DataTypeField,
  DeclaredReference,
  Node,
  NodeClass,
  RolePermission,
  XmlText,
} from "../address-space/node";
import type { LeftoverBuilder } from "./leftover-builder";
import type { LocalizedText, QualifiedName } from "../address-space/qualified-name";

type KeysOf<T> = T extends T ? keyof T : never;
type ValueOf<T, K> = T extends T ? (K extends keyof T ? T[K] : never) : never;
/** A node of any class, all fields optional and writable. */
export type NodeFields = { -readonly [K in KeysOf<Node>]?: ValueOf<Node, K> };

export type FieldDraft = { -readonly [K in keyof DataTypeField]: DataTypeField[K] } & {
  displayName?: LocalizedText[];
  description?: LocalizedText[];
};
export type DefinitionDraft = { -readonly [K in keyof DataTypeDefinition]: DataTypeDefinition[K] } & {
  fields: DataTypeField[];
};

const NOTHING: readonly never[] = [];

/** Puts an item behind the others; a list of one, the usual case, takes no more room than it needs. */
export function append<T>(list: T[] | undefined, item: T): T[] {
  if (!list) return [item];
  list.push(item);
  return list;
}

export class NodeBuilder {
  readonly nodeId: NodeId;
  readonly key: NodeKey;
  /** Attributes that the table knows, set by `readAttributes`. */
  readonly fields: NodeFields;
  displayName: LocalizedText[] | undefined;
  description: LocalizedText[] | undefined;
  inverseName: LocalizedText[] | undefined;
  category: string[] | undefined;
  rolePermissions: RolePermission[] | undefined;
  extensions: XmlText[] | undefined;
  translations: XmlText[] | undefined;
  argumentDescriptions: ArgumentDescription[] | undefined;
  otherElements: XmlText[] | undefined;
  leftovers: LeftoverBuilder | undefined;
  readonly references: DeclaredReference[] = [];

  constructor(nodeClass: NodeClass, nodeId: NodeId, browseName: QualifiedName, order: number) {
    this.nodeId = nodeId;
    this.key = toNodeKey(nodeId);
    this.fields = {
      key: this.key,
      nodeId,
      nodeClass,
      order,
      browseName,
      displayName: NOTHING,
      references: NOTHING,
    };
  }

  get nodeIdText(): string {
    return formatNodeId(this.nodeId);
  }

  isNull(): boolean {
    return isNullNodeId(this.nodeId);
  }

  build(): Node {
    const { fields } = this;
    if (this.displayName) fields.displayName = this.displayName;
    // A copy, since the list that grew has room for many more.
    if (this.references.length > 0) fields.references = this.references.slice();
    if (this.description) fields.description = this.description;
    if (this.inverseName) fields.inverseName = this.inverseName;
    if (this.category) fields.category = this.category;
    if (this.rolePermissions) fields.rolePermissions = this.rolePermissions;
    if (this.extensions) fields.extensions = this.extensions;
    if (this.translations) fields.translations = this.translations;
    if (this.argumentDescriptions) fields.argumentDescriptions = this.argumentDescriptions;
    if (this.otherElements) fields.otherElements = this.otherElements;
    const leftovers = this.leftovers?.build();
    if (leftovers) fields.leftovers = leftovers;
    // The constructor set what every node has, and the table of the class lets no foreign attribute in.
    return fields as Node;
  }
}
