/** Remembered questions that many rules ask. Each walks in a loop over tracked reads, so that cycles end. */
import type { Edge } from "../address-space/edge-index";
import type { Node, NodeClass } from "../address-space/node";
import { TYPE_CLASSES } from "./node-classes";
import { OPC_UA_NAMESPACE, type NodeKey } from "../address-space/node-id";
import { StandardReferenceType as R } from "../address-space/standard-ids";
import { makeLookup, type CheckContext } from "./check-context";

const supertypes = makeLookup<readonly NodeKey[]>((ctx, key) => {
  const chain: NodeKey[] = [];
  const seen = new Set<NodeKey>([key]);
  for (let at = ctx.supertypeEdges(key)[0]?.source; at !== undefined && !seen.has(at);) {
    seen.add(at);
    chain.push(at);
    at = ctx.supertypeEdges(at)[0]?.source;
  }
  return chain;
});

/** The chain of supertypes, nearest first, without the type itself. */
export function listSupertypes(ctx: CheckContext, type: NodeKey): readonly NodeKey[] {
  return ctx.lookUp(supertypes, type);
}

/** Whether `type` is `ancestor` or below it. */
export function isKindOf(ctx: CheckContext, type: NodeKey, ancestor: NodeKey): boolean {
  return type === ancestor || listSupertypes(ctx, type).includes(ancestor);
}

/** Whether the whole chain up to a root is loaded, so that "is not below" can be said at all. */
export function isChainLoaded(ctx: CheckContext, type: NodeKey): boolean {
  return ctx.classOf(type) !== undefined && listSupertypes(ctx, type).every((t) => ctx.classOf(t) !== undefined);
}

const NO_KEYS: readonly NodeKey[] = [];

const typeDefinitions = makeLookup<readonly NodeKey[]>((ctx, key) => {
  let found = NO_KEYS;
  for (const { type, target } of ctx.otherEdges(key)) if (type === R.HasTypeDefinition) found = [...found, target];
  return found;
});
const modellingRule = makeLookup<NodeKey | undefined>((ctx, key) =>
  findTarget(ctx.otherEdges(key), R.HasModellingRule),
);

function findTarget(edges: readonly Edge[], type: NodeKey): NodeKey | undefined {
  for (const edge of edges) if (edge.type === type) return edge.target;
  return undefined;
}

export function listTypeDefinitions(ctx: CheckContext, key: NodeKey): readonly NodeKey[] {
  return ctx.lookUp(typeDefinitions, key);
}

export function findTypeDefinition(ctx: CheckContext, key: NodeKey): NodeKey | undefined {
  return ctx.lookUp(typeDefinitions, key)[0];
}

export function findModellingRule(ctx: CheckContext, key: NodeKey): NodeKey | undefined {
  return ctx.lookUp(modellingRule, key);
}

const TYPES: ReadonlySet<NodeClass | undefined> = new Set(TYPE_CLASSES);

const typeAbove = makeLookup<NodeKey | undefined>((ctx, key) => {
  // Nearly all nodes have one parent, up to a type or a root; the general way is for the others.
  let at = key;
  for (let steps = 0; steps < 100; steps++) {
    const edges = ctx.parentEdges(at);
    const [edge] = edges;
    if (!edge) return undefined;
    if (edges.length > 1) break;
    if (TYPES.has(ctx.classOf(edge.source))) return edge.source;
    at = edge.source;
  }
  const seen = new Set<NodeKey>([key]);
  for (const at of seen) {
    for (const { source } of ctx.parentEdges(at)) {
      if (TYPES.has(ctx.classOf(source))) return source;
      seen.add(source);
    }
  }
  return undefined;
});

/** A type from which hierarchical references lead down to the node; undefined for what belongs to instances only. */
export function findTypeAbove(ctx: CheckContext, key: NodeKey): NodeKey | undefined {
  return ctx.lookUp(typeAbove, key);
}

const declaration = makeLookup<boolean>((ctx, key) => {
  if (findModellingRule(ctx, key) === undefined) return false;
  const seen = new Set<NodeKey>([key]);
  for (const at of seen) {
    for (const { source } of ctx.parentEdges(at)) {
      const parent = ctx.classOf(source);
      if (parent === "ObjectType" || parent === "VariableType") return true;
      if (parent !== undefined && findModellingRule(ctx, source) !== undefined) seen.add(source);
    }
  }
  return false;
});

/** An InstanceDeclaration: a node with a modelling rule below a type or another declaration (OPC 10000-3 §6.2.1). */
export function isInstanceDeclaration(ctx: CheckContext, key: NodeKey): boolean {
  return ctx.lookUp(declaration, key);
}

/** Whether the node hangs directly on an ObjectType or a VariableType. */
export function isMemberOfType(ctx: CheckContext, key: NodeKey): boolean {
  return ctx.parentEdges(key).some(({ source }) => {
    const parent = ctx.classOf(source);
    return parent === "ObjectType" || parent === "VariableType";
  });
}

const propertyRole = makeLookup<boolean>((ctx, key) => {
  const types = ctx.closure(R.HasProperty);
  return ctx.parentEdges(key).some((e) => types.has(e.type));
});

/** Whether the node is the target of a HasProperty reference. */
export function isProperty(ctx: CheckContext, key: NodeKey): boolean {
  return ctx.lookUp(propertyRole, key);
}

/** Edges of the given ones whose type is the reference type or below it. */
export function ofType(ctx: CheckContext, edges: readonly Edge[], referenceType: NodeKey): readonly Edge[] {
  if (edges.length === 0) return edges;
  const types = ctx.closure(referenceType);
  return edges.every((e) => types.has(e.type)) ? edges : edges.filter((e) => types.has(e.type));
}

const NO_PROPERTIES: ReadonlyMap<string, NodeKey> = new Map();

const standardProperties = makeLookup<ReadonlyMap<string, NodeKey>>((ctx, key) => {
  const edges = ofType(ctx, ctx.childEdges(key), R.HasProperty);
  if (edges.length === 0) return NO_PROPERTIES;
  const found = new Map<string, NodeKey>();
  for (const { target } of edges) {
    const node = ctx.head(target);
    if (node?.browseName.namespaceUri !== OPC_UA_NAMESPACE || found.has(node.browseName.name)) continue;
    found.set(node.browseName.name, target);
  }
  return found;
});

/** The Property with a BrowseName of namespace 0, by identity of namespace and name. */
export function findStandardProperty(ctx: CheckContext, key: NodeKey, name: string): Node | undefined {
  const found = ctx.lookUp(standardProperties, key).get(name);
  return found === undefined ? undefined : ctx.node(found);
}
