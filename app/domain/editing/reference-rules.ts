/**
 * Which ends each reference type of the standard allows (OPC 10000-3 §7; Alarms: OPC 10000-9 §5.12). A rule is inherited
 * by subtypes of the reference type (§5.3.3.3), so the rules along the chain of supertypes all hold.
 */
import type { AddressSpace } from "../address-space/address-space";
import { findProperty, findTypeDefinition, listEdgesFrom, listEdgesTo } from "../address-space/browse";
import type { Node, NodeClass } from "../address-space/node";
import { standardKey, type NodeKey } from "../address-space/node-id";
import { StandardReferenceType, StandardType } from "../address-space/standard-ids";
import { isSubtypeOf, listSupertypes } from "../address-space/type-hierarchy";

/** Why two nodes may not be joined this way: a code with a text in problem-texts.ts, and the clause. */
export type Refusal = { readonly code: string; readonly clause: string };

export type EndsRule = (space: AddressSpace, source: Node, target: Node) => Refusal | undefined;

const R = StandardReferenceType;
const OBJECTS: readonly NodeClass[] = ["Object", "ObjectType"];
const TYPES: readonly NodeClass[] = ["ObjectType", "VariableType", "DataType", "ReferenceType"];

const isOneOf = (node: Node, classes: readonly NodeClass[]): boolean => classes.includes(node.nodeClass);
const refuse = (code: string, clause: string): Refusal => ({ code, clause });

/** Whether a Variable is a Property: it is one by HasProperty or by its type definition (§5.6.3). */
export function isProperty(space: AddressSpace, node: Node): boolean {
  if (node.nodeClass !== "Variable") return false;
  return (
    findTypeDefinition(space, node.key) === StandardType.PropertyType ||
    listEdgesTo(space, node.key, R.HasProperty).length > 0
  );
}

function checkComponent(space: AddressSpace, source: Node, target: Node): Refusal | undefined {
  const clause = "OPC 10000-3 §7.7";
  if (!isOneOf(target, ["Object", "Variable", "Method"])) return refuse("reference.component-target", clause);
  if (target.nodeClass === "Variable") {
    if (isProperty(space, target)) return refuse("reference.property-as-component", "OPC 10000-3 §5.6.4");
    if (!isOneOf(source, ["Object", "ObjectType", "Variable", "VariableType"]))
      return refuse("reference.component-variable-source", clause);
    return isProperty(space, source) ? refuse("reference.property-is-leaf", "OPC 10000-3 §5.6.3") : undefined;
  }
  return isOneOf(source, OBJECTS) ? undefined : refuse("reference.component-object-source", clause);
}

function checkProperty(space: AddressSpace, source: Node, target: Node): Refusal | undefined {
  if (target.nodeClass !== "Variable") return refuse("reference.property-target", "OPC 10000-3 §7.8");
  if (isProperty(space, source)) return refuse("reference.property-is-leaf", "OPC 10000-3 §5.6.3");
  const definition = findTypeDefinition(space, target.key);
  const isComponent = listEdgesTo(space, target.key, R.HasComponent).length > 0;
  if (isComponent || (definition !== undefined && definition !== StandardType.PropertyType)) {
    return refuse("reference.component-as-property", "OPC 10000-3 §5.6.3");
  }
  const hasChildren = listEdgesFrom(space, target.key, R.HierarchicalReferences).length > 0;
  return hasChildren ? refuse("reference.property-is-leaf", "OPC 10000-3 §5.6.3") : undefined;
}

function checkSubtype(_space: AddressSpace, source: Node, target: Node): Refusal | undefined {
  const fits = isOneOf(source, TYPES) && source.nodeClass === target.nodeClass;
  return fits ? undefined : refuse("reference.subtype-ends", "OPC 10000-3 §7.10");
}

function checkTypeDefinition(_space: AddressSpace, source: Node, target: Node): Refusal | undefined {
  const fits =
    (source.nodeClass === "Object" && target.nodeClass === "ObjectType") ||
    (source.nodeClass === "Variable" && target.nodeClass === "VariableType");
  return fits ? undefined : refuse("reference.type-definition-ends", "OPC 10000-3 §7.13");
}

function checkModellingRule(space: AddressSpace, source: Node, target: Node): Refusal | undefined {
  const isRule =
    target.nodeClass === "Object" &&
    isSubtypeOf(space, findTypeDefinition(space, target.key) ?? target.key, StandardType.ModellingRuleType);
  return isOneOf(source, ["Object", "Variable", "Method"]) && isRule
    ? undefined
    : refuse("reference.modelling-rule-ends", "OPC 10000-3 §7.12");
}

function checkEncoding(space: AddressSpace, source: Node, target: Node): Refusal | undefined {
  const isStructure = source.nodeClass === "DataType" && isSubtypeOf(space, source.key, standardKey(22));
  const isEncoding =
    target.nodeClass === "Object" &&
    isSubtypeOf(space, findTypeDefinition(space, target.key) ?? target.key, StandardType.DataTypeEncodingType);
  if (!isStructure || !isEncoding) return refuse("reference.encoding-ends", "OPC 10000-3 §7.14");
  // An encoding Object belongs to one DataType, which has one of each name (§5.8.4).
  const isTaken = space.edgesTo(target.key).some((e) => e.type === R.HasEncoding);
  const encodings = space.edgesFrom(source.key).filter((e) => e.type === R.HasEncoding);
  const hasName = encodings.some((e) => space.getNode(e.target)?.browseName.name === target.browseName.name);
  return isTaken || hasName ? refuse("reference.encoding-taken", "OPC 10000-3 §5.8.4") : undefined;
}

