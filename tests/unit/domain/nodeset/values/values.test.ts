import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { numericNodeId, OPC_UA_NAMESPACE, standardKey, type NodeId } from "~/domain/address-space/node-id";
import { StandardDataType } from "~/domain/address-space/standard-ids";
import { addEnumeration } from "~/domain/editing/commands/add-enumeration";
import { addStructure } from "~/domain/editing/commands/add-structure";
import { checkVariant } from "~/domain/nodeset/values/check-variant";
import { SpaceDataTypes } from "~/domain/nodeset/values/data-type-shapes";
import { formatValue } from "~/domain/nodeset/values/format-value";
import { readValue } from "~/domain/nodeset/values/read-value";
import { INTEGER_RANGES, isWritableText, parseScalarText } from "~/domain/nodeset/values/scalar-text";
import { makeArguments, makeEuInformation, makeRange } from "~/domain/nodeset/values/standard-values";
import {
  array,
  BUILT_IN_TYPES,
  matrix,
  scalar,
  structure,
  type BuiltInType,
  type Scalar,
  type Variant,
} from "~/domain/nodeset/values/variant";
import { writeValue } from "~/domain/nodeset/values/write-value";
import { Workbench } from "../../../../support/command-harness";
import { TEST_NAMESPACE } from "../../../../support/small-standard";

const bench = new Workbench();
const mode = bench.do(addEnumeration, {
  name: "ModeEnum",
  fields: [
    { name: "Off", value: 0 },
    { name: "Fast", value: 7 },
  ],
});
const point = bench.do(addStructure, {
  name: "PointType",
  fields: [
    { name: "X", dataType: StandardDataType.Double },
    { name: "Y", dataType: StandardDataType.Double },
  ],
});
const rich = bench.do(addStructure, {
  name: "RichType",
  fields: [
    { name: "Mode", dataType: mode },
    { name: "Modes", dataType: mode, valueRank: 1 },
    { name: "Label", dataType: StandardDataType.LocalizedText },
    { name: "Labels", dataType: StandardDataType.LocalizedText, valueRank: 1 },
    { name: "Origin", dataType: point },
    { name: "Path", dataType: point, valueRank: 1 },
    { name: "Unit", dataType: StandardDataType.EUInformation },
    { name: "Limit", dataType: StandardDataType.Double, isOptional: true },
    { name: "Note", dataType: StandardDataType.String, isOptional: true },
    { name: "Any", dataType: StandardDataType.BaseDataType },
    { name: "Open", dataType: StandardDataType.Structure },
  ],
});
const special = bench.do(addStructure, {
  name: "SpecialPointType",
  supertype: point,
  fields: [{ name: "Z", dataType: StandardDataType.Double }],
});
const union = bench.do(addStructure, {
  name: "EitherType",
  isUnion: true,
  fields: [
    { name: "Number", dataType: StandardDataType.Int32 },
    { name: "Place", dataType: point },
  ],
});
const subtyped = bench.do(addStructure, {
  name: "HolderType",
  fields: [
    { name: "Place", dataType: point, allowSubTypes: true },
    { name: "Size", dataType: StandardDataType.Number, allowSubTypes: true },
  ],
});
const types = new SpaceDataTypes(bench.space);

function roundTrip(variant: Variant): Variant {
  const result = readValue(writeValue(variant, types), types);
  if (!result.ok) throw new Error(`${JSON.stringify(result.problems)} in ${writeValue(variant, types).xml}`);
  return result.value;
}

