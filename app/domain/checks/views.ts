/** The slots of one node: itself, its edges by direction and group, answers of lookups. */
import type { Edge } from "../address-space/edge-index";
import type { Node, NodeClass } from "../address-space/node";
import { Slot } from "./slots";

export class NodeSlot extends Slot {
  readonly node: Node | undefined;

  constructor(node: Node | undefined) {
    super();
    this.node = node;
  }
}

/** NodeClass and existence, which many ask for and hardly an edit changes. */
export class ClassSlot extends Slot {
  readonly nodeClass: NodeClass | undefined;

  constructor(nodeClass: NodeClass | undefined) {
    super();
    this.nodeClass = nodeClass;
  }
}

/** What a node is called, for those who match nodes by name. */
export type NodeHead = Pick<Node, "key" | "nodeClass" | "browseName">;

export class HeadSlot extends Slot {
  readonly head: NodeHead | undefined;

  constructor(head: NodeHead | undefined) {
    super();
    this.head = head;
  }
}

export class EdgeSlot extends Slot {
  readonly edges: readonly Edge[];

  constructor(edges: readonly Edge[]) {
    super();
    this.edges = edges;
  }
}

/** HasSubtype, other hierarchical references, the rest; first those from the node, then those to it. */
export const FROM = 0;
export const TO = 3;
export const SUBTYPE = 0;
export const HIERARCHICAL = 1;
export const OTHER = 2;

export class View {
  node: NodeSlot | undefined = undefined;
  nodeClass: ClassSlot | undefined = undefined;
  head: HeadSlot | undefined = undefined;
  readonly edges: (EdgeSlot | undefined)[] = [undefined, undefined, undefined, undefined, undefined, undefined];
  /** By the number of the lookup: `Answer`s, or plain values where nothing is tracked. */
  readonly answers: unknown[] = [];
}
