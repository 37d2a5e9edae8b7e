/** What readers of NodeSet2 files meet besides NodeSet2 files: each answers with a code and a place. */
import { describe, expect, it } from "vitest";
import { formatProblem } from "~/domain/core/problem-texts";
import type { Problem } from "~/domain/core/result";
import { decodeXmlBytes } from "~/domain/nodeset/decode-xml-bytes";
import { readModelHeader } from "~/domain/nodeset/read-header";
import { readNodeSet, type ReadOptions } from "~/domain/nodeset/read-nodeset";

const XMLNS = "http://opcfoundation.org/UA/2011/03/UANodeSet.xsd";
const OWN = "http://merrow.example/test/";

type Parts = { uris?: string; models?: string; aliases?: string; body?: string; root?: string };

function file({ uris, models, aliases, body, root }: Parts = {}): string {
  return `<?xml version="1.0" encoding="utf-8"?>
<UANodeSet xmlns="${XMLNS}"${root ?? ""}>
  <NamespaceUris>${uris ?? `<Uri>${OWN}</Uri>`}</NamespaceUris>
  <Models>${models ?? `<Model ModelUri="${OWN}"><RequiredModel ModelUri="http://opcfoundation.org/UA/" /></Model>`}</Models>
  <Aliases>${aliases ?? '<Alias Alias="HasSubtype">i=45</Alias>'}</Aliases>
${body ?? ""}
</UANodeSet>
`;
}

function type(id: string, more = "", inner = ""): string {
  return `  <UAObjectType NodeId="${id}" BrowseName="1:T"${more}><DisplayName>T</DisplayName>${inner}</UAObjectType>`;
}

function problemsOf(text: string, options?: ReadOptions): readonly Problem[] {
  return readNodeSet(text, options).problems;
}

function find(text: string, code: string, options?: ReadOptions): Problem {
  const found = problemsOf(text, options).find((one) => one.code === code);
  if (!found)
    throw new Error(
      `No ${code} among ${problemsOf(text, options)
        .map((one) => one.code)
        .join(", ")}`,
    );
  expect(found.at?.line).toBeGreaterThan(0);
  expect(found.at?.column).toBeGreaterThan(0);
  expect(formatProblem(found)).not.toMatch(/\{\w+\}/);
  return found;
}

const bytesOf = (text: string): Uint8Array => new TextEncoder().encode(text);
const utf16 = (text: string, isBigEndian: boolean): Uint8Array => {
  const bytes = Buffer.from(`\uFEFF${text}`, "utf16le");
  return isBigEndian ? bytes.swap16() : bytes;
};

describe("a small file", () => {
  it("is read without a problem", () => {
    expect(problemsOf(file({ body: type("ns=1;i=1") }))).toEqual([]);
  });
});

describe("text that is no NodeSet2", () => {
  it.each([
    ["", "file.empty"],
    ["  \n ", "file.empty"],
    ["hello", "xml.not-xml"],
    ['{"a":1}', "xml.not-xml"],
    ["<UANodeSet", "xml.truncated"],
    ["<a/>", "nodeset.wrong-root"],
    ["<UANodeSet/>", "nodeset.wrong-namespace"],
    [`<UANodeSetChanges xmlns="${XMLNS}" TransactionId="1"/>`, "nodeset.wrong-root"],
    [`<UANodeSet xmlns="${XMLNS}"/>`, "nodeset.no-namespace"],
  ])("%j fails with %s", (text, code) => {
    expect(readNodeSet(text).ok).toBe(false);
    find(text, code);
  });

  it("is named by its root element", () => {
    expect(find(`<UANodeSetChanges xmlns="${XMLNS}" TransactionId="1"/>`, "nodeset.wrong-root").data?.what).toMatch(
      /changes/,
    );
    expect(find('<IODevice xmlns="http://www.io-link.com/IODD/2010/10"/>', "nodeset.wrong-root").data?.what).toMatch(
      /IODD/,
    );
    expect(find('<xs:schema xmlns:xs="http://www.w3.org/2001/XMLSchema"/>', "nodeset.wrong-root").data?.what).toMatch(
      /schema/,
    );
    expect(
      find('<opc:TypeDictionary xmlns:opc="http://opcfoundation.org/BinarySchema/"/>', "nodeset.wrong-root").data?.what,
    ).toMatch(/binary/);
  });
});

