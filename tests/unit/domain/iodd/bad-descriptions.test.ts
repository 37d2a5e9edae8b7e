/** Descriptions that nobody should have to trust: each gives a problem with its place. Packages: read-package.test.ts. */
import { strToU8 } from "fflate";
import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { readDevicePackage } from "~/domain/iodd/read-package";

const name = "Quillon-QS-U30-20261102-IODD1.1.xml";
const good = readFileSync(`nodesets/demo/iodd/${name}`, "utf8");

function codes(bytes: Uint8Array, file: string): string[] {
  return readDevicePackage(bytes, file).problems.map((p) => p.code);
}

function readChanged(from: string | RegExp, to: string) {
  const text = good.replace(from, to);
  expect(text).not.toBe(good);
  return readDevicePackage(strToU8(text), name);
}

describe("descriptions", () => {
  test("with entities that expand without end, or from outside", () => {
    const bomb = good.replace(/(<\?xml[^>]*\?>)/, '$1<!DOCTYPE x [<!ENTITY a "aaaa"><!ENTITY b "&a;&a;&a;&a;">]>');
    expect(codes(strToU8(bomb), name)).toContain("xml.doctype");
    const outside = good.replace(/(<\?xml[^>]*\?>)/, '$1<!DOCTYPE x [<!ENTITY a SYSTEM "file:///etc/passwd">]>');
    expect(codes(strToU8(outside), name)).toContain("xml.doctype");
  });

  test("of another schema", () => {
    const read = readChanged("http://www.io-link.com/IODD/2010/10", "http://www.io-link.com/IODD/2008/03");
    expect(read.ok).toBe(false);
    expect(read.problems.map((p) => p.code)).toContain("iodd.wrong-root");
    expect(read.problems[0]?.at?.line).toBeGreaterThan(0);
  });

  test("whose fields overlap, lie outside, or whose lengths disagree are read and told with line and column", () => {
    const overlap = readChanged('subindex="2" bitOffset="8"', 'subindex="2" bitOffset="20"');
    expect(overlap.problems.map((p) => p.code)).toContain("iodd.field-overlap");
    const outside = readChanged('subindex="1" bitOffset="16"', 'subindex="1" bitOffset="30"');
    expect(outside.problems.map((p) => p.code)).toContain("iodd.field-outside");
    const length = readChanged(/(<ProcessDataIn id="[^"]+" bitLength=)"32"/, '$1"40"');
    expect(length.problems.map((p) => p.code)).toContain("iodd.length-mismatch");
    for (const { problems } of [overlap, outside, length]) {
      const told = problems.filter((p) => p.code.startsWith("iodd.field") || p.code === "iodd.length-mismatch");
      for (const p of told) expect([p.at?.line ?? 0, p.at?.column ?? 0].every((n) => n > 0)).toBe(true);
    }
  });

  test("with more process data than IO-Link carries", () => {
    const read = readChanged(/(<ProcessDataIn id="[^"]+" bitLength=)"32"/, '$1"264"');
    expect(read.problems.map((p) => p.code)).toContain("iodd.process-data-too-long");
  });
});
