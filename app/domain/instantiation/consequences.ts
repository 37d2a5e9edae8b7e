/**
 * What a change of types means for what was made from them.
 *
 * `listConsequences(before, after)` compares the model before and after (an edit, a newer release of a required model) and
 * answers what instances and overriding declarations of the own model no longer follow: members that a type got, lost or
 * renamed, and attributes that the copy still has as the old declaration had them. A copy that somebody changed on purpose
 * is left alone. `applyConsequences` makes the edit that follows; the user chooses from the list.
 */
import type { AddressSpace } from "../address-space/address-space";
import { findModellingRule, findTypeDefinition } from "../address-space/browse";
import {
  listInstanceDeclarations,
  listInstanceSources,
  type DeclarationSource,
} from "../address-space/instance-declarations";
import type { Node } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import { isSameQualifiedName, type QualifiedName } from "../address-space/qualified-name";
import { StandardReferenceType } from "../address-space/standard-ids";
import type { Result } from "../core/result";
import { deleteNodesOn } from "../editing/commands/delete-nodes";
import { EditDraft, type CommandContext, type Edit } from "../editing/edit-draft";
import type { AttributeName, Operation } from "../editing/operation";
import { InstanceBuilder } from "./instance-builder";
import { MemberChoice } from "./member-choice";
import { listMissingMembers, walkInstance } from "./missing-members";

const { HasModellingRule } = StandardReferenceType;

/** `node` is the copy that follows a declaration; `declaration` the one that changed. */
export type Consequence =
  | {
      readonly kind: "missing-member";
      readonly instance: NodeKey;
      readonly pathKey: string;
      readonly path: readonly QualifiedName[];
      readonly declaration: NodeKey;
    }
  | {
      readonly kind: "renamed-member";
      readonly node: NodeKey;
      readonly declaration: NodeKey;
      readonly from: QualifiedName;
      readonly to: QualifiedName;
    }
  | { readonly kind: "removed-member"; readonly node: NodeKey; readonly declaration: NodeKey }
  | {
      readonly kind: "changed-attribute";
      readonly node: NodeKey;
      readonly declaration: NodeKey;
      readonly attribute: FollowedAttribute;
      readonly from: unknown;
      readonly to: unknown;
    };

/** Attributes that a copy takes from its declaration. */
const FOLLOWED = [
  "displayName",
  "description",
  "dataType",
  "valueRank",
  "arrayDimensions",
  "value",
  "accessLevel",
  "minimumSamplingInterval",
  "historizing",
  "eventNotifier",
  "executable",
] as const satisfies readonly AttributeName[];
export type FollowedAttribute = (typeof FOLLOWED)[number];

/** Both spaces hold the same own copies; only types (own or required) differ. Each copy is named once for each reason. */
export function listConsequences(before: AddressSpace, after: AddressSpace): Consequence[] {
  const found = new Map<string, Consequence>();
  // A member of a member is met from both; it is one consequence, so the place where it would stand tells it.
  const add: Add = (place, consequence) => {
    const detail = consequence.kind === "changed-attribute" ? consequence.attribute : "";
    const id = [consequence.kind, place, consequence.declaration, detail].join(" ");
    if (!found.has(id)) found.set(id, consequence);
  };
  const instances: NodeKey[] = [];
  // An edit of the own model changes own types only; a newer required model may change any.
  const isSameBelow = before.layers.slice(0, -1).every((layer, i) => layer === after.layers[i]);
  for (const node of after.listOwnNodes()) {
    if (!before.isOwn(node.key)) continue;
    if (findTypeDefinition(before, node.key) !== undefined) {
      if (!isSameBelow || followsOwnType(before, node.key)) instances.push(node.key);
    } else if (node.nodeClass === "ObjectType" || node.nodeClass === "VariableType")
      compareOverrides(before, after, node.key, add);
  }
  for (const instance of instances) compareMembers(before, after, instance, add);
  // What is new below a renamed member can only be seen once the copies have the new name too.
  const renamed = withRenamedMembers(after, found.values());
  for (const instance of instances) compareCompleteness(before, renamed, instance, add);
  return [...found.values()];
}

function followsOwnType(space: AddressSpace, instance: NodeKey): boolean {
  return listInstanceSources(space, instance).some((source) => space.isOwn(source.key));
}

function withRenamedMembers(space: AddressSpace, consequences: Iterable<Consequence>): AddressSpace {
  let renamed = space;
  for (const consequence of consequences) {
    if (consequence.kind !== "renamed-member") continue;
    renamed = renamed.withNode({ ...renamed.requireNode(consequence.node), browseName: consequence.to });
  }
  return renamed;
}

type Add = (place: NodeKey, consequence: Consequence) => void;

function compareMembers(before: AddressSpace, after: AddressSpace, instance: NodeKey, add: Add): void {
  let scopes = 0;
  for (const level of walkInstance(before, instance, () => String(++scopes))) {
    for (const { member, child } of level.members) {
      if (!child || !after.isOwn(child.key) || member.declared.some((d) => d.key === child.key)) continue;
      compareCopy(before, after, child.key, member.declared, add);
    }
  }
}

