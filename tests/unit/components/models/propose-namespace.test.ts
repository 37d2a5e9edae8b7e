import { describe, expect, it } from "vitest";
import { findNamespaceBase, proposeNamespaceUri, toNamespacePart } from "~/components/models/propose-namespace";

describe("proposeNamespaceUri", () => {
  it("joins the words of the name", () => {
    expect(proposeNamespaceUri("http://merrow.example/UA/", "Rope braider")).toBe(
      "http://merrow.example/UA/RopeBraider/",
    );
  });

  it("keeps letters without their accents and drops other signs", () => {
    expect(toNamespacePart("Förder-Anlage № 3")).toBe("ForderAnlageNo3");
  });

  it("proposes nothing for a name without letters", () => {
    expect(proposeNamespaceUri("http://merrow.example/UA/", " … ")).toBe("");
  });
});

describe("findNamespaceBase", () => {
  it("takes what most of the team's namespaces share", () => {
    const uris = [
      "http://merrow.example/UA/RopeBraider/",
      "http://merrow.example/UA/Hall/",
      "urn:other:thing",
      "http://other.example/X/",
    ];
    expect(findNamespaceBase(uris, "Merrow Ropeworks")).toBe("http://merrow.example/UA/");
  });

  it("makes one of the organisation's name for the first model", () => {
    expect(findNamespaceBase([], "Merrow Ropeworks")).toBe("http://merrowropeworks.example/UA/");
  });
});
