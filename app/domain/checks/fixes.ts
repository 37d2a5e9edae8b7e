/** Parts that fixes are made of. A fix that cannot be made any more says so with `fix.not-possible`. */
import type { AddressSpace } from "../address-space/address-space";
import type { DeclaredReference, Node } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import { StandardReferenceType as R } from "../address-space/standard-ids";
import { fail, ok, problem, type Result } from "../core/result";
import type { AttributeName, Operation } from "../editing/operation";
import type { Finding } from "./finding";
import type { Fix } from "./rule";

export function notPossible(finding: Finding): Result<never> {
  return fail(
    problem("fix.not-possible", { rule: finding.rule }, finding.key === undefined ? undefined : { node: finding.key }),
  );
}

/** The node that the finding names, if it is still there and own. */
export function findSubject(space: AddressSpace, finding: Finding): Node | undefined {
  return finding.key === undefined ? undefined : space.own.nodes.get(finding.key);
}

export function keyOf(finding: Finding, name: string): NodeKey | undefined {
  const value = finding.data?.[name];
  return typeof value === "string" && value !== "" ? (value as NodeKey) : undefined;
}

export function setAttribute(key: NodeKey, attribute: AttributeName, value?: unknown): Operation {
  return { kind: "setAttribute", key, attribute, ...(value === undefined ? {} : { value }) };
}

/** Sets one attribute of the node; `valueOf` answers the new value, `REMOVED`, or undefined where there is nothing to do. */
export function attributeFix(
  label: string,
  attribute: AttributeName,
  valueOf: (node: Node, finding: Finding, space: AddressSpace) => unknown,
): Fix {
  return {
    label,
    apply(space, finding) {
      const node = findSubject(space, finding);
      const value = node && valueOf(node, finding, space);
      if (!node || value === undefined) return notPossible(finding);
      return ok([value === REMOVED ? setAttribute(node.key, attribute) : setAttribute(node.key, attribute, value)]);
    },
  };
}

/** Stands for an attribute that is taken away. */
export const REMOVED = Symbol("removed");

/** Removes the reference that the finding's data name by `source`, `type` and `target`. */
export function removeReferenceFix(label = "Remove the reference"): Fix {
  return {
    label,
    apply(space, finding) {
      const [source, type, target] = [keyOf(finding, "source"), keyOf(finding, "type"), keyOf(finding, "target")];
      if (source === undefined || type === undefined || target === undefined) return notPossible(finding);
      if (!space.own.outgoing.get(source)?.distinct.some((e) => e.type === type && e.target === target))
        return notPossible(finding);
      return ok([{ kind: "removeReference", source, type, target }]);
    },
  };
}

/** Sets another type for the reference that the finding's data name. */
export function retypeReferenceFix(label: string, typeOf: (finding: Finding) => NodeKey | undefined): Fix {
  return {
    label,
    apply(space, finding) {
      const [source, type, target] = [keyOf(finding, "source"), keyOf(finding, "type"), keyOf(finding, "target")];
      const wanted = typeOf(finding);
      if (source === undefined || type === undefined || target === undefined || wanted === undefined)
        return notPossible(finding);
      const removed: Operation = { kind: "removeReference", source, type, target };
      return ok([removed, ...replacement(space, source, wanted, target)]);
    },
  };
}

function replacement(space: AddressSpace, source: NodeKey, type: NodeKey, target: NodeKey): Operation[] {
  if (space.edgesFrom(source).some((e) => e.type === type && e.target === target)) return [];
  return [addReference(space, source, type, target)];
}

/** Declares hierarchical references at the child and others at the source, where these are own. */
export function addReference(space: AddressSpace, source: NodeKey, type: NodeKey, target: NodeKey): Operation {
  const atTarget = space.isOwn(target) && type !== R.HasTypeDefinition && type !== R.HasModellingRule;
  return {
    kind: "addReference",
    source,
    type,
    target,
    declaredAt: atTarget || !space.isOwn(source) ? "target" : "source",
  };
}

/** Replaces all forward references of a type by one to another target, or by none. */
export function replaceForward(
  space: AddressSpace,
  node: Node,
  type: NodeKey,
  target: NodeKey | undefined,
): Operation[] {
  const old = space.edgesFrom(node.key).filter((e) => e.type === type);
  if (target !== undefined && old.length === 1 && old[0]?.target === target) return [];
  const removed = old.map((e): Operation => ({ kind: "removeReference", source: e.source, type, target: e.target }));
  return target === undefined
    ? removed
    : [...removed, { kind: "addReference", source: node.key, type, target, declaredAt: "source" }];
}

/** Sets the type definition. */
export function typeDefinitionFix(label: string, typeOf: (node: Node, finding: Finding) => NodeKey | undefined): Fix {
  return forwardFix(label, R.HasTypeDefinition, typeOf);
}

/** Sets the modelling rule, or takes it away with `REMOVED`. */
export function modellingRuleFix(
  label: string,
  ruleOf: (node: Node, finding: Finding) => NodeKey | typeof REMOVED | undefined,
): Fix {
  return forwardFix(label, R.HasModellingRule, ruleOf);
}

function forwardFix(
  label: string,
  type: NodeKey,
  targetOf: (node: Node, finding: Finding) => NodeKey | typeof REMOVED | undefined,
): Fix {
  return {
    label,
    apply(space, finding) {
      const node = findSubject(space, finding);
      const target = node && targetOf(node, finding);
      if (!node || target === undefined) return notPossible(finding);
      const operations = replaceForward(space, node, type, target === REMOVED ? undefined : target);
      return operations.length > 0 ? ok(operations) : notPossible(finding);
    },
  };
}

/** A declared reference without its twins; the order of the rest stays. */
export function isSameReference(a: DeclaredReference, b: DeclaredReference): boolean {
  return a.type === b.type && a.target === b.target && a.isForward === b.isForward && a.serverUri === b.serverUri;
}
