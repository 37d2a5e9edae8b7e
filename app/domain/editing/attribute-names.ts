/**
 * Which attributes nodes of a class have (OPC 10000-6 Annex F, OPC 10000-3 §5.3–5.8): everything of a node but key, class
 * and references. Apart from the schemas, since these are large and a window edits without them.
 */
import type { NodeClass } from "../address-space/node";
import type { AttributeName } from "./operation";

const BASE = [
  "nodeId",
  "order",
  "browseName",
  "symbolicName",
  "displayName",
  "description",
  "category",
  "documentation",
  "releaseStatus",
  "writeMask",
  "userWriteMask",
  "accessRestrictions",
  "hasNoPermissions",
  "rolePermissions",
  "extensions",
  "otherAttributes",
  "otherElements",
  "leftovers",
] as const;
const INSTANCE = [...BASE, "parent", "designToolOnly"] as const;
const VALUE = ["value", "dataType", "valueRank", "arrayDimensions"] as const;

const ATTRIBUTES = {
  Object: [...INSTANCE, "eventNotifier"],
  View: [...INSTANCE, "eventNotifier", "containsNoLoops"],
  Variable: [
    ...INSTANCE,
    ...VALUE,
    "accessLevel",
    "userAccessLevel",
    "minimumSamplingInterval",
    "historizing",
    "translations",
  ],
  Method: [...INSTANCE, "executable", "userExecutable", "methodDeclaration", "argumentDescriptions"],
  ObjectType: [...BASE, "isAbstract"],
  VariableType: [...BASE, ...VALUE, "isAbstract"],
  DataType: [...BASE, "isAbstract", "purpose", "definition"],
  ReferenceType: [...BASE, "isAbstract", "symmetric", "inverseName"],
} as const satisfies Readonly<Record<NodeClass, readonly AttributeName[]>>;

export type AttributeOf<C extends NodeClass> = (typeof ATTRIBUTES)[C][number];

const byClass = new Map<NodeClass, ReadonlySet<string>>(
  Object.entries(ATTRIBUTES).map(([nodeClass, names]) => [nodeClass as NodeClass, new Set(names)]),
);

export function hasAttribute(nodeClass: NodeClass, attribute: AttributeName): boolean {
  return byClass.get(nodeClass)?.has(attribute) ?? false;
}

/** Attributes that a node always has. */
export function isRequiredAttribute(attribute: AttributeName): boolean {
  return attribute === "nodeId" || attribute === "order" || attribute === "browseName" || attribute === "displayName";
}