describe("XML that is broken", () => {
  it.each([
    ["two equal attributes", file({ body: type("ns=1;i=1", ' IsAbstract="true" IsAbstract="true"') })],
    ["crossed tags", file({ body: "<UAObject></UAVariable></UAObject>" })],
    ["an unknown entity", file({ body: type("ns=1;i=1", "", "<Description>&euro;</Description>") })],
    ["a NUL character", file({ body: type("ns=1;i=1", "", "<Description>\u0000</Description>") })],
    ["a bare ampersand", file({ body: type("ns=1;i=1", "", "<Description>A & B</Description>") })],
    ["an undefined prefix", file({ body: "<a:b/>" })],
    ["a name that begins with a digit", file({ body: "<1a/>" })],
    ["a value without quotes", file({ body: type("ns=1;i=1", " IsAbstract=true") })],
    ["a quote that is not closed", file({ body: type('ns=1;i=1" BrowseName="1:T><a b="c') })],
    ["two attributes without space", file({ body: type('ns=1;i=1"SymbolicName="T') })],
    ["a reference to no character", file({ body: type("ns=1;i=1", "", "<Description>&#1;</Description>") })],
    ["a reference beyond Unicode", file({ body: type("ns=1;i=1", "", "<Description>&#x110000;</Description>") })],
    ["]]> in text", file({ body: type("ns=1;i=1", "", "<Description>]]></Description>") })],
    ["-- in a comment", file({ body: "<!-- a -- b -->" })],
    ["a late declaration", file({ body: '<?xml version="1.0"?>' })],
    ["a second root", `${file()}<a/>`],
    ["text behind the root", `${file()}text`],
  ])("%s fails with a place", (_name, text) => {
    const result = readNodeSet(text);
    expect(result.ok).toBe(false);
    const code = text.includes("<a:b/>") ? "xml.prefix-undeclared" : "xml.not-well-formed";
    expect(find(text, code).at?.line).toBeGreaterThan(1);
  });

  it("names the very place of a bare ampersand", () => {
    const text = file({ body: '<UAObject NodeId="ns=1;i=1" BrowseName="1:A & B"/>' });
    const line = text.split("\n").findIndex((one) => one.includes(" & ")) + 1;
    expect(find(text, "xml.not-well-formed").at).toEqual({
      line,
      column: '<UAObject NodeId="ns=1;i=1" BrowseName="1:A '.length + 1,
    });
  });

  it("is told to end too early when it does", () => {
    const whole = file({ body: type("ns=1;i=1") });
    const cut = whole.slice(0, whole.indexOf("</DisplayName>"));
    expect(readNodeSet(cut).ok).toBe(false);
    expect(find(cut, "xml.truncated").at).toEqual({ line: 6, column: (cut.split("\n").at(-1)?.length ?? 0) + 1 });
  });

  it.each([
    ["an internal entity", '<!DOCTYPE a [<!ENTITY b "c">]>'],
    ["a growing entity", '<!DOCTYPE a [<!ENTITY a "aaaa"><!ENTITY b "&a;&a;&a;&a;"><!ENTITY c "&b;&b;&b;&b;">]>'],
    ["an external entity", '<!DOCTYPE a [<!ENTITY b SYSTEM "file:///etc/passwd">]>'],
    ["an external definition", '<!DOCTYPE a SYSTEM "http://127.0.0.1:1/a.dtd">'],
  ])("refuses a document type with %s", (_name, doctype) => {
    const text = file({ body: type("ns=1;i=1", "", "<Description>&b;</Description>") }).replace(
      "<UANodeSet",
      `${doctype}<UANodeSet`,
    );
    expect(readNodeSet(text).ok).toBe(false);
    expect(find(text, "xml.doctype").at?.line).toBe(2);
  });
});

