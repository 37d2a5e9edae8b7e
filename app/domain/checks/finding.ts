/** What the checker says of a model. */
import type { NodeKey } from "../address-space/node-id";
import type { Severity } from "../core/result";
import type { WiringPlace } from "./wiring";

/** Permanent number of a rule in the catalogue, `R001` … */
export type RuleId = `R${number}`;

/**
 * One finding: which rule, where, what collides, why it counts. `facts` are the sentences that let a reader believe it
 * without opening the standard; `clause` names part, edition and section. `key` is absent when the model as a whole is
 * meant. Line and column belong to a file and are added by `toReport`.
 */
export type Finding = {
  readonly rule: RuleId;
  readonly severity: Severity;
  readonly key?: NodeKey;
  /** NodeId text with `nsu=`; the model URI's node-less findings carry "". */
  readonly nodeId: string;
  readonly browseName: string;
  readonly path: string;
  readonly attribute?: string;
  /** For findings about wiring: the mapping, machine, source or port. */
  readonly place?: WiringPlace;
  readonly message: string;
  readonly clause: string;
  readonly facts: readonly string[];
  /** What a fix needs to know and a reader does not. */
  readonly data?: FindingData;
};

export type FindingData = Readonly<Record<string, string | number>>;

/** What a rule reports; the runner adds place and clause. `key` defaults to the node under check. */
export type Report = {
  readonly message: string;
  readonly facts?: readonly string[];
  readonly severity?: Severity;
  readonly attribute?: string;
  readonly key?: NodeKey;
  readonly place?: WiringPlace;
  /** For rules with several clauses: the one that this finding breaks. */
  readonly clause?: string;
  readonly data?: FindingData;
};

export type ReportFunction = (report: Report) => void;
