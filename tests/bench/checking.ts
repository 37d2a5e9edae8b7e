/**
 * The checker on a model of 10 000 own nodes on DI and Machinery, against reading that model from NodeSet2 in the same
 * process: the full check, cold and warm, and ten edits, each checked again after it and after its undo. Fresh processes,
 * in turns, medians of their figures.
 */
import { AddressSpace, buildLayer, type Layer } from "~/domain/address-space/address-space";
import type { NodeSetContent } from "~/domain/nodeset/nodeset-content";
import { getValue } from "~/domain/core/result";
import { runChecks, startChecks, updateChecks, type CheckRun } from "~/domain/checks/run-checks";
import { applyWithInverse } from "~/domain/editing/invert-operation";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { writeNodeSet } from "~/domain/nodeset/write-nodeset";
import { makeLargeModel } from "../support/large-model";
import { getPublishedLayer, getStandardLayer } from "../support/published-layers";
import { listEdits } from "./checked-edits";
import { answerParent, runChild } from "./child";
import { compare, median, type BenchResult } from "./result";

const SIZE = 10_000;
const ROUNDS = 3;
const WARM_ROUNDS = 5;
const EDIT_ROUNDS = 5;

type Timing = { readonly cold: number; readonly warm: number };
type Measured = {
  readonly read: Timing;
  readonly check: Timing;
  /** The first edit after loading, which finds nothing prepared. */
  readonly firstEdit: number;
  readonly edits: readonly { readonly name: string; readonly time: number }[];
};

export async function measureChecking(): Promise<BenchResult[]> {
  const rounds: Measured[] = [];
  for (let round = 0; round < ROUNDS; round++) rounds.push(await runChild<Measured>("check", []));
  const of = (pick: (one: Measured) => number): number => median(rounds.map(pick));
  const [readCold, readWarm] = [of((r) => r.read.cold), of((r) => r.read.warm)];
  const edits = (rounds[0]?.edits ?? []).map(({ name }, i) => ({ name, time: of((r) => r.edits[i]?.time ?? 0) }));
  const worst = edits.reduce((a, b) => (b.time > a.time ? b : a));
  return [
    compare(
      "full check of 10 000 own nodes, beside reading them, warm",
      "ms",
      of((r) => r.check.warm),
      readWarm,
      2,
    ),
    compare(
      "full check of 10 000 own nodes, beside reading them, cold",
      "ms",
      of((r) => r.check.cold),
      readCold,
      2,
    ),
    compare(`check after one edit, worst of ten (${worst.name})`, "ms", worst.time, readWarm, 1 / 20),
    compare(
      "check after the first edit since loading, cold",
      "ms",
      of((r) => r.firstEdit),
      readCold,
      1 / 20,
    ),
    ...edits.map(({ name, time }) => compare(`check after: ${name}`, "ms", time, readWarm, 1 / 20)),
  ];
}

export async function checkInChild(): Promise<void> {
  const required = [
    getStandardLayer(),
    getPublishedLayer("Opc.Ua.Di.NodeSet2.xml"),
    getPublishedLayer("Opc.Ua.Machinery.NodeSet2.xml"),
  ];
  const { xml } = writeNodeSet(makeLargeModel(SIZE));
  const load = (): AddressSpace => AddressSpace.of(required, read(xml));
  const [space, readCold] = clock(load);
  const [, checkCold] = clock(() => runChecks(space));
  const warm = Array.from({ length: WARM_ROUNDS }, () => {
    const [fresh, reading] = clock(load);
    return { reading, checking: clock(() => runChecks(fresh))[1] };
  });
  const reading: Timing = { cold: readCold, warm: median(warm.map((w) => w.reading)) };
  const check: Timing = { cold: checkCold, warm: median(warm.map((w) => w.checking)) };
  const edited = measureEdits(space);
  await answerParent({ read: reading, check, ...edited });
}

function measureEdits(space: AddressSpace): Pick<Measured, "firstEdit" | "edits"> {
  let run = startChecks(space);
  let firstEdit: number | undefined;
  const edits = listEdits(space).map(({ name, operations }) => {
    const times: number[] = [];
    for (let round = 0; round < EDIT_ROUNDS; round++) {
      const { space: after, inverse } = getValue(applyWithInverse(run.space, operations));
      const { space: undone } = getValue(applyWithInverse(after, inverse));
      for (const next of [after, undone]) {
        const [moved, time] = clock((): CheckRun => updateChecks(run, next));
        run = moved;
        firstEdit ??= time;
        times.push(time);
      }
    }
    return { name, time: median(times) };
  });
  return { firstEdit: firstEdit ?? 0, edits };
}

/** The model as a layer with its indexes, as far as reading makes them. */
function read(xml: string): Layer {
  const { header, nodes }: NodeSetContent = getValue(readNodeSet(xml));
  const layer = buildLayer(header, nodes);
  if (layer.outgoing.size + layer.incoming.size + layer.keysByNodeId.size < SIZE) throw new Error("Not indexed");
  return layer;
}

function clock<T>(work: () => T): [result: T, time: number] {
  const since = performance.now();
  const result = work();
  return [result, performance.now() - since];
}
