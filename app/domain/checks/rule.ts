/**
 * A rule: one file, one number, one text. It looks at one node (or at the model's header) and reports what breaks it.
 *
 * Rules read the graph through the context only: the context notes what was read, which is how an edit finds the nodes
 * that must be checked again. A rule keeps no state, asks for ids and never for names where the standard means ids, and
 * answers to every graph, however broken, without throwing.
 */
import type { Node, NodeClass } from "../address-space/node";
import type { Result, Severity } from "../core/result";
import type { NodeIdAllocator } from "../editing/allocate-node-id";
import type { AttributeName, Operation } from "../editing/operation";
import type { AddressSpace } from "../address-space/address-space";
import type { NodeKey } from "../address-space/node-id";
import type { CheckContext } from "./check-context";
import type { ExampleModel } from "./example-model";
import type { Finding, ReportFunction, RuleId } from "./finding";
import type { Wiring } from "./wiring";

/** Answers the operations that mend a finding, all in one undo step; new nodes take their NodeIds from `ids`. */
export type Fix = {
  /** What the fix does, as an imperative sentence for a button. */
  readonly label: string;
  readonly apply: (space: AddressSpace, finding: Finding, ids: NodeIdAllocator) => Result<readonly Operation[]>;
};

/**
 * Builds a small model; the bad one answers the node that the rule must name: "model" for the model as a whole, the name of
 * the place for a finding about wiring without a node.
 */
export type Example = {
  readonly text: string;
  readonly build: (m: ExampleModel) => NodeKey | "model" | `place ${string}` | undefined;
};

type RuleBase = {
  readonly id: RuleId;
  readonly title: string;
  /** The severest that the rule reports. */
  readonly severity: Severity;
  /** Part, edition and section. */
  readonly clause: string;
  readonly priority: 1 | 2;
  /** What must hold. */
  readonly condition: string;
  /** What happens in practice where it does not hold. */
  readonly why: string;
  readonly examples: { readonly good: Example; readonly bad: Example };
  readonly fix?: Fix;
};

/**
 * What a rule may need of a node to have a say. `declares members`: a type or an InstanceDeclaration. `type above`: a type
 * from which hierarchical references lead down to the node; `member of type`: directly. `text id`: a NodeId that is no number.
 */
export const NEEDS = [
  "value",
  "structure",
  "children",
  "modelling rule",
  "declares members",
  "type above",
  "no type above",
  "member of type",
  "property",
  "no property",
  "text id",
] as const;
export type Need = (typeof NEEDS)[number];

/** A rule is called for nodes that meet all that it says here, which spares most nodes most rules. */
export type NodeRule = RuleBase & {
  readonly concerns: readonly NodeClass[];
  readonly needs?: readonly Need[];
  /** The node declares a reference of this type or below it. */
  readonly declares?: NodeKey;
  /** The node has one of these attributes. */
  readonly attributes?: readonly AttributeName[];
  /** The type definition is one of these types or below. */
  readonly types?: readonly NodeKey[];
  /** The node has one of these names of namespace 0. */
  readonly standardNames?: readonly string[];
  readonly check: (node: Node, ctx: CheckContext, report: ReportFunction) => void;
};

export type ModelRule = RuleBase & {
  readonly concerns: "model";
  readonly check: (ctx: CheckContext, report: ReportFunction) => void;
};

/** A rule over mappings, machines, sources and ports; it runs only where these are handed in. */
export type WiringRule = RuleBase & {
  readonly concerns: "wiring";
  readonly check: (wiring: Wiring, ctx: CheckContext, report: ReportFunction) => void;
};

export type Rule = NodeRule | ModelRule | WiringRule;

const EDITIONS: Readonly<Record<number, string>> = { 16: "1.05.04", 11: "1.05.04" };

/** `OPC 10000-3 v1.05.06 §4.4.4`. The editions are those in which the sections were read. */
export function clause(part: number, section: string): string {
  return `OPC 10000-${part} v${EDITIONS[part] ?? "1.05.06"} ${section}`;
}
