import { StatusCodes } from "node-opcua";
import { describe, expect, it } from "vitest";
import { findStatusCode, findStatusName, STATUS_NAMES } from "~/domain/nodeset/values/status-codes";

describe("names of StatusCodes", () => {
  // The reference library's own list, without its combinations of a code with flags.
  const listed = Object.values(StatusCodes).filter(
    ({ name, value }) => typeof value === "number" && !name.includes("#"),
  );

  it("are those of the reference library", () => {
    expect(STATUS_NAMES.length).toBe(new Set(listed.map(({ value }) => value)).size);
    for (const { name, value } of listed) expect(findStatusCode(name), name).toBe(value);
  });

  it("are found with flags, with an underscore and by number", () => {
    // OPC 10000-4 Table 179 writes Bad_NotConnected; 0x808A0000 in OPC 10000-6 Annex A.2.
    expect(findStatusName(0x808a0500)).toBe("BadNotConnected");
    expect(findStatusCode("Bad_NotConnected")).toBe(0x808a0000);
    expect(findStatusCode("0x808A0000")).toBe(0x808a0000);
    expect(findStatusCode("2156527616")).toBe(0x808a0000);
    expect(findStatusCode("Broken")).toBeUndefined();
    expect(findStatusName(0x8fff0000)).toBeUndefined();
  });
});
