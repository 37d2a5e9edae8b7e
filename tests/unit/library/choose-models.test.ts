/** Which NodeSets a model gets, in which order, and what is said when some are missing (OPC 10000-6 §F.5). */
import { describe, expect, it } from "vitest";
import { formatProblem } from "~/domain/core/problem-texts";
import { chooseModels } from "~/library/choose-models";
import type { LibraryEntry } from "~/library/library-entry";

const BASE = "http://opcfoundation.org/UA/";

type Asked = { modelUri: string; version?: string; publicationDate?: string };

function entry(
  modelUri: string,
  requires: readonly (string | Asked)[] = [],
  more: Partial<LibraryEntry> = {},
): LibraryEntry {
  return {
    origin: "published",
    title: modelUri,
    file: `${modelUri}.xml`,
    modelUri,
    requiredModels: requires.map(ask),
    sha256: JSON.stringify([modelUri, more]),
    source: { kind: "file", path: "" },
    ...more,
  };
}

function ask(asked: string | Asked): Asked & { requiredModels: [] } {
  return typeof asked === "string" ? { modelUri: asked, requiredModels: [] } : { ...asked, requiredModels: [] };
}

const base = entry(BASE, [], { publicationDate: "2026-05-01T00:00:00Z" });

describe("choosing models", () => {
  it("puts what is required before what requires it, each once, the base first", () => {
    const library = [entry("c", ["b", "a", BASE]), entry("b", ["a"]), entry("a", [BASE]), base, entry("unused")];
    const { entries, problems } = chooseModels([ask("c"), ask("b")], [library], "me");
    expect(entries.map(({ modelUri }) => modelUri)).toEqual([BASE, "a", "b", "c"]);
    expect(problems).toEqual([]);
  });

  it("takes the newest of several, by publication date, and what was added before what is published", () => {
    const old = entry("a", [], { publicationDate: "2020-01-01T00:00:00Z", version: "9.0" });
    const newer = entry("a", [], { publicationDate: "2024-01-01T00:00:00+02:00", version: "1.0" });
    const added = entry("a", [], { publicationDate: "2024-01-01T00:00:00+02:00", version: "1.0", origin: "added" });
    const undated = entry("a", [], { version: "99" });
    expect(chooseModels([ask("a")], [[undated, old, newer], [base]], "me").entries).toContain(newer);
    expect(chooseModels([ask("a")], [[added], [undated, old, newer, base]], "me").entries).toContain(added);
  });

  it("is content with a newer one, and warns of an older one", () => {
    const library = [base, entry("a", [], { version: "1.2.0", publicationDate: "2022-06-01T00:00:00Z" })];
    const older = { modelUri: "a", version: "1.1.0", publicationDate: "2021-01-01T00:00:00Z" };
    expect(chooseModels([ask(older)], [library], "me").problems).toEqual([]);
    const newer = { modelUri: "a", version: "1.3.0", publicationDate: "2023-01-01T00:00:00Z" };
    const { entries, problems } = chooseModels([ask(newer)], [library], "me");
    expect(entries).toHaveLength(2);
    expect(problems.map(({ severity }) => severity)).toEqual(["warning"]);
    expect(problems.map(formatProblem)).toEqual([
      "me requires a 1.3.0 of 2023-01-01; the library has only the older 1.2.0 of 2022-06-01.",
    ]);
  });

  it("compares versions number by number where dates are missing", () => {
    const library = [base, entry("a", [], { version: "1.10.0" })];
    expect(chooseModels([ask({ modelUri: "a", version: "1.9" })], [library], "me").problems).toEqual([]);
    expect(chooseModels([ask({ modelUri: "a", version: "1.11" })], [library], "me").problems[0]?.code).toBe(
      "library.only-older",
    );
  });

  it("says which model is missing, in which version, and who requires it", () => {
    const library = [base, entry("a", [{ modelUri: "gone", version: "2.0", publicationDate: "2025-02-03T00:00:00Z" }])];
    const { entries, problems } = chooseModels([ask("a"), ask("gone")], [library], "me");
    expect(entries.map(({ modelUri }) => modelUri)).toEqual([BASE, "a"]);
    expect(problems.map(formatProblem)).toEqual([
      "a requires the model gone (2.0 of 2025-02-03), which is not in the library.",
    ]);
  });

  it("ends in a circle and shows it", () => {
    const library = [base, entry("a", ["b"]), entry("b", ["a", "me"])];
    const { problems } = chooseModels([ask("a")], [library], "me");
    expect(problems.map(({ code, data }) => [code, data?.path])).toEqual([
      ["library.required-cycle", "a → b → a"],
      ["library.required-cycle", "me → a → b → me"],
    ]);
  });

  it("leaves the asking model out, also when it is the base itself", () => {
    expect(chooseModels([], [[base]], BASE).entries).toEqual([]);
    expect(chooseModels([ask("a")], [[base, entry("a", [BASE]), entry("me")]], "me").entries).toHaveLength(2);
  });
});
