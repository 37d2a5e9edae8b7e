import { memo, use, useMemo } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { getNodeName } from "../model/member-facts";
import { useOpenModel, useView } from "../model/use-model";
import { ReferenceLine } from "./reference-line";
import { FarContext } from "./far-context";
import { formatPathData, routeLines } from "./route-lines";
import { SHADOW, type Point, type Rect } from "./sheet-geometry";
import type { Card, Scene } from "./sheet-scene";

type Props = {
  scene: Scene;
  space: AddressSpace;
  rects: ReadonlyMap<NodeKey, Rect>;
  selectedLine: string | undefined;
  onSelectLine: (id: string) => void;
};

/** The layer of references with the hard shadows of the types beneath them. */
export const SheetLines = memo(function SheetLines({ scene, space, rects, selectedLine, onSelectLine }: Props) {
  const routes = useMemo(() => routeLines(scene.lines, rects), [scene.lines, rects]);
  const shadows = useMemo(() => getShadowPath(scene.cards, rects), [scene.cards, rects]);
  const lit = useLitCards(scene);
  const isFar = use(FarContext);
  if (isFar) {
    return (
      <svg className="sheet-lines" aria-hidden="true">
        <path className="sheet-shadow" d={shadows} />
        <path className="reference-line" d={routes.map((route) => formatPathData(route.points)).join("")} />
      </svg>
    );
  }
  return (
    <svg className="sheet-lines">
      <path className="sheet-shadow" d={shadows} />
      {routes.map((route) => (
        <ReferenceLine
          key={route.line.id}
          route={route}
          isSelected={route.line.id === selectedLine}
          isLit={lit.has(route.line.from) || lit.has(route.line.to)}
          name={`${getNodeName(space, route.line.edge.source)} ${getNodeName(space, route.line.edge.type)} ${getNodeName(space, route.line.edge.target)}`}
          onSelect={onSelectLine}
        />
      ))}
    </svg>
  );
});

/** Selected cards light the lines that end at them. */
function useLitCards(scene: Scene): ReadonlySet<NodeKey> {
  const { view } = useOpenModel();
  const text = useView((state) => state.selection.join("\n"));
  return useMemo(() => {
    const selection = new Set(view.getState().selection);
    return new Set(scene.cards.flatMap((card) => (selection.has(card.key) ? [card.key] : [])));
    // The joined keys say when the selection changed.
  }, [text, scene.cards, view]);
}

/** One path for all shadows: a type's shape, moved down and to the right, hard and never blurred. */
function getShadowPath(cards: readonly Card[], rects: ReadonlyMap<NodeKey, Rect>): string {
  return cards
    .map((card) => {
      const rect = card.isType ? rects.get(card.key) : undefined;
      return rect ? getOutline(card.shape, { ...rect, x: rect.x + SHADOW, y: rect.y + SHADOW }) : "";
    })
    .join("");
}

function getOutline(shape: Card["shape"], { x, y, width, height }: Rect): string {
  const middle = y + height / 2;
  const right = x + width;
  const bottom = y + height;
  if (shape === "hexagon") return `M${x} ${middle}L${x + 20} ${y}H${right - 20}L${right} ${middle}L${right - 20} ${bottom}H${x + 20}z`;
  if (shape === "signpost") return `M${x} ${middle}L${x + 20} ${y}H${right}L${right - 20} ${middle}L${right} ${bottom}H${x + 20}z`;
  if (shape === "variable") {
    const r = 9;
    return `M${x + r} ${y}H${right - r}a${r} ${r} 0 0 1 ${r} ${r}V${bottom - r}a${r} ${r} 0 0 1 ${-r} ${r}H${x + r}a${r} ${r} 0 0 1 ${-r} ${-r}V${y + r}a${r} ${r} 0 0 1 ${r} ${-r}z`;
  }
  return `M${x} ${y}H${right}V${bottom}H${x}z`;
}

/** The way from a port to the pointer while a reference is being drawn. */
export function ConnectingLine({ from, to }: { from: Point; to: Point }) {
  const middle = (from.x + to.x) / 2;
  return (
    <svg className="sheet-lines" style={{ zIndex: 5 }} aria-hidden="true">
      <path className="connecting-line" d={`M${from.x} ${from.y}H${middle}V${to.y}H${to.x}`} />
    </svg>
  );
}
