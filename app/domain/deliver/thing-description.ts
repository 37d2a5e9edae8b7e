/**
 * A W3C Thing Description 1.1 for one machine: what its sources deliver on the wire, with Modbus and HTTP forms, and the
 * Variables that it becomes by OPC UA names (OPC 10101 §6.5.4, read by servers of OPC 10100-1). A TD has no scale, no bit
 * and no special value, so a value that a transform changes is described raw, without unit and range; what the mapping
 * does with it stands in terms of our own prefix. Addresses are zero-based wire addresses. Same input, same text.
 */
import type { MappingRow, Transform } from "../mapping/mapping";
import { countRegisters } from "../mapping/decode-registers";
import type { MappingDocument } from "./mapping-document";

export const TD_CONTEXT = "https://www.w3.org/2022/wot/td/v1.1";

export type ThingReport = { readonly target: string; readonly state: "exported" | "raw" | "left-out"; readonly reason: string };

export type ThingDescription = { readonly thing: Readonly<Record<string, unknown>>; readonly report: readonly ThingReport[] };

type Property = Record<string, unknown>;
type Binding = NonNullable<MappingDocument["machine"]>["bindings"][number];
type RegisterSource = Extract<MappingRow["source"], { kind: "register" }>;

/** `document` is that of a machine (make-mapping-document.ts). */
export function makeThingDescription(document: MappingDocument): ThingDescription {
  const { machine } = document;
  if (!machine) throw new RangeError("A Thing Description is made of a machine's document");
  const writer = new ThingWriter(document, new Map(machine.bindings.map((b) => [b.role, b] as const)));
  for (const row of document.mapping.rows) writer.addRow(row);
  return { thing: writer.finish(machine.name, machine.nodeId), report: writer.report };
}

class ThingWriter {
  readonly #document: MappingDocument;
  readonly #bindings: ReadonlyMap<string, Binding>;
  readonly #properties = new Map<string, Property>();
  readonly report: ThingReport[] = [];

  constructor(document: MappingDocument, bindings: ReadonlyMap<string, Binding>) {
    this.#document = document;
    this.#bindings = bindings;
  }

  addRow(row: MappingRow): void {
    const { source, target } = row;
    if (row.direction === "out") return this.#leaveOut(target, "outputs are not described: a TD would invite to write them");
    if (source.kind === "formula" || source.kind === "constant" || source.kind === "device-status") {
      return this.#leaveOut(target, `${source.kind} is made by the mapping, no source delivers it`);
    }
    const binding = this.#bindings.get(source.role);
    if (!binding) return this.#leaveOut(target, `the role ${source.role} is bound to no source`);
    switch (source.kind) {
      case "register":
        return this.#addRegister(row, source, binding);
      case "process-data":
        return this.#addFrame(row, source, binding);
      case "parameter":
        return this.#addParameter(row, source, binding);
      case "opc-ua-node":
        return this.#addNode(row, source.nodeId, binding);
      default:
        return this.#leaveOut(target, `${source.kind} has no form in a TD`);
    }
  }

  finish(name: string, nodeId: string): Record<string, unknown> {
    const { namespaceUri, version } = this.#document.model;
    return {
      "@context": [
        TD_CONTEXT,
        {
          modv: "https://www.w3.org/2019/wot/modbus#",
          xsd: "http://www.w3.org/2001/XMLSchema#",
          htv: "http://www.w3.org/2011/http#",
          uav: "http://opcfoundation.org/UA/WoT-Binding/",
          map: `${namespaceUri.replace(/[#/]*$/, "")}/mapping#`,
        },
      ],
      "@type": "uav:object",
      id: `urn:uuid:${makeUuid(`${namespaceUri} ${nodeId}`)}`,
      title: name,
      description: `${name}: what its sources deliver, and the OPC UA Variables that ${this.#document.mapping.machineType} makes of it.`,
      ...(version === null ? {} : { version: { instance: version, model: version } }),
      "uav:id": nodeId,
      securityDefinitions: { nosec_sc: { scheme: "nosec" } },
      security: "nosec_sc",
      properties: Object.fromEntries(this.#properties),
    };
  }

  #leaveOut(target: string, reason: string): void {
    this.report.push({ target, state: "left-out", reason });
  }

