/** Small wirings for the examples of rules about mappings, machines and ports. */
import type { NodeKey } from "../address-space/node-id";
import { StandardType as T } from "../address-space/standard-ids";
import { ok, type Problem } from "../core/result";
import type { RecordItem, ProcessDataImage, DisplayInfo } from "../iodd/device-description";
import type { Target } from "../mapping/list-targets";
import type { MappingRow } from "../mapping/mapping";
import type { CaseResult } from "../mapping/run-check-cases";
import { unitByCode } from "../units/units";
import type { ExampleModel } from "./example-model";
import type { Example } from "./rule";
import type { WiredBinding, WiredMachine, WiredMapping, WiredSource, Wiring } from "./wiring";

/** The node of the example's one machine type and of its one Variable. */
export type ExampleNodes = { readonly type: NodeKey; readonly value: NodeKey; readonly other: NodeKey };

/** Gives the example model a machine type and a wiring; answers the place that a bad example means. */
export function exampleWiring(
  m: ExampleModel,
  make: (nodes: ExampleNodes) => Partial<Wiring>,
  place?: "target" | `place ${string}`,
): ReturnType<Example["build"]> {
  const type = m.objectType("PressType");
  const value = m.variable("Value", { parent: type, rule: "Mandatory", type: T.BaseDataVariableType });
  const other = m.variable("Other", { parent: type, rule: "Optional", type: T.BaseDataVariableType });
  m.wiring = { mappings: [], machines: [], sources: [], ...make({ type, value, other }) };
  return place === "target" ? value : place;
}

export type ExampleField = { readonly type: RecordItem["type"]; readonly name: string; readonly info?: DisplayInfo };

const plain = { singleValues: [], ranges: [] } as const;

export function integerField(bitLength: number): ExampleField {
  return { name: "Value", type: { kind: "UIntegerT", bitLength, ...plain } };
}

/** A number in a unit of the Community's table. */
export function measuredField(unitCode: number): ExampleField {
  return { name: "Distance", type: { kind: "UIntegerT", bitLength: 16, ...plain }, info: { unitCode } };
}

export function rangedField(lower: number, upper: number): ExampleField {
  return { name: "Distance", type: { kind: "UIntegerT", bitLength: 16, singleValues: [], ranges: [{ lower, upper }] } };
}

export function scaledField(): ExampleField {
  return { name: "Distance", type: { kind: "IntegerT", bitLength: 16, ...plain }, info: { gradient: 0.1 } };
}

export function scaleField(): ExampleField {
  return { name: "Scale", type: { kind: "IntegerT", bitLength: 8, ...plain } };
}

type MappingParts = {
  readonly dataType?: "Byte" | "UInt16" | "Float" | "Double";
  readonly unit?: string;
  readonly range?: { readonly low: number; readonly high: number };
  readonly isWritable?: boolean;
  readonly fields?: readonly ExampleField[];
  readonly rows?: readonly MappingRow[];
  readonly lost?: readonly string[];
  readonly problems?: readonly Problem[];
  readonly cases?: readonly CaseResult[];
};

export function exampleMapping(nodes: ExampleNodes, parts: MappingParts): WiredMapping {
  const image = makeImage(parts.fields ?? []);
  return {
    id: nodes.type,
    name: "PressType",
    type: nodes.type,
    mapping: {
      machineType: "PressType",
      roles: [{ role: "sensor", kind: "io-link-device" }],
      rows: [...(parts.rows ?? [])],
    },
    targets: [makeTarget("Value", nodes.value, parts, true), makeTarget("Other", nodes.other, parts, false)],
    lost: parts.lost ?? [],
    findLayout: () => ok({ image, profileCharacteristic: [] }),
    problems: parts.problems ?? [],
    cases: parts.cases ?? [],
  };
}

/** Feeds `Value` from the first field unless said otherwise. */
export function exampleRow(change: Partial<MappingRow> = {}): MappingRow {
  return {
    target: "Value",
    source: { kind: "process-data", role: "sensor", direction: "in", subindex: 1 },
    transforms: [],
    ...change,
  };
}

export function exampleCase(holds: boolean): CaseResult {
  const expected = { target: "Value", value: 5, status: 0 };
  const misses = holds ? [] : [{ target: "Value", path: "Value", expected, found: { value: 50, status: 0 } }];
  return { id: "c1", name: "Five", misses, problems: [] };
}

export function exampleSource(port: Omit<WiredSource["ports"][number], "number"> = {}): WiredSource {
  return { id: "m1", name: "M1", kind: "rest-master", portCount: 8, ports: [{ number: 1, ...port }] };
}

export function exampleMachine(name: string, binding?: Omit<WiredBinding, "role">): WiredMachine {
  const bindings = [{ role: "sensor", ...(binding ? { sourceId: "m1", ...binding } : {}) }];
  return { id: name, name, mappingId: "PressType", bindings, problems: [] };
}

function makeImage(fields: readonly ExampleField[]): ProcessDataImage {
  let bitOffset = 0;
  const items = fields.map((field, i): RecordItem => {
    const bits = "bitLength" in field.type ? field.type.bitLength : 8;
    const item = { subindex: i + 1, bitOffset, type: field.type, name: { en: field.name } };
    bitOffset += bits;
    return item;
  });
  const bitLength = Math.max(8, Math.ceil(bitOffset / 8) * 8);
  const info = Object.fromEntries(fields.map((field, i) => [i + 1, field.info ?? {}]));
  return { id: "PD", bitLength, type: { kind: "RecordT", bitLength, items }, info };
}

function makeTarget(name: string, key: NodeKey, parts: MappingParts, isMandatory: boolean): Target {
  const unit = parts.unit === undefined ? undefined : unitByCode(parts.unit);
  const builtInType = parts.dataType ?? "Double";
  return {
    target: key,
    aliases: [],
    key,
    path: name,
    names: [{ namespaceUri: "", name }],
    displayName: name,
    group: "",
    dataType: key,
    dataTypeName: builtInType,
    builtInType,
    isArray: false,
    unit: unit && { code: unit.code, unitId: unit.unitId, symbol: unit.symbol },
    range: parts.range,
    instrumentRange: undefined,
    isMandatory,
    isProperty: false,
    states: [],
    isWritable: parts.isWritable ?? false,
    description: "",
  };
}
