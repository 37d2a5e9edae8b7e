/**
 * Nodes with all attributes of UANodeSet.xsd (OPC 10000-6 Annex F) and the references that are declared at them.
 *
 * An attribute that is undefined was not written; its default then holds (`getValueRank` and friends). An attribute
 * that was written with its default value stays defined, so that a file comes back as it was. All nodes are plain JSON:
 * the same object is stored, sent to the browser and kept in packs.
 */
import type { NodeId, NodeKey } from "./node-id";
import type { LocalizedText, QualifiedName } from "./qualified-name";

export type NodeClass =
  "Object" | "Variable" | "Method" | "View" | "ObjectType" | "VariableType" | "DataType" | "ReferenceType";

/**
 * A reference as a file declares it at a node: `isForward: false` means that the node is the target. The same reference
 * may be declared at both ends; the graph counts it once. `serverUri` names another server (`svr=`); the target is then
 * never resolved.
 */
export type DeclaredReference = {
  readonly type: NodeKey;
  readonly target: NodeKey;
  readonly isForward: boolean;
  readonly serverUri?: string;
  readonly otherAttributes?: Readonly<Record<string, string>>;
};

/**
 * XML kept as text, so that nothing is lost: a Value, an Extension, an element that we do not understand. For `value`,
 * `extensions` and `translations` it is what stands between the tags (`<Double xmlns="…">1.5</Double>`), for
 * `otherElements` the whole element. Namespace indices inside a Value are replaced by URIs:
 * `<Identifier>nsu=URI;i=1</Identifier>` and `<NamespaceIndex>URI</NamespaceIndex>` (index 0 stays as written).
 * `prefixes` holds the prefixes ("" for the default namespace) that the text uses and an outer element declared;
 * `attributes` what the tag around it carried, which no published file needs.
 */
export type XmlText = {
  readonly xml: string;
  readonly prefixes?: Readonly<Record<string, string>>;
  readonly attributes?: Readonly<Record<string, string>>;
};

/**
 * What a file holds at one element beside what the schema knows, where that element has no object of its own to keep it:
 * unknown attributes of a DisplayName, unknown elements in a table, comments. `at` is the path of the element below the
 * node (or below the root, in a header) with what tells it from its siblings: "" is the node itself, then `References`,
 * `DisplayName:de`, `Definition/Field:Speed`, `Reference:i=47 i=58`; a second one that is called the same gets `#2`.
 * The element is named by what it says and not by its place, so that edits of its siblings leave it alone; what belongs to
 * an element that an edit took away goes with it.
 */
export type Leftover = {
  readonly at: string;
  /**
   * As written, in the order of the file. Of an element that has an object of its own, spellings of attributes that we would
   * write otherwise (`1` for true, `1000.0`); they hold while the attribute has the value that they say.
   */
  readonly attributes?: Readonly<Record<string, string>>;
  readonly elements?: readonly XmlText[];
  /** Comments, processing instructions and stray text, as they stand in the file: before the element. */
  readonly before?: readonly string[];
  /** The same at the end of its content. */
  readonly inside?: readonly string[];
};

export type RolePermission = { readonly role: NodeKey; readonly permissions: number };

export type ReleaseStatus = "Released" | "Draft" | "Deprecated";

type NodeBase = {
  readonly key: NodeKey;
  readonly nodeId: NodeId;
  /** Place in the model's order of nodes: files keep theirs, new nodes get the next number. */
  readonly order: number;
  readonly browseName: QualifiedName;
  readonly symbolicName?: string;
  readonly displayName: readonly LocalizedText[];
  readonly description?: readonly LocalizedText[];
  readonly category?: readonly string[];
  readonly documentation?: string;
  readonly releaseStatus?: ReleaseStatus;
  readonly writeMask?: number;
  readonly userWriteMask?: number;
  readonly accessRestrictions?: number;
  readonly hasNoPermissions?: boolean;
  readonly rolePermissions?: readonly RolePermission[];
  readonly extensions?: readonly XmlText[];
  readonly references: readonly DeclaredReference[];
  /** Attributes that the schema does not know, by qualified name as written; `prefixes` as in XmlText. */
  readonly otherAttributes?: Readonly<Record<string, string>>;
  /** Child elements that the schema does not know, in order; written back after the known ones. */
  readonly otherElements?: readonly XmlText[];
  readonly leftovers?: readonly Leftover[];
};

type InstanceBase = NodeBase & { readonly parent?: NodeKey; readonly designToolOnly?: boolean };

