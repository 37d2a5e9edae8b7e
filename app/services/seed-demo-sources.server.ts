/** The demo's devices, mapping, sources and gateways, as the scenario has them. Seeding again changes nothing that is there. */
import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import { findModelByNamespace, listRevisions, type ModelRow } from "../db/repositories/models.server";
import { listDeviceRows } from "../db/repositories/devices.server";
import { listSourceRows } from "../db/repositories/sources.server";
import type { AddressSpace } from "../domain/address-space/address-space";
import type { NodeKey } from "../domain/address-space/node-id";
import { getValue } from "../domain/core/result";
import { applyMappingDocument } from "../domain/deliver/make-mapping-document";
import { readMappingDocument } from "../domain/deliver/mapping-document";
import { applyOperations } from "../domain/editing/apply-operation";
import type { Operation } from "../domain/editing/operation";
import { listMachines } from "../domain/instantiation/list-machines";
import { findTargetByPath } from "../domain/mapping/list-targets";
import { listParts, readPart } from "../domain/mapping/mapping-entries";
import { surveySignalSchema, type Binding } from "../domain/mapping/mapping-parts";
import type { MappingRow } from "../domain/mapping/mapping";
import { findProjectRoot } from "../utils/project-root.server";
import { addDeviceFile } from "./device-library.server";
import { freezeRevision } from "./freeze-revision.server";
import { assignMachine, saveGateway, savePort, saveSource } from "./save-source.server";
import { appendTransactions, loadWorkingModel } from "./working-model.server";

const BRAIDER = "http://merrow.example/UA/RopeBraider/";
const HALL = "http://merrow.example/UA/Hall/";
const CLIENT = "demo-seed";

/** The masters with the devices of their ports: braider and device. */
const masters = [
  { name: "M1", braiders: [1, 2] },
  { name: "M2", braiders: [3, 4] },
  { name: "M3", braiders: [5, 6] },
] as const;
const portDevices = [
  { product: 1030, role: "creel sensor", alias: "creel", serial: (b: number) => `U30-26-${100 + b}` },
  { product: 1012, role: "carriage sensor", alias: "carriage", serial: (b: number) => `P12-26-${200 + b}` },
  { product: 1005, role: "stack light", alias: "light", serial: (b: number) => `L5-26-${300 + b}` },
] as const;
const PORT_COUNT = 8;
const CONDITION_MONITOR = 1004;
/** Where nothing answers until the demo's fakes have started and told their addresses. */
const NOWHERE = "http://127.0.0.1:9";

/** The device library and the mapping of the machine type, frozen so that the hall can stand on it. */
export async function seedBraiderMapping(author: Caller, organizationId: string): Promise<void> {
  const folder = join(findProjectRoot(), "nodesets", "demo");
  const known = await listDeviceRows(organizationId);
  for (const fileName of known.length > 0 ? [] : readdirSync(join(folder, "iodd"))) {
    getValue(await addDeviceFile(author, organizationId, { bytes: readFileSync(join(folder, "iodd", fileName)), fileName }));
  }
  const model = await findModelByNamespace(organizationId, BRAIDER);
  const working = model && (await loadWorkingModel(model.id));
  const type = working && findType(working.space, "RopeBraiderType");
  if (!model || !working || type === undefined || listParts(working.space, "role", type).length > 0) return;
  const document = getValue(readMappingDocument(readFileSync(join(folder, "rope-braider.mapping.json"), "utf8")));
  const mapped = getValue(applyMappingDocument(working.space, type, document));
  const space = getValue(applyOperations(working.space, mapped));
  const attached = await attachDevices(organizationId, space, type);
  const survey = readSurvey(join(folder, "rope-braider.signals.json"), space, type);
  await append(model, author, [
    ["import-mapping", [...mapped, ...attached]],
    ["survey-signals", survey],
  ]);
  if ((await listRevisions(model.id)).length < 2) getValue(await freezeRevision(author, model, "First mapping of the rope braider"));
}

function findType(space: AddressSpace, name: string): NodeKey | undefined {
  return space.listOwnNodes().find((node) => node.nodeClass === "ObjectType" && node.browseName.name === name)?.key;
}

/** Roles know which description of the library they were made from. */
async function attachDevices(organizationId: string, space: AddressSpace, type: NodeKey): Promise<Operation[]> {
  const devices = await listDeviceRows(organizationId);
  return listParts(space, "role", type).flatMap(({ id, value }): Operation[] => {
    const device = devices.find((d) => d.vendorId === value.vendorId && d.deviceId === value.deviceId);
    if (!device) return [];
    const attached = { ...value, deviceDescriptionId: device.id };
    return [{ kind: "setMapping", part: "role", owner: type, id, value: attached }];
  });
}

const surveySchema = z.object({ signals: z.array(surveySignalSchema) });

function readSurvey(file: string, space: AddressSpace, type: NodeKey): Operation[] {
  const { signals } = surveySchema.parse(JSON.parse(readFileSync(file, "utf8")));
  return signals.map(({ target: path, ...signal }, i): Operation => {
    const target = path === undefined ? undefined : findTargetByPath(space, type, path)?.target;
    const value = { ...signal, ...(target === undefined ? {} : { target }) };
    return { kind: "setMapping", part: "signal", owner: type, id: `s${String(i + 1).padStart(2, "0")}`, value };
  });
}

