/** The command palette: what the open screens offer in it, and whether it is open. One for the window. */
import type { ReactNode } from "react";

export type PaletteEntry = {
  readonly id: string;
  readonly label: string;
  /** Heading under which it stands: Nodes, Screens, Actions … */
  readonly group: string;
  /** Said behind the label: path, data type and unit of a node, keys of an action. */
  readonly hint?: string;
  readonly glyph?: ReactNode;
  readonly isType?: boolean;
  readonly run: () => void;
};

/** Answers a query with entries, best first; asked at each key while the palette is open. */
export type PaletteSource = (query: string, limit: number) => readonly PaletteEntry[];

type PaletteState = {
  readonly isOpen: boolean;
  /** Text that the palette opens with. */
  readonly query: string;
  readonly actions: readonly PaletteEntry[];
  readonly sources: readonly PaletteSource[];
};

let state: PaletteState = { isOpen: false, query: "", actions: [], sources: [] };
const offers = new Map<string, readonly PaletteEntry[]>();
const listeners = new Set<() => void>();

function change(part: Partial<PaletteState>): void {
  state = { ...state, ...part };
  for (const listener of [...listeners]) listener();
}

export function getPalette(): PaletteState {
  return state;
}

export function subscribeToPalette(listener: () => void): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}

export function openPalette(query = ""): void {
  change({ isOpen: true, query });
}

export function closePalette(): void {
  if (state.isOpen) change({ isOpen: false });
}

/** Offers entries under an owner's name; an empty list takes them away. */
export function offerPaletteActions(owner: string, entries: readonly PaletteEntry[]): void {
  if (entries.length === 0) offers.delete(owner);
  else offers.set(owner, entries);
  change({ actions: [...offers.values()].flat() });
}

/** Adds a source of entries; answers the function that takes it away. */
export function addPaletteSource(source: PaletteSource): () => void {
  change({ sources: [...state.sources, source] });
  return () => change({ sources: state.sources.filter((s) => s !== source) });
}
