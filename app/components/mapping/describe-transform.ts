/** Transforms in words: a chip on the wire, a station in the inspector. Pure. */
import { formatScale } from "../frames/frame-fields";
import { formatBound } from "~/domain/live/format-live";
import type { Transform } from "~/domain/mapping/mapping";
import { findUnitSymbol } from "./unit-symbol";

export const transformKinds = [
  ["linear", "Gradient and offset"],
  ["unit", "Unit conversion"],
  ["bit", "Bit test"],
  ["value-map", "Value map"],
  ["lookup", "Lookup table"],
  ["deadband", "Deadband"],
  ["average", "Averaging"],
  ["counter", "Counter"],
] as const satisfies readonly (readonly [Transform["kind"], string])[];

export function nameTransform(kind: Transform["kind"]): string {
  return transformKinds.find(([known]) => known === kind)?.[1] ?? kind;
}

/** `× 0.1`, `mm → m`, `bit 3`, `table, 2 points`. */
export function describeTransform(transform: Transform): string {
  switch (transform.kind) {
    case "linear":
      return formatScale(transform.gradient, transform.offset) || "× 1";
    case "unit":
      return `${findUnitSymbol(transform.from)} → ${findUnitSymbol(transform.to)}`;
    case "bit":
      return `${transform.invert ? "not " : ""}bit ${transform.bit}`;
    case "value-map":
      return `${transform.entries.length} ${transform.entries.length === 1 ? "value" : "values"}`;
    case "lookup":
      return `table, ${transform.points.length} points`;
    case "deadband":
      return `deadband ${formatBound(transform.width)}`;
    case "average":
      return `mean of ${transform.samples}`;
    case "counter":
      return `${transform.bits} bit${transform.resets ? ", resets" : ", wraps"}`;
  }
}

/** One short text for the whole chain. */
export function describeChain(transforms: readonly Transform[]): string {
  const [only, second] = transforms;
  if (!only) return "";
  return second ? `${transforms.length} steps` : describeTransform(only);
}

/** A new step as it starts; units are those of what comes in and what the member wants. */
export function makeTransform(
  kind: Transform["kind"],
  units: { from?: string | undefined; to?: string | undefined },
): Transform {
  switch (kind) {
    case "linear":
      return { kind, gradient: 1, offset: 0 };
    case "unit":
      return { kind, from: units.from ?? "MMT", to: units.to ?? "MTR" };
    case "bit":
      return { kind, bit: 0 };
    case "value-map":
      return { kind, entries: [{ from: 0, to: 0 }] };
    case "lookup":
      return {
        kind,
        points: [
          [0, 0],
          [100, 100],
        ],
      };
    case "deadband":
      return { kind, width: 0.1 };
    case "average":
      return { kind, samples: 5 };
    case "counter":
      return { kind, bits: 16 };
  }
}