async function append(model: ModelRow, author: Caller, edits: readonly (readonly [label: string, operations: readonly Operation[]])[]): Promise<void> {
  const working = await loadWorkingModel(model.id);
  const transactions = edits.map(([label, operations], i) => ({ clientSeq: i + 1, label, operations }));
  const outcome = await appendTransactions(model.id, author, { clientId: `${CLIENT}-${model.id}`, base: working?.seq ?? 0, transactions });
  if (outcome.kind !== "accepted") throw new Error(`The demo's mapping cannot be seeded: ${outcome.kind}`);
}

/** Sources, ports, gateways and bindings of the hall. */
export async function seedHallSources(author: Caller, organizationId: string): Promise<void> {
  const model = await findModelByNamespace(organizationId, HALL);
  const working = model && (await loadWorkingModel(model.id));
  if (!model || !working || (await listSourceRows(organizationId)).length > 0) return;
  const machines = listMachines(working.space);
  const bindings = await seedSources(author, organizationId);
  const operations = machines.flatMap(({ key, name, typeKey }) => [
    ...[...(bindings.get(name) ?? [])].map(([role, value]): Operation => ({ kind: "setMapping", part: "binding", owner: key, id: role, value })),
    ...(typeKey === undefined || !["B1", "B2"].includes(name) ? [] : listOlderController(working.space, key, typeKey)),
  ]);
  await append(model, author, [["bind-roles", operations]]);
  for (const [name, endpointUrl, braiders] of [
    ["GW-North", null, ["B1", "B2", "B3"]],
    ["GW-South", null, ["B4", "B5", "B6"]],
  ] as const) {
    const { id } = getValue(await saveGateway(author, organizationId, { name, endpointUrl, note: "" }));
    for (const machine of machines.filter((m) => (braiders as readonly string[]).includes(m.name))) {
      getValue(await assignMachine(author, organizationId, { modelId: model.id, machineKey: machine.key, gatewayId: id }));
    }
  }
}

async function seedSources(author: Caller, organizationId: string): Promise<Map<string, Map<string, Binding>>> {
  const bindings = new Map<string, Map<string, Binding>>();
  const bind = (braider: number, role: string, binding: Binding): void => {
    const name = `B${braider}`;
    bindings.set(name, (bindings.get(name) ?? new Map<string, Binding>()).set(role, binding));
  };
  const times = { timeoutMs: 2_000, periodMs: 500 };
  const devices = await listDeviceRows(organizationId);
  const plan = (product: number) => {
    const device = devices.find((d) => d.deviceId === product);
    return { portClass: "A", mode: "IOL_AUTOSTART", ...(device ? { deviceDescriptionId: device.id, vendorId: device.vendorId, deviceId: product } : {}) } as const;
  };
  for (const { name, braiders } of masters) {
    const address = { url: NOWHERE, masterNumber: 1, portCount: PORT_COUNT, ...times };
    const { id: sourceId } = getValue(await saveSource(author, organizationId, { name, kind: "rest-master", address, note: "" }));
    for (const [index, braider] of braiders.entries()) {
      for (const [offset, { product, role, alias, serial }] of portDevices.entries()) {
        const port = 3 * index + offset + 1;
        const deviceAlias = `B${braider}_${alias}`;
        const serialNumber = serial(braider);
        getValue(await savePort(author, organizationId, { sourceId, port, plan: { ...plan(product), deviceAlias, serialNumber } }));
        bind(braider, role, { sourceId, port, deviceAlias, serialNumber });
      }
    }
  }
  const m4 = { url: "opc.tcp://127.0.0.1:9", masterName: "M4", portCount: PORT_COUNT, ...times };
  const { id: monitors } = getValue(await saveSource(author, organizationId, { name: "M4", kind: "opc-ua-master", address: m4, note: "" }));
  const units = { host: "127.0.0.1", port: 9, ...times };
  const note = "Controllers are units 11 … 16, meters 21 … 26.";
  const { id: modbus } = getValue(await saveSource(author, organizationId, { name: "Hall controllers and meters", kind: "modbus-unit", address: units, note }));
  for (const braider of [1, 2, 3, 4, 5, 6]) {
    const serialNumber = `C04-26-${400 + braider}`;
    getValue(await savePort(author, organizationId, { sourceId: monitors, port: braider, plan: { ...plan(CONDITION_MONITOR), serialNumber } }));
    bind(braider, "condition monitor", { sourceId: monitors, port: braider, serialNumber });
    bind(braider, "controller", { sourceId: modbus, unitId: 10 + braider });
    bind(braider, "meter", { sourceId: modbus, unitId: 20 + braider });
  }
  return bindings;
}


/** The older controllers of B1 and B2 send the low word of a Float first. */
function listOlderController(space: AddressSpace, machine: NodeKey, type: NodeKey): Operation[] {
  const reason = "The older controller sends the low word first.";
  return ["Process/SpindleSpeed", "Process/CarriageSetpoint"].flatMap((path): Operation[] => {
    const target = findTargetByPath(space, type, path)?.target;
    const source = target === undefined ? undefined : readPart(space, "row", type, target)?.source;
    if (target === undefined || source?.kind !== "register") return [];
    const row: Partial<MappingRow> = { source: { ...source, order: "CDAB" } };
    return [{ kind: "setMapping", part: "exception", owner: machine, id: target, value: { reason, row } }];
  });
}
