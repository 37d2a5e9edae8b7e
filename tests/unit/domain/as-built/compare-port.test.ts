import { describe, expect, it } from "vitest";
import { listOutside, type QuotedPointCheck } from "~/domain/as-built/as-built-report";
import { comparePort } from "~/domain/as-built/compare-port";

const wanted = { path: "B1/creel sensor", place: "port 3 of M1", vendorId: 1234, deviceId: 77 };

describe("comparePort", () => {
  it("takes the planned device", () => {
    expect(comparePort(wanted, { vendorId: 1234, deviceId: 77, serialNumber: "any" })).toEqual([]);
    expect(comparePort({ ...wanted, serialNumber: "A1" }, { vendorId: 1234, deviceId: 77, serialNumber: "A1" })).toEqual([]);
    expect(comparePort({ ...wanted, serialNumber: "A1" }, { vendorId: 1234, deviceId: 77 })).toEqual([]);
  });

  it("names an empty port, another device, and another one of the same kind", () => {
    expect(comparePort(wanted, {})).toMatchObject([{ aspect: "device", released: "vendor 1234, device 77", found: null }]);
    expect(comparePort(wanted, { vendorId: 1234, deviceId: 78 })).toMatchObject([{ detail: "port 3 of M1: another device", found: "vendor 1234, device 78" }]);
    expect(comparePort({ ...wanted, serialNumber: "A1" }, { vendorId: 1234, deviceId: 77, serialNumber: "B2" })).toMatchObject([{ released: "serial number A1", found: "serial number B2" }]);
  });
});

describe("listOutside", () => {
  it("asks the newest check of each signal alone", () => {
    const check = (nodeId: string, isWithin: boolean) => ({ nodeId, isWithin }) as QuotedPointCheck;
    expect(listOutside([check("a", true), check("a", false), check("b", false), check("b", true)])).toEqual([check("b", false)]);
  });
});