const writable = fc.string({ unit: "binary", maxLength: 12 }).filter(isWritableText);
const nodeId: fc.Arbitrary<NodeId> = fc.oneof(
  fc.nat(100_000).map((id) => numericNodeId(TEST_NAMESPACE, id)),
  writable.map((identifier) => ({ namespaceUri: "urn:a;b%", type: "s" as const, identifier: identifier.trim() })),
  fc.uuid().map((identifier) => ({ namespaceUri: OPC_UA_NAMESPACE, type: "g" as const, identifier })),
);
const integer = (type: BuiltInType): fc.Arbitrary<number | bigint> => {
  const [low, high] = INTEGER_RANGES[type] as readonly [bigint, bigint];
  const big = fc.bigInt({ min: low, max: high });
  return type === "Int64" || type === "UInt64" ? big : big.map(Number);
};
const base64 = fc.uint8Array({ maxLength: 9 }).map((bytes) => btoa(String.fromCharCode(...bytes)));
const nullable = <T>(arbitrary: fc.Arbitrary<T>): fc.Arbitrary<T | null> =>
  fc.option(arbitrary, { nil: null, freq: 6 });
const localized = fc.record({ locale: fc.constantFrom("en", "de-AT", ""), text: writable });
const dateTime = fc
  .date({ min: new Date("0001-01-01T00:00:00Z"), max: new Date("9999-12-31T23:59:59Z"), noInvalidDate: true })
  .map((d) => d.toISOString());

/** One value of each built-in type; `depth` bounds values inside values. */
function scalarOf(type: BuiltInType, depth: number): fc.Arbitrary<Scalar> {
  switch (type) {
    case "Boolean":
      return fc.boolean();
    case "Float":
    case "Double":
      return fc.double();
    case "String":
      return nullable(writable);
    case "DateTime":
      return dateTime;
    case "Guid":
      return fc.uuid();
    case "ByteString":
      return nullable(base64);
    case "XmlElement":
      return nullable(fc.constant({ xml: '<p:a xmlns:p="urn:p" b="1">text</p:a>' }));
    case "NodeId":
      return nodeId;
    case "ExpandedNodeId":
      return fc
        .tuple(nodeId, fc.option(fc.nat(9), { nil: undefined }))
        .map(([id, serverIndex]) => (serverIndex === undefined ? id : { ...id, serverIndex }));
    case "StatusCode":
      return integer("UInt32");
    case "QualifiedName":
      return nullable(fc.record({ namespaceUri: fc.constantFrom(OPC_UA_NAMESPACE, TEST_NAMESPACE), name: writable }));
    case "LocalizedText":
      return nullable(localized);
    case "ExtensionObject":
      return nullable(
        fc
          .tuple(fc.double({ noNaN: true }), fc.double({ noNaN: true }))
          .map(([X, Y]) => structure(point, { X: scalar("Double", X), Y: scalar("Double", Y) })),
      );
    case "DataValue":
      return fc.record(
        {
          value: variantOf(depth - 1),
          statusCode: fc.nat(),
          sourceTimestamp: dateTime,
          serverPicoseconds: fc.nat(9999),
        },
        { requiredKeys: [] },
      );
    case "Variant":
      return nullable(variantOf(depth - 1));
    case "DiagnosticInfo":
      return nullable(
        fc.record(
          {
            symbolicId: fc.nat(),
            additionalInfo: writable,
            innerStatusCode: fc.nat(),
            innerDiagnosticInfo: fc.constant({ locale: 3 }),
          },
          { requiredKeys: [] },
        ),
      );
    default:
      return integer(type);
  }
}

function variantOf(depth: number): fc.Arbitrary<Variant> {
  const allowed = BUILT_IN_TYPES.filter((t) => depth > 0 || (t !== "Variant" && t !== "DataValue"));
  return fc.constantFrom(...allowed).chain((type) => {
    const one = scalarOf(type, depth);
    return fc.oneof(
      one.map((value) => scalar(type, value as never)),
      fc.array(one, { maxLength: 4 }).map((values) => array(type, values as never[])),
      fc
        .tuple(fc.integer({ min: 1, max: 3 }), fc.integer({ min: 1, max: 3 }))
        .chain(([rows, columns]) =>
          fc
            .array(one, { minLength: rows * columns, maxLength: rows * columns })
            .map((values) => matrix(type, [rows, columns], values as never[])),
        ),
    );
  });
}

