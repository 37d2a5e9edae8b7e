/**
 * An OPC UA server as a live source: nodes by NodeId or browse path, and, where it is an IO-Link master after OPC 30120,
 * ports by number below IOLinkMasterSet. Process data is read raw and decoded by the mapping (§7.1.3: invalid process data
 * has a bad status). It reads, and calls ReadISDU, which reads; it never writes.
 */
import { AttributeIds, DataType, NodeClass, type ClientSession, type NodeId, StatusCodes, Variant } from "node-opcua";
import { problem } from "~/domain/core/result";
import type { Frame, LiveSource, SourceItem, SourceReading, SourceValue } from "~/domain/mapping/live-source";
import type { SampleValue } from "~/domain/mapping/sample";
import { StatusCode } from "~/domain/mapping/status";
import { toWireNodeId } from "../node-ids";
import { decodeVariant } from "./decode-value";
import type { EndpointClient } from "./endpoint-client.server";

type PortNodes = { readonly input?: NodeId; readonly output?: NodeId; readonly status?: NodeId; readonly vendorId?: NodeId; readonly deviceId?: NodeId; readonly serialNumber?: NodeId; readonly device?: NodeId; readonly readIsdu?: NodeId };

const OBJECTS = "i=85";
/** Members of a port (OPC 30120 §7.2, §7.3) by the names of their steps. */
const MEMBERS = {
  input: ["Device", "ParameterSet", "ProcessDataInput"],
  output: ["Device", "ParameterSet", "ProcessDataOutput"],
  status: ["ParameterSet", "Status"],
  vendorId: ["Device", "VendorID"],
  deviceId: ["Device", "DeviceID"],
  serialNumber: ["Device", "SerialNumber"],
  device: ["Device", "MethodSet"],
  readIsdu: ["Device", "MethodSet", "ReadISDU"],
} as const satisfies Record<keyof PortNodes, readonly string[]>;

export class OpcUaSource implements LiveSource {
  readonly #client: EndpointClient;
  readonly #masterName: string | undefined;
  readonly #ports = new Map<number, PortNodes>();
  readonly #paths = new Map<string, NodeId>();

  constructor(client: EndpointClient, masterName?: string) {
    this.#client = client;
    this.#masterName = masterName;
  }

  async read(item: SourceItem): Promise<SourceReading> {
    try {
      return await this.#client.use((session, namespaces) => this.#readItem(session, namespaces, item));
    } catch (error) {
      // Another session may be with another server: what was found is looked for again.
      this.#ports.clear();
      this.#paths.clear();
      const message = error instanceof Error ? (error.message.split("\n")[0] ?? "") : String(error);
      const url = this.#client.settings.endpointUrl;
      return { ok: false, status: StatusCode.Bad_NoCommunication, problem: problem("source.unreachable", { url, message }), time: Date.now() };
    }
  }

  close(): Promise<void> {
    return Promise.resolve();
  }

