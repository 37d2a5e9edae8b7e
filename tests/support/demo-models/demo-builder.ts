/**
 * Builds a model by the same commands that the screens use, one after the other, and numbers the nodes so that the ids of a
 * model that is built again stay what they were.
 */
import { applyOperations } from "~/domain/editing/apply-operation";
import type { NodeIdAllocator } from "~/domain/editing/allocate-node-id";
import type { Edit } from "~/domain/editing/edit-draft";
import type { AttributeName } from "~/domain/editing/operation";
import { setValue } from "~/domain/editing/commands/set-value";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { listMembers } from "~/domain/address-space/browse";
import { getOwnNamespace } from "~/domain/address-space/model-header";
import type { NodeClass } from "~/domain/address-space/node";
import { numericNodeId, type NodeKey } from "~/domain/address-space/node-id";
import type { LocalizedText } from "~/domain/address-space/qualified-name";
import { getValue, ok, type Result } from "~/domain/core/result";
import { formatProblem } from "~/domain/core/problem-texts";
import type { Variant } from "~/domain/nodeset/values/variant";
import type { Texts } from "./braider-description";

/** Where the numbers of each node class start, as published NodeSets have it; one block of 1000 a class. */
const CLASS_BASE: Readonly<Record<NodeClass, number>> = {
  ObjectType: 1001,
  VariableType: 2001,
  DataType: 3001,
  ReferenceType: 4001,
  Object: 5001,
  Variable: 6001,
  Method: 7001,
  View: 8001,
};

export class DemoBuilder {
  space: AddressSpace;
  readonly #next = new Map<string, number>();
  #base: number | undefined;

  constructor(space: AddressSpace) {
    this.space = space;
  }

  /** Nodes that are made from now on are numbered from here, whatever their class. */
  startNumbersAt(base: number): void {
    this.#base = base;
  }

  get context(): NodeIdAllocator {
    return {
      allocate: (nodeClass) => ok(numericNodeId(getOwnNamespace(this.space.own.header), this.#take(nodeClass))),
    };
  }

  #take(nodeClass: NodeClass): number {
    const base = this.#base ?? CLASS_BASE[nodeClass];
    const id = this.#next.get(String(base)) ?? base;
    this.#next.set(String(base), id + 1);
    return id;
  }

  /** Does an edit. Throws with the sentence of the problem when it is refused. */
  run(edit: Result<Edit>): void {
    if (!edit.ok) throw new Error(edit.problems.map(formatProblem).join(" "));
    this.space = getValue(applyOperations(this.space, edit.value.operations));
  }

  /** Does an edit that makes nodes; answers the main one. */
  make(edit: Result<Edit>): NodeKey {
    this.run(edit);
    const main = edit.ok ? edit.value.made[0] : undefined;
    if (main === undefined) throw new RangeError("The edit makes no node");
    return main;
  }

  set(key: NodeKey, attribute: AttributeName, value: unknown): void {
    this.space = getValue(applyOperations(this.space, [{ kind: "setAttribute", key, attribute, value }]));
  }

  setValue(key: NodeKey, value: Variant): void {
    this.run(setValue(this.space, this.context, { node: key, value }));
  }

  /** The member at a path of plain names below a node; it must be there. */
  member(key: NodeKey, path: string): NodeKey {
    return path.split("/").reduce<NodeKey>((at, name) => {
      const found = listMembers(this.space, at).find((node) => node.browseName.name === name);
      if (!found) throw new Error(`No member ${name} of ${path}`);
      return found.key;
    }, key);
  }
}

export function toLocalized({ en, de }: Texts): readonly LocalizedText[] {
  return [
    { locale: "en", text: en },
    { locale: "de", text: de },
  ];
}

export function inEnglish(text: string): readonly LocalizedText[] {
  return [{ locale: "en", text }];
}
