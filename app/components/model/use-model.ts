/** Hooks of the open model. Each subscribes to one store and one aspect, so that an edit draws only what it changed. */
import { createContext, useContext, useMemo, useSyncExternalStore } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import type { EditorState } from "~/editor/editor-state";
import type { EditorStore } from "~/editor/editor-store";
import { toBadge, type Badge, type FindingStore, type FindingTally } from "./finding-store";
import type { PresenceStore } from "./presence-store";
import type { ModelActions } from "./model-actions";
import type { ViewState, ViewStore } from "./view-store";
import type { ModelWorkspace } from "~/presenters/model-workspace.server";

export type OpenModel = {
  readonly workspace: ModelWorkspace;
  readonly editor: EditorStore;
  readonly view: ViewStore;
  readonly findings: FindingStore;
  readonly presence: PresenceStore;
  readonly actions: ModelActions;
  /** False until the packs have come. */
  readonly isReady: boolean;
};

export const OpenModelContext = createContext<OpenModel | undefined>(undefined);

export function useOpenModel(): OpenModel {
  const model = useContext(OpenModelContext);
  if (!model) throw new RangeError("Used outside of an open model");
  return model;
}

export function useEditorState(): EditorState {
  const { editor } = useOpenModel();
  return useSyncExternalStore(editor.subscribe, editor.getState, editor.getState);
}

export function useSpace(): AddressSpace {
  return useEditorState().space;
}

export function useView<T>(select: (state: ViewState) => T): T {
  const { view } = useOpenModel();
  return useSyncExternalStore(view.subscribe, () => select(view.getState()), () => select(view.getState()));
}

export function useSelection(): readonly NodeKey[] {
  return useView((state) => state.selection);
}

const SEPARATOR = "\n";

/** Which of the keys are selected. */
export function useSelectedAmong(keys: readonly NodeKey[]): ReadonlySet<NodeKey> {
  const text = useView(({ selection }) => (selection.length === 0 ? "" : keys.filter((key) => selection.includes(key)).join(SEPARATOR)));
  return useMemo(() => new Set(text === "" ? [] : (text.split(SEPARATOR) as NodeKey[])), [text]);
}

/** Which of the keys a colleague has selected, and who. */
export function useMatesAmong(keys: readonly NodeKey[]): ReadonlyMap<NodeKey, string> {
  const { presence } = useOpenModel();
  const read = (): string => {
    const people = presence.getPeople();
    if (people.length === 0) return "";
    return people.flatMap((person) => person.selection.flatMap((key) => (keys.includes(key) ? [`${key}\t${person.name}`] : []))).join(SEPARATOR);
  };
  const text = useSyncExternalStore(presence.subscribe, read, read);
  return useMemo(() => new Map(text === "" ? [] : text.split(SEPARATOR).map((entry) => entry.split("\t") as [NodeKey, string])), [text]);
}

/** Counts by severity; undefined until the checker has answered. */
export function useFindingTally(): FindingTally | undefined {
  const { findings } = useOpenModel();
  const state = useSyncExternalStore(findings.subscribe, findings.getState, findings.getState);
  return state.isKnown ? state.tally : undefined;
}

/** Badges of the keys that have findings. */
export function useBadges(keys: readonly NodeKey[]): ReadonlyMap<NodeKey, Badge> {
  const { findings } = useOpenModel();
  const read = () => {
    const { byNode } = findings.getState();
    if (byNode.size === 0) return "";
    return keys.flatMap((key) => byNode.get(key)?.map((f) => `${key}${f.rule}${f.message}`) ?? []).join(SEPARATOR);
  };
  const signature = useSyncExternalStore(findings.subscribe, read, read);
  return useMemo(() => {
    const badges = new Map<NodeKey, Badge>();
    if (signature === "") return badges;
    for (const key of keys) {
      const badge = toBadge(findings.getState().byNode.get(key));
      if (badge) badges.set(key, badge);
    }
    return badges;
    // The signature says when the badges of these keys changed; the keys themselves are made anew with each drawing.
  }, [signature, findings, keys.join(SEPARATOR)]);
}

export type { Badge };
