/** `npm run bench [-- --json]`: figures with their references, all of one run. */
import { measureAsBuilt } from "./as-built";
import { checkInChild, measureChecking } from "./checking";
import { measureCompare } from "./compare";
import { measureEditing } from "./editing";
import { measureImport, serveImportsInChild } from "./import";
import { measureFeeding, runRestMaster } from "./feeding";
import { measureIodd } from "./iodd";
import { measureLibrary, readLibraryInChild } from "./library";
import { measureMapping } from "./mapping";
import { measureReading, readAndParseInChild, readInChild, readPacksInChild, readReferenceInChild } from "./reading";
import { formatResult, type BenchResult } from "./result";
import { measureTestServerStart, runBareServer } from "./test-server-start";

const measures: readonly (() => Promise<BenchResult[]>)[] = [
  measureReading,
  measureLibrary,
  measureImport,
  measureEditing,
  measureCompare,
  measureChecking,
  measureMapping,
  measureIodd,
  measureFeeding,
  measureTestServerStart,
  measureAsBuilt,
];

async function runAll(asJson: boolean): Promise<void> {
  const results: BenchResult[] = [];
  for (const measure of measures) {
    const found = await measure();
    results.push(...found);
    if (!asJson) for (const result of found) console.log(formatResult(result));
  }
  if (asJson) console.log(JSON.stringify({ results }));
}

async function runAsChild(name: string, args: readonly string[]): Promise<void> {
  if (name === "read") return readInChild(args);
  if (name === "read-reference") return readReferenceInChild(args);
  if (name === "read-packs") return readPacksInChild(args);
  if (name === "read-and-parse") return readAndParseInChild(args);
  if (name === "check") return checkInChild();
  if (name === "read-library") return readLibraryInChild();
  if (name === "rest-master") return runRestMaster();
  if (name === "import-server") return serveImportsInChild(args);
  const [pkiFolder, ...files] = args;
  if (name === "bare-server" && pkiFolder) return runBareServer(pkiFolder, files);
  throw new RangeError(`Unknown child ${name}`);
}

const [first, name, ...rest] = process.argv.slice(2);
if (first === "--child" && name) await runAsChild(name, rest);
else await runAll(process.argv.includes("--json"));
