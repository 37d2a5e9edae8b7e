import { describe, expect, it } from "vitest";
import { formatCount } from "~/utils/format";

describe("formatCount", () => {
  it("sets groups of three apart and writes minus as U+2212", () => {
    expect(formatCount(999)).toBe("999");
    expect(formatCount(1318)).toBe("1\u202f318");
    expect(formatCount(-4408652)).toBe("\u22124\u202f408\u202f652");
  });
});
