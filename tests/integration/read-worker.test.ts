/** The worker that reads long files away from the thread that answers requests. */
import { execFileSync } from "node:child_process";
import { readFileSync } from "node:fs";
import { join } from "node:path";
import { beforeAll, describe, expect, it } from "vitest";
import { getValue } from "~/domain/core/result";
import { getPackageFolder } from "~/library/published.server";
import { readHere, readInWorker } from "~/library/read-file.server";
import { projectRoot } from "../support/source-files";

const worker = join(projectRoot, "build", "node", "read-worker.js");
const bytes = readFileSync(join(getPackageFolder(), "Opc.Ua.NodeSet2.xml"));

beforeAll(() => {
  // Builds what runs beside the web application when it is stale.
  execFileSync(process.execPath, ["app/cli/launch.mjs", "ferrule", "help"], { cwd: projectRoot, stdio: "ignore" });
});

describe("the reading worker", () => {
  it("reads what is read without it, and says how far it is", async () => {
    const steps: number[] = [];
    const result = await readInWorker(worker, bytes, {
      fileName: "base.xml",
      onProgress: (done, total) => steps.push(done / total),
    });
    const here = getValue(readHere(bytes, { fileName: "base.xml" }));
    const there = getValue(result);
    expect(there.header).toEqual(here.header);
    expect(there.nodes).toEqual(here.nodes);
    expect(there.lines).toEqual(here.lines);
    expect(steps).toEqual([...steps].sort((a, b) => a - b));
  });

  it("leaves the thread free meanwhile", async () => {
    let ticks = 0;
    const timer = setInterval(() => ticks++, 5);
    await readInWorker(worker, bytes);
    clearInterval(timer);
    // Reading here would let no timer through at all.
    expect(ticks).toBeGreaterThan(5);
  });

  it("is cancelled at once", async () => {
    const controller = new AbortController();
    const reading = readInWorker(worker, bytes, { signal: controller.signal });
    controller.abort();
    expect((await reading).problems.map(({ code }) => code)).toEqual(["read.cancelled"]);
  });

  it("brings the problems of a broken file with their places", async () => {
    const result = await readInWorker(worker, bytes.subarray(0, 1_000_000), { fileName: "cut.xml" });
    expect(result.ok).toBe(false);
    expect(result.problems[0]).toMatchObject({ code: "xml.truncated", at: { file: "cut.xml" } });
  });

  it("tells when it could not run", async () => {
    const result = await readInWorker(join(projectRoot, "build", "node", "no-such-worker.js"), bytes);
    expect(result.problems.map(({ code }) => code)).toEqual(["read.worker-ended"]);
  });
});
