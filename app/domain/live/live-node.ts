/** What Live shows of a server's nodes: plain data, made by the client side and drawn by the columns. */
import type { NodeClass } from "../address-space/node";
import type { MethodArgument } from "./live-action";
import type { Sample } from "./sample";

export type Unit = { readonly text: string; readonly description: string | null; readonly unitId: number | null };
export type LiveRange = { readonly low: number; readonly high: number };

/** A row of a column. */
export type BrowsedNode = {
  /** NodeId with `nsu=`. */
  readonly nodeId: string;
  readonly nodeClass: NodeClass;
  readonly browseName: string;
  readonly displayName: string;
  /** BrowseName of the reference type by which it was reached. */
  readonly referenceType: string;
  readonly isProperty: boolean;
  /** BrowseName of the type definition; null for Methods and types. */
  readonly typeName: string | null;
  /** Of Variables only. */
  readonly unit: Unit | null;
  readonly range: LiveRange | null;
};

export type BrowsedPage = {
  readonly children: readonly BrowsedNode[];
  /** Hand it back for the next page; null when there is none. */
  readonly continuation: string | null;
};

/** A node with what its column's head and its card show. */
export type NodeCard = {
  readonly nodeId: string;
  readonly nodeClass: NodeClass;
  readonly browseName: string;
  readonly displayName: string;
  readonly description: string | null;
  readonly typeName: string | null;
  readonly isProperty: boolean;
  readonly dataType: { readonly nodeId: string; readonly name: string } | null;
  readonly valueRank: number | null;
  readonly arrayDimensions: readonly number[];
  readonly accessLevel: readonly string[];
  readonly minimumSamplingInterval: number | null;
  readonly historizing: boolean | null;
  readonly executable: boolean | null;
  /** Built-in type that a value is encoded as; null for what is no Variable. */
  readonly builtInType: string | null;
  /** Of Methods only. */
  readonly inputArguments: readonly MethodArgument[];
  readonly unit: Unit | null;
  readonly range: LiveRange | null;
  readonly instrumentRange: LiveRange | null;
  readonly states: readonly { readonly value: number; readonly text: string }[];
  readonly sample: Sample | null;
};
