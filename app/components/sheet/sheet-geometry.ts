/** Measures of the drawing, in the drawing's own units (CSS pixels at 100 %). Cards, lines and placement agree on them. */

export type Point = { readonly x: number; readonly y: number };
export type Rect = { readonly x: number; readonly y: number; readonly width: number; readonly height: number };

export const HEAD_HEIGHT = 32;
export const ROW_HEIGHT = 24;
export const FOOT_HEIGHT = 22;
export const SHADOW = 4;
export const ZONE_WIDTH = 320;
export const ZONE_HEIGHT = 200;
/** Below this zoom nothing can be worked on. */
export const LEGIBLE = 0.5;

export function isOverlapping(a: Rect, b: Rect, gap = 0): boolean {
  return (
    a.x < b.x + b.width + gap && b.x < a.x + a.width + gap && a.y < b.y + b.height + gap && b.y < a.y + a.height + gap
  );
}

/** The smallest rectangle around all; undefined for none. */
export function getBounds(rects: Iterable<Rect>): Rect | undefined {
  let left = Infinity;
  let top = Infinity;
  let right = -Infinity;
  let bottom = -Infinity;
  for (const rect of rects) {
    left = Math.min(left, rect.x);
    top = Math.min(top, rect.y);
    right = Math.max(right, rect.x + rect.width);
    bottom = Math.max(bottom, rect.y + rect.height);
  }
  return left === Infinity ? undefined : { x: left, y: top, width: right - left, height: bottom - top };
}

/** Columns of the frame are numbers from the left, rows letters from the top. */
export function formatZoneColumn(index: number): string {
  return index >= 0 ? String(index + 1) : `−${-index}`;
}

/** A … Z, AA, AB …; rows above the first carry a minus. */
export function formatZoneRow(index: number): string {
  if (index < 0) return `−${formatZoneRow(-index - 1)}`;
  const letter = String.fromCharCode(65 + (index % 26));
  return index < 26 ? letter : formatZoneRow(Math.floor(index / 26) - 1) + letter;
}

/** The corner from which zones are counted: the fields' grid below the drawing's upper left. */
export function getZoneOrigin(bounds: Rect | undefined): Point {
  if (!bounds) return { x: 0, y: 0 };
  return {
    x: Math.floor((bounds.x - 40) / ZONE_WIDTH) * ZONE_WIDTH,
    y: Math.floor((bounds.y - 40) / ZONE_HEIGHT) * ZONE_HEIGHT,
  };
}
