import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { compareDescriptions } from "~/components/devices/compare-descriptions";
import { formatErrorCode, listParameters } from "~/components/devices/describe-device";
import { groupVersions, searchDevices } from "~/components/devices/group-versions";
import { getValue } from "~/domain/core/result";
import { readIodd } from "~/domain/iodd/read-iodd";

const xml = readFileSync("nodesets/demo/iodd/Quillon-QS-U30-20261102-IODD1.1.xml", "utf8");
const u30 = getValue(readIodd(xml));

describe("a device description in words", () => {
  it("lists parameters by index with what they take", () => {
    const rows = listParameters(u30, "en");
    expect(rows.map((row) => row.index)).toEqual([...rows.map((row) => row.index)].sort((a, b) => a - b));
    expect(rows.find((row) => row.index === 24)).toMatchObject({
      access: "rw",
      type: "String, 32 octets",
      defaultValue: "***",
      isStandard: true,
    });
    expect(rows.find((row) => row.index === 36)?.values).toContain("4 Failure");
  });

  // Error types are written as code and additional code (IO-Link interface specification, Annex C).
  it("writes error codes as one number", () => {
    expect(formatErrorCode({ code: 128, additionalCode: 17 })).toBe("0x8011");
  });
});

describe("versions side by side", () => {
  it("tells what a mapping would notice", () => {
    const newer = getValue(
      readIodd(
        xml
          .replace('upperValue="4000"', 'upperValue="6000"')
          .replace('<RecordItem subindex="4" bitOffset="1">', '<RecordItem subindex="4" bitOffset="2">'),
      ),
    );
    expect(compareDescriptions(u30, newer)).toEqual([
      {
        part: "process data in",
        name: "Distance",
        change: "changed",
        before: "Int16, bits 31 … 16, × 0.1, 0 … 400, mm",
        after: "Int16, bits 31 … 16, × 0.1, 0 … 600, mm",
      },
      { part: "process data in", name: "SSC2", change: "changed", before: "Boolean, bits 1", after: "Boolean, bits 2" },
    ]);
    expect(compareDescriptions(u30, u30)).toEqual([]);
  });

  it("stand together, the newest first", () => {
    const make = (id: string, deviceId: number, releaseDate: string) => ({
      id,
      vendorId: 65001,
      deviceId,
      vendorName: "Quillon Sensing",
      deviceName: `Device ${deviceId}`,
      productIds: [`QS-${deviceId}`],
      schemaVersion: "1.1",
      documentVersion: "V1.00.000",
      releaseDate,
    });
    const devices = [make("a", 1030, "2026-11-02"), make("b", 1012, "2026-11-02"), make("c", 1030, "2027-01-11")];
    expect(groupVersions(devices).map(({ key, versions }) => [key, versions.map((version) => version.id)])).toEqual([
      ["65001/1012", ["b"]],
      ["65001/1030", ["c", "a"]],
    ]);
    expect(searchDevices(devices, "quillon 1012").map((device) => device.id)).toEqual(["b"]);
  });
});
