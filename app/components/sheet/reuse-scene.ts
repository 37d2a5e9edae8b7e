import type { Card, Line, MemberRow, Scene } from "./sheet-scene";

/** The new scene with the old objects wherever nothing changed, so that unchanged cards are not drawn again. */
export function reuseScene(old: Scene | undefined, next: Scene): Scene {
  if (!old) return next;
  const cards = new Map(old.cards.map((card) => [card.key, card]));
  const lines = new Map(old.lines.map((line) => [line.id, line]));
  return {
    cards: next.cards.map((card) => reuseCard(cards.get(card.key), card)),
    lines: next.lines.map((line) => reuseLine(lines.get(line.id), line)),
  };
}

function reuseCard(old: Card | undefined, next: Card): Card {
  if (!old) return next;
  const rowsByKey = new Map(old.rows.map((row) => [row.key, row]));
  const reused = next.rows.map((row) => reuseFlat<MemberRow>(rowsByKey.get(row.key), row));
  const isSameRows = reused.length === old.rows.length && reused.every((row, index) => row === old.rows[index]);
  const card = { ...next, rows: isSameRows ? old.rows : reused };
  return isSameFlat(old, card) ? old : card;
}

function reuseLine(old: Line | undefined, next: Line): Line {
  return old && isSameFlat({ ...old, edge: null }, { ...next, edge: null }) ? old : next;
}

function reuseFlat<T extends object>(old: T | undefined, next: T): T {
  return old && isSameFlat(old, next) ? old : next;
}

function isSameFlat(a: object, b: object): boolean {
  const left = Object.entries(a);
  const right = new Map(Object.entries(b));
  return left.length === right.size && left.every(([name, value]) => Object.is(value, right.get(name)));
}
