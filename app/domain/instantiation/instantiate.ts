/**
 * Makes an instance of an ObjectType or VariableType.
 *
 * - `instantiate(space, context, intent)`: the edit that makes the instance below `intent.parent` with all mandatory members to
 *   the whole depth, the optional ones of `intent.optional`, and nodes for the placeholders of `intent.named`.
 * - `addDeclaredMembers(space, context, {instance, optional, named, includeMissing})`: completes an instance that exists.
 * - `missing-members.ts`: `listMissingMembers`, `listOfferedMembers`: what an instance lacks or could have.
 *
 * Methods are copied by default, with MethodDeclarationId and their argument Properties; `methods: "share"` refers to the
 * Method of the type instead. OPC 10000-3 §6.4.2 allows both. Copies are the default because a gateway binds an
 * implementation to the Method's NodeId, which must tell six machines apart, and because a node with a parent in another
 * model is lost by loaders that read one file after the other.
 */
import type { AddressSpace } from "../address-space/address-space";
import { findModellingRule, findTypeDefinition } from "../address-space/browse";
import { isPlaceholder, listInstanceSources } from "../address-space/instance-declarations";
import { isAbstract, type DeclaredReference, type Node } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import { qualifiedName, type LocalizedText } from "../address-space/qualified-name";
import { StandardReferenceType, StandardType } from "../address-space/standard-ids";
import { isSubtypeOf } from "../address-space/type-hierarchy";
import { fail, problem, type Problem, type Result } from "../core/result";
import { EditDraft, type CommandContext, type Edit } from "../editing/edit-draft";
import { checkName, checkSiblingName } from "../editing/names";
import { choosePlacement } from "../editing/placement";
import { copyTypeAttributes } from "./copy-attributes";
import { InstanceBuilder } from "./instance-builder";
import { MemberChoice, type NamedPlaceholder } from "./member-choice";

export type InstantiateIntent = {
  /** An ObjectType or VariableType. */
  readonly type: NodeKey;
  readonly parent: NodeKey;
  readonly name: string;
  /** Namespace of the BrowseName; the model's own by default. */
  readonly namespaceUri?: string;
  /** From the parent; the usual lawful one by default. */
  readonly referenceType?: NodeKey;
  /** Modelling rule; in a type Mandatory by default, in an instance none. */
  readonly rule?: NodeKey | "none";
  readonly displayName?: readonly LocalizedText[];
  readonly description?: readonly LocalizedText[];
  readonly optional?: readonly string[];
  readonly named?: readonly NamedPlaceholder[];
  readonly methods?: "copy" | "share";
  /** Attributes of the new node beside those that the type gives: dataType, value, accessLevel … */
  readonly attributes?: Readonly<Record<string, unknown>>;
  /** Interfaces beside those of the type. */
  readonly interfaces?: readonly NodeKey[];
};

/**
 * Problems: `instantiate.no-type`, `instantiate.abstract` (an abstract type stands in types only, OPC 10000-3 §6.4.3),
 * `instantiate.interface`, `instantiate.no-such-member`, `instantiate.too-deep`, `instantiate.too-many`, `name.*`,
 * `reference.*`, `node-id.block-empty`. The first of `made` is the instance.
 */
export function instantiate(space: AddressSpace, context: CommandContext, intent: InstantiateIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  addInstance(draft, intent);
  return draft.finish();
}

/** The same on a draft, for commands that do more; undefined when it failed. */
export function addInstance(draft: EditDraft, intent: InstantiateIntent): NodeKey | undefined {
  const { space } = draft;
  const type = space.getNode(intent.type);
  const parent = space.getNode(intent.parent);
  const browseName = qualifiedName(intent.namespaceUri ?? draft.ownNamespace, intent.name);
  const placement = parent && type && choosePlacement(space, parent, type, intent);
  const isDeclaration = placement?.ok === true && placement.isDeclaration;
  const found =
    checkType(space, type, isDeclaration) ??
    checkName(intent.name) ??
    checkSiblingName(space, intent.parent, browseName);
  if (found || !placement) draft.fail(found ?? problem("operation.node-missing", { node: intent.parent }));
  else if (!placement.ok) draft.fail(placement.problem);
  if (draft.hasFailed || !placement?.ok || !type) return undefined;

  const references: DeclaredReference[] = [
    ...placement.references,
    { type: StandardReferenceType.HasTypeDefinition, target: type.key, isForward: true },
    ...placement.rules,
    ...(intent.interfaces ?? []).map((target) => ({
      type: StandardReferenceType.HasInterface,
      target,
      isForward: true,
    })),
  ];
  const key = draft.add({
    nodeClass: type.nodeClass === "VariableType" ? "Variable" : "Object",
    browseName,
    ...(intent.displayName ? { displayName: intent.displayName } : {}),
    ...(intent.description ? { description: intent.description } : {}),
    references,
    attributes: { parent: intent.parent, ...copyTypeAttributes(space, type.key), ...intent.attributes },
  });
  if (key === undefined) return undefined;
  if (intent.rule === "none" || !isPlaceholder(intent.rule)) addMembers(draft, key, intent, isDeclaration);
  else reportUnmet(draft, intent);
  return draft.hasFailed ? undefined : key;
}

type Wishes = Pick<InstantiateIntent, "optional" | "named" | "methods">;

function addMembers(draft: EditDraft, key: NodeKey, wishes: Wishes, withRules: boolean): void {
  const choice = new MemberChoice(wishes.optional, wishes.named);
  const builder = new InstanceBuilder(draft, { choice, withRules, methods: wishes.methods ?? "copy" });
  builder.build(key, listInstanceSources(draft.space, key));
}

function reportUnmet(draft: EditDraft, wishes: Wishes): void {
  for (const path of new MemberChoice(wishes.optional, wishes.named).listUnmet()) {
    draft.fail(problem("instantiate.no-such-member", { path }));
  }
}

function checkType(space: AddressSpace, type: Node | undefined, isDeclaration: boolean): Problem | undefined {
  if (type?.nodeClass !== "ObjectType" && type?.nodeClass !== "VariableType") {
    return problem("instantiate.no-type", { type: type?.browseName.name ?? "" });
  }
  if (isSubtypeOf(space, type.key, StandardType.BaseInterfaceType))
    return problem("instantiate.interface", { type: type.browseName.name });
  if (isAbstract(type) && !isDeclaration) return problem("instantiate.abstract", { type: type.browseName.name });
  return undefined;
}

export type AddDeclaredMembersIntent = Wishes & {
  readonly instance: NodeKey;
  /** Adds the mandatory members that are missing, everywhere below the instance. */
  readonly includeMissing?: boolean;
};

/** Completes an instance: the members asked for, and with `includeMissing` the mandatory ones that it lacks. */
export function addDeclaredMembers(
  space: AddressSpace,
  context: CommandContext,
  intent: AddDeclaredMembersIntent,
): Result<Edit> {
  const instance = space.getNode(intent.instance);
  if (!instance || !space.isOwn(intent.instance))
    return fail(problem(instance ? "operation.node-foreign" : "operation.node-missing", { node: intent.instance }));
  if (findTypeDefinition(space, intent.instance) === undefined)
    return fail(problem("instantiate.no-type", { type: instance.browseName.name }));
  const draft = new EditDraft(space, context);
  const choice = new MemberChoice(intent.optional, intent.named);
  const withRules = findModellingRule(space, intent.instance) !== undefined;
  const builder = new InstanceBuilder(draft, { choice, withRules, methods: intent.methods ?? "copy" });
  builder.complete(intent.instance, intent.includeMissing ?? false);
  return draft.finish();
}
