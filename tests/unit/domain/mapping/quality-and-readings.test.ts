import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { getValue, ok } from "~/domain/core/result";
import { readIodd } from "~/domain/iodd/read-iodd";
import { parseHex } from "~/domain/mapping/bits";
import { chooseLayout } from "~/domain/mapping/choose-layout";
import { decodeParameter } from "~/domain/mapping/decode-parameter";
import type { Mapping, MappingRow, QualityRules } from "~/domain/mapping/mapping";
import { MappingRunner } from "~/domain/mapping/mapping-runner";
import { planMapping } from "~/domain/mapping/plan-mapping";
import { planReadings, ReadingMemory, toInputs, type FedMachine } from "~/domain/mapping/plan-readings";
import type { TargetRanges } from "~/domain/mapping/row-quality";

const device = getValue(readIodd(readFileSync("nodesets/demo/iodd/Quillon-QS-U30-20261102-IODD1.1.xml", "utf8")));
const image = getValue(chooseLayout(device, "in"));
const findConversion = (): undefined => undefined;

function run(quality: QualityRules | undefined, ranges: TargetRanges = {}, extra: readonly MappingRow[] = []): MappingRunner {
  const row: MappingRow = { target: "Distance", source: { kind: "process-data", role: "creel", direction: "in", subindex: 1 }, transforms: [], period: 1_000, ...(quality ? { quality } : {}) };
  const mapping: Mapping = { machineType: "T", roles: [{ role: "creel", kind: "io-link-device" }, { role: "plc", kind: "modbus-unit" }], rows: [row, ...extra] };
  const findLayout = () => ok({ image, profileCharacteristic: device.profileCharacteristic });
  return new MappingRunner(getValue(planMapping(mapping, { findConversion, findLayout, findRanges: () => ranges })));
}

function offer(runner: MappingRunner, hex: string, isValid = true, time = 1) {
  runner.offerFrame("creel", "in", { octets: parseHex(hex) ?? new Uint8Array(), isValid, time });
  const sample = runner.read("Distance");
  return [sample?.value, sample?.status];
}

/** Cases and codes of the table "Quality of a mapped value": the project's proposal after OPC 10000-8 §7.3.2. */
describe("quality rules of a row", () => {
  it("invalid process data is Bad, or Bad_SensorFailure where the row says so", () => {
    expect(offer(run(undefined), "08 98 FC 00", false)).toEqual([null, 0x80000000]);
    expect(offer(run({ invalid: "Bad_SensorFailure" }), "08 98 FC 00", false)).toEqual([null, 0x808c0000]);
  });

  it("out of range carries no number, or the sensor's limit with its limit bits", () => {
    expect(offer(run(undefined), "7F F8 FC 00")).toEqual([null, 0x808c0600]);
    const [value, status] = offer(run({ outOfRange: "Uncertain_SensorNotAccurate" }), "7F F8 FC 00");
    expect([typeof value, status]).toEqual(["number", 0x40930600]);
  });

  it("a value beyond InstrumentRange is uncertain with limit bits; beyond EURange only on demand", () => {
    const ranges = { range: { low: 0, high: 200 }, instrumentRange: { low: 0, high: 300 } };
    expect(offer(run(undefined, ranges), "08 98 FC 00")).toEqual([220, 0]);
    expect(offer(run({ beyondRange: "Uncertain_EngineeringUnitsExceeded" }, ranges), "08 98 FC 00")).toEqual([220, 0x40940600]);
    expect(offer(run(undefined, { instrumentRange: { low: 250, high: 300 } }), "08 98 FC 00")).toEqual([220, 0x40940500]);
  });

  it("another device and a failing one make all that the role feeds Bad until that is over", () => {
    const runner = run(undefined);
    offer(runner, "08 98 FC 00");
    runner.setRoleState("creel", "wrong-device", true, 5);
    expect(runner.read("Distance")).toEqual({ value: null, status: 0x80890000, time: 5 });
    expect(offer(runner, "08 98 FC 00")).toEqual([null, 0x80890000]);
    runner.setRoleState("creel", "device-failure", true, 6);
    runner.setRoleState("creel", "wrong-device", false, 7);
    expect(offer(runner, "08 98 FC 00")).toEqual([null, 0x808b0000]);
    runner.setRoleState("creel", "device-failure", false, 8);
    expect(offer(runner, "08 98 FC 00")).toEqual([220, 0]);
    runner.setRoleState("creel", "not-connected", true, 9);
    expect(runner.read("Distance")).toMatchObject({ value: null, status: 0x808a0000 });
  });

  it("the last value may be kept for as long as an outage takes", () => {
    const runner = run({ afterKeep: "Uncertain_NoCommunicationLastUsable" });
    offer(runner, "08 98 FC 00", true, 10_000);
    runner.age(60_000);
    expect(runner.read("Distance")).toMatchObject({ value: 220, status: 0x408f0000 });
  });

  it("a mean goes on with the inputs that are good, and says so", () => {
    const mean: MappingRow = {
      target: "Mean",
      source: { kind: "formula", expression: "mean(a, b)", inputs: { a: { kind: "member", target: "Distance" }, b: { kind: "register", role: "plc", table: "holding-register", address: 0 } } },
      transforms: [],
      quality: { badInput: "Uncertain_SubNormal" },
    };
    const runner = run(undefined, {}, [mean]);
    offer(runner, "08 98 FC 00");
    expect(runner.read("Mean")).toMatchObject({ value: 220, status: 0x40950000 });
  });
});

