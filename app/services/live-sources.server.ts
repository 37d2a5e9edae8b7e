/**
 * Live sources of the organisation: one poller a source, shared by decode benches, port plans and test servers, since a
 * small master or controller has few connections to give. Only addresses that the organisation allows are reached.
 */
import { join } from "node:path";
import { listAllowances } from "../db/repositories/endpoints.server";
import { findSourceRow, type SourceRow } from "../db/repositories/sources.server";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { isAllowed } from "../domain/live/endpoint-address";
import { formatHex } from "../domain/mapping/bits";
import type { Frame, LiveSource, SourceItem, SourceReading, SourceValue } from "../domain/mapping/live-source";
import { sourceAddressSchema, type SourceAddress, type SourceKind } from "../domain/mapping/source-settings";
import { openModbusUnits } from "../sources/modbus-source.server";
import { Poller } from "../sources/poller.server";
import { openRestMaster, openRestService } from "../sources/rest-source.server";
import { ANONYMOUS, UNPROTECTED } from "../opcua/client/endpoint-settings";
import { getEnvironment } from "../utils/env.server";
import { onShutdown } from "../utils/shutdown.server";
import { singleton } from "../utils/singleton.server";
import { loadClient } from "./live-endpoint.server";

type Open = { readonly stamp: string; readonly poller: Poller; idle: NodeJS.Timeout | undefined };

const IDLE_MS = 30_000;

type Pool = { readonly open: Map<string, Open>; readonly own: Set<string> };

const getPool = () =>
  singleton<Pool>("live-sources", () => {
    onShutdown("live sources", closeAll);
    return { open: new Map(), own: new Set() };
  });

async function closeAll(): Promise<void> {
  const entries = [...getPool().open.values()];
  getPool().open.clear();
  for (const { idle } of entries) clearTimeout(idle);
  await Promise.all(entries.map(({ poller }) => poller.close()));
}

/** Lets the demo's own fakes be reached, `host:port`; nothing else is exempt from the organisation's list. */
export function allowOwnFake(address: string): void {
  getPool().own.add(address);
}

/** The shared poller of a source. Problems: `request.not-found`, `endpoint.not-allowed`, `source.not-live`. */
export async function openSource(organizationId: string, sourceId: string): Promise<Result<Poller>> {
  const row = await findSourceRow(sourceId);
  if (row?.organizationId !== organizationId) return fail(problem("request.not-found"));
  const { open } = getPool();
  const stamp = JSON.stringify([row.kind, row.address]);
  const known = open.get(sourceId);
  if (known?.stamp === stamp) return ok(keepOpen(sourceId, known));
  if (known) {
    open.delete(sourceId);
    clearTimeout(known.idle);
    await known.poller.close();
  }
  const source = await connect(row, sourceAddressSchema.parse(row.address));
  if (!source.ok) return source;
  const entry: Open = { stamp, poller: new Poller(source.value), idle: undefined };
  open.set(sourceId, entry);
  return ok(keepOpen(sourceId, entry));
}

/** A poller that nobody has asked for a while is closed. */
function keepOpen(sourceId: string, entry: Open): Poller {
  clearTimeout(entry.idle);
  entry.idle = setTimeout(() => {
    if (!entry.poller.isIdle) return void keepOpen(sourceId, entry);
    if (getPool().open.get(sourceId) === entry) getPool().open.delete(sourceId);
    void entry.poller.close();
  }, IDLE_MS);
  entry.idle.unref();
  return entry.poller;
}

async function connect(row: SourceRow, address: SourceAddress): Promise<Result<LiveSource>> {
  const place = findPlace(address);
  if (!place) return fail(problem("source.not-live", { name: row.name }));
  const isOwn = getPool().own.has(`${place.host}:${place.port}`);
  if (!isOwn && !isAllowed(place, await listAllowances(row.organizationId))) return fail(problem("endpoint.not-allowed", place));
  const { url = "", timeoutMs } = address;
  switch (row.kind as SourceKind) {
    case "rest-master":
      return ok(openRestMaster({ baseUrl: url, timeoutMs, masterNumber: address.masterNumber ?? 1 }));
    case "rest-service":
      return ok(openRestService({ url, timeoutMs }));
    case "modbus-unit":
      return ok(openModbusUnits({ ...place, timeoutMs }));
    case "opc-ua-master":
    case "opc-ua-server":
    case "tag-server":
      return ok(await openOpcUa(row.id, url, address.masterName));
    case "controller-master":
      return fail(problem("source.not-live", { name: row.name }));
  }
}

async function openOpcUa(id: string, endpointUrl: string, masterName: string | undefined): Promise<LiveSource> {
  const { getEndpointClient } = await loadClient();
  const { OpcUaSource } = await import("../opcua/client/opc-ua-source.server");
  const pkiFolder = join(getEnvironment().dataFolder, "pki", "client");
  // Reading only, on a source that the organisation allows; protected endpoints are opened as endpoints in Live.
  const client = getEndpointClient({ id: `source-${id}`, endpointUrl, security: UNPROTECTED, token: ANONYMOUS, certificate: undefined, pkiFolder });
  return new OpcUaSource(client, masterName);
}

function findPlace({ url, host, port }: SourceAddress): { host: string; port: number } | undefined {
  if (host !== undefined) return { host: host.toLowerCase(), port: port ?? 502 };
  const match = /^(https?|opc\.tcp):\/\/(\[[0-9a-f:.]+\]|[^/:?#@\s]+)(?::(\d+))?/i.exec(url ?? "");
  if (!match?.[2]) return undefined;
  const standard = match[1]?.toLowerCase() === "https" ? 443 : match[1]?.toLowerCase() === "http" ? 80 : 4840;
  return { host: match[2].replace(/^\[|\]$/g, "").toLowerCase(), port: Number(match[3] ?? standard) };
}

/** One answer now. Problems: those of `openSource` and of the reading. */
export async function readSourceNow(organizationId: string, sourceId: string, item: SourceItem): Promise<Result<{ value: SourceValue; time: number }>> {
  const poller = await openSource(organizationId, sourceId);
  if (!poller.ok) return poller;
  const reading = await poller.value.read(item);
  return reading.ok ? ok({ value: reading.value, time: reading.time }) : fail(reading.problem);
}

/** A frame for the event stream: octets as hexadecimal pairs. */
export type LiveFrame = { readonly hex: string; readonly isValid: boolean };

export type LivePort = {
  readonly port: number;
  readonly in?: LiveFrame;
  readonly out?: LiveFrame;
  /** Why there is none. */
  readonly problem?: string;
  /** ISO 8601, UTC. */
  readonly time: string;
};

export function toLivePort(port: number, reading: SourceReading): LivePort {
  const time = new Date(reading.time).toISOString();
  if (!reading.ok) return { port, problem: reading.problem.code, time };
  if (reading.value.kind !== "process-data") return { port, time };
  const show = (frame: Frame | undefined): LiveFrame | undefined => frame && { hex: formatHex(frame.octets), isValid: frame.isValid };
  const [input, output] = [show(reading.value.in), show(reading.value.out)];
  return { port, ...(input ? { in: input } : {}), ...(output ? { out: output } : {}), time };
}

