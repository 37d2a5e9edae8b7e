/** The sheet with many cards against the bare canvas; layout of many cards while somebody types. */
import type { Page } from "playwright-core";
import { compare, limit, record, type BenchResult } from "../result";
import { GRID, makeCardModel } from "./bench-models";
import type { BenchWorld } from "./bench-world";
import { timeKey, watchKeys } from "./key-to-paint";
import { panAndZoom, percentile, summarise, type Frames } from "./measure-frames";
import { serveBareCanvas } from "./serve-bare-canvas";

const CARDS = 1000;
const MEMBERS = 5;
const SLOWER_AT_MOST = 1.3;
const ARRANGED = 300;
const TYPED_MS = 100;

export async function measureCanvas(world: BenchWorld): Promise<BenchResult[]> {
  const { page } = world;
  await openCards(world, CARDS, "Cards");
  const bare = await serveBareCanvas();
  const other = await page.context().newPage();
  try {
    const view = await readView(page);
    const where = new URLSearchParams(Object.entries({ count: CARDS, ...GRID, ...view }).map(([k, v]) => [k, String(v)]));
    await other.goto(`${bare.url}?${where}`);
    await other.locator(".react-flow__node").nth(CARDS - 1).waitFor({ state: "attached" });
    await fitPane(page, other);
    // In turn, so that both meet the machine in the same mood; the first round of each warms up.
    const [ours, theirs]: [number[], number[]] = [[], []];
    for (let round = 0; round < 4; round++) {
      const reference = await onTop(other, () => panAndZoom(other));
      const own = await onTop(page, () => panAndZoom(page));
      if (round === 0) continue;
      theirs.push(...reference);
      ours.push(...own);
    }
    return compareFrames(`sheet of ${CARDS} cards, ${CARDS * MEMBERS} rows`, summarise(ours), summarise(theirs));
  } finally {
    await other.close();
    bare.stop();
  }
}

/** Where the sheet's view stands; the bare canvas begins there too. */
async function readView(page: Page): Promise<{ x: number; y: number; zoom: number }> {
  return page.locator(".react-flow__viewport").evaluate((element) => {
    const { e: x, f: y, a: zoom } = new DOMMatrix(getComputedStyle(element).transform);
    return { x, y, zoom };
  });
}

async function onTop<T>(page: Page, run: () => Promise<T>): Promise<T> {
  await page.bringToFront();
  await page.waitForTimeout(300);
  return run();
}

/** The bare canvas gets a pane of the size that the sheet's has. */
async function fitPane(page: Page, other: Page): Promise<void> {
  const box = await page.locator(".react-flow__pane").boundingBox();
  if (!box) throw new Error("The sheet has no pane");
  await other.addStyleTag({ content: `#root { width: ${box.width}px; height: ${box.height}px !important; }` });
}

function compareFrames(name: string, ours: Frames, bare: Frames): BenchResult[] {
  return [
    compare(`${name}: median frame of pan and zoom, to bare xyflow`, "ms", ours.median, bare.median, SLOWER_AT_MOST),
    compare(`${name}: p95 frame of pan and zoom, to bare xyflow`, "ms", ours.p95, bare.p95, SLOWER_AT_MOST),
    record(`${name}: longest frame`, "ms", ours.longest),
    record(`bare xyflow, ${CARDS} default nodes: longest frame`, "ms", bare.longest),
  ];
}

/** A model of that many types, all on its first sheet in a grid; the page then shows it as a whole. */
async function openCards(world: BenchWorld, cards: number, name: string): Promise<void> {
  const { page } = world;
  const { xml, keys } = makeCardModel(cards, name);
  const modelId = await world.importModel(name, xml);
  const [sheet] = (await (await page.request.get(`/models/${modelId}/sheets`)).json()) as { id: string }[];
  const place = (index: number) => ({
    x: (index % GRID.columns) * GRID.stepX,
    y: Math.floor(index / GRID.columns) * GRID.stepY,
  });
  const layout = {
    positions: Object.fromEntries(keys.map((key, index) => [key, place(index)])),
    added: keys,
    hidden: ["i=58"],
  };
  const saved = await page.request.put(`/models/${modelId}/sheets/${sheet?.id ?? ""}`, {
    data: layout,
    headers: { origin: new URL(page.url()).origin },
  });
  if (!saved.ok()) throw new Error(`The sheet was not saved: ${await saved.text()}`);
  await page.goto(`/models/${modelId}/sheet`);
  await page.locator(".react-flow__node").first().waitFor();
  await page.getByText(/^\d+ (error|warning|hint)|no findings/i).first().waitFor({ timeout: 5_000 }).catch(() => undefined);
  await page.waitForTimeout(1500);
}

/** Names of cards are typed into the field of the stencil while elkjs arranges the sheet. */
export async function measureLayout(world: BenchWorld): Promise<BenchResult[]> {
  const { page } = world;
  await openCards(world, ARRANGED, "Arranged");
  await watchKeys(page);
  const startedAt = Date.now();
  await page.getByRole("button", { name: "Arrange the cards" }).click();
  await page.getByRole("combobox", { name: /say what it carries/i }).focus();
  const isArranging = () => page.getByRole("button", { name: "Arranging …" }).isVisible();
  const times: number[] = [];
  let typed = "";
  do {
    const letter = "abcdefgh"[times.length % 8] ?? "a";
    typed += letter;
    times.push(await timeKey(page, letter, typed));
  } while ((await isArranging()) || times.length < 10);
  const took = Date.now() - startedAt;
  return [
    limit(`typing while ${ARRANGED} cards are arranged: p95 key press to paint`, "ms", percentile(times, 0.95), TYPED_MS),
    record(`typing while ${ARRANGED} cards are arranged: longest, of ${typed.length} keys`, "ms", Math.max(...times)),
    record(`layout of ${ARRANGED} cards`, "ms", took),
  ];
}
