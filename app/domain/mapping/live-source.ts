/** What a live source can be asked, and what it answers: one form for masters, Modbus units, OPC UA servers and services. */
import type { Problem } from "../core/result";
import type { InputReference } from "./mapping";
import type { SampleValue } from "./sample";

export type RegisterTable = Extract<InputReference, { kind: "register" }>["table"];

export type SourceItem =
  /** Both directions of a device's process data. `alias` is its name at a master that knows one. */
  | { readonly kind: "process-data"; readonly port: number; readonly alias?: string }
  /** Which device answers there, and the state of the port. */
  | { readonly kind: "port"; readonly port: number; readonly alias?: string }
  | { readonly kind: "parameter"; readonly port: number; readonly alias?: string; readonly index: number; readonly subindex: number }
  | { readonly kind: "registers"; readonly unitId: number; readonly table: RegisterTable; readonly address: number; readonly count: number }
  /** Events of a device that have appeared and not disappeared. */
  | { readonly kind: "events"; readonly port: number; readonly alias?: string }
  /** The JSON answer of a service. */
  | { readonly kind: "document" }
  | { readonly kind: "node"; readonly nodeId: string };

export type Frame = { readonly octets: Uint8Array; readonly isValid: boolean };

export type SourceValue =
  | { readonly kind: "process-data"; readonly in?: Frame; readonly out?: Frame }
  | {
      readonly kind: "port";
      /** Number of the port's state (OPC 30120: 0 no device … 255 not available); undefined where the source tells none. */
      readonly status?: number;
      readonly vendorId?: number;
      readonly deviceId?: number;
      readonly serialNumber?: string;
    }
  | { readonly kind: "events"; readonly codes: readonly number[] }
  | { readonly kind: "octets"; readonly octets: Uint8Array }
  | { readonly kind: "words"; readonly words: readonly number[] }
  | { readonly kind: "document"; readonly json: unknown }
  | { readonly kind: "scalar"; readonly value: SampleValue; readonly status: number };

/** A value with the time of its acquisition, or why there is none and the status that fed Variables take meanwhile. */
export type Reading<T> =
  | { readonly ok: true; readonly value: T; readonly time: number }
  | { readonly ok: false; readonly status: number; readonly problem: Problem; readonly time: number };

export type SourceReading = Reading<SourceValue>;

export interface LiveSource {
  /** Never rejects: what goes wrong is a reading too. Items that the kind of source does not know answer `source.item`. */
  read(item: SourceItem): Promise<SourceReading>;
  close(): Promise<void>;
}

export function toItemKey(item: SourceItem): string {
  return JSON.stringify(item);
}

