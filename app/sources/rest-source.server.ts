/** A master with the JSON integration, and a plain JSON service, as live sources. */
import { z } from "zod";
import { problem } from "../domain/core/result";
import type { LiveSource, Reading, SourceItem, SourceReading, SourceValue } from "../domain/mapping/live-source";
import { StatusCode } from "../domain/mapping/status";
import { getJson, readActiveEvents, readIdentification, readParameter, readPorts, readProcessData, type RestMasterAddress } from "./rest-master.server";

/** Port states of the JSON integration 1.0 → numbers of OPC 30120 (0 no device, 1 deactivated, 2 incorrect device, 3 pre-operate, 4 operate, 5 DI, 6 DO, 255 not available). */
const PORT_STATES: Readonly<Record<string, number>> = {
  COMMUNICATION_LOST: 0,
  DEACTIVATED: 1,
  INCORRECT_DEVICE: 2,
  DEVICE_STARTING: 3,
  DEVICE_ONLINE: 4,
  "DIGITAL_INPUT_C/Q": 5,
  "DIGITAL_OUTPUT_C/Q": 6,
  NOT_AVAILABLE: 255,
};

export type RestMasterSettings = RestMasterAddress & { readonly masterNumber?: number };

export function openRestMaster(settings: RestMasterSettings): LiveSource {
  const { masterNumber = 1 } = settings;
  /** A master that was never told other names calls its devices so (JSON integration 1.0). */
  const aliasOf = ({ port, alias }: { port: number; alias?: string }): string => alias ?? `master${masterNumber}port${port}`;
  return {
    read: async (item) => {
      switch (item.kind) {
        case "process-data":
          return mapReading(await readProcessData(settings, aliasOf(item)), (value) => ({ kind: "process-data", ...value }));
        case "parameter":
          return mapReading(await readParameter(settings, aliasOf(item), item.index, item.subindex), (octets) => ({ kind: "octets", octets }));
        case "events":
          return mapReading(await readActiveEvents(settings, aliasOf(item)), (codes) => ({ kind: "events", codes }));
        case "port":
          return readPort(settings, masterNumber, item.port, aliasOf(item));
        default:
          return refuseItem(item);
      }
    },
    close: () => Promise.resolve(),
  };
}

async function readPort(settings: RestMasterAddress, masterNumber: number, port: number, alias: string): Promise<SourceReading> {
  const ports = await readPorts(settings, masterNumber);
  if (!ports.ok) return ports;
  const found = ports.value.find((p) => p.portNumber === port);
  const status = found && PORT_STATES[found.statusInfo];
  const state: SourceValue = { kind: "port", ...(status === undefined ? {} : { status }) };
  if (status !== 2 && status !== 4) return { ok: true, value: state, time: ports.time };
  const identity = await readIdentification(settings, alias);
  if (!identity.ok) return { ok: true, value: state, time: ports.time };
  const { vendorId, deviceId, serialNumber } = identity.value;
  return { ok: true, value: { ...state, vendorId, deviceId, ...(serialNumber === undefined ? {} : { serialNumber }) }, time: identity.time };
}

/** A service whose one address answers JSON. */
export function openRestService(settings: { readonly url: string; readonly timeoutMs?: number }): LiveSource {
  return {
    read: async (item) => {
      if (item.kind !== "document") return refuseItem(item);
      return mapReading(await getJson(settings.url, settings.timeoutMs, z.json()), (json) => ({ kind: "document", json }));
    },
    close: () => Promise.resolve(),
  };
}

export function mapReading<T>(reading: Reading<T>, change: (value: T) => SourceValue): SourceReading {
  return reading.ok ? { ...reading, value: change(reading.value) } : reading;
}

/** The source cannot answer this kind of question; the mapping is at fault. */
export function refuseItem(item: SourceItem): SourceReading {
  return { ok: false, status: StatusCode.Bad_ConfigurationError, problem: problem("source.item", { kind: item.kind }), time: Date.now() };
}
