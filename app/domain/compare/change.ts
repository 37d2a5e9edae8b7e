/**
 * One change between two states of a model, as an engineer names it: a unit of a Variable changed, a member was added; not
 * "three attributes of two Properties differ". What belongs to one intent is one change.
 */
import type { NodeKey } from "../address-space/node-id";

export type ChangeRating = "breaking" | "additive" | "neutral";

export type ChangeKind =
  | "member-added"
  | "member-removed"
  | "type-added"
  | "type-removed"
  | "instance-added"
  | "instance-removed"
  | "id-reused"
  | "renumbered"
  | "renamed"
  | "moved"
  | "node-class-changed"
  | "supertype-changed"
  | "type-definition-changed"
  | "modelling-rule-changed"
  | "data-type-changed"
  | "value-rank-changed"
  | "unit-changed"
  | "range-changed"
  | "value-changed"
  | "access-changed"
  | "abstract-changed"
  | "symmetric-changed"
  | "enumeration-changed"
  | "structure-changed"
  | "arguments-changed"
  | "reference-added"
  | "reference-removed"
  | "text-changed"
  | "symbolic-name-changed"
  | "release-status-changed"
  | "permissions-changed"
  | "attribute-changed"
  | "mapping-added"
  | "mapping-removed"
  | "mapping-changed"
  | "required-model-changed"
  | "model-version-changed";

export type Change = {
  readonly kind: ChangeKind;
  /** The node in the later state; for what was removed, in the earlier one. Absent for changes of the model itself. */
  readonly key?: NodeKey;
  /** NodeId text with `nsu=` of the same node. */
  readonly nodeId?: string;
  readonly path: string;
  /** What exactly: an attribute, a field, a reference type. */
  readonly detail?: string;
  readonly rating: ChangeRating;
  readonly reason: string;
  /** The clause that the rating follows; empty where it is our own inference, which the reason then says. */
  readonly clause: string;
  readonly before: string | null;
  readonly after: string | null;
};

export type Comparison = {
  /** Breaking first, then additive, then neutral; inside by path. */
  readonly changes: readonly Change[];
  /** The worst rating; undefined when nothing changed. */
  readonly rating: ChangeRating | undefined;
  /** The next version by semantic versioning; undefined when the earlier version is no version number. */
  readonly proposedVersion: string | undefined;
};
