import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import type { DeviceDescription } from "../../../../app/domain/iodd/device-description";
import { readIodd } from "../../../../app/domain/iodd/read-iodd";
import { parseHex } from "../../../../app/domain/mapping/bits";
import { compileFormula } from "../../../../app/domain/mapping/formula";
import { mappingSchema, type Mapping, type MappingRow, type Transform } from "../../../../app/domain/mapping/mapping";
import { MappingRunner } from "../../../../app/domain/mapping/mapping-runner";
import { makeDeviceLayouts, planMapping, toChannelKey } from "../../../../app/domain/mapping/plan-mapping";
import type { Sample } from "../../../../app/domain/mapping/sample";
import { makeTransform } from "../../../../app/domain/mapping/transform";

function deviceOf(product: string): DeviceDescription {
  const read = readIodd(readFileSync(`nodesets/demo/iodd/Quillon-${product}-20261102-IODD1.1.xml`, "utf8"));
  if (!read.ok) throw new Error("unreadable");
  return read.value;
}

const controller = {
  kind: "register",
  role: "controller",
  table: "holding-register",
  address: 12,
  type: "Float32",
  order: "ABCD",
} as const;

const rows: MappingRow[] = [
  {
    target: "Process/CreelDistance",
    source: { kind: "process-data", role: "creel sensor", direction: "in", subindex: 1 },
    transforms: [],
    period: 1000,
  },
  // Scenario: 380 mm empty, 60 mm full.
  {
    target: "Process/CreelFill",
    source: { kind: "process-data", role: "creel sensor", direction: "in", subindex: 1 },
    transforms: [
      {
        kind: "lookup",
        points: [
          [60, 100],
          [380, 0],
        ],
      },
    ],
  },
  {
    target: "Process/CarriageDeviation",
    source: {
      kind: "formula",
      expression: "position - setpoint",
      inputs: { position: { kind: "member", target: "Process/CarriagePosition" }, setpoint: controller },
    },
    transforms: [],
  },
  {
    target: "Process/CarriagePosition",
    source: { kind: "process-data", role: "carriage sensor", direction: "in", subindex: 1 },
    transforms: [],
  },
  { target: "Process/CarriageSetpoint", source: controller, transforms: [] },
  { target: "Configuration/Works", source: { kind: "constant", value: "Merrow" }, transforms: [] },
];

const mapping: Mapping = {
  machineType: "RopeBraiderType",
  roles: [
    { role: "creel sensor", kind: "io-link-device", vendorId: 65001, deviceId: 1030 },
    { role: "carriage sensor", kind: "io-link-device", vendorId: 65001, deviceId: 1012 },
    { role: "controller", kind: "modbus-unit" },
  ],
  rows,
};

const devices = new Map([
  ["creel sensor", deviceOf("QS-U30")],
  ["carriage sensor", deviceOf("QS-P12")],
]);
const findConversion = (): undefined => undefined;

function runner(of: Mapping = mapping): MappingRunner {
  const plan = planMapping(of, { findLayout: makeDeviceLayouts(devices), findConversion });
  if (!plan.ok) throw new Error(JSON.stringify(plan.problems));
  return new MappingRunner(plan.value);
}

function frame(hex: string, time = 1_000, isValid = true) {
  return { octets: parseHex(hex) ?? new Uint8Array(), isValid, time };
}

