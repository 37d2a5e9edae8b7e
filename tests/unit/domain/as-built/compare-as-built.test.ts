/** Differences that a reader of the standard would name: units and ranges by OPC 10000-8 §5.6, statuses by OPC 10000-4 §7.38.1. */
import { describe, expect, it } from "vitest";
import { AddressSpace, buildLayer } from "~/domain/address-space/address-space";
import { qualifiedName } from "~/domain/address-space/qualified-name";
import type { Node } from "~/domain/address-space/node";
import { numericNodeId, standardKey, toNodeKey } from "~/domain/address-space/node-id";
import { STRICT_TOLERANCE, type AsBuiltTolerance, type Observation } from "~/domain/as-built/as-built";
import { compareAsBuilt, matches } from "~/domain/as-built/compare-as-built";
import { ObservationTally } from "~/domain/as-built/observation-tally";
import { smallStandard } from "../../../support/small-standard";

const URI = "http://merrow.example/as-built/";
const keyOf = (id: number) => toNodeKey(numericNodeId(URI, id));
const folder: Node = {
  key: keyOf(1),
  nodeId: numericNodeId(URI, 1),
  nodeClass: "Object",
  order: 0,
  browseName: qualifiedName(URI, "B1"),
  displayName: [{ locale: "de", text: "Flechter 1" }, { locale: "en", text: "Braider 1" }],
  references: [{ type: standardKey(35), target: standardKey(85), isForward: false }],
};

function property(id: number, name: string, xml: string, owner = 1): Node {
  return {
    key: keyOf(id),
    nodeId: numericNodeId(URI, id),
    nodeClass: "Variable",
    order: id,
    browseName: qualifiedName("http://opcfoundation.org/UA/", name),
    displayName: [{ text: name }],
    dataType: standardKey(12),
    value: { xml },
    references: [{ type: standardKey(46), target: keyOf(owner), isForward: false }],
  };
}

const text = (value: string): string => `<String xmlns="http://opcfoundation.org/UA/2008/02/Types.xsd">${value}</String>`;
const header = { namespaceUris: [URI], models: [{ modelUri: URI, version: "1.2.0", requiredModels: [] }] };


function compare(released: Node[], served: Node[], change: { tolerance?: Partial<AsBuiltTolerance>; observations?: Observation[]; version?: string } = {}) {
  return compareAsBuilt({
    released: AddressSpace.of([smallStandard], buildLayer(header, released)),
    releasedModels: [{ modelUri: URI, version: "1.2.0" }],
    served: { nodes: served, models: [{ modelUri: URI, ...(change.version ? { version: change.version } : {}) }], isComplete: true },
    tolerance: { ...STRICT_TOLERANCE, ...change.tolerance },
    observations: change.observations ?? [],
  });
}

describe("compareAsBuilt", () => {
  it("takes a text in any of the released languages, and values in any spelling", () => {
    const served = [{ ...folder, displayName: [{ locale: "de", text: "Flechter 1" }] }, property(2, "SerialNumber", `<uax:String xmlns:uax="http://opcfoundation.org/UA/2008/02/Types.xsd">SB-1</uax:String>`)];
    expect(compare([{ ...folder, symbolicName: "Braider1" } as Node, property(2, "SerialNumber", text("SB-1"))], served)).toMatchObject({ verdict: "as released", differences: [] });
  });

  it("names a missing node, one too many, and another value of a Property", () => {
    const released = [folder, property(2, "SerialNumber", text("SB-1")), property(3, "Manufacturer", text("Sallow"))];
    const served = [folder, property(2, "SerialNumber", text("SB-2")), property(4, "Location", text("Hall 1"))];
    const { verdict, differences } = compare(released, served);
    expect(verdict).toBe("differs");
    expect(differences.map((d) => [d.aspect, d.nodeId])).toEqual(
      expect.arrayContaining([
        ["missing", keyOf(3)],
        ["additional", keyOf(4)],
        ["value", keyOf(2)],
      ]),
    );
  });

  it("lists what a pattern ignores and does not count it", () => {
    const { verdict, differences, counts } = compare([folder], [folder, property(4, "VendorHint", text("x"))], { tolerance: { ignored: ["*/Vendor*"] } });
    expect(differences).toMatchObject([{ aspect: "additional", ignoredBy: "*/Vendor*" }]);
    expect({ verdict, ...counts }).toEqual({ verdict: "as released", nodes: 1, counted: 0, ignored: 1 });
  });

  it("compares versions only where the server tells one", () => {
    expect(compare([folder], [folder]).differences).toEqual([]);
    expect(compare([folder], [folder], { version: "1.1.0" }).differences).toMatchObject([{ aspect: "version", released: "1.2.0", found: "1.1.0" }]);
  });

  it("judges what the values did", () => {
    const seen = (change: Partial<Observation>): Observation => ({ nodeId: keyOf(9), path: "B1/Tension", watchedFor: 10_000, samples: 10, badFor: 0, uncertainFor: 0, worstStatus: "Good", promisedPeriod: 1_000, ...change });
    const judge = (change: Partial<Observation>) => compare([folder], [folder], { observations: [seen(change)] }).differences;
    expect(judge({})).toEqual([]);
    expect(judge({ samples: 0 })).toMatchObject([{ kind: "never-came" }]);
    expect(judge({ badFor: 6_000, worstStatus: "BadNoCommunication" })).toMatchObject([{ kind: "bad-status", found: "BadNoCommunication for 6 s" }]);
    expect(judge({ samples: 8, watchedFor: 30_000, shortestGap: 3_500 })).toMatchObject([{ kind: "too-slow", released: "every 1 s", found: "every 3.75 s" }]);
    // A value that hardly moved, or moved in time at least twice, contradicts no promise.
    expect(judge({ samples: 3, shortestGap: 3_500 })).toEqual([]);
    expect(judge({ samples: 8, watchedFor: 30_000, shortestGap: 1_100 })).toEqual([]);
  });
});

describe("ObservationTally", () => {
  it("measures the longest time in one piece by the severity bits", () => {
    const tally = new ObservationTally("i=1", "x", 0);
    tally.offer(100, 0, "Good");
    tally.offer(1_000, 0x80310000, "BadNoCommunication");
    tally.offer(2_000, 0x808c0000, "BadSensorFailure");
    tally.offer(4_000, 0x40900000, "UncertainLastUsableValue");
    tally.offer(4_500, 0, "Good");
    tally.offer(5_000, 0x80310000, "BadNoCommunication");
    expect(tally.end(6_000)).toEqual({ nodeId: "i=1", path: "x", watchedFor: 6_000, samples: 6, shortestGap: 500, badFor: 3_000, uncertainFor: 500, worstStatus: "BadNoCommunication" });
  });
});

describe("matches", () => {
  it("knows one sign, for any characters", () => {
    expect(matches("a*c", "abc")).toBe(true);
    expect(matches("a*c", "ac")).toBe(true);
    expect(matches("a*a", "a")).toBe(false);
    expect(matches("*x*y*", "axbyc")).toBe(true);
    expect(matches("a.c", "abc")).toBe(false);
  });
});
