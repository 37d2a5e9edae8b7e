/**
 * How the Variables of machines are fed, for rules that speak of it: mappings of the machine types, the machines with what
 * they bind, the sources with their ports. Who runs the checks hands it in; where nobody does, these rules do not run.
 */
import type { NodeKey } from "../address-space/node-id";
import type { DeviceDescription } from "../iodd/device-description";
import type { Mapping } from "../mapping/mapping";

export type Wiring = {
  /** One for each machine type that has a mapping. */
  readonly mappings: readonly WiredMapping[];
  readonly machines: readonly WiredMachine[];
  readonly sources: readonly WiredSource[];
  /** What is known of the devices that roles and ports ask for, by `vendorId/deviceId`. */
  readonly devices: ReadonlyMap<string, DeviceDescription>;
};

export type WiredMapping = {
  readonly id: string;
  readonly name: string;
  /** The node of the machine type; undefined when it is gone. */
  readonly type: NodeKey | undefined;
  readonly mapping: Mapping;
};

export type WiredMachine = {
  readonly id: string;
  readonly name: string;
  readonly mappingId: string;
  /** What each role stands for on this machine: the id of a source and, for IO-Link, the port. */
  readonly bindings: readonly { readonly role: string; readonly sourceId: string; readonly port?: number }[];
};

export type WiredSource = {
  readonly id: string;
  readonly name: string;
  readonly kind: Mapping["roles"][number]["kind"] | "io-link-master";
  readonly ports: readonly {
    readonly number: number;
    readonly portClass?: "A" | "B";
    /** `vendorId/deviceId` of the device that is planned on the port. */
    readonly device?: string;
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
};
