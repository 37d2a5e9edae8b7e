/**
 * A value while it is edited: a Variant in which any item may still be unfinished, that is a text with the reason why it is
 * no value yet. A draft without unfinished items is a Variant. Pure.
 */
import type { NodeKey } from "~/domain/address-space/node-id";
import type { BuiltInType, DiagnosticInfo, RawStructure, Scalar, Variant } from "~/domain/nodeset/values/variant";

export type Unfinished = { readonly unfinished: string; readonly reason: string };

export type DraftStructure = {
  readonly kind: "structure";
  readonly dataType: NodeKey;
  readonly fields: Readonly<Record<string, Draft>>;
};

export type DraftDataValue = {
  readonly value?: Draft;
  readonly statusCode?: number | Unfinished;
  readonly sourceTimestamp?: string | Unfinished;
  readonly sourcePicoseconds?: number | Unfinished;
  readonly serverTimestamp?: string | Unfinished;
  readonly serverPicoseconds?: number | Unfinished;
};

export type DraftDiagnostic = {
  readonly [K in keyof DiagnosticInfo]: K extends "innerDiagnosticInfo"
    ? DraftDiagnostic
    : DiagnosticInfo[K] | Unfinished;
};

export type DraftItem = Scalar | Unfinished | DraftStructure | RawStructure | DraftDataValue | DraftDiagnostic | Draft;

export type Draft =
  | { readonly type: BuiltInType; readonly shape: "scalar"; readonly value: DraftItem }
  | { readonly type: BuiltInType; readonly shape: "array"; readonly values: readonly DraftItem[] }
  | {
      readonly type: BuiltInType;
      readonly shape: "matrix";
      readonly values: readonly DraftItem[];
      readonly dimensions: readonly number[];
    };

export function unfinished(text: string, reason: string): Unfinished {
  return { unfinished: text, reason };
}

export function isUnfinished(item: unknown): item is Unfinished {
  return typeof item === "object" && item !== null && "unfinished" in item;
}

export function toDraft(variant: Variant): Draft {
  return variant;
}

/** Why the draft is no value yet, in the order of the form; empty for a finished one. */
export function listReasons(draft: unknown): string[] {
  if (isUnfinished(draft)) return [draft.reason];
  if (typeof draft !== "object" || draft === null) return [];
  return Object.values(draft).flatMap(listReasons);
}

/** The value; undefined while something is unfinished. */
export function finishDraft(draft: Draft): Variant | undefined {
  return listReasons(draft).length === 0 ? (draft as Variant) : undefined;
}

/** The items of any shape in order. */
export function listItems(draft: Draft): readonly DraftItem[] {
  return draft.shape === "scalar" ? [draft.value] : draft.values;
}

export function withItem<T>(items: readonly T[], index: number, item: T): T[] {
  return items.map((old, i) => (i === index ? item : old));
}

export function withInserted<T>(items: readonly T[], index: number, added: readonly T[]): T[] {
  return [...items.slice(0, index), ...added, ...items.slice(index)];
}

export function withoutItem<T>(items: readonly T[], index: number): T[] {
  return items.filter((_, i) => i !== index);
}

/** The item moved by so many places; the same list where it would leave it. */
export function withMoved<T>(items: readonly T[], index: number, by: number): readonly T[] {
  const to = index + by;
  const item = items[index];
  if (item === undefined || to < 0 || to >= items.length) return items;
  return withInserted(withoutItem(items, index), to, [item]);
}

/** Items of a matrix in another size: those whose indices exist in both stay, others are made. The last index runs fastest. */
export function resizeMatrix<T>(
  items: readonly T[],
  from: readonly number[],
  to: readonly number[],
  make: () => T,
): T[] {
  const count = to.reduce((product, size) => product * size, 1);
  return Array.from({ length: count }, (_, flat) => {
    const at = toIndices(flat, to);
    const isOld = at.length === from.length && at.every((index, i) => index < (from[i] ?? 0));
    const old = isOld ? items[toFlat(at, from)] : undefined;
    return old === undefined ? make() : old;
  });
}

export function toIndices(flat: number, dimensions: readonly number[]): number[] {
  const indices: number[] = [];
  let rest = flat;
  for (const size of [...dimensions].reverse()) {
    indices.unshift(size === 0 ? 0 : rest % size);
    rest = size === 0 ? 0 : Math.floor(rest / size);
  }
  return indices;
}

export function toFlat(indices: readonly number[], dimensions: readonly number[]): number {
  return indices.reduce((flat, index, i) => flat * (dimensions[i] ?? 1) + index, 0);
}
