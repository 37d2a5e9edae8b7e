/** What the browser must fetch before a model can be looked at, with an empty cache. */
import { gzipSync } from "node:zlib";
import { limit, type BenchResult } from "../result";
import type { BenchWorld } from "./bench-world";

const LIMIT_KB = 350;
/** Loaded when wanted, and not counted. */
const LATER = /source-text|monaco|editor\.worker|elk/;

export async function measureFirstLoad(world: BenchWorld): Promise<BenchResult[]> {
  const models = (await (await world.page.request.get("/api/v1/models")).json()) as { id: string; name: string }[];
  const braider = models.find((model) => model.name === "Rope braider");
  if (!braider) throw new Error("The demo has no rope braider");
  const results: BenchResult[] = [];
  for (const place of ["sheet", "register"]) results.push(...(await measurePage(world, braider.id, place)));
  return results;
}

async function measurePage(world: BenchWorld, modelId: string, place: string): Promise<BenchResult[]> {
  const context = await world.browser.newContext({
    baseURL: new URL(world.page.url()).origin,
    viewport: { width: 1440, height: 900 },
    storageState: await world.page.context().storageState(),
  });
  const page = await context.newPage();
  const scripts = new Map<string, Promise<number>>();
  page.on("response", (response) => {
    const { pathname } = new URL(response.url());
    if (!pathname.endsWith(".js") || LATER.test(pathname)) return;
    const size = response.body().then((bytes) => gzipSync(bytes, { level: 9 }).length);
    // One that is still on its way when the page is closed belongs to no first load.
    scripts.set(pathname, size.catch(() => 0));
  });
  await page.goto(`/models/${modelId}/${place}`);
  await (place === "sheet" ? page.getByRole("application", { name: "Drawing" }) : page.getByRole("treegrid")).waitFor();
  // What is fetched to be able to work counts; what the checker and the units fetch afterwards is told beside it.
  const first = await sum(scripts);
  await page.waitForTimeout(4_000);
  const all = await sum(scripts);
  const { paint, pack } = await page.evaluate(() => ({
    paint: performance.getEntriesByName("first-contentful-paint")[0]?.startTime ?? Number.POSITIVE_INFINITY,
    pack: Math.min(
      ...performance
        .getEntriesByType("resource")
        .filter((entry) => new URL(entry.name).pathname.startsWith("/packs/"))
        .map((entry) => entry.startTime),
    ),
  }));
  await context.close();
  return [
    limit(`first load of the ${place}: JavaScript, gzip`, "kB", first / 1000, LIMIT_KB),
    limit(`first load of the ${place}: with what comes later by itself`, "kB", all / 1000, LIMIT_KB),
    limit(`first load of the ${place}: first paint to first required pack (negative: after it)`, "ms", paint - pack, 0),
  ];
}

async function sum(scripts: ReadonlyMap<string, Promise<number>>): Promise<number> {
  return (await Promise.all(scripts.values())).reduce((total, size) => total + size, 0);
}
