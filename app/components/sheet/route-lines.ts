/**
 * Orthogonal ways for the lines of a sheet. Lines of one ReferenceType that leave the same place share a trunk, as on a
 * drawing; two trunks never lie on one track. A line keeps straight where both ends are at one height.
 */
import { HEAD_HEIGHT, ROW_HEIGHT, type Point, type Rect } from "./sheet-geometry";
import type { Line } from "./sheet-scene";

export type Route = { readonly line: Line; readonly points: readonly Point[] };

type Side = "left" | "right" | "top" | "bottom";

const STUB = 30;
const TRACK = 10;
const BUS = 36;
const SLOTS = [0, 8, -8, 4, -4];

/** Rectangles by card; a line whose card has none is left out. */
export function routeLines(lines: readonly Line[], rects: ReadonlyMap<string, Rect>): Route[] {
  const slots = new SlotTable();
  const tracks = new TrackTable();
  const obstacles = new ObstacleTable(rects);
  const routes: Route[] = [];
  for (const line of lines) {
    const source = rects.get(line.from);
    const target = rects.get(line.to);
    if (source && target) routes.push({ line, points: routeLine(line, source, target, { slots, tracks, obstacles }) });
  }
  return nameEachBusOnce(routes);
}

/** Lines on one bus say its name once, where it is longest. */
function nameEachBusOnce(routes: readonly Route[]): Route[] {
  const longest = new Map<string, Route>();
  const lengthOf = (route: Route): number => Math.abs((route.points.at(-1)?.x ?? 0) - (route.points[0]?.x ?? 0));
  const busOf = ({ line }: Route): string | undefined => (line.isOrganized ? `${line.from} ${line.edge.type}` : undefined);
  for (const route of routes) {
    const bus = busOf(route);
    const other = bus === undefined ? undefined : longest.get(bus);
    if (bus !== undefined && (!other || lengthOf(route) > lengthOf(other))) longest.set(bus, route);
  }
  return routes.map((route) => {
    const bus = busOf(route);
    if (bus === undefined || longest.get(bus) === route) return route;
    const { label: _, ...line } = route.line;
    return { ...route, line };
  });
}

type Tables = { readonly slots: SlotTable; readonly tracks: TrackTable; readonly obstacles: ObstacleTable };

function routeLine(line: Line, source: Rect, target: Rect, { slots, tracks, obstacles }: Tables): Point[] {
  if (line.from === line.to) return routeLoop(source, line.sourceRow);
  if (line.isOrganized && isBelow(source, target)) return routeFromAbove(source, target);
  const [from, to] = chooseSides(source, target, line.sourceRow !== undefined);
  // Lines of one type meet at the end that carries no mark, and at a supertype's heads.
  const bundle = line.end === "subtype" ? `${line.to} in ${to}` : `${line.from} ${line.sourceRow ?? line.edge.type} ${from}`;
  const start = getAnchor(source, from, slots.take(line.from, from, `${line.sourceRow ?? line.edge.type} ${line.end}`), line.sourceRow);
  const end = getAnchor(target, to, slots.take(line.to, to, `${line.edge.type} ${line.end}`), undefined);
  if (from === "top" || from === "bottom") return routeVertical(start, end);
  if (from === to) return routeAround(start, end, from, tracks, bundle);
  const ends = [line.from, line.to];
  if (Math.abs(start.y - end.y) < 1.5 && obstacles.isFree(start.y, start.x, end.x, ends)) return [start, { x: end.x, y: start.y }];
  const direction = from === "right" ? 1 : -1;
  const gap = Math.abs(end.x - start.x);
  const isRoomy = gap > 2 * STUB + 16;
  const nearEnd = line.end === "subtype";
  const wanted = !isRoomy ? start.x + direction * (gap / 2) : nearEnd ? end.x - direction * STUB * 1.2 : start.x + direction * STUB;
  const x = tracks.take(wanted, nearEnd ? -direction : direction, start.y, end.y, bundle, isRoomy);
  if (obstacles.isFree(end.y, x, end.x, ends)) return [start, { x, y: start.y }, { x, y: end.y }, end];
  return routeBetween(start, end, x, direction, ends, { slots, tracks, obstacles }, bundle);
}

