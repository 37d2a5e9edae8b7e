/** Files that people take for a NodeSet: each is named in plain words. */
import { gzipSync } from "node:zlib";
import { describe, expect, it } from "vitest";
import { decodeXmlBytes } from "~/domain/nodeset/decode-xml-bytes";
import { recogniseFile } from "~/domain/nodeset/recognise-file";

const bytes = (text: string): Uint8Array => new TextEncoder().encode(text);
const NODESET = '<UANodeSet xmlns="http://opcfoundation.org/UA/2011/03/UANodeSet.xsd"/>';

describe("recogniseFile", () => {
  it.each([
    ["a NodeSet", NODESET, "nodeset", /NodeSet2/],
    ["one behind a comment", `<?xml version="1.0"?>\n<!-- <html> -->\n${NODESET}`, "nodeset", /NodeSet2/],
    [
      "one with a prefix",
      '<u:UANodeSet xmlns:u="http://opcfoundation.org/UA/2011/03/UANodeSet.xsd"/>',
      "nodeset",
      /NodeSet2/,
    ],
    ["changes", '<UANodeSetChanges TransactionId="1"/>', "xml", /changes/],
    ["a device description", '<IODevice xmlns="http://www.io-link.com/IODD/2010/10">', "xml", /IODD/],
    ["an XML schema", '<xs:schema xmlns:xs="http://www.w3.org/2001/XMLSchema">', "xml", /schema/],
    ["a type dictionary", '<opc:TypeDictionary xmlns:opc="http://opcfoundation.org/BinarySchema/">', "xml", /binary/],
    ["other XML", "<note/>", "xml", /another XML document/],
    ["a web page", "<!DOCTYPE html><html>", "html", /web page/],
    ["a web page without type", "<HTML><body>", "html", /web page/],
    ["JSON", ' {"a": 1}', "json", /JSON/],
    ["a table", "Name;Id\nA;1\n", "csv", /CSV/],
    ["words", "Dear colleagues,", "text", /text file/],
  ])("knows %s", (_name, text, kind, what) => {
    for (const head of ["", "\uFEFF"]) {
      const found = recogniseFile(bytes(head + text));
      expect([found.kind, found.what]).toEqual([kind, expect.stringMatching(what)]);
    }
  });

  it.each([
    ["a ZIP archive", [0x50, 0x4b, 3, 4], "zip"],
    ["a PDF", [0x25, 0x50, 0x44, 0x46, 0x2d], "pdf"],
    ["a picture", [0x89, 0x50, 0x4e, 0x47], "image"],
    ["bytes", [1, 2, 0, 3], "binary"],
  ])("knows %s by its first bytes", (_name, head, kind) => {
    expect(recogniseFile(Uint8Array.from(head))).toMatchObject({ kind, isXml: false });
  });

  it("knows a compressed NodeSet as what it is, so that nobody unpacks without a limit", () => {
    const result = decodeXmlBytes(gzipSync(NODESET));
    expect(result.problems[0]).toMatchObject({ code: "file.other-kind", data: { kind: "gzip" } });
  });

  it("knows a NodeSet in UTF-16", () => {
    expect(recogniseFile(Buffer.from(`\uFEFF${NODESET}`, "utf16le")).kind).toBe("nodeset");
    expect(recogniseFile(Buffer.from(NODESET, "utf16le").swap16()).kind).toBe("nodeset");
  });
});
