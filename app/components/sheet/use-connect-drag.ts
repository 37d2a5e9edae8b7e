import { useReactFlow } from "@xyflow/react";
import { useCallback, useEffect, useState, type PointerEvent } from "react";
import type { NodeKey } from "~/domain/address-space/node-id";
import type { Point } from "./sheet-geometry";

export type Connecting = { readonly source: NodeKey; readonly from: Point; readonly to: Point };
/** Without a target the menu asks for it. `at` is a place in the window. */
export type ConnectRequest = { readonly source: NodeKey; readonly target?: NodeKey; readonly at?: Point };

/** Drawing a reference: from the port of a row or head to any other row or card. */
export function useConnectDrag(onRequest: (request: ConnectRequest) => void) {
  const { screenToFlowPosition } = useReactFlow();
  const [connecting, setConnecting] = useState<Connecting>();
  const isConnecting = connecting !== undefined;

  /** Answers whether the press was on a port. */
  const start = useCallback(
    (event: PointerEvent): boolean => {
      const port = (event.target as Element).closest<HTMLElement>("[data-port]");
      if (!port || event.button !== 0) return false;
      event.preventDefault();
      event.stopPropagation();
      const box = port.getBoundingClientRect();
      const from = screenToFlowPosition({ x: box.x + box.width / 2, y: box.y + box.height / 2 });
      setConnecting({ source: port.dataset.port as NodeKey, from, to: from });
      return true;
    },
    [screenToFlowPosition],
  );

  useEffect(() => {
    if (!isConnecting) return;
    let marked: Element | null = null;
    const mark = (element: Element | null) => {
      if (marked === element) return;
      marked?.classList.remove("drop-target");
      marked = element;
      marked?.classList.add("drop-target");
    };
    const move = (event: globalThis.PointerEvent) => {
      setConnecting((old) => old && { ...old, to: screenToFlowPosition({ x: event.clientX, y: event.clientY }) });
      mark(findKeyElement(event.clientX, event.clientY));
    };
    const finish = (event: globalThis.PointerEvent) => {
      mark(null);
      const target = findKeyElement(event.clientX, event.clientY)?.dataset.key as NodeKey | undefined;
      setConnecting((old) => {
        if (old && target !== undefined && target !== old.source) {
          const at = { x: event.clientX, y: event.clientY };
          queueMicrotask(() => onRequest({ source: old.source, target, at }));
        }
        return undefined;
      });
    };
    const leave = (event: KeyboardEvent) => {
      if (event.key !== "Escape") return;
      mark(null);
      setConnecting(undefined);
    };
    window.addEventListener("pointermove", move);
    window.addEventListener("pointerup", finish);
    window.addEventListener("keydown", leave);
    return () => {
      mark(null);
      window.removeEventListener("pointermove", move);
      window.removeEventListener("pointerup", finish);
      window.removeEventListener("keydown", leave);
    };
  }, [isConnecting, onRequest, screenToFlowPosition]);

  return { connecting, start };
}

/** The row or card under a point of the window. */
export function findKeyElement(x: number, y: number): HTMLElement | null {
  return document.elementFromPoint(x, y)?.closest<HTMLElement>("[data-key]") ?? null;
}
