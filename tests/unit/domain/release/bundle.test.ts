import { createHash } from "node:crypto";
import { unzipSync } from "fflate";
import { afterEach, describe, expect, test, vi } from "vitest";
import { getValue } from "~/domain/core/result";
import { makeManifest, openBundle, packBundle, writeManifest, type BundleFile } from "~/domain/release/bundle";

const sha256 = (bytes: Uint8Array): string => createHash("sha256").update(bytes).digest("hex");
const file = (path: string, text: string): BundleFile => ({ path, bytes: Buffer.from(text) });
const files = [file("b/two.txt", "2"), file("a.txt", "1"), file("B.txt", "3")];
const about = {
  model: {
    name: "M",
    namespaceUri: "urn:m",
    version: "1.0.0",
    modelVersion: "1.0.0",
    publicationDate: "2026-12-01T00:00:00Z",
    revision: 1,
    contents: "0",
    previous: null,
    rating: null,
  },
  requiredModels: [],
};
const signature = { algorithm: "Ed25519", keyId: "k", publicKey: "p", signature: "s" } as const;

afterEach(() => vi.useRealTimers());

describe("a bundle", () => {
  test("has the same bytes whenever and in whatever order it is made", () => {
    const make = (list: readonly BundleFile[]) =>
      packBundle(list, writeManifest(makeManifest(about, list, sha256)), signature);
    const first = make(files);
    vi.useFakeTimers({ now: new Date("2031-07-01T23:59:59Z") });
    const second = make([...files].reverse());
    expect(sha256(second)).toBe(sha256(first));
    // The local file header holds the time in four bytes from offset 10 (APPNOTE 4.3.7): 1980-01-01 12:00.
    expect([...first.slice(10, 14)]).toEqual([0x00, 0x60, 0x21, 0x00]);
    expect(Object.keys(unzipSync(first))).toEqual(["manifest.json", "signature.json", "B.txt", "a.txt", "b/two.txt"]);
  });

  test("is held against its manifest", () => {
    const manifest = writeManifest(makeManifest(about, files, sha256));
    const open = (list: readonly BundleFile[]) =>
      openBundle(packBundle(list, manifest, signature), sha256).problems.map((p) => p.code);
    expect(open(files)).toEqual([]);
    expect(open([...files.slice(1), file("b/two.txt", "other")])).toEqual(["bundle.file-changed"]);
    expect(open(files.slice(1))).toEqual(["bundle.file-missing"]);
    expect(open([...files, file("more.txt", "")])).toEqual(["bundle.file-unknown"]);
    expect(openBundle(Buffer.from("PK no"), sha256).problems.map((p) => p.code)).toEqual(["bundle.unreadable"]);
    expect(getValue(openBundle(packBundle(files, manifest, signature), sha256)).manifest.files).toHaveLength(3);
  });
});
