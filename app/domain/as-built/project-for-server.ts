/**
 * A released model as a server could tell it: without symbolic names, notes of the modeller and values that move, each
 * text in the one language that the server chose. Only so do the two compare without noise.
 */
import type { AddressSpace } from "../address-space/address-space";
import { hasValueAttributes, type Node } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import type { LocalizedText } from "../address-space/qualified-name";
import { StandardReferenceType } from "../address-space/standard-ids";
import type { DataTypeLookup } from "../nodeset/values/data-type-shapes";
import { normaliseValue } from "./normalise-value";
import { collectSubtypes } from "../address-space/type-hierarchy";

/** What no service of a server answers, or what it answers by user and not by model. */
const UNTOLD: ReadonlySet<string> = new Set([
  "symbolicName",
  "category",
  "documentation",
  "releaseStatus",
  "rolePermissions",
  "hasNoPermissions",
  "accessRestrictions",
  "writeMask",
  "userWriteMask",
  "userAccessLevel",
  "userExecutable",
  "extensions",
  "translations",
  "argumentDescriptions",
  "methodDeclaration",
  "otherAttributes",
  "otherElements",
  "leftovers",
]);

/** What a server may choose where the model leaves it open. */
const LEFT_TO_SERVER = ["minimumSamplingInterval", "historizing", "executable", "value"] as const;

/**
 * Properties that tell the process and not the model: the text of a present value (OPC 10000-8 §5.3.3.4) and what states and
 * transitions say of now (OPC 10000-16 §4.4.2, §4.4.4).
 */
const MOVING_PROPERTIES: ReadonlySet<string> = new Set(["ValueAsText", "Id", "Name", "Number", "EffectiveDisplayName", "TransitionTime", "EffectiveTransitionTime"]);

/** A released node; `served` is the same node as the server has it, when it has it: it decides the language. */
export function projectForServer(view: ServedView, node: Node, served: Node | undefined): Node {
  const projected = {
    ...without(node, (name) => UNTOLD.has(name)),
    displayName: pickText(node.displayName, served?.displayName),
    ...(node.description ? { description: pickText(node.description, served?.description) } : {}),
  } as Node;
  return withBareFields(withComparableValue(view, projected));
}

/** The same node as the server has it, without what the release leaves to the server. */
export function projectServed(view: ServedView, node: Node, released: Node | undefined): Node {
  const open = new Set<string>(LEFT_TO_SERVER.filter((name) => released && !(name in released)));
  const told = open.size > 0 ? (without(node, (name) => open.has(name)) as Node) : node;
  // No service tells ParentNodeId; where the release names one of several owners, the same one is meant.
  const parent = released && "parent" in released ? { parent: released.parent } : {};
  return withBareFields(withComparableValue(view, { ...told, ...parent } as Node));
}

/** Fields of a DataType by name and type; their texts come in one language and are no part of the contract. */
function withBareFields(node: Node): Node {
  if (node.nodeClass !== "DataType" || !node.definition) return node;
  const fields = node.definition.fields.map((field) => without(field, (name) => ["displayName", "description", "symbolicName"].includes(name)));
  return { ...node, definition: { ...node.definition, fields } } as Node;
}

function without(object: object, isDropped: (name: string) => boolean): object {
  return Object.fromEntries(Object.entries(object).filter(([name]) => !isDropped(name)));
}

/** The value of a Property in one spelling; that of another Variable is the process's, not the model's. */
function withComparableValue(view: ServedView, node: Node): Node {
  if (!hasValueAttributes(node) || node.value === undefined) return node;
  const isTold = view.properties.has(node.key) && !MOVING_PROPERTIES.has(node.browseName.name);
  return isTold ? { ...node, value: normaliseValue(node.value, view.types) } : (without(node, (name) => name === "value") as Node);
}

/** What the projections ask of all nodes of one side. */
export type ServedView = { readonly types: DataTypeLookup; readonly properties: ReadonlySet<NodeKey> };

/** Read off the declarations in one walk: of thousands of nodes this is quicker than a question for the edges of each. */
export function makeServedView(space: AddressSpace, types: DataTypeLookup, nodes: readonly Node[]): ServedView {
  const propertyTypes = collectSubtypes(space, StandardReferenceType.HasProperty);
  const properties = new Set<NodeKey>();
  for (const node of nodes) {
    for (const { type, target, isForward } of node.references) {
      if (type === StandardReferenceType.HasProperty || propertyTypes.has(type)) properties.add(isForward ? target : node.key);
    }
  }
  return { types, properties };
}

/** The released text that the server shows, if it shows one of them; else the first, so that the difference is told. */
function pickText(released: readonly LocalizedText[], served: readonly LocalizedText[] | undefined): readonly LocalizedText[] {
  const shown = served?.[0];
  if (shown && released.some((text) => text.text === shown.text)) return [shown];
  return released.slice(0, 1);
}
