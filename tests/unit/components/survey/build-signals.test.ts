import { describe, expect, it } from "vitest";
import { buildSignals } from "~/components/survey/build-signals";
import { countStates } from "~/components/survey/survey-words";
import { getValue } from "~/domain/core/result";
import { applyOperations } from "~/domain/editing/apply-operation";
import { BlockAllocator } from "~/domain/editing/allocate-node-id";
import { listTargets } from "~/domain/mapping/list-targets";
import { readPart } from "~/domain/mapping/mapping-entries";
import type { SurveySignal } from "~/domain/mapping/mapping-parts";
import { braiderType, makeMappedBraiderSpace } from "../../../support/demo-mapping";

const space = makeMappedBraiderSpace();
const signal = (part: Partial<SurveySignal>): SurveySignal => ({
  name: "Oil level",
  group: "Environment",
  wantedBy: ["Maintenance planner"],
  state: "decided",
  delivery: { kind: "buy", text: "a float switch" },
  evidence: [],
  ...part,
});
const context = () => {
  const blocks = BlockAllocator.forModel(() => space, []);
  blocks.addBlock({ from: 90_000, to: 90_100 });
  return blocks;
};

describe("decided signals", () => {
  it("become members with unit and range, and the survey names them", () => {
    const entries = [{ id: "s1", value: signal({ unit: "P1", range: { low: 0, high: 100 } }) }];
    const built = getValue(buildSignals(space, context(), braiderType, entries));
    const after = getValue(applyOperations(space, built.operations));
    const target = listTargets(after, braiderType).find((one) => one.path === "Environment/OilLevel");
    expect(target).toMatchObject({ dataTypeName: "Float", unit: { code: "P1" }, range: { low: 0, high: 100 } });
    expect(readPart(after, "signal", braiderType, "s1")).toMatchObject({ state: "built", target: target?.target });
  });

  it("take a member of their name that is there already", () => {
    const built = getValue(
      buildSignals(space, context(), braiderType, [{ id: "s1", value: signal({ name: "Humidity" }) }]),
    );
    expect(built.operations.map((operation) => operation.kind)).toEqual(["setMapping"]);
  });
});

describe("where a survey stands", () => {
  it("counts states by group", () => {
    const counted = countStates([signal({}), signal({ state: "built" }), signal({ group: "", state: "wanted" })]);
    expect(counted.map(({ group, all, counts }) => [group, all, counts.decided, counts.built])).toEqual([
      ["Environment", 2, 1, 1],
      ["", 1, 0, 0],
    ]);
  });
});