describe("readValue ∘ writeValue", () => {
  it("is the value, for all 25 built-in types, arrays and matrices", () => {
    fc.assert(
      fc.property(variantOf(2), (variant) => void expect(roundTrip(variant)).toEqual(variant)),
      { numRuns: 1500 },
    );
  });

  it("keeps structures: nested, arrays of them, enumerations, optional fields, any values", () => {
    const origin = structure(point, { X: scalar("Double", 1), Y: scalar("Double", -2.5) });
    const value = structure(rich, {
      Mode: scalar("Int32", 7),
      Modes: array("Int32", [0, 7, 3]),
      Label: scalar("LocalizedText", { locale: "de", text: "Ölstand <&>" }),
      Labels: array("LocalizedText", [{ text: "a" }, { text: "b" }]),
      Origin: scalar("ExtensionObject", origin),
      Path: array("ExtensionObject", [origin, origin]),
      Unit: makeEuInformation({
        namespaceUri: "urn:u",
        unitId: 3,
        displayName: { text: "m" },
        description: { text: "metre" },
      }),
      Note: scalar("String", "n"),
      Any: scalar("Variant", array("UInt16", [1, 2])),
      Open: scalar("ExtensionObject", origin),
    });
    const variant = scalar("ExtensionObject", value);
    expect(roundTrip(variant)).toEqual(variant);
    const { xml } = writeValue(variant, types);
    // OPC 10000-6 §5.3.6: bit 1 is the second optional field; §5.3.1.2: enumerations as Name_Value.
    expect(xml).toContain("<EncodingMask>2</EncodingMask>");
    expect(xml).toContain("<Mode>Fast_7</Mode>");
    expect(xml).toMatch(/<ModeEnum>Off_0<\/ModeEnum>/);
    expect(xml).toContain(`<RichType xmlns="${TEST_NAMESPACE}Types.xsd">`);
  });

  it("keeps unions, subtyped fields and inherited fields", () => {
    const place = structure(special, { X: scalar("Double", 1), Y: scalar("Double", 2), Z: scalar("Double", 3) });
    for (const value of [
      structure(union, {
        Place: scalar("ExtensionObject", structure(point, { X: scalar("Double", 1), Y: scalar("Double", 2) })),
      }),
      structure(union, {}),
      structure(subtyped, { Place: scalar("ExtensionObject", place), Size: scalar("Variant", scalar("Byte", 3)) }),
      place,
    ]) {
      expect(roundTrip(scalar("ExtensionObject", value))).toEqual(scalar("ExtensionObject", value));
    }
    expect(
      writeValue(scalar("ExtensionObject", structure(union, { Number: scalar("Int32", 5) })), types).xml,
    ).toContain("<SwitchField>1</SwitchField>");
  });
});

