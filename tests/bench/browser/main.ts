/** `npm run bench:browser [-- --json] [names …]`: figures of the screens in headless Chromium, all of one run. */
import { formatResult, type BenchResult } from "../result";
import { openWorld, type BenchWorld } from "./bench-world";
import { measureCanvas, measureLayout } from "./measure-canvas";
import { measureKeys, measureRegister } from "./measure-editing";
import { measureFirstLoad } from "./measure-first-load";

const measures: Readonly<Record<string, (world: BenchWorld) => Promise<BenchResult[]>>> = {
  "first-load": measureFirstLoad,
  canvas: measureCanvas,
  layout: measureLayout,
  keys: measureKeys,
  register: measureRegister,
};

const asJson = process.argv.includes("--json");
const wanted = process.argv.slice(2).filter((argument) => !argument.startsWith("--"));
const unknown = wanted.filter((name) => !(name in measures));
if (unknown.length > 0) throw new RangeError(`Unknown: ${unknown.join(", ")}. Known are ${Object.keys(measures).join(", ")}.`);

const world = await openWorld();
try {
  const results: BenchResult[] = [];
  for (const [name, measure] of Object.entries(measures)) {
    if (wanted.length > 0 && !wanted.includes(name)) continue;
    const found = await measure(world);
    results.push(...found);
    if (!asJson) for (const result of found) console.log(formatResult(result));
  }
  if (asJson) console.log(JSON.stringify({ results }));
} finally {
  await world.stop();
}
