import { useReactFlow, useStore, type ReactFlowState } from "@xyflow/react";
import { useEffect, useMemo, useRef, type PointerEvent } from "react";
import type { NodeKey } from "~/domain/address-space/node-id";
import { getBounds, type Rect } from "./sheet-geometry";

const WIDTH = 131;
const HEIGHT = 45;
const MARGIN = 3;

const getView = (state: ReactFlowState): string => [...state.transform, state.width, state.height].join(" ");

/** The whole sheet, small, with a frame around what is in sight; a press or a drag goes there. Drawn anew only when cards move. */
export function SheetMap({ rects }: { rects: ReadonlyMap<NodeKey, Rect> }) {
  const canvas = useRef<HTMLCanvasElement>(null);
  const { setCenter, getZoom } = useReactFlow();
  const [x = 0, y = 0, zoom = 1, width = 0, height = 0] = useStore(getView).split(" ").map(Number);
  const scale = useMemo(() => toScale(getBounds(rects.values())), [rects]);

  useEffect(() => {
    if (canvas.current) drawCards(canvas.current, rects, scale);
  }, [rects, scale]);

  function go(event: PointerEvent<HTMLElement>): void {
    if (event.buttons !== 1) return;
    const box = event.currentTarget.getBoundingClientRect();
    const to = { x: (event.clientX - box.x - scale.x) / scale.factor, y: (event.clientY - box.y - scale.y) / scale.factor };
    void setCenter(to.x, to.y, { zoom: getZoom(), duration: 0 });
  }

  const frame = {
    transform: `translate(${scale.x - (x / zoom) * scale.factor}px, ${scale.y - (y / zoom) * scale.factor}px)`,
    width: (width / zoom) * scale.factor,
    height: (height / zoom) * scale.factor,
  };
  return (
    <div
      className="sheet-map-view"
      onPointerDown={(event) => {
        event.currentTarget.setPointerCapture(event.pointerId);
        go(event);
      }}
      onPointerMove={go}
    >
      <canvas ref={canvas} role="img" aria-label={`Map of the sheet with ${rects.size} cards`} width={WIDTH * 2} height={HEIGHT * 2} />
      <i style={frame} />
    </div>
  );
}

type Scale = { readonly x: number; readonly y: number; readonly factor: number };

function toScale(bounds: Rect | undefined): Scale {
  if (!bounds) return { x: 0, y: 0, factor: 0.05 };
  const factor = Math.min((WIDTH - 2 * MARGIN) / bounds.width, (HEIGHT - 2 * MARGIN) / bounds.height, 0.12);
  return {
    x: (WIDTH - bounds.width * factor) / 2 - bounds.x * factor,
    y: (HEIGHT - bounds.height * factor) / 2 - bounds.y * factor,
    factor,
  };
}

function drawCards(canvas: HTMLCanvasElement, rects: ReadonlyMap<NodeKey, Rect>, scale: Scale): void {
  const context = canvas.getContext("2d");
  if (!context) return;
  const style = getComputedStyle(canvas);
  context.setTransform(2, 0, 0, 2, 0, 0);
  context.clearRect(0, 0, WIDTH, HEIGHT);
  context.fillStyle = style.getPropertyValue("--bench-2");
  context.strokeStyle = style.getPropertyValue("--ink-3");
  context.lineWidth = 0.5;
  for (const rect of rects.values()) {
    const place = [rect.x * scale.factor + scale.x, rect.y * scale.factor + scale.y, rect.width * scale.factor, rect.height * scale.factor] as const;
    context.fillRect(...place);
    context.strokeRect(...place);
  }
}