function checkGeneratesEvent(space: AddressSpace, source: Node, target: Node): Refusal | undefined {
  const isEvent = target.nodeClass === "ObjectType" && isSubtypeOf(space, target.key, StandardType.BaseEventType);
  const fits = isEvent && isOneOf(source, ["ObjectType", "VariableType", "Method"]);
  return fits ? undefined : refuse("reference.event-ends", "OPC 10000-3 §7.15");
}

function checkAlwaysGeneratesEvent(space: AddressSpace, source: Node, target: Node): Refusal | undefined {
  if (source.nodeClass !== "Method") return refuse("reference.event-ends", "OPC 10000-3 §7.16");
  return checkGeneratesEvent(space, source, target);
}

function checkInterface(space: AddressSpace, source: Node, target: Node): Refusal | undefined {
  const isInterface = (key: NodeKey): boolean => isSubtypeOf(space, key, StandardType.BaseInterfaceType);
  const fits =
    target.nodeClass === "ObjectType" &&
    target.key !== StandardType.BaseInterfaceType &&
    isInterface(target.key) &&
    isOneOf(source, OBJECTS) &&
    !(source.nodeClass === "ObjectType" && isInterface(source.key));
  return fits ? undefined : refuse("reference.interface-ends", "OPC 10000-3 §7.19");
}

function checkAddIn(space: AddressSpace, source: Node, target: Node): Refusal | undefined {
  if (!isOneOf(source, OBJECTS) || target.nodeClass !== "Object")
    return refuse("reference.add-in-ends", "OPC 10000-3 §7.20");
  const type = findTypeDefinition(space, target.key);
  const chain = type === undefined ? [] : [type, ...listSupertypes(space, type)];
  const hasDefaultName = chain.some((key) => findProperty(space, key, "DefaultInstanceBrowseName") !== undefined);
  return hasDefaultName ? undefined : refuse("reference.add-in-type", "OPC 10000-3 §4.10.3");
}

function checkOrganizes(_space: AddressSpace, source: Node, _target: Node): Refusal | undefined {
  return isOneOf(source, ["Object", "ObjectType", "View"])
    ? undefined
    : refuse("reference.organizes-source", "OPC 10000-3 §7.11");
}

function checkEventSource(_space: AddressSpace, source: Node, target: Node): Refusal | undefined {
  if (!isOneOf(source, ["Object", "View", "ObjectType"]))
    return refuse("reference.event-source-ends", "OPC 10000-3 §7.17");
  return isOneOf(target, ["DataType", "ReferenceType"])
    ? refuse("reference.event-source-ends", "OPC 10000-3 §7.17")
    : undefined;
}

function checkNotifier(_space: AddressSpace, source: Node, target: Node): Refusal | undefined {
  const fits = isOneOf(source, ["Object", "View", "ObjectType"]) && target.nodeClass === "Object";
  return fits ? undefined : refuse("reference.notifier-ends", "OPC 10000-3 §7.18");
}

/** Rules by reference type; looked up along its supertypes. */
export const endsRules: ReadonlyMap<NodeKey, EndsRule> = new Map<NodeKey, EndsRule>([
  [R.HasComponent, checkComponent],
  [R.HasProperty, checkProperty],
  [R.HasSubtype, checkSubtype],
  [R.HasTypeDefinition, checkTypeDefinition],
  [R.HasModellingRule, checkModellingRule],
  [R.HasEncoding, checkEncoding],
  [R.GeneratesEvent, checkGeneratesEvent],
  [R.AlwaysGeneratesEvent, checkAlwaysGeneratesEvent],
  [R.HasInterface, checkInterface],
  [R.HasAddIn, checkAddIn],
  [R.Organizes, checkOrganizes],
  [R.HasEventSource, checkEventSource],
  [R.HasNotifier, checkNotifier],
]);

/** What a source of a class may refer to at all (§5.3.3.1, §5.4, §5.8.3). */
export function checkSourceClass(
  space: AddressSpace,
  source: Node,
  isHierarchicalType: boolean,
  referenceType: NodeKey,
): Refusal | undefined {
  const isA = (ancestor: NodeKey): boolean => isSubtypeOf(space, referenceType, ancestor);
  if (isA(TOLERATED.HasDictionaryEntry) || isA(TOLERATED.IsDeprecated)) return undefined;
  if (source.nodeClass === "ReferenceType" && !isA(R.HasSubtype) && !isA(R.HasProperty)) {
    return refuse("reference.reference-type-source", "OPC 10000-3 §5.3.3.1");
  }
  if (source.nodeClass === "DataType" && ![R.HasSubtype, R.HasProperty, R.HasEncoding].some(isA)) {
    return refuse("reference.data-type-source", "OPC 10000-3 §5.8.3");
  }
  if (source.nodeClass === "View" && !isHierarchicalType) return refuse("reference.view-source", "OPC 10000-3 §5.4");
  return undefined;
}

/** HasDictionaryEntry (OPC 10000-19 §6.1) and IsDeprecated (OPC 10000-3 §7.21) may start anywhere. */
const TOLERATED = { HasDictionaryEntry: standardKey(17597), IsDeprecated: standardKey(23562) } as const;
