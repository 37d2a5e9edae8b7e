/**
 * Where cards lie that nobody has placed. Types stand in bands on one axis: what they build on at the left, the type in
 * the middle, what it is made of at the right. Cards that somebody placed stay; a new card takes the nearest free place
 * beside the card that it belongs to.
 */
import type { NodeKey } from "~/domain/address-space/node-id";
import { isOverlapping, type Point, type Rect } from "./sheet-geometry";
import type { Card, Scene } from "./sheet-scene";

const COLUMN_GAP = 88;
const CARD_GAP = 24;
const BAND_GAP = 56;
const ORIGIN: Point = { x: 40, y: 40 };

type Band = { axis: Card; left: Card[]; right: Card[] };

export function placeCards(scene: Scene, known: ReadonlyMap<NodeKey, Point>): Map<NodeKey, Point> {
  const unplaced = scene.cards.filter((card) => !known.has(card.key));
  if (unplaced.length === 0) return pick(scene, known);
  if (unplaced.length === scene.cards.length) return placeAll(scene);
  return placeBeside(scene, pick(scene, known), unplaced);
}

function pick(scene: Scene, known: ReadonlyMap<NodeKey, Point>): Map<NodeKey, Point> {
  const places = new Map<NodeKey, Point>();
  for (const card of scene.cards) {
    const point = known.get(card.key);
    if (point) places.set(card.key, point);
  }
  return places;
}

function placeAll(scene: Scene): Map<NodeKey, Point> {
  const bands = groupInBands(scene);
  const leftWidth = Math.max(0, ...bands.flatMap((band) => band.left.map((card) => card.width)));
  const axisWidth = Math.max(0, ...bands.map((band) => band.axis.width));
  const axisX = ORIGIN.x + (leftWidth > 0 ? leftWidth + COLUMN_GAP : 0);
  const rightX = axisX + axisWidth + COLUMN_GAP;
  const places = new Map<NodeKey, Point>();
  let y = ORIGIN.y;
  for (const band of bands) {
    const left = stack(band.left, y, (card) => ORIGIN.x + leftWidth - card.width, places);
    if (isFolder(band, scene)) {
      places.set(band.axis.key, { x: axisX, y });
      const below = y + band.axis.height + COLUMN_GAP / 2;
      y = Math.max(stackColumns(band.right, below, 420, axisX + COLUMN_GAP / 2, places), left) + BAND_GAP;
      continue;
    }
    const right = stackColumns(band.right, y, Math.max(band.axis.height, 420), rightX, places);
    places.set(band.axis.key, { x: axisX, y });
    y = Math.max(y + band.axis.height, left, right) + BAND_GAP;
  }
  return places;
}

/** What a folder organises hangs below it, so that its lines need not run around cards. */
function isFolder({ axis, right }: Band, scene: Scene): boolean {
  const organized = new Set(scene.lines.flatMap((line) => (line.isOrganized && line.from === axis.key ? [line.to] : [])));
  return right.length > 1 && right.every((card) => organized.has(card.key));
}

/** Each type or entry Object that belongs to no other card opens a band; the rest joins the band that it has lines with. */
function groupInBands(scene: Scene): Band[] {
  const cards = new Map(scene.cards.map((card) => [card.key, card]));
  const owner = new Map<NodeKey, NodeKey>();
  for (const line of scene.lines) {
    const isOwnership = line.end === "component" || line.end === "property" || line.end === "hierarchical";
    if (isOwnership && !owner.has(line.edge.target)) owner.set(line.edge.target, line.edge.source);
  }
  const folders = new Set([...owner.values()].filter((key) => cards.get(key)?.isForeign && !cards.get(key)?.isType));
  const isAxis = (card: Card): boolean => {
    // A folder of a required model, as that of the machines, holds its Objects like a type its members.
    const above = owner.get(card.key);
    if (folders.has(card.key)) return above === undefined || !folders.has(above);
    if (card.isForeign || card.shape === "hexagon" || card.shape === "signpost" || card.shape === "oval") return false;
    const holder = cards.get(owner.get(card.key) ?? card.key);
    return holder === undefined || holder.key === card.key || (holder.isForeign && holder.isType);
  };
  const bands = new Map<NodeKey, Band>();
  for (const card of scene.cards) if (isAxis(card)) bands.set(card.key, { axis: card, left: [], right: [] });
  const placed = new Set(bands.keys());
  const loose: Card[] = [];
  for (const card of scene.cards) {
    if (placed.has(card.key)) continue;
    const found = findBand(card, scene, bands, owner);
    if (!found) loose.push(card);
    else if (isLeftCard(card)) found.left.push(card);
    else found.right.push(card);
  }
  const rest = loose.map((card) => ({ axis: card, left: [], right: [] }));
  return [...bands.values(), ...rest];
}

function isLeftCard(card: Card): boolean {
  return card.shape === "oval" || (card.isForeign && card.shape !== "hexagon");
}