/** Cards lie in the way: along a free lane between them, then down or up to the target. */
function routeBetween(start: Point, end: Point, x: number, direction: number, ends: readonly string[], { tracks, obstacles }: Tables, bundle: string): Point[] {
  const before = end.x - direction * STUB;
  const lane = obstacles.findLane(end.y, x, before, ends);
  const last = tracks.take(before, -direction, lane, end.y, `${bundle} far`, true);
  return [start, { x, y: start.y }, { x, y: lane }, { x: last, y: lane }, { x: last, y: end.y }, end];
}

function chooseSides(source: Rect, target: Rect, isRow: boolean): [Side, Side] {
  const room = 20;
  if (source.x + source.width + room <= target.x) return ["right", "left"];
  if (target.x + target.width + room <= source.x) return ["left", "right"];
  if (isRow) return ["right", "right"];
  if (source.y + source.height <= target.y) return ["bottom", "top"];
  if (target.y + target.height <= source.y) return ["top", "bottom"];
  return ["right", "right"];
}

/** The height at which a head, a row or a shape is met. */
function getAnchor(rect: Rect, side: Side, slot: number, row: number | undefined): Point {
  if (side === "top" || side === "bottom") {
    return { x: rect.x + rect.width / 2 + slot, y: side === "top" ? rect.y : rect.y + rect.height };
  }
  const x = side === "left" ? rect.x : rect.x + rect.width;
  if (row !== undefined) return { x, y: rect.y + HEAD_HEIGHT + (row + 0.5) * ROW_HEIGHT };
  const middle = rect.height <= 48 ? rect.height / 2 : HEAD_HEIGHT / 2;
  return { x, y: rect.y + middle + slot };
}

function isBelow(source: Rect, target: Rect): boolean {
  return source.y + source.height + BUS <= target.y && source.x + BUS <= target.x;
}

/** Down from the folder to a bus, along it to the gap before the card, down there, and into its head. */
function routeFromAbove(source: Rect, target: Rect): Point[] {
  const start = { x: source.x + BUS / 2, y: source.y + source.height };
  const bus = start.y + BUS / 2;
  const x = target.x - BUS / 2;
  const end = getAnchor(target, "left", 0, undefined);
  if (x - start.x < 1.5) return [start, { x: start.x, y: end.y }, end];
  return [start, { x: start.x, y: bus }, { x, y: bus }, { x, y: end.y }, end];
}

function routeVertical(start: Point, end: Point): Point[] {
  if (Math.abs(start.x - end.x) < 1.5) return [start, { x: start.x, y: end.y }];
  const y = (start.y + end.y) / 2;
  return [start, { x: start.x, y }, { x: end.x, y }, end];
}

function routeAround(start: Point, end: Point, side: Side, tracks: TrackTable, bundle: string): Point[] {
  const direction = side === "left" ? -1 : 1;
  const outermost = direction === 1 ? Math.max(start.x, end.x) : Math.min(start.x, end.x);
  const x = tracks.take(outermost + direction * STUB, direction, start.y, end.y, bundle, true);
  return [start, { x, y: start.y }, { x, y: end.y }, end];
}

function routeLoop(rect: Rect, row: number | undefined): Point[] {
  const start = getAnchor(rect, "right", 0, row);
  const x = start.x + STUB;
  const y = rect.y - 16;
  return [start, { x, y: start.y }, { x, y }, { x: rect.x + rect.width / 2, y }, { x: rect.x + rect.width / 2, y: rect.y }];
}

/** Gives each bundle its own height on the side of a card. */
class SlotTable {
  readonly #taken = new Map<string, string[]>();