describe("MappingRunner", () => {
  test("waits for the first sample of each source and knows constants at once", () => {
    const running = runner();
    expect(running.read("Process/CreelDistance")).toEqual({ value: null, status: 0x80320000, time: 0 });
    expect(running.read("Configuration/Works")).toMatchObject({ value: "Merrow", status: 0 });
    expect(running.read("Process/Nothing")).toBeUndefined();
  });

  test("one frame feeds the distance and, through the lookup table, the fill level", () => {
    const updates = runner().offerFrame("creel sensor", "in", frame("08 98 FC 00")); // 2200 → 220.0 mm, halfway
    expect(updates.map((u) => [u.target, u.sample.value, u.sample.status])).toEqual([
      ["Process/CreelDistance", 220, 0],
      ["Process/CreelFill", 50, 0],
    ]);
  });

  test("no echo reaches the node as Bad_SensorFailure without a value, also through the table", () => {
    const running = runner();
    running.offerFrame("creel sensor", "in", frame("7F FC FC 00"));
    expect(running.read("Process/CreelFill")).toEqual({ value: null, status: 0x808c0000, time: 1_000 });
  });

  test("an invalid frame and one of the wrong length give Bad, never 0", () => {
    const running = runner();
    running.offerFrame("creel sensor", "in", frame("08 98 FC 00", 5, false));
    expect(running.read("Process/CreelDistance")).toEqual({ value: null, status: 0x80000000, time: 5 });
    running.offerFrame("creel sensor", "in", frame("08 98", 6));
    expect(running.read("Process/CreelDistance")).toEqual({ value: null, status: 0x80890000, time: 6 });
  });

  test("a formula takes the worst status and the oldest time of its inputs", () => {
    const running = runner();
    const channel = toChannelKey(controller);
    running.offerSample(channel, { value: 100.5, status: 0, time: 900 });
    expect(running.read("Process/CarriageDeviation")?.status).toBe(0x80320000);
    running.offerFrame("carriage sensor", "in", frame("27 74 FB 00")); // 10100 × 0.01 mm = 101.00 mm
    expect(running.read("Process/CarriageDeviation")).toEqual({ value: 0.5, status: 0, time: 900 });
    running.offerSample(channel, { value: 7, status: 0x80310000, time: 1_100 });
    expect(running.read("Process/CarriageDeviation")).toEqual({ value: null, status: 0x80310000, time: 1_000 });
  });

  test("a silent source ages: last value usable, then no communication", () => {
    const running = runner();
    running.offerFrame("creel sensor", "in", frame("08 98 FC 00", 10_000));
    expect(running.age(10_900)).toEqual([]);
    expect(running.age(11_500)).toEqual([
      { target: "Process/CreelDistance", sample: { value: 220, status: 0x408f0000, time: 10_000 } },
    ]);
    expect(running.age(13_500)[0]?.sample).toEqual({ value: null, status: 0x80310000, time: 10_000 });
  });
});

describe("planMapping", () => {
  const planCodes = (changed: Partial<Mapping>): string[] =>
    planMapping({ ...mapping, ...changed }, { findLayout: makeDeviceLayouts(devices), findConversion }).problems.map(
      (p) => p.code,
    );
  const row = (source: MappingRow["source"], transforms: Transform[] = []): Partial<Mapping> => ({
    rows: [{ target: "T", source, transforms }],
  });

  test.each([
    ["a role that the mapping does not have", row({ kind: "tag", role: "ghost", name: "x" }), "mapping.unknown-role"],
    [
      "a field that the device does not have",
      row({ kind: "process-data", role: "creel sensor", direction: "in", subindex: 9 }),
      "mapping.unknown-field",
    ],
    [
      "a direction without process data",
      row({ kind: "process-data", role: "creel sensor", direction: "out", subindex: 1 }),
      "decode.no-process-data",
    ],
    [
      "a unit of another dimension",
      row({ kind: "tag", role: "controller", name: "x" }, [{ kind: "unit", from: "MMT", to: "CEL" }]),
      "transform.unit-dimension",
    ],
    [
      "a formula over a member that nothing feeds",
      row({ kind: "formula", expression: "a", inputs: { a: { kind: "member", target: "Gone" } } }),
      "mapping.unknown-member",
    ],
    [
      "a formula that reads itself",
      row({ kind: "formula", expression: "a", inputs: { a: { kind: "member", target: "T" } } }),
      "mapping.formula-cycle",
    ],
    ["a target twice", { rows: [...rows, ...rows.slice(0, 1)] }, "mapping.target-twice"],
  ] satisfies [string, Partial<Mapping>, string][])("refuses %s", (_, changed, code) => {
    expect(planCodes(changed)).toContain(code);
  });

  test("the schema takes the mapping as JSON and refuses what it does not know", () => {
    expect(mappingSchema.parse(JSON.parse(JSON.stringify(mapping)))).toEqual(mapping);
    expect(mappingSchema.safeParse({ ...mapping, rows: [{ ...rows[0], gadget: 1 }] }).success).toBe(false);
  });
});