describe("limits", () => {
  it("end a file that is too large", () => {
    const result = readNodeSet(file(), { limits: { maxBytes: 100 } });
    expect(result.ok).toBe(false);
    expect(result.problems[0]?.code).toBe("limit.file-size");
  });

  it("end a file that is too deep, without growing with it", () => {
    const text = file({
      body: `<UAObject NodeId="ns=1;i=1" BrowseName="1:A"><Extensions><Extension>${"<a>".repeat(100_000)}`,
    });
    expect(find(text, "limit.depth").data?.limit).toBe(200);
  });

  it("let 200 levels pass", () => {
    // The root, UAObject, Extensions and Extension are four of them.
    const inner = "<a>".repeat(196) + "</a>".repeat(196);
    const text = file({
      body: `<UAObject NodeId="ns=1;i=1" BrowseName="1:A"><Extensions><Extension>${inner}</Extension></Extensions></UAObject>`,
    });
    expect(problemsOf(text)).toEqual([]);
    expect(readNodeSet(text.replace(inner, `<a>${inner}</a>`)).ok).toBe(false);
  });

  it("end an element with too many attributes", () => {
    const attributes = Array.from({ length: 1_000_000 }, (_, i) => ` a${i}="x"`).join("");
    expect(find(file({ body: type("ns=1;i=1", attributes) }), "limit.attributes").data?.limit).toBe(256);
  });

  it("end a file with too many nodes", () => {
    const body = [1, 2, 3].map((id) => type(`ns=1;i=${id}`)).join("\n");
    expect(readNodeSet(file({ body }), { limits: { maxNodes: 3 } }).ok).toBe(true);
    expect(find(file({ body }), "limit.nodes", { limits: { maxNodes: 2 } }).at?.line).toBe(8);
  });

  it("end a file that takes too long", () => {
    const body = Array.from({ length: 2_000 }, (_, i) => type(`ns=1;i=${i + 1}`)).join("\n");
    expect(find(file({ body }), "limit.time", { shouldStop: () => true }).severity).toBe("error");
  });

  it("list 1000 problems and say how many more there are", () => {
    const body = Array.from({ length: 1_500 }, (_, i) => type(`ns=7;i=${i + 1}`)).join("\n");
    const problems = problemsOf(file({ body }));
    expect(problems).toHaveLength(1_001);
    expect(problems.at(-1)).toMatchObject({ code: "limit.problems", data: { count: 500 } });
  });

  it("report progress on the way", () => {
    const steps: number[] = [];
    const body = Array.from({ length: 2_000 }, (_, i) => type(`ns=1;i=${i + 1}`)).join("\n");
    readNodeSet(file({ body }), { onProgress: (done, total) => steps.push(done / total) });
    expect(steps.length).toBeGreaterThan(3);
    expect([...steps].sort((a, b) => a - b)).toEqual(steps);
  });
});