describe("readValue", () => {
  const read = (xml: string): ReturnType<typeof readValue> =>
    readValue(
      { xml: xml.replaceAll("U:", "uax:"), prefixes: { uax: "http://opcfoundation.org/UA/2008/02/Types.xsd" } },
      types,
    );
  const valueOf = (xml: string): Variant | undefined => {
    const result = read(xml);
    return result.ok ? result.value : undefined;
  };

  // Forms as printed in OPC 10000-6 §5.3.1 and as they stand in published files.
  it("reads what published files hold", () => {
    expect(valueOf("<U:Double> 1.5E3 </U:Double>")).toEqual(scalar("Double", 1500));
    expect(valueOf("<U:Float>-INF</U:Float>")).toEqual(scalar("Float", -Infinity));
    expect(valueOf("<U:String>  kept </U:String>")).toEqual(scalar("String", "  kept "));
    expect(valueOf("<U:String/>")).toEqual(scalar("String", ""));
    expect(valueOf('<U:String xmlns:xsi="http://www.w3.org/2001/XMLSchema-instance" xsi:nil="true"/>')).toEqual(
      scalar("String", null),
    );
    expect(valueOf("<U:ListOfInt32><U:Int32>1</U:Int32><U:Int32>2</U:Int32></U:ListOfInt32>")).toEqual(
      array("Int32", [1, 2]),
    );
    expect(valueOf("<U:Guid><U:String>F9168C5E-CEB2-4FAA-B6BF-329BF39FA1E4</U:String></U:Guid>")).toEqual(
      scalar("Guid", "f9168c5e-ceb2-4faa-b6bf-329bf39fa1e4"),
    );
    expect(valueOf("<U:LocalizedText><U:Locale>en</U:Locale><U:Text>A</U:Text></U:LocalizedText>")).toEqual(
      scalar("LocalizedText", { locale: "en", text: "A" }),
    );
    expect(
      valueOf("<U:QualifiedName><U:NamespaceIndex>urn:x</U:NamespaceIndex><U:Name>N</U:Name></U:QualifiedName>"),
    ).toEqual(scalar("QualifiedName", { namespaceUri: "urn:x", name: "N" }));
    const range =
      "<U:ExtensionObject><U:TypeId><U:Identifier>i=884</U:Identifier></U:TypeId><U:Body><U:Range><U:High>5</U:High></U:Range></U:Body></U:ExtensionObject>";
    expect(valueOf(range)).toEqual(makeRange({ low: 0, high: 5 }));
  });

  it("keeps raw what it does not know and says why", () => {
    const object = (id: string, body: string): string =>
      `<U:ExtensionObject><U:TypeId><U:Identifier>${id}</U:Identifier></U:TypeId>${body}</U:ExtensionObject>`;
    const reasonOf = (xml: string): unknown => {
      const variant = valueOf(xml);
      return variant?.type === "ExtensionObject" && variant.shape === "scalar" && variant.value?.kind === "raw"
        ? variant.value.reason
        : variant;
    };
    expect(reasonOf(object("nsu=urn:x;i=1", '<U:Body><q:T xmlns:q="urn:q"><q:A>1</q:A></q:T></U:Body>'))).toBe(
      "unknown-type",
    );
    expect(reasonOf(object("i=297", "<U:Body><U:Argument><U:Colour>1</U:Colour></U:Argument></U:Body>"))).toBe(
      "body-mismatch",
    );
    expect(reasonOf(object("i=298", "<U:Body><U:ByteString>AAAA</U:ByteString></U:Body>"))).toBe("binary-body");
    expect(reasonOf(object("i=297", ""))).toBe("no-body");
    const raw = valueOf(object("nsu=urn:x;i=1", '<U:Body><q:T xmlns:q="urn:q"><q:A>1</q:A></q:T></U:Body>'));
    expect(raw && roundTrip(raw)).toEqual(raw);
  });

  it("answers problems, never a wrong value", () => {
    const codes = (xml: string): string[] => read(xml).problems.map((p) => p.code);
    expect(codes("")).toEqual(["value.empty"]);
    expect(codes("<U:Whatever/>")).toEqual(["value.element"]);
    expect(codes("<U:Int32>1.5</U:Int32>")).toEqual(["value.syntax"]);
    expect(codes("<U:Byte>256</U:Byte>")).toEqual(["value.syntax"]);
    expect(codes("<U:Boolean>yes</U:Boolean>")).toEqual(["value.syntax"]);
    expect(codes("<U:NodeId><U:Identifier>x=1</U:Identifier></U:NodeId>")).toEqual(["node-id.syntax"]);
    expect(
      codes(
        "<U:Matrix><U:Dimensions><U:UInt32>2</U:UInt32></U:Dimensions><U:Elements><U:Byte>1</U:Byte></U:Elements></U:Matrix>",
      ),
    ).toEqual(["value.dimensions"]);
    expect(read("<U:Double>").ok).toBe(false);
    expect(codes(`${"<U:Variant><U:Value>".repeat(90)}${"</U:Value></U:Variant>".repeat(90)}`)).toHaveLength(0);
    expect(read(`${"<U:Variant><U:Value>".repeat(5000)}${"</U:Value></U:Variant>".repeat(5000)}`).ok).toBe(false);
  });

  it("never throws on broken XML", () => {
    fc.assert(
      fc.property(fc.string({ maxLength: 60 }), (xml) => void read(`<U:Double>${xml}`)),
      { numRuns: 200 },
    );
  });
});

