/** Mending all findings of a kind, and the preview of what that changes. */
import { expect, test } from "vitest";
import { listChanges } from "~/domain/checks/list-changes";
import { mendAll } from "~/domain/checks/mend";
import { findRule } from "~/domain/checks/registry";
import { runChecks } from "~/domain/checks/run-checks";
import { CountingAllocator } from "~/domain/editing/allocate-node-id";
import { buildModel } from "../../../support/model-builder";

function findAll(space: ReturnType<typeof buildModel>["space"], rule: string) {
  return runChecks(space).filter((f) => f.rule === rule);
}

test("mends all of a kind in one batch; what is mended along with another counts", () => {
  const { space } = buildModel((m) => {
    const pump = m.objectType("PumpType");
    for (const name of ["Speed", "Torque"]) m.variable(name, { parent: pump, rule: "Mandatory" });
    for (const name of ["Pump1", "Pump2"]) m.object(name, { type: pump });
  });
  const findings = findAll(space, "R086");
  expect(findings).toHaveLength(4);
  const mended = mendAll(space, findings, new CountingAllocator(space));
  expect(mended.mended).toEqual(findings);
  expect(mended.problems).toEqual([]);
  expect(findAll(mended.space, "R086")).toEqual([]);
});

test("leaves what cannot be mended and says why", () => {
  const { space } = buildModel((m) =>
    m.variable("Speed", { parent: m.objectType("PumpType"), rule: "Mandatory", set: { displayName: [] } }),
  );
  const [finding] = findAll(space, "R016");
  if (!finding || !findRule("R016")?.fix) throw new Error("R016 finds nothing");
  const stale = { ...finding, key: undefined, nodeId: "" };
  const { operations, mended, problems } = mendAll(space, [finding, stale], new CountingAllocator(space));
  expect(operations).toHaveLength(1);
  expect(mended).toEqual([finding, stale]);
  expect(problems).toEqual([]);
  const alone = mendAll(space, [stale], new CountingAllocator(space));
  expect(alone.mended).toEqual([]);
  expect(alone.problems.map((p) => p.code)).toEqual(["fix.not-possible"]);
});

test("tells what changes by attribute, reference and node", () => {
  const { space, made } = buildModel((m) =>
    m.variable("Speed", { parent: m.objectType("PumpType"), rule: "Mandatory" }),
  );
  const node = space.requireNode(made);
  const after = space.withNode({
    ...node,
    displayName: [{ locale: "de", text: "Drehzahl" }],
    references: node.references.slice(1),
  });
  expect(listChanges(space, after)).toEqual([
    {
      kind: "changed",
      key: made,
      name: "Speed",
      nodeClass: "Variable",
      path: "PumpType/Speed",
      details: [
        { label: "DisplayName", before: "Speed", after: "de: Drehzahl" },
        { label: "Reference", before: "HasTypeDefinition to BaseDataVariableType" },
      ],
    },
  ]);
  const gone = listChanges(space, space.withoutNode(made));
  expect(gone.map(({ kind, name }) => [kind, name])).toEqual([["removed", "Speed"]]);
});
