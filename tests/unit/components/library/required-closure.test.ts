import { describe, expect, it } from "vitest";
import { baseModelUri, listRequired, searchChoices } from "~/components/library/required-closure";
import type { LibraryChoice } from "~/services/list-library-choices.server";

function choice(
  title: string,
  modelUri: string,
  required: readonly string[],
  publicationDate = "2024-01-01",
): LibraryChoice {
  return {
    id: `${modelUri} ${publicationDate}`,
    modelUri,
    title,
    fileName: "",
    version: "1.0",
    publicationDate,
    nodeCount: 1,
    origin: "published",
    required: required.map((uri) => ({ modelUri: uri })),
    by: undefined,
  };
}

const base = choice("OPC UA", baseModelUri, []);
const devices = choice("Devices", "urn:devices", [baseModelUri]);
const machinery = choice("Machinery", "urn:machinery", [baseModelUri, "urn:devices"]);

describe("listRequired", () => {
  it("brings what the chosen models require, with who asked", () => {
    const rows = listRequired([base, devices, machinery], ["urn:machinery"]);
    expect(rows.map((row) => row.modelUri)).toEqual([baseModelUri, "urn:machinery", "urn:devices"]);
    expect(rows[2]?.askedBy).toEqual(["urn:machinery"]);
    expect(rows[1]?.askedBy).toEqual([]);
  });

  it("names a missing model without an entry", () => {
    const rows = listRequired([base, machinery], ["urn:machinery"]);
    expect(rows.find((row) => row.modelUri === "urn:devices")?.choice).toBeUndefined();
  });

  it("takes the newest of several entries and ends in cycles", () => {
    const old = choice("Devices", "urn:devices", [], "2010-01-01");
    const round = choice("Round", "urn:round", ["urn:round"]);
    expect(listRequired([base, old, devices], ["urn:devices"])[1]?.choice).toBe(devices);
    expect(listRequired([base, round], ["urn:round"])).toHaveLength(2);
  });
});

describe("searchChoices", () => {
  it("asks for all words in title or URI and puts titles that begin with the text first", () => {
    const all = [choice("Glass machinery", "urn:glass", []), machinery, devices];
    expect(searchChoices(all, "mach").map((c) => c.title)).toEqual(["Machinery", "Glass machinery"]);
    expect(searchChoices(all, "machinery glass").map((c) => c.title)).toEqual(["Glass machinery"]);
  });
});
