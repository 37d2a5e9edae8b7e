/** Lining up and spreading out of selected cards. */
import type { NodeKey } from "~/domain/address-space/node-id";
import type { Point, Rect } from "./sheet-geometry";

export type Alignment = "left" | "right" | "top" | "bottom" | "rows" | "columns";

export function alignCards(rects: ReadonlyMap<NodeKey, Rect>, alignment: Alignment): Map<NodeKey, Point> {
  const entries = [...rects];
  if (alignment === "rows" || alignment === "columns") return spread(entries, alignment);
  const all = entries.map(([, rect]) => rect);
  const left = Math.min(...all.map((r) => r.x));
  const right = Math.max(...all.map((r) => r.x + r.width));
  const top = Math.min(...all.map((r) => r.y));
  const bottom = Math.max(...all.map((r) => r.y + r.height));
  return new Map(
    entries.map(([key, rect]) => {
      const x = alignment === "left" ? left : alignment === "right" ? right - rect.width : rect.x;
      const y = alignment === "top" ? top : alignment === "bottom" ? bottom - rect.height : rect.y;
      return [key, { x, y }] as const;
    }),
  );
}

/** The same gap between all, the outermost two stay. */
function spread(entries: [NodeKey, Rect][], alignment: "rows" | "columns"): Map<NodeKey, Point> {
  const isColumn = alignment === "rows";
  const start = (r: Rect) => (isColumn ? r.y : r.x);
  const length = (r: Rect) => (isColumn ? r.height : r.width);
  const sorted = [...entries].sort((a, b) => start(a[1]) - start(b[1]));
  const first = sorted[0]?.[1];
  const last = sorted.at(-1)?.[1];
  if (!first || !last || sorted.length < 3) return new Map(entries);
  const used = sorted.reduce((sum, [, rect]) => sum + length(rect), 0);
  const gap = (start(last) + length(last) - start(first) - used) / (sorted.length - 1);
  let at = start(first);
  return new Map(
    sorted.map(([key, rect]) => {
      const place = isColumn ? { x: rect.x, y: at } : { x: at, y: rect.y };
      at += length(rect) + gap;
      return [key, place] as const;
    }),
  );
}
