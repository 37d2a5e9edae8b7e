import { useMemo, useRef } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { listDefaultCards } from "./default-choice";
import { reuseScene } from "./reuse-scene";
import { buildScene, type Scene } from "./sheet-scene";
import { chooseCards, type SheetLayout } from "./sheet-layout";

/** The drawn things of a sheet; cards that an edit did not touch stay the same objects. */
export function useScene(space: AddressSpace, layout: SheetLayout): Scene {
  const last = useRef<Scene>(undefined);
  const { isChosen, added, hidden, unfolded } = layout;
  return useMemo(() => {
    const shown = chooseCards(isChosen ? [] : listDefaultCards(space), { ...layout, added, hidden });
    last.current = reuseScene(last.current, buildScene(space, { shown, unfolded: new Set(unfolded) }));
    return last.current;
    // Positions and captions do not change what is drawn.
  }, [space, isChosen, added, hidden, unfolded]);
}
