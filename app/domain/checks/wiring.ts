/**
 * How the Variables of machines are fed, for rules that speak of it: mappings of the machine types, the machines with what
 * they bind, the sources with their ports. Who runs the checks hands it in; where nobody does, these rules do not run.
 */
import type { NodeKey } from "../address-space/node-id";
import type { Problem } from "../core/result";
import type { Target } from "../mapping/list-targets";
import type { Mapping } from "../mapping/mapping";
import type { FindLayout } from "../mapping/plan-mapping";
import type { CaseResult } from "../mapping/run-check-cases";

export type Wiring = {
  /** One for each machine type that has a mapping. */
  readonly mappings: readonly WiredMapping[];
  readonly machines: readonly WiredMachine[];
  readonly sources: readonly WiredSource[];
};

export type WiredMapping = {
  readonly id: string;
  readonly name: string;
  /** The node of the machine type; undefined when it is gone. */
  readonly type: NodeKey | undefined;
  readonly mapping: Mapping;
  /** What the type has to feed. */
  readonly targets: readonly Target[];
  /** Rows whose member is gone, by the name that it had. */
  readonly lost: readonly string[];
  readonly findLayout: FindLayout;
  /** Why the mapping cannot run. */
  readonly problems: readonly Problem[];
  readonly cases: readonly CaseResult[];
};

export type WiredMachine = {
  readonly id: string;
  readonly name: string;
  readonly mappingId: string;
  /** What each role of the mapping stands for on this machine; without a source where nothing is bound. */
  readonly bindings: readonly WiredBinding[];
  /** Why the mapping with the exceptions of this machine cannot run, where the type's own can. */
  readonly problems: readonly Problem[];
};

export type WiredBinding = {
  readonly role: string;
  /** What the role wants: `vendorId/deviceId`, and the class of its port. */
  readonly device?: string;
  readonly portClass?: "A" | "B";
  readonly sourceId?: string;
  readonly port?: number;
  readonly unitId?: number;
};

export type WiredSource = {
  readonly id: string;
  readonly name: string;
  readonly kind: string;
  /** 0 for sources without ports. */
  readonly portCount: number;
  readonly ports: readonly {
    readonly number: number;
    readonly portClass?: "A" | "B";
    /** `vendorId/deviceId` of the device that is planned on the port, and its name. */
    readonly device?: string;
    readonly deviceName?: string;
    /** Process data of that device in bits, the longer direction. */
    readonly processDataBits?: number;
  }[];
};

/** What a finding about wiring speaks of where no node says it: shown as its place, and the target of its link. */
export type WiringPlace = {
  readonly kind: "mapping" | "role" | "machine" | "source" | "port";
  /** The id of the mapping, machine or source. */
  readonly id: string;
  /** `Rope braider`, `creel sensor`, `B3`, `hall-master port 4`. */
  readonly name: string;
  /** The row of a mapping, by its target. */
  readonly target?: string;
  readonly port?: number;
};