describe("formulas", () => {
  test.each([
    ["(a + 2) * 3", 9],
    ["a > 0 ? max(a, 5) : 0", 5],
    ["1 / 0", Number.NaN],
    ["a == 1 and not false", true],
  ])("%s", (text, value) => {
    const formula = compileFormula(text, ["a"]);
    expect(formula.ok && formula.value.evaluate({ a: 1 })).toEqual(value);
  });

  test.each([
    ["a = 3", "formula.not-allowed"],
    ["f(x) = x", "formula.not-allowed"],
    ["import(a)", "formula.not-allowed"],
    ["a.constructor", "formula.not-allowed"],
    ["[1,2,3]", "formula.not-allowed"],
    ["a!", "formula.not-allowed"],
    ["'text'", "formula.not-allowed"],
    ["1:100000000", "formula.not-allowed"],
    ["b + 1", "formula.unknown-name"],
    ["1 +", "formula.syntax"],
    [Array.from({ length: 400 }, () => "a").join("+"), "formula.too-long"],
  ])("refuses %s", (text, code) => {
    expect(compileFormula(text, ["a"])).toMatchObject({ ok: false, problems: [{ code }] });
  });
});

describe("transforms", () => {
  const good = (value: Sample["value"]): Sample => ({ value, status: 0, time: 1 });
  const run = (transform: Transform, values: Sample["value"][]): Sample["value"][] => {
    const made = makeTransform(transform, (from, to) => (from === "MMT" && to === "MTR" ? (v) => v / 1000 : undefined));
    if (!made.ok) throw new Error("refused");
    return values.map((value) => made.value(good(value)).value);
  };

  test.each([
    ["linear", { kind: "linear", gradient: 0.1, offset: -1 }, [13], [0.3]],
    ["unit", { kind: "unit", from: "MMT", to: "MTR" }, [1500], [1.5]],
    ["bit", { kind: "bit", bit: 3 }, [8, 7], [true, false]],
    ["bit above 32", { kind: "bit", bit: 40 }, [2n ** 40n], [true]],
    [
      "value map",
      { kind: "value-map", entries: [{ from: 1, to: "Running" }], otherwise: "Off" },
      [1, 9],
      ["Running", "Off"],
    ],
    ["value map without an answer", { kind: "value-map", entries: [{ from: 1, to: 2 }] }, [5], [null]],
    ["deadband", { kind: "deadband", width: 1 }, [10, 10.5, 11.5, 11], [10, 10, 11.5, 11.5]],
    ["average", { kind: "average", samples: 3 }, [1, 2, 3, 4], [1, 1.5, 2, 3]],
    ["counter that wraps", { kind: "counter", bits: 8 }, [250, 255, 4], [250, 255, 260]],
    ["counter that is reset", { kind: "counter", bits: 32, resets: true }, [100, 130, 5], [100, 130, 135]],
    [
      "lookup outside its points",
      {
        kind: "lookup",
        points: [
          [0, 0],
          [10, 100],
        ],
      },
      [-5, 15, 2.5],
      [0, 100, 25],
    ],
  ] satisfies [string, Transform, Sample["value"][], Sample["value"][]][])("%s", (_, transform, values, expected) => {
    expect(run(transform, values)).toEqual(expected);
  });

  test("pass a Bad sample on unchanged", () => {
    const made = makeTransform({ kind: "linear", gradient: 2, offset: 0 }, () => undefined);
    const bad: Sample = { value: null, status: 0x808c0000, time: 3 };
    expect(made.ok && made.value(bad)).toBe(bad);
  });
});
