/**
 * Operations: the smallest edits of a model. Each is plain JSON, has an apply and an inverse, and names one conflict
 * unit: (node, attribute), (source, type, target), a whole node, or one field of the header. User intents ("add a member",
 * "instantiate", "delete with all below it") are commands that answer a list of operations.
 */
import type { MappingAddress } from "../address-space/mapping-entry";
import type { NodeId, NodeKey } from "../address-space/node-id";
import type { ModelHeader } from "../address-space/model-header";
import type { Node } from "../address-space/node";

/** Every attribute of a node that may be set by itself: all but identity, class and references. */
export type AttributeName =
  | "nodeId"
  | "order"
  | "browseName"
  | "symbolicName"
  | "displayName"
  | "description"
  | "category"
  | "documentation"
  | "releaseStatus"
  | "writeMask"
  | "userWriteMask"
  | "accessRestrictions"
  | "hasNoPermissions"
  | "rolePermissions"
  | "extensions"
  | "otherAttributes"
  | "otherElements"
  | "leftovers"
  | "parent"
  | "designToolOnly"
  | "eventNotifier"
  | "containsNoLoops"
  | "value"
  | "dataType"
  | "valueRank"
  | "arrayDimensions"
  | "accessLevel"
  | "userAccessLevel"
  | "minimumSamplingInterval"
  | "historizing"
  | "translations"
  | "executable"
  | "userExecutable"
  | "methodDeclaration"
  | "argumentDescriptions"
  | "isAbstract"
  | "purpose"
  | "definition"
  | "symmetric"
  | "inverseName";

/** Where a reference is declared: at its source, at its target, or at both ends; ends outside the own model are skipped. */
export type DeclaredAt = "source" | "target" | "both";

export type Operation =
  /**
   * Adds a node with all it declares. What it refers to must be loaded, unless `isDangling` says that the node was like
   * that before: an undo puts back what a file held.
   */
  | { readonly kind: "addNode"; readonly node: Node; readonly isDangling?: true }
  /** Removes a node that no other own node refers to any more. */
  | { readonly kind: "removeNode"; readonly key: NodeKey }
  /** Sets one attribute; an absent `value` takes it away. */
  | {
      readonly kind: "setAttribute";
      readonly key: NodeKey;
      readonly attribute: AttributeName;
      readonly value?: unknown;
    }
  /** Gives nodes other NodeIds, all at once: two may exchange theirs, and several may pass them on in a circle. */
  | { readonly kind: "renumber"; readonly changes: readonly { readonly key: NodeKey; readonly nodeId: NodeId }[] }
  /**
   * `sourceIndex` and `targetIndex` are places in the lists of declared references; absent means at the end. `repeats`
   * are the places of further declarations of the same reference, which some files have and an undo must put back.
   */
  | {
      readonly kind: "addReference";
      readonly source: NodeKey;
      readonly type: NodeKey;
      readonly target: NodeKey;
      readonly declaredAt: DeclaredAt;
      readonly sourceIndex?: number;
      readonly targetIndex?: number;
      readonly repeats?: { readonly source: readonly number[]; readonly target: readonly number[] };
      /** Attributes that the schema does not know, as `DeclaredReference.otherAttributes`, at either end. */
      readonly sourceAttributes?: Readonly<Record<string, string>>;
      readonly targetAttributes?: Readonly<Record<string, string>>;
      readonly isDangling?: true;
    }
  | { readonly kind: "removeReference"; readonly source: NodeKey; readonly type: NodeKey; readonly target: NodeKey }
  /** Sets one field of the model's header: version, required models, namespace table. */
  | { readonly kind: "setHeader"; readonly field: keyof ModelHeader; readonly value?: unknown }
  /** Sets one entry of the mapping; an absent `value` takes it away. Its owner must be there unless `isDangling`. */
  | ({ readonly kind: "setMapping"; readonly value?: unknown; readonly isDangling?: true } & MappingAddress);

/** Whether the operations leave nodes and header alone: who may edit mappings need not be allowed to edit models. */
export function isMappingEdit(operations: readonly Operation[]): boolean {
  return operations.every((operation) => operation.kind === "setMapping");
}

/**
 * A transaction: what one user did in one go. Stored as one row; undo is a new transaction made of `inverse`.
 * `seq` is the model's sequence number that it got; `base` the one that the author saw.
 */
export type Transaction = {
  readonly seq: number;
  readonly base: number;
  readonly clientId: string;
  readonly clientSeq: number;
  readonly author: string;
  /** ISO 8601, UTC. */
  readonly at: string;
  /** The command for people and history: `add-member`, `set-unit`, `undo`. */
  readonly label: string;
  readonly operations: readonly Operation[];
  readonly inverse: readonly Operation[];
};
