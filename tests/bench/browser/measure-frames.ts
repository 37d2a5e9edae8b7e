/** Times between frames while something moves. The functions handed to the page run there and close over nothing. */
import type { Page } from "playwright-core";

export type Frames = { readonly median: number; readonly p95: number; readonly longest: number };

export function percentile(values: readonly number[], share: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  const found = sorted[Math.min(sorted.length - 1, Math.ceil(sorted.length * share) - 1)];
  if (found === undefined) throw new RangeError("No values");
  return found;
}

export function summarise(frames: readonly number[]): Frames {
  return { median: percentile(frames, 0.5), p95: percentile(frames, 0.95), longest: Math.max(...frames) };
}

/** Pans and zooms a canvas of xyflow by pointer and wheel, one step a frame, and answers the time of each frame. */
export async function panAndZoom(page: Page): Promise<number[]> {
  return page.evaluate(async () => {
    const pane = document.querySelector(".react-flow__pane");
    if (!pane) throw new Error("No canvas");
    const box = pane.getBoundingClientRect();
    const middle = { clientX: box.x + box.width / 2, clientY: box.y + box.height / 2 };
    const frame = () => new Promise<number>((resolve) => requestAnimationFrame(resolve));
    const mouse = (target: EventTarget, type: string, x: number, y: number, buttons: number) =>
      target.dispatchEvent(
        new MouseEvent(type, {
          bubbles: true,
          cancelable: true,
          view: window,
          clientX: middle.clientX + x,
          clientY: middle.clientY + y,
          button: 0,
          buttons,
        }),
      );
    const zoom = (deltaY: number) =>
      pane.dispatchEvent(
        new WheelEvent("wheel", { bubbles: true, cancelable: true, view: window, ...middle, deltaY, ctrlKey: true }),
      );
    const times: number[] = [];
    let last = await frame();
    const step = async (act: () => void) => {
      act();
      const now = await frame();
      times.push(now - last);
      last = now;
    };
    const pan = async (steps: number) => {
      mouse(pane, "mousedown", 0, 0, 1);
      // A figure of eight that ends where it began.
      for (let at = 1; at <= steps; at++) {
        const turn = (2 * Math.PI * at) / steps;
        await step(() => mouse(window, "mousemove", Math.sin(2 * turn) * 320, Math.sin(turn) * 240, 1));
      }
      mouse(window, "mouseup", 0, 0, 0);
    };
    // Near, then out until all is in sight, then in to full size, and back to where it began.
    await pan(60);
    for (let at = 0; at < 60; at++) await step(() => zoom(19));
    await pan(60);
    for (let at = 0; at < 80; at++) await step(() => zoom(-24));
    await pan(90);
    for (let at = 0; at < 30; at++) await step(() => zoom(26));
    return times;
  });
}

/** Scrolls an element from its top, some rows a frame, with jumps between; answers the time of each frame. */
export async function scrollThrough(page: Page, selector: string): Promise<number[]> {
  return page.evaluate(async (wanted) => {
    const element = document.querySelector(wanted);
    if (!element) throw new Error(`Nothing to scroll: ${wanted}`);
    const frame = () => new Promise<number>((resolve) => requestAnimationFrame(resolve));
    const times: number[] = [];
    let last = await frame();
    const scroll = async (top: number) => {
      element.scrollTop = top;
      const now = await frame();
      times.push(now - last);
      last = now;
    };
    const height = element.scrollHeight;
    for (let at = 0; at < 150; at++) await scroll(at * 60);
    for (let at = 0; at < 60; at++) await scroll((height * at) / 60);
    for (let at = 0; at < 150; at++) await scroll(height / 2 + at * 240);
    return times;
  }, selector);
}
