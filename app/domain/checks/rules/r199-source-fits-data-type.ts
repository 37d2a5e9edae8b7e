import type { Target } from "../../mapping/list-targets";
import type { WiringRule } from "../rule";
import { findField, findSourceKind, findTargetOf, type SourceKind } from "../source-facts";
import { exampleMapping, exampleRow, exampleWiring, integerField } from "../wiring-examples";

/** Bits and sign of the integer types (OPC 10000-6 §5.1.2). */
const INTEGERS: Readonly<Record<string, readonly [bits: number, isSigned: boolean]>> = {
  SByte: [8, true],
  Byte: [8, false],
  Int16: [16, true],
  UInt16: [16, false],
  Int32: [32, true],
  UInt32: [32, false],
  Int64: [64, true],
  UInt64: [64, false],
};

export const r199: WiringRule = {
  id: "R199",
  title: "The source fits the data type",
  severity: "error",
  clause: "OPC 30120 1.0 §12.2.2, Table 63; common practice for other sources",
  priority: 2,
  concerns: "wiring",
  condition:
    "What reaches a Variable fits its data type: an integer of enough bits and of the same sign, Float or Double for scaled values, Boolean for bits, text for text.",
  why: "Values beyond the type are cut or refused by the server: 200 mm becomes -56, or the node stays Bad.",
  check(wiring, _ctx, report) {
    for (const mapping of wiring.mappings) {
      for (const row of mapping.mapping.rows) {
        if (row.direction === "out") continue;
        const target = findTargetOf(mapping, row);
        const source = findSourceKind(row, findField(mapping, row));
        const misfit = target && source && findMisfit(target, source);
        if (!target || !source || misfit === undefined) continue;
        report({
          key: target.key,
          attribute: "dataType",
          message: `${target.path} is ${target.dataTypeName}, its source delivers ${describe(source)}: ${misfit}.`,
          facts: [`Data type: ${target.dataTypeName} (${target.builtInType})`, `Source: ${describe(source)}`],
        });
      }
    }
  },
  examples: {
    good: {
      text: "12 bits into UInt16.",
      build: (m) =>
        exampleWiring(m, (c) => ({
          mappings: [exampleMapping(c, { dataType: "UInt16", fields: [integerField(12)], rows: [exampleRow()] })],
        })),
    },
    bad: {
      text: "16 bits into Byte.",
      build: (m) =>
        exampleWiring(
          m,
          (c) => ({
            mappings: [exampleMapping(c, { dataType: "Byte", fields: [integerField(16)], rows: [exampleRow()] })],
          }),
          "target",
        ),
    },
  },
};

function describe({ kind, bits, isSigned }: SourceKind): string {
  if (kind !== "integer")
    return { boolean: "a Boolean", real: "a number with decimals", text: "text", time: "a time", octets: "octets" }[
      kind
    ];
  return `${isSigned ? "a signed" : "an unsigned"} integer of ${bits ?? "unknown"} bits`;
}

function findMisfit(
  { builtInType, isArray }: Target,
  { kind, bits = 0, isSigned = false }: SourceKind,
): string | undefined {
  if (isArray) return "one value cannot be a list";
  const integer = INTEGERS[builtInType];
  switch (kind) {
    case "integer": {
      if (builtInType === "Float" && bits > 24) return "Float holds 24 bits exactly";
      if (builtInType === "Double" || builtInType === "Float" || builtInType === "Variant") return undefined;
      if (!integer) return "it is no number";
      const [has, hasSign] = integer;
      if (isSigned && !hasSign) return "negative values are lost";
      return bits > (hasSign && !isSigned ? has - 1 : has) ? `it holds ${has} bits` : undefined;
    }
    case "real":
      return builtInType === "Float" || builtInType === "Double" || builtInType === "Variant"
        ? undefined
        : integer
          ? "decimals are lost"
          : "it is no number";
    case "boolean":
      return builtInType === "Boolean" || builtInType === "Variant" ? undefined : "it is no Boolean";
    case "text":
      return ["String", "LocalizedText", "Variant"].includes(builtInType) ? undefined : "it is no text";
    case "time":
      return builtInType === "DateTime" || builtInType === "Variant" ? undefined : "it is no time";
    case "octets":
      return builtInType === "ByteString" || builtInType === "Variant" ? undefined : "it is no ByteString";
  }
}
