/**
 * The workbench of commands: collects operations and applies each at once, so that the next step sees what the last one
 * made. After a step that failed the rest is skipped, and `finish` answers the problems: a command does all or nothing.
 */
import type { AddressSpace, Edge } from "../address-space/address-space";
import { getOwnNamespace } from "../address-space/model-header";
import type { DeclaredReference, Node, NodeClass } from "../address-space/node";
import { toNodeKey, type NodeKey } from "../address-space/node-id";
import type { LocalizedText, QualifiedName } from "../address-space/qualified-name";
import { fail, ok, type Problem, type Result } from "../core/result";
import type { NodeIdAllocator } from "./allocate-node-id";
import { applyOperation } from "./apply-operation";
import type { AttributeName, DeclaredAt, Operation } from "./operation";
import { toSymbolicName } from "./symbolic-name";

/** What every command gets beside the model: where new NodeIds come from. */
export type CommandContext = NodeIdAllocator;

/** What a command answers: the operations of one transaction and the nodes that they make, the main one first. */
export type Edit = { readonly operations: readonly Operation[]; readonly made: readonly NodeKey[] };

/** A new node without what the draft fills in by itself. */
export type NewNode = {
  readonly nodeClass: NodeClass;
  readonly browseName: QualifiedName;
  readonly displayName?: readonly LocalizedText[];
  readonly description?: readonly LocalizedText[];
  readonly references: readonly DeclaredReference[];
  /** Attributes of the class: dataType, parent, isAbstract … */
  readonly attributes?: Readonly<Record<string, unknown>>;
};

export class EditDraft {
  readonly #context: CommandContext;
  readonly #operations: Operation[] = [];
  readonly #made: NodeKey[] = [];
  readonly #problems: Problem[] = [];
  readonly #notes: Problem[] = [];
  #space: AddressSpace;

  constructor(space: AddressSpace, context: CommandContext) {
    this.#space = space;
    this.#context = context;
  }

  /** The model with everything that was done so far. */
  get space(): AddressSpace {
    return this.#space;
  }

  get hasFailed(): boolean {
    return this.#problems.length > 0;
  }

  get ownNamespace(): string {
    return getOwnNamespace(this.#space.own.header);
  }

  /** Stops the command with a problem. */
  fail(problem: Problem): void {
    this.#problems.push(problem);
  }

  /** Something that the user should be told although the command goes through. */
  note(problem: Problem): void {
    this.#notes.push(problem);
  }

  do(operation: Operation): void {
    if (this.hasFailed) return;
    const result = applyOperation(this.#space, operation);
    if (!result.ok) {
      this.#problems.push(...result.problems);
      return;
    }
    this.#operations.push(operation);
    this.#space = result.value;
  }

  /** Adds a node with the next free NodeId and order number; undefined when the command has failed. */
  add(spec: NewNode): NodeKey | undefined {
    if (this.hasFailed) return undefined;
    const parent = spec.references.find((r) => !r.isForward)?.target;
    const allocated = this.#context.allocate(spec.nodeClass, {
      space: this.#space,
      parent,
      name: spec.browseName.name,
    });
    if (!allocated.ok) {
      this.#problems.push(...allocated.problems);
      return undefined;
    }
    const key = toNodeKey(allocated.value);
    const symbolicName = toSymbolicName(spec.browseName.name);
    const node = {
      key,
      nodeId: allocated.value,
      nodeClass: spec.nodeClass,
      order: this.#space.own.nextOrder,
      browseName: spec.browseName,
      ...(symbolicName === undefined ? {} : { symbolicName }),
      displayName: spec.displayName ?? [{ text: spec.browseName.name }],
      ...(spec.description && spec.description.length > 0 ? { description: spec.description } : {}),
      references: spec.references,
      ...withoutUndefined(spec.attributes ?? {}),
    } as Node;
    this.do({ kind: "addNode", node });
    if (this.hasFailed) return undefined;
    this.#made.push(key);
    return key;
  }

  /** Sets an attribute unless it is so already; `undefined` takes it away. */
  set(key: NodeKey, attribute: AttributeName, value: unknown): void {
    const node: (Node & { readonly [name: string]: unknown }) | undefined = this.#space.getNode(key);
    if (node && isSameJson(node[attribute], value)) return;
    this.do({ kind: "setAttribute", key, attribute, ...(value === undefined ? {} : { value }) });
  }

  addReference(edge: Edge, declaredAt: DeclaredAt): void {
    const { source, type, target } = edge;
    this.do({ kind: "addReference", source, type, target, declaredAt });
  }

  removeReference({ source, type, target }: Edge): void {
    this.do({ kind: "removeReference", source, type, target });
  }

  finish(): Result<Edit> {
    if (this.hasFailed) return fail(...this.#problems);
    return ok({ operations: this.#operations, made: this.#made }, this.#notes);
  }
}

function withoutUndefined(attributes: Readonly<Record<string, unknown>>): Record<string, unknown> {
  return Object.fromEntries(Object.entries(attributes).filter(([, value]) => value !== undefined));
}

function isSameJson(a: unknown, b: unknown): boolean {
  return a === b || (a !== undefined && b !== undefined && JSON.stringify(a) === JSON.stringify(b));
}
