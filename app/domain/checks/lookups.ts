/** Remembered questions that many rules ask. Each walks in a loop over tracked reads, so that cycles end. */
import type { Edge } from "../address-space/edge-index";
import type { Node } from "../address-space/node";
import { isTypeNode } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import { StandardReferenceType as R } from "../address-space/standard-ids";
import type { CheckContext, Lookup } from "./check-context";

const supertypes: Lookup<readonly NodeKey[]> = {
  compute(ctx, key) {
    const chain: NodeKey[] = [];
    const seen = new Set<NodeKey>([key]);
    for (let at = ctx.supertypeEdges(key)[0]?.source; at !== undefined && !seen.has(at);) {
      seen.add(at);
      chain.push(at);
      at = ctx.supertypeEdges(at)[0]?.source;
    }
    return chain;
  },
};

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
  return ctx.node(type) !== undefined && listSupertypes(ctx, type).every((t) => ctx.node(t) !== undefined);
}

export function findTypeDefinition(ctx: CheckContext, key: NodeKey): NodeKey | undefined {
  return ctx.otherEdges(key).find((e) => e.type === R.HasTypeDefinition)?.target;
}

export function findModellingRule(ctx: CheckContext, key: NodeKey): NodeKey | undefined {
  return ctx.otherEdges(key).find((e) => e.type === R.HasModellingRule)?.target;
}

const typeAbove: Lookup<NodeKey | undefined> = {
  compute(ctx, key) {
    const seen = new Set<NodeKey>([key]);
    for (const at of seen) {
      for (const edge of ctx.parentEdges(at)) {
        const parent = ctx.node(edge.source);
        if (parent && isTypeNode(parent)) return parent.key;
        seen.add(edge.source);
      }
    }
    return undefined;
  },
};

/** A type from which hierarchical references lead down to the node; undefined for what belongs to instances only. */
export function findTypeAbove(ctx: CheckContext, key: NodeKey): NodeKey | undefined {
  return ctx.lookUp(typeAbove, key);
}

const declaration: Lookup<boolean> = {
  compute(ctx, key) {
    if (findModellingRule(ctx, key) === undefined) return false;
    const seen = new Set<NodeKey>([key]);
    for (const at of seen) {
      for (const { source } of ctx.parentEdges(at)) {
        const parent = ctx.node(source);
        if (!parent) continue;
        if (parent.nodeClass === "ObjectType" || parent.nodeClass === "VariableType") return true;
        if (findModellingRule(ctx, source) !== undefined) seen.add(source);
      }
    }
    return false;
  },
};

/** An InstanceDeclaration: a node with a modelling rule below a type or another declaration (OPC 10000-3 §6.2.1). */
export function isInstanceDeclaration(ctx: CheckContext, key: NodeKey): boolean {
  return ctx.lookUp(declaration, key);
}

const propertyRole: Lookup<boolean> = {
  compute(ctx, key) {
    const types = ctx.closure(R.HasProperty);
    return ctx.parentEdges(key).some((e) => types.has(e.type));
  },
};

/** Whether the node is the target of a HasProperty reference. */
export function isProperty(ctx: CheckContext, key: NodeKey): boolean {
  return ctx.lookUp(propertyRole, key);
}

/** Edges of the given ones whose type is the reference type or below it. */
export function ofType(ctx: CheckContext, edges: readonly Edge[], referenceType: NodeKey): Edge[] {
  const types = ctx.closure(referenceType);
  return edges.filter((e) => types.has(e.type));
}

/** The Property with a BrowseName of namespace 0, by identity of namespace and name. */
export function findStandardProperty(ctx: CheckContext, key: NodeKey, name: string): Node | undefined {
  return findPropertyNamed(ctx, key, "http://opcfoundation.org/UA/", name);
}

export function findPropertyNamed(
  ctx: CheckContext,
  key: NodeKey,
  namespaceUri: string,
  name: string,
): Node | undefined {
  for (const edge of ofType(ctx, ctx.childEdges(key), R.HasProperty)) {
    const node = ctx.node(edge.target);
    if (node?.browseName.name === name && node.browseName.namespaceUri === namespaceUri) return node;
  }
  return undefined;
}
