import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { StandardDataType } from "~/domain/address-space/standard-ids";
import type { XmlText } from "~/domain/address-space/node";
import { getValue } from "~/domain/core/result";
import { addStructure } from "~/domain/editing/commands/add-structure";
import { SpaceDataTypes } from "~/domain/nodeset/values/data-type-shapes";
import { readValue } from "~/domain/nodeset/values/read-value";
import { rewriteValue } from "~/domain/nodeset/values/rewrite-value";
import { array, scalar, structure, type Variant } from "~/domain/nodeset/values/variant";
import { writeValue } from "~/domain/nodeset/values/write-value";
import { Workbench } from "../../../../support/command-harness";

const bench = new Workbench();
const point = bench.do(addStructure, {
  name: "PointType",
  fields: [
    { name: "X", dataType: StandardDataType.Double },
    { name: "Note", dataType: StandardDataType.String, isOptional: true },
  ],
});
const types = new SpaceDataTypes(bench.space);
const UAX = "http://opcfoundation.org/UA/2008/02/Types.xsd";

/** The text after the edit; it must read as the value that was asked for. */
function edit(xml: XmlText, change: (before: Variant) => Variant): string {
  const before = getValue(readValue(xml, types));
  const after = change(before);
  const rewritten = rewriteValue(xml, before, after, types);
  expect(getValue(readValue(rewritten, types))).toEqual(after);
  return rewritten.xml;
}

describe("a value that is edited", () => {
  it("changes its own text only, prefixes and comments stay", () => {
    const xml = {
      xml: "<uax:ListOfDouble><!-- from the test bench -->\n\t<uax:Double>1.0</uax:Double>\n\t<uax:Double> 2 </uax:Double></uax:ListOfDouble>",
      prefixes: { uax: UAX },
    };
    expect(edit(xml, () => array("Double", [1, 3]))).toBe(xml.xml.replace("> 2 <", ">3<"));
    expect(edit(xml, () => array("Double", [1]))).toBe(xml.xml.replace("\n\t<uax:Double> 2 </uax:Double>", ""));
  });

  it("takes rows in with the white space of the others, in the namespace of the text", () => {
    const xml = { xml: `\n <ListOfString xmlns="${UAX}">\n   <String>a</String>\n </ListOfString>\n` };
    expect(edit(xml, () => array("String", ["a", "b & c"]))).toBe(
      xml.xml.replace("</String>\n", "</String>\n   <String>b &amp; c</String>\n"),
    );
    const prefixed = { xml: "<u:ListOfString><u:String>a</u:String></u:ListOfString>", prefixes: { u: UAX } };
    expect(edit(prefixed, () => array("String", ["a", "b"]))).toBe(
      `<u:ListOfString><u:String>a</u:String><String xmlns="${UAX}">b</String></u:ListOfString>`,
    );
  });

  it("opens an empty element up", () => {
    const xml = { xml: `<String xmlns="${UAX}" />` };
    expect(edit(xml, () => scalar("String", "now"))).toBe(`<String xmlns="${UAX}">now</String>`);
  });

  it("writes a structure's field into its line, also where the mask changes", () => {
    const before = scalar("ExtensionObject", structure(point, { X: scalar("Double", 1) }));
    const xml = writeValue(before, types);
    const next = scalar("ExtensionObject", structure(point, { X: scalar("Double", 2) }));
    expect(edit(xml, () => next)).toBe(xml.xml.replace("<X>1</X>", "<X>2</X>"));
    const noted = scalar("ExtensionObject", structure(point, { X: scalar("Double", 1), Note: scalar("String", "n") }));
    const lines = edit(xml, () => noted).split("\n");
    expect(lines.filter((line) => !xml.xml.split("\n").includes(line)).map((line) => line.trim())).toEqual([
      "<EncodingMask>1</EncodingMask>",
      "<Note>n</Note>",
    ]);
  });

  it("is written anew where the text has other elements than the writer", () => {
    const xml = {
      xml: `<ExtensionObject xmlns="${UAX}"><TypeId><Identifier>i=888</Identifier></TypeId><Body><EUInformation><UnitId>7</UnitId></EUInformation></Body></ExtensionObject>`,
    };
    const text = edit(xml, (before) => {
      const unit = before.shape === "scalar" && before.type === "ExtensionObject" ? before.value : undefined;
      if (unit?.kind !== "structure") throw new Error("No structure");
      return scalar("ExtensionObject", { ...unit, fields: { ...unit.fields, UnitId: scalar("Int32", 8) } });
    });
    expect(text).toContain("<UnitId>8</UnitId>");
    expect(text).toContain("<Identifier>i=888</Identifier></TypeId><Body>");
  });

  it("reads as what was asked for, whatever is edited", () => {
    const texts = fc.array(
      fc.oneof(
        fc.string().filter((s) => /^[\t\n\u0020-\uD7FF]*$/.test(s)),
        fc.constant(null),
      ),
      { maxLength: 8 },
    );
    fc.assert(
      fc.property(texts, texts, (before, after) => {
        const from = array("String", before);
        const to = array("String", after);
        const rewritten = rewriteValue(writeValue(from, types), from, to, types);
        expect(getValue(readValue(rewritten, types))).toEqual(to);
      }),
      { numRuns: 300 },
    );
  });
});
