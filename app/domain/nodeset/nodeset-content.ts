import type { ModelHeader } from "../address-space/model-header";
import type { Node } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import type { Position } from "./xml/source-position";

/** What a NodeSet2 file holds, and where. */
export type NodeSetContent = {
  readonly header: ModelHeader;
  readonly nodes: readonly Node[];
  /** Where the element of each node starts in the file. */
  readonly lines: ReadonlyMap<NodeKey, Position>;
  /** Where each model, own or required, is named, by its URI. */
  readonly modelPlaces: ReadonlyMap<string, Position>;
  /** False when a node, a reference, a role or an alias of the file could not be kept; a problem tells each. */
  readonly isWhole: boolean;
};
