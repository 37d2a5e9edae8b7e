/** Unit and ranges of a Variable, from its Properties EngineeringUnits, EURange and InstrumentRange (OPC 10000-8 §5.3.2). */
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { findEuInformation, findRange, type EUInformation, type Range } from "~/domain/nodeset/values/standard-values";
import { toNumber } from "./parse-phrase";
import { readPropertyValue } from "./read-typed-value";

/** A unit as screens show it; `information` is what the Property holds. */
export type UnitFacts = {
  readonly symbol: string;
  readonly name: string;
  readonly unitId: number;
  readonly information: EUInformation;
};

export function toUnitFacts(information: EUInformation): UnitFacts {
  return { symbol: information.displayName.text, name: information.description.text, unitId: information.unitId, information };
}

export function findUnitOf(space: AddressSpace, variable: NodeKey): UnitFacts | undefined {
  const information = findEuInformation(readPropertyValue(space, variable, "EngineeringUnits"));
  return information && toUnitFacts(information);
}

export function findUnitSymbol(space: AddressSpace, variable: NodeKey): string {
  return findUnitOf(space, variable)?.symbol ?? "";
}

export function findRangeOf(space: AddressSpace, variable: NodeKey): Range | undefined {
  return findRange(readPropertyValue(space, variable, "EURange"));
}

export function findInstrumentRangeOf(space: AddressSpace, variable: NodeKey): Range | undefined {
  return findRange(readPropertyValue(space, variable, "InstrumentRange"));
}

/** Up to seven significant digits, the minus as U+2212. */
export function formatNumber(value: number): string {
  if (!Number.isFinite(value)) return String(value);
  const text = Math.abs(value) >= 1e15 ? value.toExponential() : String(Number(value.toPrecision(12)));
  return text.replace("-", "−");
}

/** `−20 … 120`. */
export function formatRange(range: Range | undefined): string {
  return range ? `${formatNumber(range.low)} … ${formatNumber(range.high)}` : "";
}

const RANGE = /^\s*([-−+]?\d+(?:[.,]\d+)?)\s*(?:…|\.{2,3}|–|;|:|\bto\b|\s)\s*([-−+]?\d+(?:[.,]\d+)?)\s*$/i;

/** Reads `0 … 400`, `0..400`, `-20 to 120`, `0 400`; undefined for anything else. Order is checked by the command. */
export function parseRange(text: string): Range | undefined {
  const match = RANGE.exec(text);
  if (!match) return undefined;
  return { low: toNumber(match[1] ?? ""), high: toNumber(match[2] ?? "") };
}
