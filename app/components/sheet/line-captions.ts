/** Where the name and the cardinality of a line stand: close to the target where they fit, else along its longest stretch. */
import type { Point } from "./sheet-geometry";
import type { Line } from "./sheet-scene";

export type CaptionText = { readonly text: string; readonly x: number; readonly y: number; readonly anchor: "start" | "middle" | "end"; readonly isMono: boolean };

const AWAY: Readonly<Record<string, number>> = { component: 15, property: 18 };
const HEAD = 18;
const LETTER = 6.3;
const MONO_LETTER = 6.8;

export function placeCaptions({ end, label, cardinality }: Line, points: readonly Point[]): CaptionText[] {
  const last = points.at(-1);
  const before = points.at(-2);
  if (!last || !before) return [];
  const isLevel = last.y === before.y;
  const sign = last.x > before.x ? -1 : 1;
  const anchor = isLevel && sign < 0 ? "end" : "start";
  const away = AWAY[end] ?? HEAD;
  const captions: CaptionText[] = [];
  if (cardinality !== undefined) {
    captions.push({ text: cardinality, x: isLevel ? last.x + sign * away : last.x + 8, y: isLevel ? last.y - 6 : last.y - 14, anchor, isMono: true });
  }
  if (label === undefined) return captions;
  const beside = cardinality === undefined ? 0 : cardinality.length * MONO_LETTER + 8;
  const room = Math.abs(last.x - before.x) - away - beside;
  if (isLevel && room >= label.length * LETTER) captions.push({ text: label, x: last.x + sign * (away + beside), y: last.y - 6, anchor, isMono: false });
  else captions.push({ text: label, ...placeAlong(points, label.length * LETTER), isMono: false });
  return captions;
}

/** Above the longest level stretch that holds the text, else beside the longest upright one. */
function placeAlong(points: readonly Point[], width: number): Pick<CaptionText, "x" | "y" | "anchor"> {
  let level: [Point, Point] | undefined;
  let upright: [Point, Point] | undefined;
  const lengthOf = (stretch: [Point, Point] | undefined): number => (stretch ? Math.abs(stretch[1].x - stretch[0].x) + Math.abs(stretch[1].y - stretch[0].y) : 0);
  for (let at = 1; at < points.length; at++) {
    const stretch: [Point, Point] = [points[at - 1] as Point, points[at] as Point];
    if (stretch[0].y === stretch[1].y) {
      if (lengthOf(stretch) > lengthOf(level)) level = stretch;
    } else if (lengthOf(stretch) > lengthOf(upright)) upright = stretch;
  }
  if (level && (lengthOf(level) >= width + 8 || !upright)) return { x: (level[0].x + level[1].x) / 2, y: level[0].y - 6, anchor: "middle" };
  const [from, to] = upright ?? [points[0] as Point, points[0] as Point];
  return { x: from.x + 6, y: (from.y + to.y) / 2 + 4, anchor: "start" };
}