export type ObjectNode = InstanceBase & { readonly nodeClass: "Object"; readonly eventNotifier?: number };

export type ViewNode = InstanceBase & {
  readonly nodeClass: "View";
  readonly eventNotifier?: number;
  readonly containsNoLoops?: boolean;
};

/** What Variables and VariableTypes share. `arrayDimensions` is kept as text: `0,3`. */
type ValueAttributes = {
  readonly value?: XmlText;
  readonly dataType?: NodeKey;
  readonly valueRank?: number;
  readonly arrayDimensions?: string;
};

export type VariableNode = InstanceBase &
  ValueAttributes & {
    readonly nodeClass: "Variable";
    readonly accessLevel?: number;
    readonly userAccessLevel?: number;
    readonly minimumSamplingInterval?: number;
    readonly historizing?: boolean;
    readonly translations?: readonly XmlText[];
  };

export type ArgumentDescription = { readonly name: string; readonly description: readonly LocalizedText[] };

export type MethodNode = InstanceBase & {
  readonly nodeClass: "Method";
  readonly executable?: boolean;
  readonly userExecutable?: boolean;
  readonly methodDeclaration?: NodeKey;
  readonly argumentDescriptions?: readonly ArgumentDescription[];
};

export type ObjectTypeNode = NodeBase & { readonly nodeClass: "ObjectType"; readonly isAbstract?: boolean };

export type VariableTypeNode = NodeBase &
  ValueAttributes & { readonly nodeClass: "VariableType"; readonly isAbstract?: boolean };

/** A Field of a Definition (OPC 10000-6 §F.12). `value` is an enumeration value or the bit number of an option set. */
export type DataTypeField = {
  readonly name: string;
  readonly symbolicName?: string;
  readonly displayName?: readonly LocalizedText[];
  readonly description?: readonly LocalizedText[];
  readonly dataType?: NodeKey;
  readonly valueRank?: number;
  readonly arrayDimensions?: string;
  readonly maxStringLength?: number;
  readonly value?: number;
  readonly isOptional?: boolean;
  readonly allowSubTypes?: boolean;
  readonly otherAttributes?: Readonly<Record<string, string>>;
  readonly otherElements?: readonly XmlText[];
};

export type DataTypeDefinition = {
  readonly name: QualifiedName;
  readonly symbolicName?: string;
  readonly isUnion?: boolean;
  readonly isOptionSet?: boolean;
  readonly baseType?: string;
  readonly fields: readonly DataTypeField[];
  readonly otherAttributes?: Readonly<Record<string, string>>;
  readonly otherElements?: readonly XmlText[];
};

export type DataTypeNode = NodeBase & {
  readonly nodeClass: "DataType";
  readonly isAbstract?: boolean;
  readonly purpose?: "Normal" | "ServicesOnly" | "CodeGenerator";
  readonly definition?: DataTypeDefinition;
};

export type ReferenceTypeNode = NodeBase & {
  readonly nodeClass: "ReferenceType";
  readonly isAbstract?: boolean;
  readonly symmetric?: boolean;
  readonly inverseName?: readonly LocalizedText[];
};

export type Node =
  | ObjectNode
  | VariableNode
  | MethodNode
  | ViewNode
  | ObjectTypeNode
  | VariableTypeNode
  | DataTypeNode
  | ReferenceTypeNode;

export type TypeNode = ObjectTypeNode | VariableTypeNode | DataTypeNode | ReferenceTypeNode;
export type InstanceNode = ObjectNode | VariableNode | MethodNode | ViewNode;

export function isTypeNode(node: Node): node is TypeNode {
  return node.nodeClass.endsWith("Type");
}

/** Whether the node carries DataType, ValueRank, ArrayDimensions and Value. */
export function hasValueAttributes(node: Node): node is VariableNode | VariableTypeNode {
  return node.nodeClass === "Variable" || node.nodeClass === "VariableType";
}

export function isAbstract(node: Node): boolean {
  return isTypeNode(node) && node.isAbstract === true;
}

/** ValueRank with its default −1, Scalar (OPC 10000-6 §F.9). */
export function getValueRank(node: { readonly valueRank?: number }): number {
  return node.valueRank ?? -1;
}

/** DataType with its default BaseDataType, i=24. */
export function getDataType(node: { readonly dataType?: NodeKey }): NodeKey {
  return node.dataType ?? ("i=24" as NodeKey);
}

/** AccessLevel with its default 1, CurrentRead. */
export function getAccessLevel(node: VariableNode): number {
  return node.accessLevel ?? 1;
}