function findBand(card: Card, scene: Scene, bands: ReadonlyMap<NodeKey, Band>, owner: ReadonlyMap<NodeKey, NodeKey>): Band | undefined {
  const seen = new Set<NodeKey>();
  for (let at = owner.get(card.key); at !== undefined && !seen.has(at); at = owner.get(at)) {
    const band = bands.get(at);
    if (band) return band;
    seen.add(at);
  }
  for (const line of scene.lines) {
    const other = line.edge.source === card.key ? line.edge.target : line.edge.target === card.key ? line.edge.source : undefined;
    const band = other === undefined ? undefined : (bands.get(other) ?? bands.get(owner.get(other) ?? other));
    if (band) return band;
  }
  return undefined;
}

function stack(cards: readonly Card[], top: number, xOf: (card: Card) => number, places: Map<NodeKey, Point>): number {
  let y = top;
  for (const card of cards) {
    places.set(card.key, { x: xOf(card), y });
    y += card.height + CARD_GAP;
  }
  return y - CARD_GAP;
}

/** Fills columns of about the same height, so that a wide model does not become a ladder. */
function stackColumns(cards: readonly Card[], top: number, height: number, left: number, places: Map<NodeKey, Point>): number {
  const total = cards.reduce((sum, card) => sum + card.height + CARD_GAP, 0);
  const columns = Math.max(1, Math.min(4, Math.round(total / height)));
  const wanted = total / columns;
  let x = left;
  let y = top;
  let widest = 0;
  let bottom = top;
  for (const card of cards) {
    if (y > top && y - top + card.height / 2 > wanted) {
      x += widest + COLUMN_GAP / 2;
      y = top;
      widest = 0;
    }
    places.set(card.key, { x, y });
    y += card.height + CARD_GAP;
    widest = Math.max(widest, card.width);
    bottom = Math.max(bottom, y - CARD_GAP);
  }
  return bottom;
}

function placeBeside(scene: Scene, places: Map<NodeKey, Point>, unplaced: readonly Card[]): Map<NodeKey, Point> {
  const cards = new Map(scene.cards.map((card) => [card.key, card]));
  const rects: Rect[] = [];
  for (const [key, point] of places) {
    const card = cards.get(key);
    if (card) rects.push({ ...point, width: card.width, height: card.height });
  }
  for (const card of unplaced) {
    const point = findFreePlace(card, getWantedPlace(card, scene, cards, places, rects), rects);
    places.set(card.key, point);
    rects.push({ ...point, width: card.width, height: card.height });
  }
  return places;
}

function getWantedPlace(card: Card, scene: Scene, cards: ReadonlyMap<NodeKey, Card>, places: ReadonlyMap<NodeKey, Point>, rects: readonly Rect[]): Point {
  for (const line of scene.lines) {
    const isTarget = line.edge.target === card.key;
    const other = isTarget ? line.edge.source : line.edge.source === card.key ? line.edge.target : undefined;
    const point = other === undefined ? undefined : places.get(other);
    const neighbour = other === undefined ? undefined : cards.get(other);
    if (!point || !neighbour) continue;
    const goesLeft = line.end === "subtype" ? !isTarget : isLeftCard(card);
    return { x: goesLeft ? point.x - COLUMN_GAP - card.width : point.x + neighbour.width + COLUMN_GAP, y: point.y };
  }
  const bottom = Math.max(ORIGIN.y - BAND_GAP, ...rects.map((rect) => rect.y + rect.height));
  return { x: Math.min(...rects.map((rect) => rect.x), ORIGIN.x), y: bottom + BAND_GAP };
}

/** Arranged cards go below those that stay, where they would cover them; they keep their places among each other's columns. */
export function makeRoom(scene: Scene, arranged: ReadonlyMap<NodeKey, Point>, kept: ReadonlyMap<NodeKey, Rect>): Map<NodeKey, Point> {
  if (kept.size === 0) return new Map(arranged);
  const cards = new Map(scene.cards.map((card) => [card.key, card]));
  const rects = [...kept.values()];
  const places = new Map<NodeKey, Point>();
  for (const [key, wanted] of [...arranged].sort((a, b) => a[1].y - b[1].y)) {
    const card = cards.get(key);
    if (!card) continue;
    const point = findFreePlace(card, wanted, rects);
    places.set(key, point);
    rects.push({ ...point, width: card.width, height: card.height });
  }
  return places;
}

/** Slides downwards until nothing is covered. */
function findFreePlace(card: Card, wanted: Point, rects: readonly Rect[]): Point {
  let y = wanted.y;
  for (let tries = 0; tries <= rects.length; tries++) {
    const rect = { x: wanted.x, y, width: card.width, height: card.height };
    const blocking = rects.filter((other) => isOverlapping(rect, other, CARD_GAP - 2));
    if (blocking.length === 0) break;
    y = Math.max(...blocking.map((other) => other.y + other.height)) + CARD_GAP;
  }
  return { x: wanted.x, y };
}
