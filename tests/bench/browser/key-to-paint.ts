/** From the press of a key to the frame that shows what it changed, measured in the page by its own clock. */
import type { Page } from "playwright-core";

declare global {
  interface Window {
    ferruleBench?: { await: (text: string) => void; answer: Promise<number> };
  }
}

/** To be called once on each page that is measured. */
export async function watchKeys(page: Page): Promise<void> {
  await page.evaluate(() => {
    let pressedAt = 0;
    window.addEventListener("keydown", (event) => (pressedAt = event.timeStamp), true);
    const bench: NonNullable<Window["ferruleBench"]> = {
      answer: Promise.resolve(0),
      await: (text) => {
        bench.answer = new Promise((resolve) => {
          const holds = (node: Node): boolean =>
            node instanceof HTMLInputElement ? node.value.includes(text) : node.textContent?.includes(text) === true;
          const observer = new MutationObserver((records) => {
            const isShown = records.some((record) => holds(record.target) || [...record.addedNodes].some(holds));
            if (!isShown) return;
            observer.disconnect();
            requestAnimationFrame(() => {
              // What follows a frame's own work runs after it was painted.
              const channel = new MessageChannel();
              channel.port1.onmessage = () => resolve(performance.now() - pressedAt);
              channel.port2.postMessage(null);
            });
          });
          const attributeFilter = ["value"];
          observer.observe(document.body, { subtree: true, childList: true, characterData: true, attributeFilter });
        });
      },
    };
    window.ferruleBench = bench;
  });
}

/** Presses the key and answers the milliseconds until `text` is on screen. */
export async function timeKey(page: Page, key: string, text: string): Promise<number> {
  await page.evaluate((wanted) => window.ferruleBench?.await(wanted), text);
  await page.keyboard.press(key);
  const took = await page.evaluate(() => window.ferruleBench?.answer);
  if (took === undefined) throw new Error("The page does not watch its keys");
  return took;
}
