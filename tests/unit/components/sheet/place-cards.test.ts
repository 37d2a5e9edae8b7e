import { describe, expect, it } from "vitest";
import { placeCards } from "~/components/sheet/place-cards";
import { isOverlapping, type Rect } from "~/components/sheet/sheet-geometry";
import type { Card, Line, Scene } from "~/components/sheet/sheet-scene";
import type { NodeKey } from "~/domain/address-space/node-id";

const key = (name: string): NodeKey => name as NodeKey;

function card(name: string, more: Partial<Card> = {}): Card {
  return {
    key: key(name),
    shape: "card",
    nodeClass: "Object",
    name,
    isType: false,
    isAbstract: false,
    isForeign: false,
    namespaceLabel: "",
    idText: "",
    nodeIdText: "",
    rows: [],
    folded: 0,
    drawn: 0,
    members: 0,
    width: 264,
    height: 120,
    ...more,
  };
}

function line(source: string, target: string, end: Line["end"]): Line {
  const edge = { source: key(source), type: key("type"), target: key(target) };
  const isReversed = end === "subtype";
  return { id: `${source} ${target}`, edge, from: isReversed ? edge.target : edge.source, to: isReversed ? edge.source : edge.target, end };
}

function toRects(scene: Scene, places: ReadonlyMap<NodeKey, { x: number; y: number }>): Rect[] {
  return scene.cards.map((c) => ({ ...(places.get(c.key) ?? { x: 0, y: 0 }), width: c.width, height: c.height }));
}

function expectNoOverlap(rects: readonly Rect[]): void {
  rects.forEach((a, i) => rects.slice(i + 1).forEach((b) => expect(isOverlapping(a, b)).toBe(false)));
}

describe("a first placement", () => {
  const type = card("PumpType", { nodeClass: "ObjectType", isType: true });
  const base = card("BaseObjectType", { nodeClass: "ObjectType", isType: true, isForeign: true });
  const groups = ["A", "B", "C"].map((name) => card(name));
  const scene: Scene = {
    cards: [type, base, ...groups],
    lines: [line("BaseObjectType", "PumpType", "subtype"), ...groups.map((g) => line("PumpType", g.name, "component"))],
  };

  it("puts what a type builds on left of it and its parts right of it", () => {
    const places = placeCards(scene, new Map());
    const x = (name: string): number => places.get(key(name))?.x ?? NaN;
    expect(x("BaseObjectType")).toBeLessThan(x("PumpType"));
    for (const group of groups) expect(x(group.name)).toBeGreaterThan(x("PumpType"));
    expectNoOverlap(toRects(scene, places));
  });

  it("stands machines in columns beside the folder that organises them", () => {
    const machines = Array.from({ length: 6 }, (_, i) => card(`B${i + 1}`, { height: 260 }));
    const folder = card("Machines", { isForeign: true });
    const hall: Scene = { cards: [folder, ...machines], lines: machines.map((m) => line("Machines", m.name, "hierarchical")) };
    const places = placeCards(hall, new Map());
    const columns = new Set(machines.map((m) => places.get(m.key)?.x));
    expect(columns.size).toBeGreaterThan(1);
    for (const m of machines) expect(places.get(m.key)?.x).toBeGreaterThan(places.get(folder.key)?.x ?? NaN);
    expectNoOverlap(toRects(hall, places));
  });

  it("keeps placed cards and puts a new one on free ground beside its owner", () => {
    const known = new Map([
      [type.key, { x: 0, y: 0 }],
      [base.key, { x: -400, y: 0 }],
      [key("A"), { x: 352, y: 0 }],
      [key("B"), { x: 352, y: 150 }],
    ]);
    const places = placeCards(scene, known);
    for (const [k, point] of known) expect(places.get(k)).toEqual(point);
    expectNoOverlap(toRects(scene, places));
  });
});
