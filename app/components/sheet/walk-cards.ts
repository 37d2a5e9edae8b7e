/** Where the arrow keys lead on a sheet: up and down through the rows of a card, sideways to the nearest card. */
import type { NodeKey } from "~/domain/address-space/node-id";
import type { Rect } from "./sheet-geometry";
import type { Card, Scene } from "./sheet-scene";

export type WalkKey = "ArrowUp" | "ArrowDown" | "ArrowLeft" | "ArrowRight";

/** The next node, or undefined where there is none in that direction. Without a place to start it is the first card. */
export function findNextNode(scene: Scene, rects: ReadonlyMap<NodeKey, Rect>, at: NodeKey | undefined, key: WalkKey): NodeKey | undefined {
  const card = scene.cards.find((c) => c.key === at || c.rows.some((row) => row.key === at));
  if (!card) return scene.cards[0]?.key;
  const places = [card.key, ...card.rows.map((row) => row.key)];
  const index = places.indexOf(at as NodeKey);
  if (key === "ArrowDown" && index < places.length - 1) return places[index + 1];
  if (key === "ArrowUp" && index > 0) return places[index - 1];
  return findNeighbour(scene.cards, rects, card, key)?.key;
}

/** The card whose centre lies nearest in the direction; what lies askew counts as farther. */
function findNeighbour(cards: readonly Card[], rects: ReadonlyMap<NodeKey, Rect>, from: Card, key: WalkKey): Card | undefined {
  const start = rects.get(from.key);
  if (!start) return undefined;
  let best: Card | undefined;
  let bestCost = Infinity;
  for (const card of cards) {
    const rect = rects.get(card.key);
    if (!rect || card.key === from.key) continue;
    const dx = rect.x + rect.width / 2 - (start.x + start.width / 2);
    const dy = rect.y + rect.height / 2 - (start.y + start.height / 2);
    const isSideways = key === "ArrowLeft" || key === "ArrowRight";
    const ahead = key === "ArrowRight" ? dx : key === "ArrowLeft" ? -dx : key === "ArrowDown" ? dy : -dy;
    const aside = Math.abs(isSideways ? dy : dx);
    if (ahead <= 8) continue;
    const cost = ahead + aside * 1.6;
    if (cost < bestCost) {
      bestCost = cost;
      best = card;
    }
  }
  return best;
}