  take(card: string, side: Side, bundle: string): number {
    const id = `${card} ${side}`;
    const bundles = this.#taken.get(id) ?? [];
    this.#taken.set(id, bundles);
    let index = bundles.indexOf(bundle);
    if (index < 0) index = bundles.push(bundle) - 1;
    return SLOTS[index % SLOTS.length] ?? 0;
  }
}

const BUCKET = 160;
const CLEARANCE = 12;

/** Finds cards that a level stretch would run through. */
class ObstacleTable {
  readonly #buckets = new Map<number, [key: string, rect: Rect][]>();

  constructor(rects: ReadonlyMap<string, Rect>) {
    for (const [key, rect] of rects) {
      for (let at = Math.floor(rect.y / BUCKET); at <= Math.floor((rect.y + rect.height) / BUCKET); at++) {
        const bucket = this.#buckets.get(at) ?? [];
        bucket.push([key, rect]);
        this.#buckets.set(at, bucket);
      }
    }
  }

  isFree(y: number, x1: number, x2: number, ends: readonly string[]): boolean {
    return this.#listMet(y, x1, x2, ends).length === 0;
  }

  /** The free height nearest to the wished one, beside the edges of the cards in the way. */
  findLane(y: number, x1: number, x2: number, ends: readonly string[]): number {
    const tried = new Set<number>();
    let wave = this.#listMet(y, x1, x2, ends);
    for (let round = 0; round < 6 && wave.length > 0; round++) {
      const lanes = wave.flatMap((rect) => [rect.y - CLEARANCE, rect.y + rect.height + CLEARANCE]).filter((lane) => !tried.has(lane));
      lanes.sort((a, b) => Math.abs(a - y) - Math.abs(b - y));
      const free = lanes.find((lane) => this.isFree(lane, x1, x2, ends));
      if (free !== undefined) return free;
      for (const lane of lanes) tried.add(lane);
      wave = lanes.flatMap((lane) => this.#listMet(lane, x1, x2, ends));
    }
    return y;
  }

  #listMet(y: number, x1: number, x2: number, ends: readonly string[]): Rect[] {
    const left = Math.min(x1, x2);
    const right = Math.max(x1, x2);
    const met: Rect[] = [];
    for (const [key, rect] of this.#buckets.get(Math.floor(y / BUCKET)) ?? []) {
      const isMet = rect.y < y && y < rect.y + rect.height && rect.x < right && left < rect.x + rect.width;
      if (isMet && !ends.includes(key)) met.push(rect);
    }
    return met;
  }
}

/** Keeps vertical stretches of different bundles apart. */
class TrackTable {
  readonly #byBundle = new Map<string, number>();
  readonly #stretches = new Map<number, { top: number; bottom: number; bundle: string }[]>();

  take(wanted: number, direction: number, y1: number, y2: number, bundle: string, mayMove: boolean): number {
    const top = Math.min(y1, y2);
    const bottom = Math.max(y1, y2);
    const known = this.#byBundle.get(bundle);
    let x = known !== undefined && this.#isFree(known, top, bottom, bundle) ? known : wanted;
    for (let tries = 0; mayMove && tries < 12 && !this.#isFree(x, top, bottom, bundle); tries++) x += direction * TRACK;
    this.#byBundle.set(bundle, x);
    const track = toTrack(x);
    const stretches = this.#stretches.get(track) ?? [];
    stretches.push({ top, bottom, bundle });
    this.#stretches.set(track, stretches);
    return x;
  }

  #isFree(x: number, top: number, bottom: number, bundle: string): boolean {
    const stretches = this.#stretches.get(toTrack(x)) ?? [];
    return !stretches.some((s) => s.bundle !== bundle && s.top < bottom && top < s.bottom);
  }
}

function toTrack(x: number): number {
  return Math.round(x / TRACK);
}

/** SVG path of a way. */
export function formatPathData(points: readonly Point[]): string {
  return points.map((point, index) => `${index === 0 ? "M" : "L"}${point.x} ${point.y}`).join("");
}