  #addRegister(row: MappingRow, source: RegisterSource, binding: Binding): void {
    const { host, port } = binding.source.address;
    if (host === undefined) return this.#leaveOut(row.target, `${binding.source.name} has no address`);
    const isRaw = row.transforms.some((t) => t.kind !== "deadband" && t.kind !== "average");
    const isBit = source.bit !== undefined && source.table.endsWith("register");
    const type = source.type ?? "UInt16";
    const isFlag = !source.table.endsWith("register");
    const quantity = isFlag || isBit ? 1 : countRegisters(type);
    const address = source.address + (binding.addressOffset ?? 0);
    const order = source.order ?? "ABCD";
    const form = {
      href: `modbus+tcp://${host}:${port ?? 502}/${binding.unitId ?? 1}/${address}?quantity=${quantity}`,
      op: ["readproperty", "observeproperty"],
      contentType: "application/octet-stream",
      "modv:entity": ENTITY[source.table],
      "modv:type": isFlag ? "xsd:boolean" : XSD[isBit ? "UInt16" : type],
      "modv:zeroBasedAddressing": true,
      "modv:mostSignificantByte": order === "ABCD" || order === "CDAB",
      "modv:mostSignificantWord": order === "ABCD" || order === "BADC",
      "modv:pollingTime": row.period ?? 500,
    };
    const jsonType = isFlag ? "boolean" : type.startsWith("Float") && !isBit ? "number" : "integer";
    const property = {
      ...this.#describe(row, isRaw || isBit),
      type: jsonType,
      readOnly: true,
      observable: true,
      ...(isBit ? { "map:fields": [{ name: row.target, bitOffset: source.bit, bitLength: 1 }] } : {}),
      forms: [form],
    };
    this.#addProperty(row.target, property, isRaw || isBit);
  }

  /** All fields of one frame are one property: the master answers the whole. */
  #addFrame(row: MappingRow, source: Extract<MappingRow["source"], { kind: "process-data" }>, binding: Binding): void {
    const base = toMasterUrl(binding);
    const place = base ?? toOpcUaPlace(binding);
    if (place === undefined) return this.#leaveOut(row.target, `${binding.source.name} has no form in a TD`);
    const name = toName(`${source.role} ${source.direction}`);
    const layout = this.#document.layouts.find((l) => l.role === source.role && l.direction === source.direction);
    const items = layout?.image.type.kind === "RecordT" ? layout.image.type.items : [];
    const item = items.find((i) => i.subindex === source.subindex);
    const field = {
      name: row.target,
      bitOffset: item?.bitOffset ?? 0,
      bitLength: item && "bitLength" in item.type ? item.type.bitLength : (layout?.image.bitLength ?? 0),
      ...this.#annotate(row),
    };
    const known = this.#properties.get(name);
    if (known) (known["map:fields"] as unknown[]).push(field);
    else this.#properties.set(name, base === undefined ? makeRawProperty(source.role, field, place) : makeFrameProperty(source, layout?.image.bitLength ?? 0, field, base));
    this.report.push({ target: row.target, state: "raw", reason: "a field of process data: octets of the whole frame, the field in map:fields" });
  }

  #addParameter(row: MappingRow, source: Extract<MappingRow["source"], { kind: "parameter" }>, binding: Binding): void {
    const base = toMasterUrl(binding);
    if (base === undefined) return this.#leaveOut(row.target, "parameters are described for masters with the JSON integration only");
    const path = source.subindex === 0 ? `${source.index}/value` : `${source.index}/subindices/${source.subindex}/value`;
    const property = {
      ...this.#describe(row, true),
      type: "array",
      items: { type: "integer", minimum: 0, maximum: 255 },
      readOnly: true,
      forms: [{ href: `${base}/parameters/${path}?format=byteArray`, op: "readproperty", contentType: "application/json", "htv:methodName": "GET" }],
    };
    this.#addProperty(row.target, property, true);
  }

  #addNode(row: MappingRow, nodeId: string, binding: Binding): void {
    const { url } = binding.source.address;
    if (url === undefined) return this.#leaveOut(row.target, `${binding.source.name} has no address`);
    const href = `${url.replace(/\/+$/, "")}/?id=${nodeId.replaceAll("#", "%23").replaceAll("&", "%26")}`;
    const isRaw = row.transforms.length > 0;
    const property = { ...this.#describe(row, isRaw), readOnly: true, observable: true, forms: [{ href, op: ["readproperty", "observeproperty"], contentType: "application/octet-stream" }] };
    this.#addProperty(row.target, property, isRaw);
  }

  #addProperty(target: string, property: Property, isRaw: boolean): void {
    const base = `${toName(target)}${isRaw ? "_raw" : ""}`;
    let name = base;
    for (let n = 2; this.#properties.has(name); n++) name = `${base}_${n}`;
    this.#properties.set(name, property);
    this.report.push({ target, state: isRaw ? "raw" : "exported", reason: isRaw ? "the mapping changes the value; the TD tells it as the wire gives it" : "" });
  }

  /** Unit and range hold for the Variable, so only where the value on the wire is that of the Variable. */
  #describe(row: MappingRow, isRaw: boolean): Property {
    const node = this.#document.nodes.find((n) => n.target === row.target);
    const engineering = !isRaw && node ? { ...(node.unit && node.unit.code !== "" ? { unit: node.unit.code } : {}), ...(node.range ? { minimum: node.range.low, maximum: node.range.high } : {}) } : {};
    return { "@type": "uav:variable", title: row.target, ...engineering, ...this.#annotate(row) };
  }

  #annotate(row: MappingRow): Property {
    const node = this.#document.nodes.find((n) => n.target === row.target);
    const linear = row.transforms.filter((t): t is Extract<Transform, { kind: "linear" }> => t.kind === "linear");
    const [scaling] = linear.length === 1 ? linear : [];
    return {
      ...(node ? { "uav:mapToNodeId": node.nodeId } : {}),
      ...(scaling ? { "map:scale": scaling.gradient, "map:offset": scaling.offset } : {}),
      ...(row.transforms.length > 0 ? { "map:transforms": row.transforms.map((t) => t.kind) } : {}),
      ...(node?.unit && row.transforms.length > 0 ? { "map:unit": node.unit.code } : {}),
      ...(row.mirrorsSafetySignal ? { "map:mirrorsSafetySignal": true } : {}),
    };
  }
}

