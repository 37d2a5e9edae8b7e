/** The checker follows operations, as windows and server apply them: after each the findings are those of a full run. */
import fc from "fast-check";
import { expect, test } from "vitest";
import { runChecks, startChecks, updateChecks } from "~/domain/checks/run-checks";
import { StandardDataType as D, StandardType as T } from "~/domain/address-space/standard-ids";
import { range } from "~/domain/checks/example-values";
import { applyWithInverse } from "~/domain/editing/invert-operation";
import { buildModel } from "../../../support/model-builder";
import { choice, makeOperation } from "../../../support/random-operations";

const { space: start } = buildModel((m) => {
  const pump = m.objectType("PumpType");
  const drive = m.object("Drive", { parent: pump, rule: "Mandatory" });
  const speed = m.variable("Speed", { parent: drive, rule: "Mandatory", type: T.AnalogItemType, dataType: D.Double });
  m.property("0:EURange", { parent: speed, dataType: D.Range, rule: "Mandatory", value: range(0, 100) });
  m.method("Start", { parent: m.objectType("FastPumpType", { supertype: pump }), rule: "Optional" });
  for (let i = 0; i < 3; i++)
    m.variable("Speed", { parent: m.object("Drive", { parent: m.object(`Pump${i}`, { type: pump }) }) });
});

test("finds what a full run finds after each operation, and after its inverse", () => {
  fc.assert(
    fc.property(fc.array(choice, { minLength: 1, maxLength: 12 }), (choices) => {
      let run = startChecks(start);
      for (const [i, picked] of choices.entries()) {
        const applied = applyWithInverse(run.space, [makeOperation(run.space, picked, 5000 + i * 1000)]);
        if (!applied.ok) continue;
        run = updateChecks(run, applied.value.space);
        expect(run.findings).toEqual(runChecks(run.space));
        if (!picked.flag) continue;
        const undone = applyWithInverse(run.space, applied.value.inverse);
        if (!undone.ok) throw new Error("The inverse did not apply");
        run = updateChecks(run, undone.value.space);
        expect(run.findings).toEqual(runChecks(run.space));
      }
    }),
    { numRuns: 25 },
  );
});
