import { useEffect, useRef, type RefObject } from "react";
import type { NodeKey } from "~/domain/address-space/node-id";
import type { Point } from "./sheet-geometry";
import type { Scene } from "./sheet-scene";

/** Puts the next card that appears where something was let go, once. */
export function useDropPlace(
  scene: Scene,
  wanted: RefObject<Point | undefined>,
  place: (places: ReadonlyMap<NodeKey, Point>) => void,
): void {
  const before = useRef<ReadonlySet<NodeKey>>(undefined);
  useEffect(() => {
    const known = before.current;
    before.current = new Set(scene.cards.map((card) => card.key));
    const at = wanted.current;
    const added = at && known ? scene.cards.find((card) => !known.has(card.key)) : undefined;
    if (!at || !added) return;
    wanted.current = undefined;
    place(new Map([[added.key, at]]));
  }, [scene, wanted, place]);
}