describe("encodings", () => {
  it.each([
    ["UTF-16 little endian", utf16(file(), false)],
    ["UTF-16 big endian", utf16(file(), true)],
    ["UTF-16 without mark", Buffer.from(file().replace("utf-8", "utf-16"), "utf16le")],
  ])("%s is read with a warning", (_name, bytes) => {
    const result = decodeXmlBytes(bytes);
    expect(result.ok && readNodeSet(result.value).ok).toBe(true);
    expect(result.problems.map(({ code, severity }) => [code, severity])).toEqual([["encoding.declared", "warning"]]);
  });

  it("reads declared Latin-1 with a warning", () => {
    const text = file({ body: type("ns=1;i=1", "", "<Description>Spindel läuft</Description>") }).replace(
      "utf-8",
      "ISO-8859-1",
    );
    const result = decodeXmlBytes(Buffer.from(text, "latin1"));
    expect(result.ok && result.value).toContain("läuft");
    expect(result.problems[0]?.code).toBe("encoding.declared");
  });

  it("refuses Latin-1 that claims to be UTF-8, and names the place", () => {
    const text = file({ body: type("ns=1;i=1", "", "<Description>Spindel läuft</Description>") });
    const result = decodeXmlBytes(Buffer.from(text, "latin1"));
    expect(result.ok).toBe(false);
    const line = text.split("\n").findIndex((one) => one.includes("läuft"));
    expect(result.problems[0]).toMatchObject({
      code: "encoding.invalid",
      at: { line: line + 1, column: (text.split("\n")[line]?.indexOf("ä") ?? 0) + 1 },
    });
  });

  it("refuses an encoding that nobody knows", () => {
    const result = decodeXmlBytes(bytesOf(file().replace("utf-8", "EBCDIC-37")));
    expect(result.problems[0]?.code).toBe("encoding.unknown");
  });

  it("drops a byte order mark", () => {
    const result = decodeXmlBytes(bytesOf(`\uFEFF${file()}`));
    expect(result.ok && result.value.startsWith("<?xml")).toBe(true);
    expect(result.problems).toEqual([]);
  });

  it("refuses more bytes than allowed", () => {
    expect(decodeXmlBytes(new Uint8Array(50 * 1024 * 1024 + 1)).problems[0]?.code).toBe("limit.file-size");
  });

  it("reads CR LF as LF and says so", () => {
    const text = file({ body: type("ns=1;i=1", "", "<Description>a\r\nb</Description>") }).replace(/\r?\n/g, "\r\n");
    const result = readNodeSet(text);
    expect(result.ok && result.value.nodes[0]?.description?.[0]?.text).toBe("a\nb");
    expect(result.problems.map(({ code, severity }) => [code, severity])).toEqual([["encoding.line-ends", "hint"]]);
  });
});

describe("the head alone", () => {
  it("is read up to the first node", () => {
    const result = readModelHeader(file({ body: `${type("ns=1;i=1")}<broken` }));
    expect(result.ok && result.value.models[0]?.modelUri).toBe(OWN);
  });

  it("is refused as the whole would be", () => {
    for (const text of ["hello", "<a/>", `<UANodeSet xmlns="${XMLNS}"/>`, `<UANodeSet xmlns="${XMLNS}"><Models>`]) {
      const head = readModelHeader(text);
      expect([head.ok, head.problems[0]?.code]).toEqual([false, readNodeSet(text).problems[0]?.code]);
    }
  });
});

