/**
 * Comparing two revisions with 500 changes beside reading one of them from NodeSet2, and how the time grows with the model.
 * All in one process, in turns; both sides start from what they have in use: the texts, and the two address spaces.
 */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { AddressSpace as Space, buildLayer } from "~/domain/address-space/address-space";
import { compareModels } from "~/domain/compare/compare-models";
import { getValue } from "~/domain/core/result";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { writeNodeSet } from "~/domain/nodeset/write-nodeset";
import { makeLargeSpace } from "../support/large-model";
import { plantChanges } from "../support/planted-changes";
import { compare, median, record, type BenchResult } from "./result";

const SIZES = [1_000, 10_000, 50_000] as const;
const CHANGES = 500;
const ROUNDS = 5;
/** Asked for at 10 000 nodes. */
const TARGET_SIZE = 10_000;
const SEED = 7;

export function measureCompare(): Promise<BenchResult[]> {
  const figures = SIZES.map(measure);
  const [, middle, large] = figures;
  if (!middle || !large) throw new RangeError("No sizes");
  const growth = large.size / middle.size;
  return Promise.resolve([
    ...figures.map(({ size, compared, read }) =>
      size === TARGET_SIZE
        ? compare(`compare ${size} nodes, ${CHANGES} changes, beside reading one revision`, "ms", compared, read, 2)
        : record(`compare ${size} nodes, ${CHANGES} changes`, "ms", compared),
    ),
    // Linear growth would give five times the time for five times the nodes; a tenth is left for the clock.
    compare(`compare ${large.size} nodes beside ${growth} × ${middle.size}`, "ms", large.compared, growth * middle.compared, 1.1),
  ]);
}

type Figure = { readonly size: number; readonly compared: number; readonly read: number };

function measure(size: number): Figure {
  const before = makeLargeSpace(size);
  const { space: planted } = plantChanges(before, CHANGES, SEED);
  // A revision comes from a pack: its layer is built in one go, not edited step by step.
  const after = rebuild(planted);
  const text = writeNodeSet({ header: before.own.header, nodes: before.listOwnNodes() }).xml;
  const compared: number[] = [];
  const read: number[] = [];
  for (let round = 0; round < ROUNDS; round++) {
    const [left, right] = [rebuild(before), rebuild(after)];
    compared.push(clock(() => compareModels(left, right)));
    read.push(clock(() => readToSpace(text, before)));
  }
  return { size, compared: median(compared), read: median(read) };
}

function rebuild(space: AddressSpace): AddressSpace {
  return Space.of(space.layers.slice(0, -1), buildLayer(space.own.header, space.listOwnNodes()));
}

function readToSpace(text: string, like: AddressSpace): AddressSpace {
  const { header, nodes } = getValue(readNodeSet(text));
  return Space.of(like.layers.slice(0, -1), buildLayer(header, nodes));
}

function clock(work: () => unknown): number {
  const since = performance.now();
  work();
  return performance.now() - since;
}
