import { describe, expect, it } from "vitest";
import { getValue } from "~/domain/core/result";
import { applyOperations } from "~/domain/editing/apply-operation";
import type { Operation } from "~/domain/editing/operation";
import { listParts } from "~/domain/mapping/mapping-entries";
import { compareNames } from "~/domain/mapping/name-likeness";
import { suggestRows } from "~/domain/mapping/suggest-rows";
import type { Tag } from "~/domain/mapping/tag";
import { braiderType, makeMappedBraiderSpace } from "../../../support/demo-mapping";

const mapped = makeMappedBraiderSpace();
const withoutRows = getValue(
  applyOperations(
    mapped,
    listParts(mapped, "row", braiderType).map(({ id }): Operation => ({ kind: "setMapping", part: "row", owner: braiderType, id })),
  ),
);

describe("suggested rows", () => {
  // The scenario's table "fed by".
  it("find the fields of the three sensors", () => {
    const found = suggestRows(withoutRows, braiderType);
    const pairs = Object.fromEntries(
      found.flatMap(({ path, source }) => (source.kind === "process-data" ? [[path, `${source.role} ${source.subindex}`]] : [])),
    );
    expect(pairs).toMatchObject({
      "Process/CreelDistance": "creel sensor 1",
      "Process/CarriagePosition": "carriage sensor 1",
      "Environment/GearboxVibration": "condition monitor 1",
      "Environment/GearboxTemperature": "condition monitor 2",
      "Environment/Humidity": "condition monitor 3",
      "Environment/AmbientPressure": "condition monitor 4",
    });
    for (const { reasons } of found) expect(reasons.length).toBeGreaterThan(0);
  });

  it("know what device status and the application-specific tag are", () => {
    const found = suggestRows(withoutRows, braiderType);
    expect(found.find((s) => s.path === "Status/SensorHealth")?.source).toEqual({
      kind: "device-status",
      roles: ["carriage sensor", "condition monitor", "creel sensor"],
    });
    expect(found.find((s) => s.path === "Configuration/SensorTag")?.source).toMatchObject({ kind: "parameter", index: 24 });
  });

  it("propose nothing that is mapped already", () => {
    const taken = new Set(listParts(mapped, "row", braiderType).map((r) => r.id));
    expect(suggestRows(mapped, braiderType).filter((s) => taken.has(s.target))).toEqual([]);
  });

  it("pair tags by name and unit, with the scale of the list", () => {
    const register = (address: number) => ({ kind: "register" as const, table: "input-register" as const, address, type: "UInt16" as const });
    const tags: Tag[] = [
      { name: "ENERGY_ACT_PWR", reference: register(0), unit: "WTT", line: 2 },
      { name: "ENERGY_VOLT", reference: register(4), unit: "VLT", scale: 0.1, line: 3 },
      { name: "OIL_TEMP", reference: register(9), unit: "CEL", line: 4 },
    ];
    const found = suggestRows(withoutRows, braiderType, { tags: [{ role: "meter", tags }] });
    const power = found.find((s) => s.path === "Energy/ActivePower");
    expect(power?.source).toMatchObject({ kind: "register", address: 0, role: "meter" });
    expect(power?.transforms).toEqual([{ kind: "unit", from: "WTT", to: "KWT" }]);
    expect(found.find((s) => s.path === "Energy/Voltage")?.transforms).toEqual([{ kind: "linear", gradient: 0.1, offset: 0 }]);
  });
});

describe("likeness of names", () => {
  it("sees through abbreviations and ways of joining words", () => {
    expect(compareNames("Process/CarriagePosition", "carr_pos").score).toBeGreaterThan(0.4);
    expect(compareNames("Environment/GearboxTemperature", "GearboxTmp").score).toBeGreaterThan(0.8);
    expect(compareNames("Energy/Voltage", "Humidity").words).toEqual([]);
  });
});