describe("namespaces and models", () => {
  it.each([
    ["a NodeId", type("ns=9;i=1"), "node-id.namespace-index"],
    ["a BrowseName", '<UAObject NodeId="ns=1;i=1" BrowseName="9:A"/>', "qualified-name.namespace-index"],
    [
      "a reference",
      type("ns=1;i=1", "", '<References><Reference ReferenceType="HasSubtype">ns=9;i=1</Reference></References>'),
      "node-id.namespace-index",
    ],
    ["a DataType", '<UAVariable NodeId="ns=1;i=1" BrowseName="1:A" DataType="ns=9;i=1"/>', "node-id.namespace-index"],
    [
      "a value",
      `<UAVariable NodeId="ns=1;i=1" BrowseName="1:A"><Value><NodeId xmlns="http://opcfoundation.org/UA/2008/02/Types.xsd"><Identifier>ns=9;i=1</Identifier></NodeId></Value></UAVariable>`,
      "node-id.namespace-index",
    ],
  ])("an index in %s that the table lacks", (_name, body, code) => {
    const found = find(file({ body }), code);
    expect(found.severity).toBe("error");
    expect(found.data).toMatchObject({ index: 9, count: 2 });
  });

  it("keeps an attribute with a broken id as it was written", () => {
    const result = readNodeSet(file({ body: '<UAVariable NodeId="ns=1;i=1" BrowseName="1:A" DataType="ns=9;i=1"/>' }));
    expect(result.ok && result.value.nodes[0]?.otherAttributes).toEqual({ DataType: "ns=9;i=1" });
  });

  it("refuses to let a model be the standard itself", () => {
    const text = file({ models: '<Model ModelUri="http://opcfoundation.org/UA/" />', body: type("ns=1;i=1") });
    expect(find(text, "nodeset.own-namespace-zero").severity).toBe("error");
  });

  it("notes that namespace 0 is listed, and reads its index as namespace 0", () => {
    const text = file({ uris: `<Uri>${OWN}</Uri><Uri>http://opcfoundation.org/UA/</Uri>`, body: type("ns=2;i=77") });
    expect(find(text, "nodeset.namespace-zero-listed").data?.index).toBe(2);
    const result = readNodeSet(text);
    expect(result.ok && result.value.nodes[0]?.key).toBe("i=77");
  });

  it("keeps both of two models in one file and says which", () => {
    const models = `<Model ModelUri="${OWN}" /><Model ModelUri="http://merrow.example/second/" />`;
    const text = file({ models, uris: `<Uri>${OWN}</Uri><Uri>http://merrow.example/second/</Uri>` });
    expect(find(text, "nodeset.several-models").data?.models).toBe(`${OWN}, http://merrow.example/second/`);
    const result = readNodeSet(text);
    expect(result.ok && result.value.header.models).toHaveLength(2);
  });

  it("tells a model that requires itself", () => {
    const models = `<Model ModelUri="${OWN}"><RequiredModel ModelUri="urn:a"><RequiredModel ModelUri="${OWN}" /></RequiredModel></Model>`;
    expect(find(file({ models }), "nodeset.required-model-cycle").data?.path).toBe(`${OWN} → urn:a → ${OWN}`);
  });
});