  async #readItem(session: ClientSession, namespaces: readonly string[], item: SourceItem): Promise<SourceReading> {
    switch (item.kind) {
      case "node":
        return this.#readNode(session, namespaces, item.nodeId);
      case "process-data":
        return this.#readProcessData(session, item.port);
      case "port":
        return this.#readPort(session, item.port);
      case "parameter":
        return this.#readParameter(session, item);
      default:
        return this.#refuse("source.item", { kind: item.kind });
    }
  }

  async #readNode(session: ClientSession, namespaces: readonly string[], text: string): Promise<SourceReading> {
    const isPath = text.startsWith("/");
    let nodeId = this.#paths.get(text);
    if (!nodeId) {
      const wire = isPath ? undefined : toWireNodeId(text, namespaces);
      nodeId = wire?.ok ? wire.value : isPath ? await this.#walk(session, OBJECTS, splitPath(text)) : undefined;
      if (!nodeId) return this.#refuse("source.no-node", { url: this.#client.settings.endpointUrl, path: text });
      this.#paths.set(text, nodeId);
    }
    const data = await session.read({ nodeId, attributeId: AttributeIds.Value });
    const status = data.statusCode.value;
    const value = status >>> 31 === 1 ? null : toSampleValue(decodeVariant(data.value));
    return answer({ kind: "scalar", value, status }, data.sourceTimestamp?.getTime());
  }

  async #readProcessData(session: ClientSession, port: number): Promise<SourceReading> {
    const { input, output } = await this.#findPort(session, port);
    const nodes = [input, output].filter((id) => id !== undefined);
    if (nodes.length === 0) return this.#refuse("source.no-node", { url: this.#client.settings.endpointUrl, path: `Port${port}/Device` });
    const values = await session.read(nodes.map((nodeId) => ({ nodeId, attributeId: AttributeIds.Value })));
    const frameOf = (node: NodeId | undefined): Frame | undefined => {
      const data = node && values[nodes.indexOf(node)];
      if (!data) return undefined;
      const octets = toOctets(data.value);
      // A device without process data in this direction has an empty array.
      if (octets.length === 0 && data.statusCode.isGood()) return undefined;
      return { octets, isValid: data.statusCode.value >>> 31 === 0 };
    };
    const [inFrame, outFrame] = [frameOf(input), frameOf(output)];
    const time = values[0]?.sourceTimestamp?.getTime();
    return answer({ kind: "process-data", ...(inFrame ? { in: inFrame } : {}), ...(outFrame ? { out: outFrame } : {}) }, time);
  }

  async #readPort(session: ClientSession, port: number): Promise<SourceReading> {
    const { status, vendorId, deviceId, serialNumber } = await this.#findPort(session, port);
    const read = async (nodeId: NodeId | undefined): Promise<unknown> => {
      const data = nodeId && (await session.read({ nodeId, attributeId: AttributeIds.Value }));
      return data?.statusCode.isGood() ? decodeVariant(data.value) : undefined;
    };
    const found = { status: await read(status), vendorId: await read(vendorId), deviceId: await read(deviceId) };
    const numbers = Object.fromEntries(Object.entries(found).filter(([, value]) => typeof value === "number"));
    const serial = await read(serialNumber);
    return answer({ kind: "port", ...numbers, ...(typeof serial === "string" && serial !== "" ? { serialNumber: serial } : {}) });
  }

  async #readParameter(session: ClientSession, { port, index, subindex }: Extract<SourceItem, { kind: "parameter" }>): Promise<SourceReading> {
    const { device, readIsdu } = await this.#findPort(session, port);
    if (!device || !readIsdu) return this.#refuse("source.no-node", { url: this.#client.settings.endpointUrl, path: `Port${port}/Device/MethodSet/ReadISDU` });
    const called = await session.call({
      objectId: device,
      methodId: readIsdu,
      inputArguments: [new Variant({ dataType: DataType.UInt16, value: index }), new Variant({ dataType: DataType.Byte, value: subindex })],
    });
    const [result, errorType] = called.outputArguments ?? [];
    if (called.statusCode !== StatusCodes.Good || !result) {
      const code = Number(decodeVariant(errorType) ?? called.statusCode.value);
      return this.#refuse("source.refused", { url: this.#client.settings.endpointUrl, httpStatus: 0, code, message: called.statusCode.name });
    }
    return answer({ kind: "octets", octets: toOctets(result) });
  }

  #refuse(code: string, data: Record<string, string | number>): SourceReading {
    return { ok: false, status: StatusCode.Bad_ConfigurationError, problem: problem(code, data), time: Date.now() };
  }

  async #findPort(session: ClientSession, port: number): Promise<PortNodes> {
    const known = this.#ports.get(port);
    if (known) return known;
    const set = await this.#walk(session, OBJECTS, ["IOLinkMasterSet"]);
    const masters = set ? await listChildren(session, set) : [];
    const master = masters.find((m) => (this.#masterName === undefined ? m.isObject : m.name === this.#masterName));
    const node = master && (await this.#walk(session, master.nodeId, [`Port${port}`]));
    const found: Record<string, NodeId> = {};
    for (const [name, steps] of node ? Object.entries(MEMBERS) : []) {
      const member = node && (await this.#walk(session, node, steps));
      if (member) found[name] = member;
    }
    this.#ports.set(port, found);
    return found;
  }

  async #walk(session: ClientSession, start: NodeId | string, steps: readonly string[]): Promise<NodeId | undefined> {
    let at: NodeId | string = start;
    for (const step of steps) {
      const child: { nodeId: NodeId } | undefined = (await listChildren(session, at)).find((c) => c.name === step);
      if (!child) return undefined;
      at = child.nodeId;
    }
    return typeof at === "string" ? undefined : at;
  }
}

async function listChildren(session: ClientSession, node: NodeId | string): Promise<{ name: string; nodeId: NodeId; isObject: boolean }[]> {
  const { references } = await session.browse({ nodeId: node, referenceTypeId: "i=33", includeSubtypes: true, resultMask: 63 });
  return (references ?? []).map((r) => ({ name: r.browseName.name ?? "", nodeId: r.nodeId, isObject: r.nodeClass === NodeClass.Object }));
}

/** `/Line/Motor&/Pump`: names from the Objects folder down, `&` before reserved characters. */
function splitPath(path: string): string[] {
  return (path.slice(1).match(/(?:&.|[^/&])+/g) ?? []).map((step) => step.replace(/&(.)/g, "$1"));
}

function toOctets(variant: Variant): Uint8Array {
  const value: unknown = variant.value;
  if (value instanceof Uint8Array) return Uint8Array.from(value);
  return Array.isArray(value) ? Uint8Array.from(value as number[]) : new Uint8Array();
}

function toSampleValue(value: unknown): SampleValue {
  return typeof value === "number" || typeof value === "string" || typeof value === "boolean" ? value : null;
}

function answer(value: SourceValue, time = Date.now()): SourceReading {
  return { ok: true, value, time };
}
