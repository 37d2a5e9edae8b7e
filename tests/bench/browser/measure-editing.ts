/** Key press to painted change on the sheet and in the register; scrolling and opening large models. */
import { limit, record, type BenchResult } from "../result";
import { makeMachineModel, makeRowModel } from "./bench-models";
import type { BenchWorld } from "./bench-world";
import { timeKey, watchKeys } from "./key-to-paint";
import { percentile, scrollThrough, summarise } from "./measure-frames";

const EDITED_NODES = 10_000;
const ROWS = 50_000;
const LIMIT_MS = 100;
const EDITS = 24;

export async function measureKeys(world: BenchWorld): Promise<BenchResult[]> {
  const { page } = world;
  const modelId = await world.importModel("Edited", makeMachineModel(EDITED_NODES));
  await page.goto(`/models/${modelId}/sheet`);
  await page.getByRole("group", { name: "ObjectType Machine0Type" }).waitFor();
  await page.waitForTimeout(3_000);
  await watchKeys(page);
  const onSheet = await timeRenames(world, "Sheet");
  await page.goto(`/models/${modelId}/register`);
  await page.getByRole("treegrid", { name: "Members" }).getByRole("row").nth(3).waitFor();
  await page.waitForTimeout(3_000);
  await watchKeys(page);
  const inRegister = await timeDescriptions(world);
  const name = `key press to painted change, ${EDITED_NODES} nodes`;
  return [
    limit(`${name}, sheet: p95`, "ms", percentile(onSheet, 0.95), LIMIT_MS),
    record(`${name}, sheet: median`, "ms", percentile(onSheet, 0.5)),
    limit(`${name}, register: p95`, "ms", percentile(inRegister, 0.95), LIMIT_MS),
    record(`${name}, register: median`, "ms", percentile(inRegister, 0.5)),
  ];
}

/** The selected type is renamed by F2, a name and Enter; Enter is measured. */
async function timeRenames({ page }: BenchWorld, what: string): Promise<number[]> {
  const times: number[] = [];
  await page.getByRole("application", { name: "Drawing" }).focus();
  for (let at = 0; at < EDITS; at++) {
    await page.keyboard.press("F2");
    const field = page.getByRole("textbox", { name: /^New name of/ });
    await field.fill(`${what}${at}Type`);
    times.push(await timeKey(page, "Enter", `${what}${at}Type`));
    await page.waitForTimeout(120);
  }
  return times;
}

/** Descriptions are typed down the column; Enter keeps one and goes to the next. */
async function timeDescriptions({ page }: BenchWorld): Promise<number[]> {
  const times: number[] = [];
  const row = page.getByRole("treegrid", { name: "Members" }).getByRole("row").nth(3);
  await row.getByRole("gridcell").nth(0).click();
  const titles = await page.getByRole("columnheader").allInnerTexts();
  for (let at = 0; at < titles.findIndex((title) => /^Description/.test(title)); at++) await page.keyboard.press("ArrowRight");
  for (let at = 0; at < EDITS; at++) {
    await page.keyboard.type(`note ${at} end`);
    times.push(await timeKey(page, "Enter", `note ${at} end`));
    await page.waitForTimeout(120);
  }
  return times;
}

export async function measureRegister(world: BenchWorld): Promise<BenchResult[]> {
  const { page } = world;
  const modelId = await world.importModel("Rows", makeRowModel(ROWS, "Rows"));
  const startedAt = Date.now();
  await page.goto(`/models/${modelId}/register`, { waitUntil: "commit" });
  await page.getByRole("heading", { name: /^Register of Rows/ }).waitFor({ state: "attached" });
  const firstScreen = Date.now() - startedAt;
  await page.getByRole("treegrid", { name: "Members" }).getByRole("row").nth(5).waitFor();
  const usable = Date.now() - startedAt;
  await page.waitForTimeout(8_000);
  const shown = Number(await page.getByRole("treegrid", { name: "Members" }).getAttribute("aria-rowcount"));
  const frames = summarise(await scrollThrough(page, "[role=treegrid]"));
  return [
    record(`opening a model of ${ROWS} nodes: first screen`, "ms", firstScreen),
    record(`opening a model of ${ROWS} nodes: until the register can be used`, "ms", usable),
    limit(`scrolling the register of ${shown} rows: longest frame`, "ms", frames.longest, LIMIT_MS),
    record(`scrolling the register of ${shown} rows: p95 frame`, "ms", frames.p95),
  ];
}
