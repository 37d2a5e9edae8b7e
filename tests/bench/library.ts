/** Figures of the library: memory over all NodeSets, and what a long read leaves of the thread that answers requests. */
import { readFileSync } from "node:fs";
import { join } from "node:path";
import { getValue } from "~/domain/core/result";
import { Library } from "~/library/library.server";
import { getPackageFolder } from "~/library/published.server";
import { readFileBytes, readHere } from "~/library/read-file.server";
import { answerParent, readHeap, runChild } from "./child";
import { record, type BenchResult } from "./result";

type AllRead = { milliseconds: number; growth: number };

export async function measureLibrary(): Promise<BenchResult[]> {
  const all = await runChild<AllRead>("read-library", []);
  const lag = await measureLag();
  return [
    record("read all NodeSets of the package, one after the other", "ms", all.milliseconds),
    record("heap that each leaves behind after its release", "MB", all.growth),
    record("longest wait of another request while a 4 MB file is read", "ms", lag),
  ];
}

/** Loads each NodeSet of the package with what it requires, twice; what the second round leaves is a leak. */
export async function readLibraryInChild(): Promise<void> {
  const since = performance.now();
  await loadEach();
  const milliseconds = performance.now() - since;
  const before = readHeap();
  const count = await loadEach();
  await answerParent({ milliseconds, growth: (readHeap() - before) / count });
}

async function loadEach(): Promise<number> {
  const library = new Library();
  for (const entry of library.list()) {
    getValue(await library.resolve(entry.requiredModels, { requiredBy: entry.modelUri }));
    getValue(await library.load(entry));
  }
  return library.list().length;
}

/** A timer of 1 ms stands for other requests: how late it comes is how long they wait. */
async function measureLag(): Promise<number> {
  const bytes = readFileSync(join(getPackageFolder(), "Opc.Ua.NodeSet2.xml"));
  readHere(bytes);
  let longest = 0;
  let last = performance.now();
  const timer = setInterval(() => {
    const now = performance.now();
    longest = Math.max(longest, now - last);
    last = now;
  }, 1);
  getValue(await readFileBytes(bytes));
  clearInterval(timer);
  return longest;
}