describe("parseScalarText", () => {
  it("holds the ends of every integer type (OPC 10000-6 §5.1.2)", () => {
    for (const [type, range] of Object.entries(INTEGER_RANGES)) {
      const [low, high] = range as readonly [bigint, bigint];
      expect(BigInt(parseScalarText(type as BuiltInType, String(high)) as number)).toBe(high);
      expect(BigInt(parseScalarText(type as BuiltInType, String(low)) as number)).toBe(low);
      expect(parseScalarText(type as BuiltInType, String(high + 1n))).toBeUndefined();
      expect(parseScalarText(type as BuiltInType, String(low - 1n))).toBeUndefined();
    }
  });
});

describe("checkVariant", () => {
  const fits = (variant: Variant, dataType: Parameters<typeof standardKey>[0], valueRank = -1): string | undefined =>
    checkVariant(variant, { dataType: standardKey(dataType), valueRank }, types)?.code;

  // OPC 10000-3 §8: enumerations are Int32; Duration is a Double; Number takes any number.
  it("compares type and rank", () => {
    expect(fits(scalar("Double", 1), 290)).toBeUndefined();
    expect(fits(scalar("Byte", 1), 26)).toBeUndefined();
    expect(fits(scalar("UInt16", 1), 27)).toBe("value.type");
    expect(fits(scalar("Int32", 1), 256)).toBeUndefined();
    expect(fits(scalar("String", "x"), 11)).toBe("value.type");
    expect(fits(array("Double", [1]), 11)).toBe("value.rank");
    expect(fits(array("Double", []), 11, 2)).toBeUndefined();
    expect(fits(array("Double", [1]), 24)).toBeUndefined();
    expect(fits(scalar("Byte", 300), 3)).toBe("value.range");
  });
});

describe("formatValue", () => {
  const format = (variant: Variant, dataType?: typeof mode): string =>
    formatValue(variant, types, dataType === undefined ? {} : { dataType });

  it("writes for people", () => {
    expect(format(makeRange({ low: -5, high: 5 }))).toBe("−5 … 5");
    expect(
      format(
        makeEuInformation({ namespaceUri: "u", unitId: 1, displayName: { text: "°C" }, description: { text: "" } }),
      ),
    ).toBe("°C");
    expect(format(scalar("Int32", 7), mode)).toBe("Fast");
    expect(format(array("Double", [1, -2]))).toBe("[1, −2]");
    expect(format(matrix("Byte", [1, 2], [1, 2]))).toBe("1 × 2 [1, 2]");
    expect(format(array("Byte", new Array<number>(30).fill(0)))).toMatch(/… 30 in all\]$/);
    expect(format(scalar("ByteString", "AAAA"))).toBe("3 bytes");
    expect(
      format(scalar("ExtensionObject", structure(point, { X: scalar("Double", 1), Y: scalar("Double", 2) }))),
    ).toBe("{X: 1, Y: 2}");
    expect(
      format(makeArguments([{ name: "A", dataType: numericNodeId(OPC_UA_NAMESPACE, 11), valueRank: -1 }])),
    ).toContain("Name: A, DataType: i=11, ValueRank: −1");
    expect(format(scalar("StatusCode", 0x80340000))).toBe("0x80340000");
    expect(format(scalar("String", null))).toBe("–");
  });
});
