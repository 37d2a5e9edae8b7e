import { describe, expect, it } from "vitest";
import { getValue, ok } from "~/domain/core/result";
import { chooseLayout } from "~/domain/mapping/choose-layout";
import { encodeOutputs } from "~/domain/mapping/encode-outputs";
import type { Mapping, MappingRow } from "~/domain/mapping/mapping";
import { readDemoDevice } from "../../../support/demo-models/braider-mapping";

const light = readDemoDevice("QS-L5");
const options = { findConversion: () => undefined, findLayout: () => ok({ image: getValue(chooseLayout(light, "out")), profileCharacteristic: [] }) };
const out = (target: string, subindex: number, more: Partial<MappingRow> = {}): MappingRow => ({
  target,
  direction: "out",
  source: { kind: "process-data", role: "light", direction: "out", subindex },
  transforms: [],
  limits: { low: 0, high: 5 },
  ...more,
});
const register: MappingRow = { target: "Speed", direction: "out", source: { kind: "register", role: "plc", table: "holding-register", address: 40, type: "Float32", order: "CDAB" }, transforms: [], limits: { low: 0, high: 180 } };
const mapping = (...rows: MappingRow[]): Mapping => ({ machineType: "T", roles: [{ role: "light", kind: "io-link-device" }, { role: "plc", kind: "modbus-unit" }], rows });

describe("outputs", () => {
  // Scenario: segment 1 in bits 39 … 32: colour 3 bit @5, pattern 3 bit @2, intensity 2 bit @0. Green 1, flash 1, intensity 3 → 0010 0111.
  it("become the frame of their device and the words of their registers", () => {
    const made = getValue(encodeOutputs(mapping(out("Colour", 1), out("Pattern", 2), out("Intensity", 3), register), options, { Colour: 1, Pattern: 1, Intensity: 3, Speed: 123.456 }));
    expect(made.frames.map((f) => [f.role, ...f.octets])).toEqual([["light", 0x27, 0, 0, 0, 0]]);
    // 123.456 as Float32 = 42 F6 E9 79; CDAB: low word first.
    expect(made.registers[0]?.words).toEqual([0xe979, 0x42f6]);
  });

  it("are refused beyond their limits and their field, and then nothing is made", () => {
    const codes = (values: Record<string, number>, ...rows: MappingRow[]) => encodeOutputs(mapping(...rows), options, values).problems.map((p) => [p.code, p.at?.path]);
    expect(codes({ Colour: 1, Intensity: 9 }, out("Colour", 1), out("Intensity", 3))).toEqual([["encode.beyond-limits", "Intensity"]]);
    expect(codes({ Intensity: 4 }, out("Intensity", 3))).toEqual([["encode.out-of-range", undefined]]);
    expect(codes({ Speed: Number.NaN }, register)).toEqual([["encode.beyond-limits", "Speed"]]);
  });

  it("need limits, and never mirror a safety signal", () => {
    const { limits: _limits, ...without } = out("Colour", 1);
    expect(encodeOutputs(mapping(without), options, { Colour: 1 }).problems.map((p) => p.code)).toEqual(["mapping.output-limits"]);
    expect(encodeOutputs(mapping(out("Colour", 1, { mirrorsSafetySignal: true })), options, {}).problems.map((p) => p.code)).toEqual(["mapping.output-safety"]);
  });
});
