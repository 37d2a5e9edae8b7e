import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { AddressSpace, buildLayer } from "~/domain/address-space/address-space";
import { standardKey } from "~/domain/address-space/node-id";
import { StandardReferenceType as R } from "~/domain/address-space/standard-ids";
import { runChecks, startChecks, updateChecks } from "~/domain/checks/run-checks";
import { garbageNode, garbageSpace } from "../../../support/garbage-graphs";
import { buildModel } from "../../../support/model-builder";
import { getStandardLayer } from "../../../support/published-layers";

describe("runChecks", () => {
  test("answers to garbage without throwing, twice the same", () => {
    fc.assert(
      fc.property(garbageSpace([getStandardLayer()]), (space) => {
        expect(runChecks(space)).toEqual(runChecks(space));
      }),
      { numRuns: 40 },
    );
  });

  test("answers to a model without any required model", () => {
    fc.assert(
      fc.property(garbageSpace([]), (space) => {
        expect(() => runChecks(space)).not.toThrow();
      }),
      { numRuns: 40 },
    );
  });

  test("names own nodes only", () => {
    const { space } = buildModel((m) => {
      m.variable("Stray", { parent: standardKey(68) });
    });
    expect(runChecks(space).every((f) => f.key === undefined || space.isOwn(f.key))).toBe(true);
  });

  test("does not depend on the order in which nodes were added", () => {
    fc.assert(
      fc.property(garbageSpace([getStandardLayer()]), (space) => {
        const reversed = [...space.listOwnNodes()].reverse();
        const other = AddressSpace.of(space.layers.slice(0, -1), buildLayer(space.own.header, reversed));
        expect(runChecks(other)).toEqual(runChecks(space));
      }),
      { numRuns: 20 },
    );
  });

  test("stops when it is told to and says how far it came", () => {
    const { space } = buildModel((m) => {
      for (let i = 0; i < 1200; i++) m.object(`Pump${i}`, { type: standardKey(4294967290) });
    });
    const seen: number[] = [];
    const stopped = startChecks(space, { onProgress: (done) => seen.push(done), shouldStop: () => true });
    expect(seen[0]).toBe(500);
    expect(stopped.findings.length).toBeLessThan(runChecks(space).length);
  });
});

describe("updateChecks", () => {
  const edit = fc.oneof(
    { weight: 5, arbitrary: garbageNode.map((node) => ({ kind: "put" as const, node })) },
    { weight: 1, arbitrary: garbageNode.map((node) => ({ kind: "remove" as const, node })) },
    { weight: 1, arbitrary: fc.constantFrom("1.0.0", "2.0").map((version) => ({ kind: "header" as const, version })) },
  );

  test("finds what a full run finds, after any edit of any model", () => {
    fc.assert(
      fc.property(
        garbageSpace([getStandardLayer()]),
        fc.array(edit, { minLength: 1, maxLength: 6 }),
        (start, edits) => {
          let run = startChecks(start);
          let space = start;
          for (const step of edits) {
            if (step.kind === "put") space = space.withNode(step.node);
            else if (step.kind === "remove") space = space.withoutNode(step.node.key);
            else
              space = space.withHeader({
                ...space.own.header,
                models: space.own.header.models.map((m) => ({ ...m, version: step.version })),
              });
            run = updateChecks(run, space);
            expect(run.findings).toEqual(runChecks(space));
          }
        },
      ),
      { numRuns: 40 },
    );
  });

  test("checks again only what an edit can touch", () => {
    const { space, made } = buildModel((m) => {
      const pump = m.objectType("PumpType");
      m.variable("Speed", { parent: pump, rule: "Mandatory" });
      const first = m.object("Pump0", { type: pump });
      for (let i = 1; i < 50; i++) m.variable("Speed", { parent: m.object(`Pump${i}`, { type: pump }) });
      return first;
    });
    const run = startChecks(space);
    const node = space.requireNode(made);
    const after = space.withNode({ ...node, displayName: [] });
    const dirty = run.context.update(after, [made]);
    expect(dirty.size).toBeLessThan(4);
  });

  test("follows an edit of a type to its instances", () => {
    const { space, made } = buildModel((m) => {
      const pump = m.objectType("PumpType");
      const speed = m.variable("Speed", { parent: pump, rule: "Optional" });
      return { speed, pump: m.object("Pump1", { type: pump }) };
    });
    const run = startChecks(space);
    expect(run.findings.filter((f) => f.rule === "R086")).toEqual([]);
    const speed = space.requireNode(made.speed);
    const references = speed.references.map((r) =>
      r.type === R.HasModellingRule ? { ...r, target: standardKey(78) } : r,
    );
    const next = updateChecks(run, space.withNode({ ...speed, references }));
    expect(next.findings.filter((f) => f.rule === "R086").map((f) => f.key)).toEqual([made.pump]);
  });
});
