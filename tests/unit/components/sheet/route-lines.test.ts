import { describe, expect, it } from "vitest";
import { routeLines } from "~/components/sheet/route-lines";
import { HEAD_HEIGHT, ROW_HEIGHT, type Rect } from "~/components/sheet/sheet-geometry";
import type { Line } from "~/components/sheet/sheet-scene";
import type { NodeKey } from "~/domain/address-space/node-id";

const key = (name: string): NodeKey => name as NodeKey;

function line(from: string, to: string, end: Line["end"] = "component", sourceRow?: number): Line {
  return { id: `${from} ${to} ${end}`, edge: { source: key(from), type: key(end), target: key(to) }, from: key(from), to: key(to), end, ...(sourceRow === undefined ? {} : { sourceRow }) };
}

const rects = (entries: Record<string, Rect>): Map<string, Rect> => new Map(Object.entries(entries));
const box = (x: number, y: number, height = 100): Rect => ({ x, y, width: 200, height });

function isOrthogonal(points: readonly { x: number; y: number }[]): boolean {
  return points.every((point, i) => i === 0 || point.x === points[i - 1]?.x || point.y === points[i - 1]?.y);
}

describe("a line between cards", () => {
  it("is straight where both heads lie at one height, and ends on the edges", () => {
    const [route] = routeLines([line("a", "b")], rects({ a: box(0, 0), b: box(400, 0) }));
    expect(route?.points).toEqual([
      { x: 200, y: HEAD_HEIGHT / 2 },
      { x: 400, y: HEAD_HEIGHT / 2 },
    ]);
  });

  it("runs orthogonally and leaves at its row", () => {
    const [route] = routeLines([line("a", "b", "leader", 2)], rects({ a: box(0, 0, 200), b: box(400, 300) }));
    expect(route?.points[0]).toEqual({ x: 200, y: HEAD_HEIGHT + 2.5 * ROW_HEIGHT });
    expect(isOrthogonal(route?.points ?? [])).toBe(true);
  });

  it("goes around a card in its way", () => {
    const cards = rects({ a: box(0, 0), wall: box(300, -50, 200), b: box(700, 0) });
    const [route] = routeLines([line("a", "b")], cards);
    const points = route?.points ?? [];
    expect(isOrthogonal(points)).toBe(true);
    points.slice(1).forEach((point, i) => {
      const before = points[i] as { x: number; y: number };
      const isLevel = point.y === before.y;
      const crosses = isLevel && point.y > -50 && point.y < 150 && Math.min(point.x, before.x) < 500 && Math.max(point.x, before.x) > 300;
      expect(crosses).toBe(false);
    });
  });

  it("shares a trunk with its own kind and keeps apart from others", () => {
    const cards = rects({ a: box(0, 0), b: box(500, 200), c: box(500, 400), d: box(500, 600) });
    const routes = routeLines([line("a", "b"), line("a", "c"), line("a", "d", "other")], cards);
    const trunk = (i: number): number | undefined => routes[i]?.points[1]?.x;
    expect(trunk(0)).toBe(trunk(1));
    expect(trunk(2)).not.toBe(trunk(0));
  });

  it("is left out when a card is not on the sheet", () => {
    expect(routeLines([line("a", "b")], rects({ a: box(0, 0) }))).toEqual([]);
  });
});
