import { describe, expect, it } from "vitest";
import { formatBytes, formatLeaf, parseBytes, parseLeaf, parseNodeIdLeaf } from "~/components/values/leaf-text";
import { isUnfinished } from "~/components/values/value-draft";
import type { BuiltInType } from "~/domain/nodeset/values/variant";

const reasonOf = (type: BuiltInType, text: string): string | undefined => {
  const parsed = parseLeaf(type, text);
  return isUnfinished(parsed) ? parsed.reason : undefined;
};

describe("texts of leaves", () => {
  // Ranges: OPC 10000-6 §5.1.2, Table 1.
  it.each<[BuiltInType, string, unknown]>([
    ["SByte", "−128", -128],
    ["Byte", "255", 255],
    ["Int64", "-9223372036854775808", -9223372036854775808n],
    ["UInt64", "18446744073709551615", 18446744073709551615n],
    ["Double", "1,5", 1.5],
    ["Double", "−INF", -Infinity],
    ["Float", "1e−3", 0.001],
    ["Boolean", "TRUE", true],
    ["String", " as it is ", " as it is "],
    ["Guid", "{72962B91-FA75-4AE6-8D28-B404DC7DAF63}", "72962b91-fa75-4ae6-8d28-b404dc7daf63"],
    ["DateTime", "2026-12-01", "2026-12-01T00:00:00Z"],
    ["DateTime", "2026-12-01 09:30", "2026-12-01T09:30:00Z"],
    ["DateTime", "2024-02-29T08:00:00.123+01:00", "2024-02-29T08:00:00.123+01:00"],
  ])("%s takes %s", (type, text, value) => {
    expect(parseLeaf(type, text)).toEqual(value);
  });

  it.each<[BuiltInType, string, RegExp]>([
    ["Byte", "256", /from 0 to 255/],
    ["Int16", "12.5", /whole numbers from −32768 to 32767/],
    ["UInt64", "-1", /from 0 to 18446744073709551615/],
    ["Double", "fast", /takes a number/],
    ["Float", "1e39", /Float ends at 3.4e38/],
    ["Double", "1e999", /Double ends/],
    ["DateTime", "2026-02-30T00:00:00Z", /2026-12-01T09:30:00Z/],
    ["DateTime", "tomorrow", /2026-12-01T09:30:00Z/],
    ["Guid", "72962b91", /8-4-4-4-12/],
    ["String", "a\u0007b", /XML cannot hold/],
  ])("%s says why it does not take %s", (type, text, reason) => {
    expect(reasonOf(type, text)).toMatch(reason);
  });

  it("show a true minus and the names of what is no number", () => {
    expect([-5, 5n, NaN, -Infinity, null, true].map(formatLeaf)).toEqual(["−5", "5", "NaN", "−INF", "", "true"]);
  });

  it("turn bytes into hex and base64 and back", () => {
    // RFC 4648 §10: BASE64("foobar") = "Zm9vYmFy", BASE16 of it 666F6F626172.
    expect(parseBytes("66 6F 6F 62 61 72", "hex")).toBe("Zm9vYmFy");
    expect(formatBytes("Zm9vYmFy", "hex")).toBe("66 6F 6F 62 61 72");
    expect(isUnfinished(parseBytes("6", "hex"))).toBe(true);
    expect(isUnfinished(parseBytes("Zm9", "base64"))).toBe(true);
  });

  it("read NodeIds with the namespace as URI only", () => {
    expect(parseNodeIdLeaf("i=85")).toMatchObject({ type: "i", identifier: 85 });
    expect(parseNodeIdLeaf("nsu=http://example.test/;s=A.B")).toMatchObject({ type: "s", identifier: "A.B" });
    expect(isUnfinished(parseNodeIdLeaf("ns=3;i=1"))).toBe(true);
  });
});
