import { describe, expect, it } from "vitest";
import { toSafePath } from "~/utils/safe-return";

describe("toSafePath", () => {
  it("keeps a path of our own", () => {
    expect(toSafePath("/models/abc/sheet?node=x")).toBe("/models/abc/sheet?node=x");
  });

  it.each([
    null,
    undefined,
    "",
    "models",
    "https://elsewhere.example/",
    "//elsewhere.example",
    "/\\elsewhere.example",
    "/a b",
    "/a\nb",
  ])("leads home instead of to %j", (wanted) => {
    expect(toSafePath(wanted)).toBe("/");
  });
});