describe("nodes", () => {
  const subtypeOf = (target: string): string =>
    `<References><Reference ReferenceType="HasSubtype" IsForward="false">${target}</Reference></References>`;

  it("names both places of a NodeId that is given twice and keeps the first", () => {
    const body = `${type("ns=1;i=1")}\n${type("ns=1;i=01", ' IsAbstract="true"')}`;
    const found = find(file({ body }), "nodeset.duplicate-node-id");
    expect(found).toMatchObject({ severity: "error", at: { line: 7 }, data: { firstLine: 6 } });
    const result = readNodeSet(file({ body }));
    expect(result.ok && result.value.nodes.map((node) => "isAbstract" in node)).toEqual([false]);
    expect(result.ok && result.value.isWhole).toBe(false);
  });

  it.each([
    ["ns=1;i=4294967296", "node-id.numeric-range"],
    ["ns=1;i=-1", "node-id.syntax"],
    ["ns=1;i=", "node-id.syntax"],
    ["ns=1;x=4", "node-id.syntax"],
    ["ns=1;g=not-a-guid", "node-id.syntax"],
    ["ns=99999999999;i=1", "node-id.syntax"],
    ["i=0", "nodeset.null-node-id"],
  ])("the NodeId %s is refused with %s", (id, code) => {
    expect(find(file({ body: type(id) }), code).severity).toBe("error");
  });

  it("takes the greatest numeric id", () => {
    expect(problemsOf(file({ body: type("ns=1;i=4294967295") }))).toEqual([]);
  });

  it("reads only the first number of 2:3:Name as an index, and wonders", () => {
    const text = file({ body: '<UAObject NodeId="ns=1;i=1" BrowseName="1:3:Name"/>' });
    expect(find(text, "nodeset.browse-name-prefix").severity).toBe("warning");
    const result = readNodeSet(text);
    expect(result.ok && result.value.nodes[0]?.browseName).toEqual({ namespaceUri: OWN, name: "3:Name" });
  });

  it("misses NodeId and BrowseName where they are absent", () => {
    expect(find(file({ body: '<UAObject BrowseName="1:A"/>' }), "nodeset.attribute-missing").data?.attribute).toBe(
      "NodeId",
    );
    expect(find(file({ body: '<UAObject NodeId="ns=1;i=1"/>' }), "nodeset.attribute-missing").data?.attribute).toBe(
      "BrowseName",
    );
  });

  it("tells types that are their own supertypes", () => {
    const body = [
      type("ns=1;i=1", "", subtypeOf("ns=1;i=2")),
      type("ns=1;i=2", "", subtypeOf("ns=1;i=3")),
      type("ns=1;i=3", "", subtypeOf("ns=1;i=1")),
    ].join("\n");
    expect(find(file({ body }), "nodeset.type-cycle").at?.line).toBe(6);
    expect(problemsOf(file({ body })).filter(({ code }) => code === "nodeset.type-cycle")).toHaveLength(1);
  });

  it.each([
    ["ValueRank", "many"],
    ["ValueRank", "2147483648"],
    ["AccessLevel", "-1"],
    ["Historizing", "yes"],
    ["MinimumSamplingInterval", "INF"],
    ["ArrayDimensions", "1,,2"],
    ["ReleaseStatus", "Beta"],
  ])("keeps %s=%j as written and says what it should be", (name, value) => {
    const text = file({ body: `<UAVariable NodeId="ns=1;i=1" BrowseName="1:A" ${name}="${value}"/>` });
    expect(find(text, "nodeset.attribute-value").at?.attribute).toBe(name);
    const result = readNodeSet(text);
    expect(result.ok && result.value.nodes[0]?.otherAttributes).toEqual({ [name]: value });
  });
});

describe("aliases", () => {
  const reference = (alias: string): string =>
    type(
      "ns=1;i=1",
      "",
      `<References><Reference ReferenceType="${alias}" IsForward="false">i=58</Reference></References>`,
    );

  it("takes a name of the standard that is not defined, once with a warning", () => {
    const body = `${reference("HasSubtype")}\n${reference("HasSubtype").replace("i=1", "i=2")}`;
    const problems = problemsOf(file({ aliases: "", body }));
    expect(problems.map(({ code, severity }) => [code, severity])).toEqual([["nodeset.alias-undefined", "warning"]]);
  });

  it("refuses a name that nobody knows", () => {
    expect(find(file({ body: reference("HasNothing") }), "nodeset.alias-unknown").at?.attribute).toBe("ReferenceType");
  });

  it("follows aliases of aliases, and ends in a circle", () => {
    const chain = '<Alias Alias="A">B</Alias><Alias Alias="B">i=45</Alias>';
    const result = readNodeSet(file({ aliases: chain, body: reference("A") }));
    expect(result.ok && result.value.nodes[0]?.references[0]?.type).toBe("i=45");
    const circle = '<Alias Alias="A">B</Alias><Alias Alias="B">A</Alias>';
    expect(find(file({ aliases: circle, body: reference("A") }), "nodeset.alias-cycle").severity).toBe("error");
  });

  it("ends a chain of 100 000 aliases", () => {
    const chain = Array.from({ length: 100_000 }, (_, i) => `<Alias Alias="A${i}">A${i + 1}</Alias>`).join("");
    expect(find(file({ aliases: chain, body: reference("A0") }), "nodeset.alias-unknown").severity).toBe("error");
  }, 20_000);

  it("takes the first of two meanings and says so", () => {
    const twice = '<Alias Alias="HasSubtype">i=45</Alias><Alias Alias="HasSubtype">i=46</Alias>';
    expect(find(file({ aliases: twice }), "nodeset.alias-defined-twice").severity).toBe("warning");
  });
});
