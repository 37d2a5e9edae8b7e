import { describe, expect, test } from "vitest";
import { compareVersions, planRelease, toModelVersion } from "~/domain/release/release-rules";

const last = { version: "1.02.0", modelVersion: "1.2.0", publicationDate: "2026-10-12T08:00:00Z" };
const base = {
  publicationDate: "2026-12-01T10:00:00Z",
  required: [{ modelUri: "http://opcfoundation.org/UA/", version: "1.05.07", requiredModels: [] }],
};
const codes = (intent: Partial<Parameters<typeof planRelease>[0]>): string[] => {
  const plan = planRelease({ ...base, version: "1.3.0", rating: "additive", last, ...intent });
  return plan.problems.map((found) => `${found.severity} ${found.code}`);
};

describe("planRelease", () => {
  test("drops leading zeros for ModelVersion and keeps Version as text (OPC 10000-6 §F.2, semver.org §2)", () => {
    expect(planRelease({ ...base, version: "1.03.0", rating: "additive", last })).toMatchObject({
      ok: true,
      value: { version: "1.03.0", modelVersion: "1.3.0", publicationDate: base.publicationDate },
    });
    expect(toModelVersion("1.05")).toBe("1.5.0");
    expect(toModelVersion("1.5.0-rc")).toBeUndefined();
  });

  test.each([
    [{ version: "next" }, ["error release.version"]],
    [{ version: "1.2.0" }, ["error release.version-not-higher"]],
    [{ version: "1.2.1" }, ["error release.version-too-low"]],
    [{ version: "1.2.1", rating: "neutral" as const }, []],
    [{ version: "1.3.0", rating: "breaking" as const }, ["error release.version-too-low"]],
    [{ version: "2.0.0", rating: "breaking" as const }, ["warning release.breaking-same-namespace"]],
    [{ publicationDate: last.publicationDate }, ["error release.date-not-later"]],
    [{ required: [{ modelUri: "urn:x", requiredModels: [] }] }, ["error release.requirement-open"]],
    [{ version: "0.1.0", last: undefined }, []],
  ])("%j", (intent, expected) => {
    expect(codes(intent)).toEqual(expected);
  });

  test("compares numbers, not texts (semver.org §11)", () => {
    expect(compareVersions("1.10.0", "1.9.9")).toBeGreaterThan(0);
    expect(compareVersions("2.0.0", "10.0.0")).toBeLessThan(0);
  });
});