/** What an instance lacked before the change is no consequence of it. */
function compareCompleteness(before: AddressSpace, after: AddressSpace, instance: NodeKey, add: Add): void {
  const missing = listMissingMembers(after, instance);
  if (missing.length === 0) return;
  const known = new Set(listMissingMembers(before, instance).map((open) => open.declaration));
  for (const { parent, path, pathKey, declaration } of missing) {
    if (!known.has(declaration)) add(parent, { kind: "missing-member", instance, path, pathKey, declaration });
  }
}

/** Declarations of a subtype that override inherited ones. */
function compareOverrides(before: AddressSpace, after: AddressSpace, type: NodeKey, add: Add): void {
  for (const row of listInstanceDeclarations(before, type).values()) {
    const [nearest, ...overridden] = row.declared;
    if (nearest && overridden.length > 0 && after.isOwn(nearest.key))
      compareCopy(before, after, nearest.key, overridden, add);
  }
}

/** Compares a copy with the declarations that it follows, nearest first. */
function compareCopy(
  before: AddressSpace,
  after: AddressSpace,
  copy: NodeKey,
  declared: readonly DeclarationSource[],
  add: Add,
): void {
  const declaration = declared[0]?.key;
  const old = declaration === undefined ? undefined : before.getNode(declaration);
  const node = after.getNode(copy);
  if (!old || !node || declaration === undefined) return;
  const now = after.getNode(declaration);
  if (!now) {
    if (declared.every((d) => !after.getNode(d.key))) add(copy, { kind: "removed-member", node: copy, declaration });
    return;
  }
  for (const attribute of FOLLOWED) compareAttribute({ copy: node, old, now }, attribute, add);
  const follows = isSameQualifiedName(node.browseName, old.browseName);
  if (follows && !isSameQualifiedName(old.browseName, now.browseName)) {
    add(copy, { kind: "renamed-member", node: copy, declaration, from: old.browseName, to: now.browseName });
  }
}

type Attributes = Node & { readonly [name: string]: unknown };

function compareAttribute(nodes: { copy: Node; old: Node; now: Node }, attribute: FollowedAttribute, add: Add): void {
  const [copy, old, now] = [nodes.copy, nodes.old, nodes.now].map((n) => (n as Attributes)[attribute]);
  if (isSame(old, now) || !isSame(copy, old)) return;
  add(nodes.copy.key, {
    kind: "changed-attribute",
    node: nodes.copy.key,
    declaration: nodes.now.key,
    attribute,
    from: old,
    to: now,
  });
}

function isSame(a: unknown, b: unknown): boolean {
  return a === b || JSON.stringify(a) === JSON.stringify(b);
}

/** The edit that makes the chosen consequences good. Problems as `addDeclaredMembers`, `deleteNodes` and apply. */
export function applyConsequences(
  space: AddressSpace,
  context: CommandContext,
  intent: { readonly consequences: readonly Consequence[] },
): Result<Edit> {
  const draft = new EditDraft(space, context);
  const missing = new Map<NodeKey, string[]>();
  for (const consequence of intent.consequences) {
    switch (consequence.kind) {
      case "renamed-member":
        draft.set(consequence.node, "browseName", consequence.to);
        break;
      case "changed-attribute":
        draft.set(consequence.node, consequence.attribute, consequence.to);
        break;
      case "removed-member":
        if (draft.space.getNode(consequence.node)) deleteNodesOn(draft, [consequence.node]);
        break;
      case "missing-member":
        missing.set(consequence.instance, [...(missing.get(consequence.instance) ?? []), consequence.pathKey]);
    }
  }
  for (const [instance, paths] of missing) {
    if (draft.hasFailed) break;
    const withRules = draft.space.edgesFrom(instance).some((e) => e.type === HasModellingRule);
    const choice = new MemberChoice(
      paths.filter((path) => listMissingMembers(draft.space, instance).some((m) => m.pathKey === path)),
    );
    new InstanceBuilder(draft, { choice, withRules, methods: "copy" }).complete(instance, false);
  }
  return draft.finish();
}

/** Whether operations touch types or what stands in them, so that asking for consequences is worth the time. */
export function touchesDeclarations(before: AddressSpace, operations: readonly Operation[]): boolean {
  return operations.some((operation) => {
    if (operation.kind === "setHeader" || operation.kind === "setMapping" || operation.kind === "renumber") return false;
    if (operation.kind === "addNode") return operation.node.references.some((r) => r.type === HasModellingRule);
    const keys = "key" in operation ? [operation.key] : [operation.source, operation.target];
    return keys.some((key) => isDeclaration(before, key));
  });
}

function isDeclaration(space: AddressSpace, key: NodeKey): boolean {
  const nodeClass = space.isOwn(key) ? space.getNode(key)?.nodeClass : undefined;
  if (nodeClass === "ObjectType" || nodeClass === "VariableType") return true;
  return nodeClass !== undefined && findModellingRule(space, key) !== undefined;
}