const ENTITY = { coil: "Coil", "discrete-input": "DiscreteInput", "holding-register": "HoldingRegister", "input-register": "InputRegister" } as const;

const XSD = {
  UInt16: "xsd:unsignedShort",
  Int16: "xsd:short",
  UInt32: "xsd:unsignedInt",
  Int32: "xsd:int",
  UInt64: "xsd:unsignedLong",
  Int64: "xsd:long",
  Float32: "xsd:float",
  Float64: "xsd:double",
} as const;

/** The device below a master with the JSON integration. */
function toMasterUrl({ source, port, deviceAlias }: Binding): string | undefined {
  const { url, masterNumber = 1 } = source.address;
  if (source.kind !== "rest-master" || url === undefined) return undefined;
  const alias = deviceAlias ?? `master${masterNumber}port${port ?? 1}`;
  return `${url.replace(/\/+$/, "")}/iolink/v1/devices/${encodeURIComponent(alias)}`;
}

function toOpcUaPlace({ source, port }: Binding): { url: string; path: string } | undefined {
  const { url, masterName } = source.address;
  if (source.kind !== "opc-ua-master" || url === undefined) return undefined;
  return { url, path: `/Objects/IOLinkMasterSet/${masterName ?? source.name}/Port${port ?? 1}/Device/ParameterSet` };
}

function makeFrameProperty(source: { role: string; direction: "in" | "out" }, bitLength: number, field: unknown, base: string): Property {
  const octets = Math.ceil(bitLength / 8);
  const side = source.direction === "in" ? "getdata" : "setdata";
  const value = { type: "array", items: { type: "integer", minimum: 0, maximum: 255 }, ...(octets > 0 ? { minItems: octets, maxItems: octets } : {}) };
  const ioLink = { type: "object", properties: { valid: { type: "boolean" }, value }, required: ["valid", "value"] };
  return {
    title: `${source.role}, process data ${source.direction}`,
    type: "object",
    properties: { ioLink },
    readOnly: true,
    "map:fields": [field],
    forms: [{ href: `${base}/processdata/${side}/value?format=byteArray`, op: "readproperty", contentType: "application/json", "htv:methodName": "GET" }],
  };
}

function makeRawProperty(role: string, field: unknown, place: string | { url: string; path: string }): Property {
  const { url, path } = typeof place === "string" ? { url: place, path: "" } : place;
  return {
    "@type": "uav:variable",
    title: `${role}, process data`,
    type: "array",
    items: { type: "integer", minimum: 0, maximum: 255 },
    readOnly: true,
    observable: true,
    "map:fields": [field],
    forms: [{ href: url, op: ["readproperty", "observeproperty"], contentType: "application/octet-stream", "uav:browsePath": `${path}/ProcessDataInput` }],
  };
}

function toName(text: string): string {
  return text.replace(/[^A-Za-z0-9]+/g, "_").replace(/^_+|_+$/g, "");
}

/** A UUID that depends on the text alone (form of version 8, RFC 9562 §5.8), so that a machine keeps its id. */
function makeUuid(text: string): string {
  const hex = [0x811c9dc5, 0x01000193, 0x9e3779b9, 0x85ebca6b].map((seed) => hash(text, seed)).join("");
  return `${hex.slice(0, 8)}-${hex.slice(8, 12)}-8${hex.slice(13, 16)}-a${hex.slice(17, 20)}-${hex.slice(20, 32)}`;
}

/** FNV-1a with a seed, eight digits. */
function hash(text: string, seed: number): string {
  let value = seed;
  for (let i = 0; i < text.length; i++) value = Math.imul(value ^ text.charCodeAt(i), 16777619);
  return (value >>> 0).toString(16).padStart(8, "0");
}

/** The text of a TD: two spaces, keys as they were made. */
export function writeThingDescription({ thing }: ThingDescription): string {
  return `${JSON.stringify(thing, null, 2)}\n`;
}
