import { useLayoutEffect, useState, type RefObject } from "react";

type Point = { x: number; y: number };
const STUB = 9;
const CARD_STUB = 24;

/**
 * The copper wire along the browse path: it leaves each selected row at its right edge, runs along the border of the
 * columns and ends at the card. Measured from the drawn rows, so that it fits whatever scrolls.
 */
export function PathWire({ stage, signature }: { stage: RefObject<HTMLElement | null>; signature: string }) {
  const [drawing, setDrawing] = useState({ path: "", width: 0, height: 0 });
  useLayoutEffect(() => {
    const root = stage.current;
    if (!root) return undefined;
    let frame = 0;
    const draw = (): void => {
      cancelAnimationFrame(frame);
      frame = requestAnimationFrame(() => setDrawing(measure(root)));
    };
    draw();
    const sizes = new ResizeObserver(draw);
    sizes.observe(root);
    root.addEventListener("scroll", draw, { capture: true, passive: true });
    const rows = new MutationObserver(draw);
    rows.observe(root, { childList: true, subtree: true });
    return () => {
      cancelAnimationFrame(frame);
      sizes.disconnect();
      rows.disconnect();
      root.removeEventListener("scroll", draw, { capture: true });
    };
  }, [stage, signature]);
  return (
    <svg aria-hidden width={drawing.width} height={drawing.height} className="pointer-events-none absolute top-0 left-0 max-md:hidden">
      <path d={drawing.path} fill="none" stroke="var(--copper)" strokeWidth={2} />
    </svg>
  );
}

function measure(root: HTMLElement): { path: string; width: number; height: number } {
  const frame = root.getBoundingClientRect();
  const rows = [...root.querySelectorAll<HTMLElement>('[role="option"][aria-selected="true"]')];
  const ends = rows.map((row) => toEnds(row, frame));
  const card = root.querySelector<HTMLElement>("[data-wire-end]")?.getBoundingClientRect();
  const viewport = root.querySelector<HTMLElement>("[data-columns]")?.getBoundingClientRect();
  const parts: string[] = [];
  ends.forEach(({ right, edge }, i) => {
    const next = ends[i + 1]?.left ?? (card ? { x: edge, y: card.top + card.height / 2 - frame.top } : undefined);
    if (!next) return;
    const isLast = i === ends.length - 1;
    const turn = isLast && viewport ? viewport.right - frame.left : edge;
    if (viewport && (turn < viewport.left - frame.left || (!isLast && turn > viewport.right - frame.left))) return;
    parts.push(`M${right.x - STUB} ${right.y}H${turn}V${next.y}h${isLast ? CARD_STUB : STUB}`);
  });
  return { path: parts.join(""), width: frame.width, height: frame.height };
}

/** Where the wire meets a row; a row that is scrolled out of its column is met at the column's edge. */
function toEnds(row: HTMLElement, frame: DOMRect): { left: Point; right: Point; edge: number } {
  const box = row.getBoundingClientRect();
  const column = (row.closest("section") ?? row).getBoundingClientRect();
  const list = (row.parentElement ?? row).getBoundingClientRect();
  const y = Math.min(list.bottom - 2, Math.max(list.top + 2, box.top + box.height / 2)) - frame.top;
  return { left: { x: column.left - frame.left, y }, right: { x: column.right - frame.left, y }, edge: column.right - frame.left };
}
