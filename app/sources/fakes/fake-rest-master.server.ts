/** A master that answers as the JSON integration for IO-Link 1.0 does, on loopback, for development, demo and tests. */
import { createServer, type IncomingMessage, type Server, type ServerResponse } from "node:http";
import type { AddressInfo } from "node:net";

export type FakeDevice = {
  readonly port: number;
  readonly alias: string;
  readonly vendorId: number;
  readonly deviceId: number;
  readonly productName: string;
  readonly serialNumber: string;
  /** Octets in the order of transmission; undefined where the device has none in this direction. */
  readonly readIn?: (time: number) => { readonly octets: readonly number[]; readonly isValid: boolean };
  readonly readOut?: (time: number) => { readonly octets: readonly number[]; readonly isValid: boolean };
  /** Events in the order in which they came, as the log of the master has them. */
  readonly events?: readonly { readonly code: number; readonly mode: "APPEARS" | "DISAPPEARS" | "SINGLESHOT" }[];
  /** Octets of parameters by index. */
  readonly parameters?: Readonly<Record<number, readonly number[]>>;
};

export type FakeRestMaster = {
  readonly baseUrl: string;
  /** Takes the device off its port, or puts it back. */
  setConnected(alias: string, isConnected: boolean): void;
  close(): Promise<void>;
};

const PORTS = 8;

export async function startFakeRestMaster(
  devices: readonly FakeDevice[],
  now: () => number = Date.now,
): Promise<FakeRestMaster> {
  const lost = new Set<string>();
  const server = createServer((request, response) => answer(request, response, devices, lost, now()));
  await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve));
  const { port } = server.address() as AddressInfo;
  return {
    baseUrl: `http://127.0.0.1:${port}`,
    setConnected: (alias, isConnected) => void (isConnected ? lost.delete(alias) : lost.add(alias)),
    close: () => closeServer(server),
  };
}

function closeServer(server: Server): Promise<void> {
  server.closeAllConnections();
  return new Promise((resolve) => server.close(() => resolve()));
}

function send(response: ServerResponse, status: number, body: unknown): void {
  response.writeHead(status, { "content-type": "application/json" });
  response.end(JSON.stringify(body));
}

/** Status of an error code (JSON integration 1.0): 104 … and 305 … are 400, wrong places 404. */
function refuse(response: ServerResponse, code: number, message: string): void {
  send(response, [103, 301, 302, 303, 304, 308, 309, 310, 312].includes(code) ? 404 : 400, { code, message });
}

function answer(
  request: IncomingMessage,
  response: ServerResponse,
  devices: readonly FakeDevice[],
  lost: ReadonlySet<string>,
  time: number,
): void {
  const url = new URL(request.url ?? "/", "http://127.0.0.1");
  const parts = url.pathname.split("/").filter(Boolean).map(decodeURIComponent);
  if (request.method !== "GET") return refuse(response, 103, "action not supported");
  if (parts[0] !== "iolink" || parts[1] !== "v1") return refuse(response, 301, "resource not found");
  const path = parts.slice(2);
  if (path.join("/") === "masters") return send(response, 200, [{ masterNumber: 1, serialNumber: "M-0001" }]);
  if (path.join("/") === "masters/1/ports") return send(response, 200, listPorts(devices, lost));
  if (path[0] !== "devices") return refuse(response, 301, "resource not found");
  if (path.length === 1)
    return send(
      response,
      200,
      devices.map((d) => ({ deviceAlias: d.alias, masterNumber: 1, portNumber: d.port })),
    );
  const device = devices.find((d) => d.alias === path[1]);
  if (!device) return refuse(response, 304, "deviceAlias not found");
  if (lost.has(device.alias)) return refuse(response, 308, "device not accessible");
  answerDevice(response, device, path.slice(2), time);
}

function listPorts(devices: readonly FakeDevice[], lost: ReadonlySet<string>): unknown[] {
  return Array.from({ length: PORTS }, (_, i) => {
    const device = devices.find((d) => d.port === i + 1);
    if (!device) return { portNumber: i + 1, statusInfo: "DEACTIVATED", deviceAlias: `master1port${i + 1}` };
    const statusInfo = lost.has(device.alias) ? "COMMUNICATION_LOST" : "DEVICE_ONLINE";
    return { portNumber: device.port, statusInfo, deviceAlias: device.alias };
  });
}

function answerDevice(response: ServerResponse, device: FakeDevice, path: readonly string[], time: number): void {
  const [what, ...rest] = path;
  if (what === "identification") {
    const { vendorId, deviceId, productName, serialNumber } = device;
    return send(response, 200, {
      vendorId,
      deviceId,
      ioLinkRevision: "1.1",
      vendorName: "Quillon Sensing",
      productName,
      serialNumber,
    });
  }
  if (what === "processdata" && rest.join("/") === "value") {
    const toBody = (read: FakeDevice["readIn"]) => {
      const frame = read?.(time);
      return frame && { ioLink: { valid: frame.isValid, value: frame.octets } };
    };
    const [getData, setData] = [toBody(device.readIn), toBody(device.readOut)];
    return send(response, 200, { ...(getData ? { getData } : {}), ...(setData ? { setData } : {}) });
  }
  if (what === "events" && rest.length === 0) {
    const events = (device.events ?? []).map((message) => ({ time: new Date(time).toISOString(), severity: "WARNING", origin: { deviceAlias: device.alias }, message }));
    return send(response, 200, events);
  }
  if (what === "parameters" && rest[1] === "value") {
    const octets = device.parameters?.[Number(rest[0])];
    return octets ? send(response, 200, octets) : refuse(response, 309, "parameter not found");
  }
  return refuse(response, 301, "resource not found");
}
