import { describe, expect, test } from "vitest";
import { AddressSpace } from "~/domain/address-space/address-space";
import { compareModels } from "~/domain/compare/compare-models";
import { proposeVersion } from "~/domain/compare/propose-version";
import { getPublishedLayer, getStandardLayer } from "../../../support/published-layers";
import { plantChanges, planters } from "../../../support/planted-changes";

function spaceOf(...files: readonly string[]): AddressSpace {
  const layers = files.map((file) => getPublishedLayer(file));
  const own = layers.pop();
  if (!own) throw new Error("no file");
  return AddressSpace.of([getStandardLayer(), ...layers], own);
}

/** Namespace 0 as the own model: the largest published one, so that 400 changes find nodes of their own. */
const standard = (): AddressSpace => AddressSpace.of([], getStandardLayer());
const ofKind = (text: { kind: string; rating: string }): string => `${text.kind} ${text.rating}`;

describe("compareModels", () => {
  test.each(["Opc.Ua.Di.NodeSet2.xml", "Opc.Ua.Machinery.NodeSet2.xml", "Opc.Ua.LADS.NodeSet2.xml"])(
    "finds nothing between %s and itself",
    (file) => {
      expect(compareModels(spaceOf(file), spaceOf(file))).toEqual({
        changes: [],
        rating: undefined,
        proposedVersion: expect.toSatisfy((v) => v === undefined || typeof v === "string"),
      });
    },
  );

  const fresh = Number(process.env.FERRULE_SEED ?? Date.now() % 1_000_000);
  test.each([
    ["a fixed seed", 20261201],
    ["a fresh seed", fresh],
  ])("finds each of 400 planted changes once, under its kind, with its rating: %s", (_, seed) => {
    const before = standard();
    const { space: after, planted } = plantChanges(before, 400, seed);
    const found = compareModels(before, after).changes;
    const rows = new Map<string, { planted: number; found: number }>();
    for (const p of planted) rows.set(ofKind(p), { planted: (rows.get(ofKind(p))?.planted ?? 0) + 1, found: 0 });
    for (const f of found)
      rows.set(ofKind(f), { planted: rows.get(ofKind(f))?.planted ?? 0, found: (rows.get(ofKind(f))?.found ?? 0) + 1 });
    console.info(
      `planted changes, seed ${seed}\n${[...rows].map(([kind, r]) => `${kind.padEnd(40)} planted ${r.planted} found ${r.found}`).join("\n")}`,
    );
    const key = (c: { kind: string; rating: string }, node: string | undefined): string => `${ofKind(c)} ${node}`;
    expect(found.map((c) => key(c, c.nodeId)).sort()).toEqual(planted.map((p) => key(p, p.node)).sort());
    expect(planted.length).toBe(400);
    expect(new Set(planted.map((p) => p.kind)).size).toBeGreaterThanOrEqual(20);
    expect(planters.length).toBeGreaterThanOrEqual(20);
  });

  /** Checked by hand in the two files of the npm package (1.02 and the current one). */
  test("published DI, 1.02 against its successor: three findings read from the files by hand", () => {
    const { changes, rating } = compareModels(
      spaceOf("1.02/Opc.Ua.Di.NodeSet2.xml"),
      spaceOf("Opc.Ua.Di.NodeSet2.xml"),
    );
    expect(rating).toBe("breaking");
    const find = (kind: string, path: string) => changes.find((c) => c.kind === kind && c.path === path);
    expect(find("data-type-changed", "BlockType/RevisionCounter")).toMatchObject({
      before: "UInt32",
      after: "Int32",
      rating: "breaking",
    });
    expect(find("type-removed", "DeviceType")).toBeUndefined();
    expect(find("renumbered", "DeviceType")).toMatchObject({
      before: "nsu=http://opcfoundation.org/UA/DI/;i=12254",
      after: "nsu=http://opcfoundation.org/UA/DI/;i=1002",
    });
    expect(find("member-added", "ConnectionPointType/<ProfileIdentifier>")).toMatchObject({ rating: "breaking" });
    expect(find("renumbered", "DeviceSet")).toMatchObject({
      before: "nsu=http://opcfoundation.org/UA/DI/;i=12260",
      after: "nsu=http://opcfoundation.org/UA/DI/;i=5001",
    });
  });
});

describe("proposeVersion", () => {
  /** semver.org 2.0.0 §§4, 6, 7, 8. */
  test.each([
    ["1.2.3", "breaking", "2.0.0"],
    ["1.2.3", "additive", "1.3.0"],
    ["1.2.3", "neutral", "1.2.4"],
    ["0.4.1", "breaking", "0.5.0"],
    ["1.03", "additive", "1.4.0"],
    ["next", "additive", undefined],
  ] as const)("%s after a change rated %s is %s", (version, rating, expected) => {
    expect(proposeVersion(version, rating)).toBe(expected);
  });
});
