/**
 * Reading ns0, DI, IA, Machinery and IO-Link as XML into a resolved graph, against node-opcua's own loader of the same
 * files. Each in fresh processes, in turns; what is loaded before the clock starts is the code, on both sides.
 */
import { readFileSync } from "node:fs";
import type { AddressSpace as ReferenceSpace } from "node-opcua";
import { AddressSpace, buildLayer, type Layer } from "~/domain/address-space/address-space";
import { listChildren } from "~/domain/address-space/browse";
import { StandardObject } from "~/domain/address-space/standard-ids";
import { getValue } from "~/domain/core/result";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { answerParent, readHeap, runChild } from "./child";
import { listBenchFiles } from "./published-files";
import { compare, median, type BenchResult } from "./result";

type Reading = { cold: number; warm: number; heap: number };

const ROUNDS = 5;
const WARM_ROUNDS = 3;

export async function measureReading(): Promise<BenchResult[]> {
  const files = listBenchFiles();
  const own: Reading[] = [];
  const reference: Reading[] = [];
  for (let round = 0; round < ROUNDS; round++) {
    own.push(await runChild<Reading>("read", files));
    reference.push(await runChild<Reading>("read-reference", files));
  }
  const of = (list: Reading[], pick: keyof Reading): number => median(list.map((reading) => reading[pick]));
  return [
    compare("read five published files, cold", "ms", of(own, "cold"), of(reference, "cold"), 0.25),
    compare("read five published files, warm", "ms", of(own, "warm"), of(reference, "warm"), 0.4),
    compare("heap held after reading", "MB", of(own, "heap"), of(reference, "heap"), 1),
  ];
}

export async function readInChild(files: readonly string[]): Promise<void> {
  await answerParent(await time(() => Promise.resolve(readAll(files))));
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

function readAll(files: readonly string[]): AddressSpace {
  const layers: Layer[] = [];
  for (const file of files) {
    const { header, nodes } = getValue(readNodeSet(readFileSync(file, "utf8")));
    layers.push(buildLayer(header, nodes));
  }
  const own = layers.pop();
  if (!own) throw new RangeError("No files");
  const space = AddressSpace.of(layers, own);
  // Asks once, so that an index that is made on demand is made inside the measured time.
  if (listChildren(space, StandardObject.ObjectsFolder).length === 0) throw new Error("The graph is not resolved");
  return space;
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
