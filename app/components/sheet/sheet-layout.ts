/** What is saved of a sheet: which cards it shows and where they lie. Layout only, never part of the model's XML. */
import type { NodeKey } from "~/domain/address-space/node-id";
import type { Point } from "./sheet-geometry";

export type Caption = {
  readonly id: string;
  readonly text: string;
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
};

export type SheetLayout = {
  readonly positions: Readonly<Record<string, Point>>;
  /** A selection that somebody chose, instead of what the model as a whole shows by itself. */
  readonly isChosen: boolean;
  /** Cards that somebody put where they lie; arranging leaves them there. */
  readonly byHand: readonly NodeKey[];
  /** Cards beyond the default choice, and cards of it that were taken away. */
  readonly added: readonly NodeKey[];
  readonly hidden: readonly NodeKey[];
  readonly unfolded: readonly NodeKey[];
  readonly captions: readonly Caption[];
};

export const EMPTY_LAYOUT: SheetLayout = { positions: {}, isChosen: false, byHand: [], added: [], hidden: [], unfolded: [], captions: [] };

/** Reads a stored layout; what is missing or broken is left out, since a layout may never keep a model from opening. */
export function readLayout(stored: unknown): SheetLayout {
  if (typeof stored !== "object" || stored === null) return EMPTY_LAYOUT;
  const { positions, isChosen, byHand, added, hidden, unfolded, captions } = stored as Record<string, unknown>;
  return {
    positions: Object.fromEntries(Object.entries(toRecord(positions)).filter((entry): entry is [string, Point] => isPoint(entry[1]))),
    isChosen: isChosen === true,
    byHand: toKeys(byHand),
    added: toKeys(added),
    hidden: toKeys(hidden),
    unfolded: toKeys(unfolded),
    captions: Array.isArray(captions) ? captions.filter(isCaption) : [],
  };
}

function toRecord(value: unknown): Record<string, unknown> {
  return typeof value === "object" && value !== null ? (value as Record<string, unknown>) : {};
}

function toKeys(value: unknown): NodeKey[] {
  return Array.isArray(value) ? (value.filter((key) => typeof key === "string") as NodeKey[]) : [];
}

function isPoint(value: unknown): value is Point {
  const { x, y } = toRecord(value);
  return Number.isFinite(x) && Number.isFinite(y);
}

function isCaption(value: unknown): value is Caption {
  const { id, text, width, height } = toRecord(value);
  return typeof id === "string" && typeof text === "string" && isPoint(value) && Number.isFinite(width) && Number.isFinite(height);
}

export function withPositions(layout: SheetLayout, positions: Iterable<readonly [string, Point]>): SheetLayout {
  const rounded = [...positions].map(([key, point]) => [key, { x: Math.round(point.x), y: Math.round(point.y) }] as const);
  return { ...layout, positions: { ...layout.positions, ...Object.fromEntries(rounded) } };
}

/** Places that a person gave. */
export function withHandPlaced(layout: SheetLayout, positions: Iterable<readonly [NodeKey, Point]>): SheetLayout {
  const placed = [...positions];
  return { ...withPositions(layout, placed), byHand: [...new Set([...layout.byHand, ...placed.map(([key]) => key)])] };
}

/** Leaves these cards to the layout again. */
export function withoutHandPlaced(layout: SheetLayout, keys: readonly NodeKey[]): SheetLayout {
  return { ...layout, byHand: layout.byHand.filter((key) => !keys.includes(key)) };
}

/** A sheet that shows just these cards, without places. */
export function makeChosenLayout(keys: readonly NodeKey[], positions: SheetLayout["positions"] = {}): SheetLayout {
  return { ...EMPTY_LAYOUT, isChosen: true, added: [...new Set(keys)], positions };
}

/** Shows cards; one that was taken away before comes back. */
export function withShown(layout: SheetLayout, keys: readonly NodeKey[]): SheetLayout {
  return {
    ...layout,
    added: [...new Set([...layout.added, ...keys])],
    hidden: layout.hidden.filter((key) => !keys.includes(key)),
  };
}

export function withHidden(layout: SheetLayout, keys: readonly NodeKey[]): SheetLayout {
  const positions = Object.fromEntries(Object.entries(layout.positions).filter(([key]) => !keys.includes(key as NodeKey)));
  return {
    ...layout,
    positions,
    byHand: layout.byHand.filter((key) => !keys.includes(key)),
    added: layout.added.filter((key) => !keys.includes(key)),
    hidden: [...new Set([...layout.hidden, ...keys])],
  };
}

export function withFoldToggled(layout: SheetLayout, key: NodeKey): SheetLayout {
  const { unfolded } = layout;
  return { ...layout, unfolded: unfolded.includes(key) ? unfolded.filter((k) => k !== key) : [...unfolded, key] };
}

/** The cards of the sheet: the default choice, unless somebody chose all, with what was added and taken away. */
export function chooseCards(defaults: readonly NodeKey[], layout: SheetLayout): NodeKey[] {
  const hidden = new Set(layout.hidden);
  return [...new Set([...(layout.isChosen ? [] : defaults), ...layout.added])].filter((key) => !hidden.has(key));
}
