import { createServer, type Server } from "node:http";
import type { AddressInfo } from "node:net";
import { afterEach, describe, expect, test } from "vitest";
import { decodeRegisters, encodeRegisters } from "~/domain/mapping/decode-registers";
import { encodeCarriageSensor, encodeCreelSensor, makeBraiderSignals } from "~/sources/fakes/braider-signals";
import { startFakeModbusUnits } from "~/sources/fakes/fake-modbus-units.server";
import { startFakeRestMaster } from "~/sources/fakes/fake-rest-master.server";
import { ModbusConnection } from "~/sources/modbus-unit.server";
import { readActiveEvents, readIdentification, readParameter, readPorts, readProcessData } from "~/sources/rest-master.server";

const closers: (() => Promise<unknown>)[] = [];
afterEach(async () => {
  for (const close of closers.splice(0).reverse()) await close();
});

async function master() {
  const fake = await startFakeRestMaster([
    {
      port: 1,
      alias: "B1 creel",
      vendorId: 65001,
      deviceId: 1030,
      productName: "QS-U30",
      serialNumber: "U-1",
      readIn: (t) => ({ octets: encodeCreelSensor(makeBraiderSignals(1, t)), isValid: true }),
      parameters: { 24: [0x42, 0x31] },
    },
    {
      port: 2,
      alias: "B1 carriage",
      vendorId: 65001,
      deviceId: 1012,
      productName: "QS-P12",
      serialNumber: "P-1",
      readIn: () => ({ octets: [0, 0, 0, 0], isValid: false }),
    },
  ]);
  closers.push(() => fake.close());
  return fake;
}

