import { useEffect, useId } from "react";
import { addPaletteSource, offerPaletteActions, type PaletteEntry, type PaletteSource } from "./palette-store";

/** Offers screens and actions in the palette while the component is on the page. Hand over a stable list (useMemo). */
export function usePaletteActions(entries: readonly PaletteEntry[]): void {
  const owner = useId();
  useEffect(() => {
    offerPaletteActions(owner, entries);
    return () => offerPaletteActions(owner, []);
  }, [owner, entries]);
}

/** Offers a searched source, as the nodes of the open model. Hand over a stable function (useCallback). */
export function usePaletteSource(source: PaletteSource): void {
  useEffect(() => addPaletteSource(source), [source]);
}
