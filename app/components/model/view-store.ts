/**
 * What the person in front of this window looks at: selection, open drawer, the cell or name being edited. Shared by the
 * sheet, the register, the drawer and the palette; never saved with the model.
 */
import type { NodeKey } from "~/domain/address-space/node-id";

export type ViewState = {
  /** Selected nodes in the order of selection; the last one is the one that the drawer shows. */
  readonly selection: readonly NodeKey[];
  /** Counts wishes to bring the selected node into sight, so that the same node can be asked for twice. */
  readonly revealed: number;
  readonly isDrawerOpen: boolean;
  readonly renaming: NodeKey | undefined;
  /** The node whose value is open in its form. */
  readonly openValue: NodeKey | undefined;
};

export class ViewStore {
  #state: ViewState = {
    selection: [],
    revealed: 0,
    isDrawerOpen: true,
    renaming: undefined,
    openValue: undefined,
  };
  readonly #listeners = new Set<() => void>();

  readonly getState = (): ViewState => this.#state;

  readonly subscribe = (listener: () => void): (() => void) => {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  };

  select(keys: readonly NodeKey[]): void {
    const old = this.#state.selection;
    if (old.length === keys.length && old.every((key, index) => key === keys[index])) return;
    this.#set({ selection: keys, renaming: undefined });
  }

  /** Adds the node to the selection, or takes it out. */
  toggle(key: NodeKey): void {
    const { selection } = this.#state;
    this.select(selection.includes(key) ? selection.filter((k) => k !== key) : [...selection, key]);
  }

  /** Selects the node and asks the open view to bring it into sight. */
  reveal(key: NodeKey): void {
    this.#set({ selection: [key], revealed: this.#state.revealed + 1, renaming: undefined });
  }

  startRenaming(key: NodeKey): void {
    this.#set({ renaming: key });
  }

  stopRenaming(): void {
    if (this.#state.renaming !== undefined) this.#set({ renaming: undefined });
  }

  /** Shows the whole value of the node in the drawer, as a form. */
  openValue(key: NodeKey): void {
    this.select([key]);
    this.#set({ openValue: key, isDrawerOpen: true });
  }

  closeValue(): void {
    if (this.#state.openValue !== undefined) this.#set({ openValue: undefined });
  }

  setDrawerOpen(isDrawerOpen: boolean): void {
    if (isDrawerOpen !== this.#state.isDrawerOpen) this.#set({ isDrawerOpen });
  }

  #set(change: Partial<ViewState>): void {
    this.#state = { ...this.#state, ...change };
    for (const listener of [...this.#listeners]) listener();
  }
}