/** A server that answers what the test says, for what no master should answer. */
async function oddServer(body: string, status = 200): Promise<string> {
  const server: Server = createServer((_, response) =>
    response.writeHead(status, { "content-type": "application/json" }).end(body),
  );
  await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve));
  closers.push(() => new Promise((resolve) => server.close(resolve)));
  return `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
}

describe("REST master", () => {
  test("gives the octets of both directions with their validity", async () => {
    const { baseUrl } = await master();
    const read = await readProcessData({ baseUrl }, "B1 creel");
    expect(read.ok && read.value.in?.isValid).toBe(true);
    expect(read.ok && read.value.in?.octets).toHaveLength(4);
    expect(read.ok && read.value.out).toBeUndefined();
    expect(await readProcessData({ baseUrl }, "B1 carriage")).toMatchObject({
      ok: true,
      value: { in: { isValid: false } },
    });
  });

  test("tells events that have appeared and not disappeared", async () => {
    const fake = await startFakeRestMaster([
      {
        port: 1,
        alias: "S",
        vendorId: 65001,
        deviceId: 1030,
        productName: "QS-U30",
        serialNumber: "U-1",
        // 0x8C40 maintenance, 0x4210 over-temperature, 0x5012 battery (IODD standard definitions).
        events: [
          { code: 0x8c40, mode: "APPEARS" },
          { code: 0x4210, mode: "APPEARS" },
          { code: 0x5012, mode: "SINGLESHOT" },
          { code: 0x4210, mode: "DISAPPEARS" },
        ],
      },
    ]);
    closers.push(() => fake.close());
    expect(await readActiveEvents({ baseUrl: fake.baseUrl }, "S")).toMatchObject({ ok: true, value: [0x8c40] });
  });

  test("reads ports, identification and a parameter", async () => {
    const { baseUrl } = await master();
    expect(await readIdentification({ baseUrl }, "B1 creel")).toMatchObject({
      ok: true,
      value: { vendorId: 65001, deviceId: 1030, serialNumber: "U-1" },
    });
    expect(await readParameter({ baseUrl }, "B1 creel", 24)).toMatchObject({
      ok: true,
      value: Uint8Array.of(0x42, 0x31),
    });
    const ports = await readPorts({ baseUrl });
    expect(ports.ok && ports.value.map((p) => p.statusInfo)).toEqual([
      "DEVICE_ONLINE",
      "DEVICE_ONLINE",
      ...Array.from({ length: 6 }, () => "DEACTIVATED"),
    ]);
  });

  test("tells a lost device, an unknown alias and a missing parameter apart", async () => {
    const fake = await master();
    fake.setConnected("B1 creel", false);
    const { baseUrl } = fake;
    expect(await readProcessData({ baseUrl }, "B1 creel")).toMatchObject({
      ok: false,
      status: 0x80310000,
      problem: { data: { code: 308 } },
    });
    expect(await readProcessData({ baseUrl }, "ghost")).toMatchObject({
      ok: false,
      status: 0x80890000,
      problem: { data: { code: 304 } },
    });
    fake.setConnected("B1 creel", true);
    expect(await readParameter({ baseUrl }, "B1 creel", 99)).toMatchObject({
      ok: false,
      problem: { code: "source.refused", data: { code: 309 } },
    });
  });

  test("takes the draft's key too, and refuses nonsense with a reason", async () => {
    const draft = await oddServer('{"getData":{"iolink":{"valid":true,"value":[1,2]}}}');
    expect(await readProcessData({ baseUrl: draft }, "x")).toMatchObject({
      ok: true,
      value: { in: { octets: Uint8Array.of(1, 2) } },
    });
    const wrongKey = await oddServer('{"getData":{"ioLink":{"valid":true,"value":[1,2,999]}}}');
    expect(await readProcessData({ baseUrl: wrongKey }, "x")).toMatchObject({
      ok: false,
      problem: { code: "source.answer-unexpected" },
    });
    const noJson = await oddServer("<html>");
    expect(await readProcessData({ baseUrl: noJson }, "x")).toMatchObject({
      ok: false,
      problem: { code: "source.no-json" },
    });
    const large = await oddServer(JSON.stringify("x".repeat(1_100_000)));
    expect(await readProcessData({ baseUrl: large }, "x")).toMatchObject({
      ok: false,
      problem: { code: "source.answer-too-large" },
    });
  });

  test("ends waiting for a silent master", async () => {
    const server = createServer(() => undefined);
    await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve));
    closers.push(() => {
      server.closeAllConnections();
      return new Promise((resolve) => server.close(resolve));
    });
    const baseUrl = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
    expect(await readProcessData({ baseUrl, timeoutMs: 200 }, "x")).toMatchObject({
      ok: false,
      status: 0x80310000,
      problem: { code: "source.unreachable" },
    });
  });
});

describe("Modbus TCP", () => {
  async function units() {
    const fake = await startFakeModbusUnits(
      new Map([
        [
          11,
          {
            holding: () => ({
              0: 2,
              10: encodeRegisters(128.5, "Float32", "CDAB")[0] ?? 0,
              11: encodeRegisters(128.5, "Float32", "CDAB")[1] ?? 0,
            }),
            input: () => ({}),
          },
        ],
        [21, { holding: () => ({}), input: () => ({ 0: 0, 1: 3100, 4: 2301 }) }],
      ]),
    );
    closers.push(() => fake.close());
    const connection = new ModbusConnection({ host: fake.host, port: fake.port, timeoutMs: 1_000 });
    closers.push(() => connection.close());
    return { connection, fake };
  }

  test("reads registers of several units over one connection", async () => {
    const { connection } = await units();
    const [state, speed, power] = await Promise.all([
      connection.read({ unitId: 11, table: "holding-register", address: 0, count: 1 }),
      connection.read({ unitId: 11, table: "holding-register", address: 10, count: 2 }),
      connection.read({ unitId: 21, table: "input-register", address: 0, count: 2 }),
    ]);
    expect(state).toMatchObject({ ok: true, value: [2] });
    expect(speed?.ok && decodeRegisters(speed.value, "Float32", "CDAB")).toBe(128.5);
    expect(power?.ok && decodeRegisters(power.value, "Int32")).toBe(3100);
  });

  test("an exception is an answer of the unit and keeps the connection", async () => {
    const { connection } = await units();
    expect(await connection.read({ unitId: 11, table: "holding-register", address: 500, count: 1 })).toMatchObject({
      ok: false,
      problem: { code: "source.modbus-exception", data: { code: 2 } },
    });
    expect(await connection.read({ unitId: 11, table: "holding-register", address: 0, count: 1 })).toMatchObject({
      ok: true,
    });
  });

  test("an outage is Bad_NoCommunication, and the next reading connects again", async () => {
    const connection = new ModbusConnection({ host: "127.0.0.1", port: 1, timeoutMs: 300 });
    closers.push(() => connection.close());
    expect(await connection.read({ unitId: 1, table: "coil", address: 0, count: 8 })).toMatchObject({
      ok: false,
      status: 0x80310000,
      problem: { code: "source.unreachable" },
    });
  });
});

test("the fakes' frames carry the signals that they were made of", () => {
  const signals = makeBraiderSignals(2, 1_000_000);
  const [high = 0, low = 0] = encodeCarriageSensor(signals);
  expect(((high << 8) | low) / 100).toBeCloseTo(signals.carriagePosition, 1);
});
