/**
 * Seeded faults: 300 faults of known kinds in valid models, each found by the right rule at the right node. One run has a
 * fixed seed, one a fresh one, which it prints. Each fault is also taken back, and the findings are those of before.
 */
import { readFileSync } from "node:fs";
import { expect, test } from "vitest";
import { AddressSpace, buildLayer, type Layer } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import type { Finding } from "~/domain/checks/finding";
import { mendAll } from "~/domain/checks/mend";
import { RULES } from "~/domain/checks/registry";
import type { Rule } from "~/domain/checks/rule";
import { ExampleModel } from "~/domain/checks/example-model";
import { runChecks, startChecks, updateChecks, type CheckRun } from "~/domain/checks/run-checks";
import { getValue } from "~/domain/core/result";
import { CountingAllocator } from "~/domain/editing/allocate-node-id";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { makeLargeSpace } from "../support/large-model";
import { getPublishedLayer, getStandardLayer } from "../support/published-layers";
import { makeRandom } from "../support/random";
import { FAULTS, plantFault } from "../support/seeded-faults";

const PLANTED = 300;

function readDemo(file: string): Layer {
  const { header, nodes } = getValue(
    readNodeSet(readFileSync(new URL(`../../nodesets/demo/${file}`, import.meta.url), "utf8")),
  );
  return buildLayer(header, nodes);
}

function loadModels(): AddressSpace[] {
  const published = ["Di", "IA", "Machinery"].map((name) => getPublishedLayer(`Opc.Ua.${name}.NodeSet2.xml`));
  const braider = readDemo("merrow-rope-braider.NodeSet2.xml");
  const hall = readDemo("merrow-hall.NodeSet2.xml");
  const base = [getStandardLayer(), ...published];
  const structures = AddressSpace.of(base, getPublishedLayer("Opc.Ua.AutoID.NodeSet2.xml"));
  return [structures, AddressSpace.of(base, braider), AddressSpace.of([...base, braider], hall), makeLargeSpace(500)];
}

type Tally = { planted: number; found: number };

function plantAll(seed: number): Map<string, Tally> {
  const random = makeRandom(String(seed));
  const runs: CheckRun[] = loadModels().map((space) => startChecks(space));
  const tallies = new Map<string, Tally>();
  let planted = 0;
  for (let i = 0; planted < PLANTED && i < PLANTED * 5; i++) {
    const fault = FAULTS[i % FAULTS.length];
    const first = random.below(runs.length);
    // A model without a place for the fault passes it on to the next one.
    const places = runs.map((_, step) => (first + step) % runs.length);
    const [at, seeded] = places.flatMap((index) => {
      const space = runs[index]?.space;
      const made = fault && space && plantFault(space, fault, random);
      return made ? [[index, made] as const] : [];
    })[0] ?? [0, undefined];
    const run = runs[at];
    if (!run || !seeded) continue;
    planted++;
    const known = new Set(run.findings);
    const faulty = updateChecks(run, seeded.space);
    const isFound = faulty.findings.some((f) => f.rule === seeded.rule && f.key === seeded.key && !known.has(f));
    const tally = tallies.get(seeded.rule) ?? { planted: 0, found: 0 };
    tallies.set(seeded.rule, { planted: tally.planted + 1, found: tally.found + Number(isFound) });
    if (!isFound) console.log(`seed ${seed}: not found: ${seeded.rule} at ${seeded.key ?? "the model"}`);
    const found = faulty.findings.find((f) => f.rule === seeded.rule && f.key === seeded.key && !known.has(f));
    const next = found ? tryMend(faulty, found) : faulty;
    const mended = updateChecks(next, run.space);
    expect(mended.findings).toEqual(run.findings);
    runs[at] = mended;
  }
  return tallies;
}

let mends = 0;

/** Where the rule can mend the fault, mending takes the finding away and raises no error that was not there. */
function tryMend(run: CheckRun, finding: Finding): CheckRun {
  // No file that is read and no operation makes two nodes of one NodeId, and the address space finds one of them only.
  if (finding.rule === "R002") return run;
  const { operations, space, mended } = mendAll(run.space, [finding], new CountingAllocator(run.space));
  if (operations.length === 0 || mended.length === 0) return run;
  mends++;
  const after = updateChecks(run, space);
  expect(after.findings.filter((f) => f.message === finding.message && f.key === finding.key)).toEqual([]);
  // A renamed member changes what is said of others that name it, which is no further error.
  const identify = (f: Finding): string => `${f.rule} ${f.key ?? ""}`;
  const before = new Set(run.findings.map(identify));
  expect(
    after.findings
      .filter((f) => f.severity === "error" && !before.has(identify(f)))
      .map((f) => `${finding.rule} mended: ${f.rule} ${f.message}`),
  ).toEqual([]);
  return after;
}

function print(seed: number, tallies: ReadonlyMap<string, Tally>): void {
  const rows = [...tallies]
    .sort(([a], [b]) => a.localeCompare(b))
    .map(([rule, t]) => `${rule} ${t.found}/${t.planted}`);
  console.log(`seed ${seed}: ${rows.join(", ")}`);
}

test.each([
  ["a fixed seed", 20260501],
  ["a fresh seed", Date.now() % 1_000_000_000],
])("finds at least 99 % of seeded faults (%s, %i)", (_name, seed) => {
  const tallies = plantAll(seed);
  print(seed, tallies);
  console.log(`${mends} of them mended by their rule's fix, none raising another error`);
  const all = [...tallies.values()];
  const planted = all.reduce((sum, t) => sum + t.planted, 0);
  const found = all.reduce((sum, t) => sum + t.found, 0);
  expect(planted).toBe(PLANTED);
  expect([...tallies.keys()].sort()).toEqual([...new Set(FAULTS.map((f) => f.rule))].sort());
  expect(found / planted).toBeGreaterThanOrEqual(0.99);
});

/** The bad example of a rule, put into a valid model as a second model of the file; answers the node that is meant. */
function plantExample(host: AddressSpace, rule: Rule): { space: AddressSpace; key: NodeKey } | undefined {
  const example = new ExampleModel();
  const made = rule.examples.bad.build(example);
  if (made === undefined || made === "model" || made.startsWith("place ") || example.wiring) return undefined;
  const { header, nodes } = example.build();
  const { own } = host;
  const merged = {
    ...own.header,
    namespaceUris: [...own.header.namespaceUris, ...header.namespaceUris],
    models: [...own.header.models, ...header.models],
  };
  const shifted = nodes.map((node) => ({ ...node, order: node.order + own.nextOrder }));
  const layer = buildLayer(merged, [...host.listOwnNodes(), ...shifted]);
  return { space: AddressSpace.of(host.layers.slice(0, -1), layer), key: made as NodeKey };
}

test("finds a fault of every kind that a node can have, planted into a valid model", () => {
  const host = loadModels()[1];
  if (!host) throw new Error("No model");
  const planted = RULES.flatMap((rule) => {
    const made = plantExample(host, rule);
    return made ? [{ rule, ...made }] : [];
  });
  const missed = planted.filter(
    ({ rule, space, key }) => !runChecks(space, { rules: [rule] }).some((f) => f.rule === rule.id && f.key === key),
  );
  console.log(`${planted.length} kinds planted, ${planted.length - missed.length} found`);
  for (const { rule, key } of missed) console.log(`not found: ${rule.id} at ${key}`);
  expect(planted.length).toBeGreaterThan(150);
  expect(missed.length / planted.length).toBeLessThanOrEqual(0.01);
});
