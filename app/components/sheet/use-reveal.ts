import { useReactFlow, useStoreApi, type Viewport } from "@xyflow/react";
import { useEffect, useRef } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { findParent } from "~/domain/address-space/browse";
import type { NodeKey } from "~/domain/address-space/node-id";
import { useOpenModel, useView } from "../model/use-model";
import type { SheetControl } from "./sheet-control";
import { HEAD_HEIGHT, LEGIBLE, ROW_HEIGHT, type Point, type Rect } from "./sheet-geometry";
import type { Scene } from "./sheet-scene";

const MARGIN = 28;

/** Brings a node into sight when somebody asked for it: its card, or the card in whose rows it stands; a hidden one is drawn first. */
export function useReveal(space: AddressSpace, scene: Scene, rects: ReadonlyMap<NodeKey, Rect>, control: SheetControl, seen: number): void {
  const { view } = useOpenModel();
  const revealed = useView((state) => state.revealed);
  const answered = useRef(seen);
  const asked = useRef(seen);
  const { setCenter, getViewport } = useReactFlow();
  const size = useStoreApi();

  useEffect(() => {
    if (revealed === answered.current) return;
    const key = view.getState().selection.at(-1);
    if (key === undefined) return;
    const place = findNearestPlace(space, scene, rects, key);
    if (place) {
      answered.current = revealed;
      const { zoom } = getViewport();
      const { width, height } = size.getState();
      if (zoom < LEGIBLE || !isInSight(place, getViewport(), width, height)) {
        void setCenter(place.x, place.y, { zoom: zoom < LEGIBLE ? 0.9 : zoom, duration: 180 });
      }
      return;
    }
    if (asked.current === revealed) return;
    asked.current = revealed;
    const card = findCardToShow(space, scene, key);
    if (card.fold !== undefined) control.toggleFold(card.fold);
    else control.show([card.key]);
  }, [revealed, scene, rects, space, control, view, setCenter, getViewport, size]);
}

function isInSight(place: Point, viewport: Viewport, width: number, height: number): boolean {
  const x = place.x * viewport.zoom + viewport.x;
  const y = place.y * viewport.zoom + viewport.y;
  return x > MARGIN && y > MARGIN && x < width - MARGIN && y < height - MARGIN;
}

/** The place of the node, or of the nearest owner that is drawn: a Property of a Variable has no row of its own. */
function findNearestPlace(space: AddressSpace, scene: Scene, rects: ReadonlyMap<NodeKey, Rect>, key: NodeKey): Point | undefined {
  const seen = new Set<NodeKey>();
  for (let at: NodeKey | undefined = key; at !== undefined && !seen.has(at) && seen.size < 8; at = findParent(space, at)) {
    seen.add(at);
    const place = findPlace(scene, rects, at);
    if (place) return place;
    if (space.getNode(at)?.nodeClass.endsWith("Type")) return undefined;
  }
  return undefined;
}

function findPlace(scene: Scene, rects: ReadonlyMap<NodeKey, Rect>, key: NodeKey): Point | undefined {
  for (const card of scene.cards) {
    const index = card.rows.findIndex((row) => row.key === key);
    const rect = card.key === key || index >= 0 ? rects.get(card.key) : undefined;
    if (!rect) continue;
    const y = index < 0 ? Math.min(rect.height / 2, 160) : HEAD_HEIGHT + (index + 0.5) * ROW_HEIGHT;
    return { x: rect.x + rect.width / 2, y: rect.y + y };
  }
  return undefined;
}

/** The card that holds the node folded away, else the card to draw: a Property's or Variable's owner, else the node itself. */
function findCardToShow(space: AddressSpace, scene: Scene, key: NodeKey): { key: NodeKey; fold?: NodeKey } {
  const parent = findParent(space, key);
  const holder = scene.cards.find((card) => card.key === parent && card.folded > 0);
  if (holder) return { key, fold: holder.key };
  const node = space.getNode(key);
  return { key: node?.nodeClass === "Variable" && parent !== undefined ? parent : key };
}
