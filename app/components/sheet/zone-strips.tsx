import { useViewport } from "@xyflow/react";
import { useEffect, useMemo, useState, type RefObject } from "react";
import { formatZoneColumn, formatZoneRow, ZONE_HEIGHT, ZONE_WIDTH, type Point } from "./sheet-geometry";

type Side = "top" | "bottom" | "left" | "right";

/** Numbers along the top and foot, letters along the sides of the frame: they move with the drawing, so that a place keeps its name. */
export function ZoneStrip({ side, origin, canvas }: { side: Side; origin: Point; canvas: RefObject<HTMLElement | null> }) {
  const viewport = useViewport();
  const size = useSize(canvas);
  const isRow = side === "top" || side === "bottom";
  const length = isRow ? size.width : size.height;
  const offset = isRow ? viewport.x + origin.x * viewport.zoom : viewport.y + origin.y * viewport.zoom;
  const step = getStep((isRow ? ZONE_WIDTH : ZONE_HEIGHT) * viewport.zoom);
  const first = Math.floor(-offset / step.pixels);
  // While the drawing only moves, the labels are kept and their band is shifted: that costs no layout.
  const labels = useMemo(() => {
    const count = Math.min(60, Math.ceil(length / step.pixels) + 2);
    return Array.from({ length: count }, (_, place) => {
      const index = first + place;
      const at = place * step.pixels;
      return (
        <span key={index} style={isRow ? { left: at, width: step.pixels } : { top: at, height: step.pixels }}>
          {isRow ? formatZoneColumn(index * step.zones) : formatZoneRow(index * step.zones)}
        </span>
      );
    });
  }, [first, length, step.pixels, step.zones, isRow]);
  const shift = Math.round(first * step.pixels + offset);
  return (
    <div className={isRow ? "zone-strip is-row" : "zone-strip is-column"} style={isRow ? { gridRow: side === "top" ? 1 : 3 } : { gridColumn: side === "left" ? 1 : 3 }} aria-hidden="true">
      <div style={{ transform: isRow ? `translateX(${shift}px)` : `translateY(${shift}px)` }}>{labels}</div>
    </div>
  );
}

/** Far away several zones share one label. */
function getStep(pixels: number): { pixels: number; zones: number } {
  let zones = 1;
  while (pixels * zones < 60) zones *= 2;
  return { pixels: pixels * zones, zones };
}

function useSize(target: RefObject<HTMLElement | null>): { width: number; height: number } {
  const [size, setSize] = useState({ width: 0, height: 0 });
  useEffect(() => {
    const element = target.current;
    if (!element) return;
    const observer = new ResizeObserver(() => setSize({ width: element.clientWidth, height: element.clientHeight }));
    observer.observe(element);
    return () => observer.disconnect();
  }, [target]);
  return size;
}