describe("readings of machines", () => {
  const register = (address: number, type: "UInt16" | "Float32" = "UInt16") => ({ kind: "register" as const, role: "plc", table: "holding-register" as const, address, type });
  const rows: MappingRow[] = [
    { target: "A", source: register(0), transforms: [], period: 500 },
    { target: "B", source: register(1), transforms: [], period: 500 },
    { target: "C", source: register(10, "Float32"), transforms: [], period: 500 },
    { target: "D", source: { kind: "process-data", role: "creel", direction: "in", subindex: 1 }, transforms: [], period: 200 },
    { target: "E", source: { kind: "process-data", role: "creel", direction: "in", subindex: 2 }, transforms: [], period: 1_000 },
  ];
  const machine: FedMachine = {
    machine: "P1",
    mapping: { machineType: "T", roles: [{ role: "creel", kind: "io-link-device", vendorId: 65_001, deviceId: 1030 }, { role: "plc", kind: "modbus-unit" }, { role: "meter", kind: "modbus-unit" }], rows },
    bindings: new Map([
      ["creel", { binding: { sourceId: "m1", port: 3, deviceAlias: "creel" }, kind: "rest-master" as const }],
      ["plc", { binding: { sourceId: "plc", unitId: 11, addressOffset: 100 }, kind: "modbus-unit" as const }],
    ]),
  };
  const plan = planReadings([machine]);

  it("join neighbours but no gaps, offer one frame once, and take the shortest period", () => {
    expect(plan.readings.map((r) => [r.sourceId, r.item, r.period])).toEqual([
      ["m1", { kind: "process-data", port: 3, alias: "creel" }, 200],
      ["m1", { kind: "port", port: 3, alias: "creel" }, 5_000],
      ["plc", { kind: "registers", unitId: 11, table: "holding-register", address: 100, count: 2 }, 500],
      ["plc", { kind: "registers", unitId: 11, table: "holding-register", address: 110, count: 2 }, 500],
    ]);
    expect(plan.readings[0]?.uses).toHaveLength(1);
    expect(plan.unbound).toEqual([{ machine: "P1", role: "meter" }]);
  });

  it("become inputs: values by their place, an exception as its status, an outage as nothing", () => {
    const [, , words] = plan.readings;
    if (!words) throw new RangeError("No registers");
    const memory = new ReadingMemory();
    expect(toInputs(words, { ok: true, value: { kind: "words", words: [7, 9] }, time: 5 }, memory).map((i) => (i.kind === "sample" ? [i.value, i.status] : i.kind))).toEqual([[7, 0], [9, 0]]);
    const exception = { ok: false as const, status: 0x80890000, problem: { code: "source.modbus-exception", severity: "error" as const }, time: 6 };
    expect(toInputs(words, exception, memory)).toMatchObject([{ value: null, status: 0x80890000 }, { value: null, status: 0x80890000 }]);
    const outage = { ...exception, status: 0x80310000 };
    expect(toInputs(words, outage, memory)).toEqual([]);
  });

  it("see that another device answers", () => {
    const port = plan.readings[1];
    if (!port) throw new RangeError("No port");
    const inputs = toInputs(port, { ok: true, value: { kind: "port", status: 4, vendorId: 65_001, deviceId: 1012 }, time: 5 }, new ReadingMemory());
    expect(inputs).toEqual([{ kind: "role", machine: "P1", role: "creel", state: "wrong-device", holds: true, time: 5 }]);
  });
});

describe("octets of parameters", () => {
  it("are text up to the first zero, or big-endian numbers", () => {
    expect(decodeParameter(Uint8Array.of(0x42, 0x31, 0, 0))).toBe("B1");
    expect(decodeParameter(Uint8Array.of(1, 0))).toBe(256);
    expect(decodeParameter(Uint8Array.of(0xff, 0xfe), "signed")).toBe(-2);
    expect(decodeParameter(Uint8Array.of(0x42, 0xf6, 0xe9, 0x79), "float")).toBeCloseTo(123.456, 3);
    expect(decodeParameter(new Uint8Array(9), "unsigned")).toBeUndefined();
  });
});
