/**
 * Reading ns0, DI, IA, Machinery and IO-Link into a resolved graph, as XML and from packs, against node-opcua's own loader
 * of the same XML: each in fresh processes, in turns. What is loaded before the clock starts is the code, on both sides.
 * A second reference is libxml2, which only parses, in the same process.
 */
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { gunzipSync, gzipSync } from "node:zlib";
import type { AddressSpace as ReferenceSpace } from "node-opcua";
import { AddressSpace, buildLayer, type Layer } from "~/domain/address-space/address-space";
import { StandardObject } from "~/domain/address-space/standard-ids";
import { getValue } from "~/domain/core/result";
import { decodeXmlBytes } from "~/domain/nodeset/decode-xml-bytes";
import { readPack, writePack } from "~/domain/nodeset/pack";
import type { NodeSetContent } from "~/domain/nodeset/nodeset-content";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { writeNodeSet } from "~/domain/nodeset/write-nodeset";
import { answerParent, readHeap, runChild } from "./child";
import { copyBenchFiles } from "./published-files";
import { compare, median, type BenchResult } from "./result";

type Reading = { cold: number; warm: number; heap: number };
type Parsing = {
  read: number;
  parsed: number;
  readWarm: number;
  parsedWarm: number;
  written: number;
  readBase: number;
};

const ROUNDS = 5;
const WARM_ROUNDS = 5;

export async function measureReading(): Promise<BenchResult[]> {
  const scratch = mkdtempSync(join(tmpdir(), "ferrule-bench-"));
  try {
    const files = copyBenchFiles(scratch);
    const packs = files.map(makePack);
    const own: Reading[] = [];
    const packed: Reading[] = [];
    const reference: Reading[] = [];
    const parsing: Parsing[] = [];
    for (let round = 0; round < ROUNDS; round++) {
      own.push(await runChild<Reading>("read", files));
      reference.push(await runChild<Reading>("read-reference", files));
      packed.push(await runChild<Reading>("read-packs", packs));
      parsing.push(await runChild<Parsing>("read-and-parse", files));
    }
    return toResults(own, packed, reference, parsing);
  } finally {
    rmSync(scratch, { recursive: true, force: true });
  }
}

function toResults(own: Reading[], packed: Reading[], reference: Reading[], parsing: Parsing[]): BenchResult[] {
  const of = (list: Reading[], pick: keyof Reading): number => median(list.map((reading) => reading[pick]));
  const ofParsing = (pick: keyof Parsing): number => median(parsing.map((one) => one[pick]));
  return [
    compare("read five published files, cold", "ms", of(own, "cold"), of(reference, "cold"), 0.25),
    compare("read five published files, warm", "ms", of(own, "warm"), of(reference, "warm"), 0.4),
    compare("heap held after reading", "MB", of(own, "heap"), of(reference, "heap"), 1),
    compare("read the same from packs, cold", "ms", of(packed, "cold"), of(reference, "cold"), 0.1),
    compare("read the same beside libxml2's parsing, cold", "ms", ofParsing("read"), ofParsing("parsed"), 2.5),
    compare("read the same beside libxml2's parsing, warm", "ms", ofParsing("readWarm"), ofParsing("parsedWarm"), 2.5),
    compare("write ns0 beside reading it", "ms", ofParsing("written"), ofParsing("readBase"), 1),
  ];
}

function makePack(file: string): string {
  const path = `${file}.json.gz`;
  writeFileSync(path, gzipSync(writePack(readFile(file))));
  return path;
}

export async function readInChild(files: readonly string[]): Promise<void> {
  await answerParent(await time(() => Promise.resolve(readAll(files))));
}

export async function readPacksInChild(packs: readonly string[]): Promise<void> {
  const read = (): AddressSpace => {
    return resolve(packs.map((path) => getValue(readPack(gunzipSync(readFileSync(path)).toString("utf8")))));
  };
  await answerParent(await time(() => Promise.resolve(read())));
}

export async function readReferenceInChild(files: readonly string[]): Promise<void> {
  const { AddressSpace: Space, generateAddressSpace } = await import("node-opcua");
  const read = async (): Promise<ReferenceSpace> => {
    const space = Space.create();
    await generateAddressSpace(space, [...files]);
    return space;
  };
  await answerParent(await time(read));
}

/** In one process: our reading, libxml2's parsing, and writing ns0. */
export async function readAndParseInChild(files: readonly string[]): Promise<void> {
  const { XmlDocument } = await import("libxml2-wasm");
  const parseAll = (): void => {
    for (const file of files) XmlDocument.fromBuffer(readFileSync(file)).dispose();
  };
  const [base = ""] = files;
  const read = clock(() => readAll(files));
  const parsed = clock(parseAll);
  const content = readFile(base);
  const answer: Parsing = {
    read,
    parsed,
    readWarm: repeat(() => readAll(files)),
    parsedWarm: repeat(parseAll),
    written: repeat(() => writeNodeSet(content)),
    readBase: repeat(() => readFile(base)),
  };
  await answerParent(answer);
}

function readFile(file: string): NodeSetContent {
  return getValue(readNodeSet(getValue(decodeXmlBytes(readFileSync(file)))));
}

function readAll(files: readonly string[]): AddressSpace {
  return resolve(files.map(readFile));
}

/** The graph, asked once at both ends, so that what is made on demand is made inside the measured time. */
function resolve(contents: readonly Pick<NodeSetContent, "header" | "nodes">[]): AddressSpace {
  const layers: Layer[] = contents.map(({ header, nodes }) => buildLayer(header, nodes));
  const own = layers.pop();
  if (!own) throw new RangeError("No files");
  const space = AddressSpace.of(layers, own);
  const { ObjectsFolder, TypesFolder } = StandardObject;
  const found = space.edgesFrom(ObjectsFolder).length + space.edgesTo(TypesFolder).length;
  if (found === 0) throw new Error("The graph is not resolved");
  return space;
}

function clock(work: () => unknown): number {
  const since = performance.now();
  work();
  return performance.now() - since;
}

function repeat(work: () => unknown): number {
  work();
  return median(Array.from({ length: WARM_ROUNDS }, () => clock(work)));
}

async function time(read: () => Promise<unknown>): Promise<Reading> {
  const before = readHeap();
  let since = performance.now();
  const held = await read();
  const cold = performance.now() - since;
  const heap = readHeap() - before;
  const warm: number[] = [];
  for (let round = 0; round < WARM_ROUNDS; round++) {
    since = performance.now();
    await read();
    warm.push(performance.now() - since);
  }
  if (!held) throw new Error("Nothing was read");
  return { cold, warm: median(warm), heap };
}
