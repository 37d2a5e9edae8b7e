import { useLayoutEffect, useState, type RefObject } from "react";
import { routeWires, type Wire, type WireEnds } from "./route-wires";

export type Connection = { readonly id: string; readonly pin: string; readonly terminal: string };

/** Measures pins and terminals in the drawing and routes the wires anew whenever one of them moved. */
export function useWires(
  drawing: RefObject<HTMLDivElement | null>,
  connections: readonly Connection[],
): readonly Wire[] {
  const [wires, setWires] = useState<readonly Wire[]>([]);
  const signature = connections.map((connection) => connection.id).join("\n");
  useLayoutEffect(() => {
    const box = drawing.current;
    if (!box) return;
    let frame = 0;
    const measure = () => {
      const next = measureWires(box, connections);
      setWires((before) => (JSON.stringify(before) === JSON.stringify(next) ? before : next));
    };
    const later = () => {
      cancelAnimationFrame(frame);
      frame = requestAnimationFrame(measure);
    };
    measure();
    const observer = new ResizeObserver(later);
    observer.observe(box);
    for (const child of box.children) observer.observe(child);
    const changes = new MutationObserver(later);
    changes.observe(box, { childList: true, subtree: true, attributes: true, attributeFilter: ["style", "data-pin"] });
    return () => {
      cancelAnimationFrame(frame);
      observer.disconnect();
      changes.disconnect();
    };
    // The signature says which connections there are; the list is made anew with each drawing.
  }, [drawing, signature]);
  return wires;
}

function measureWires(box: HTMLElement, connections: readonly Connection[]): Wire[] {
  const origin = box.getBoundingClientRect();
  const gutter = box.querySelector("[data-gutter]")?.getBoundingClientRect();
  if (!gutter) return [];
  const find = (attribute: string, value: string) =>
    box.querySelector<HTMLElement>(`[${attribute}="${CSS.escape(value)}"]`);
  const ends: WireEnds[] = connections.flatMap((connection) => {
    const pin = find("data-pin", connection.pin);
    const terminal = find("data-terminal", connection.terminal)?.getBoundingClientRect();
    if (!pin || !terminal) return [];
    const from = pin.getBoundingClientRect();
    const row = pin.closest<HTMLElement>("[data-tracks-below]");
    const below = row && row.getBoundingClientRect().top - origin.top + Number(row.dataset["tracksBelow"]);
    return [
      {
        id: connection.id,
        x: Math.round(below === null ? from.right - origin.left : (from.left + from.right) / 2 - origin.left) + 0.5,
        y: below === null ? (from.top + from.bottom) / 2 - origin.top : from.bottom - origin.top,
        ...(below === null ? {} : { tracksTop: below }),
        terminalX: terminal.left - origin.left,
        terminalY: Math.round((terminal.top + terminal.bottom) / 2 - origin.top) + 0.5,
      },
    ];
  });
  return routeWires(ends, { left: gutter.left - origin.left, right: gutter.right - origin.left });
}
