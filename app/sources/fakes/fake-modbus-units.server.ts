/** Controllers and meters that speak Modbus TCP on loopback, for development, demo and tests; the package's own server. */
import { ServerTCP } from "modbus-serial";
import { createServer } from "node:net";
import type { AddressInfo } from "node:net";

/** Registers of one unit at a time; an address that is absent answers exception 2, illegal data address. */
export type FakeUnit = {
  readonly holding: (time: number) => Readonly<Record<number, number>>;
  readonly input: (time: number) => Readonly<Record<number, number>>;
};

export type FakeModbusUnits = { readonly host: string; readonly port: number; close(): Promise<void> };

const ILLEGAL_DATA_ADDRESS = 2;
const GATEWAY_TARGET_SILENT = 0x0b;

export async function startFakeModbusUnits(
  units: ReadonlyMap<number, FakeUnit>,
  now: () => number = Date.now,
): Promise<FakeModbusUnits> {
  const port = await findFreePort();
  const read = (table: keyof FakeUnit, address: number, unitId: number): number => {
    const unit = units.get(unitId);
    if (!unit) throw Object.assign(new Error(`No unit ${unitId}`), { modbusErrorCode: GATEWAY_TARGET_SILENT });
    const value = unit[table](now())[address];
    if (value === undefined)
      throw Object.assign(new Error(`No register ${address}`), { modbusErrorCode: ILLEGAL_DATA_ADDRESS });
    return value;
  };
  const vector = {
    getHoldingRegister: (address: number, unitId: number) => read("holding", address, unitId),
    getInputRegister: (address: number, unitId: number) => read("input", address, unitId),
  };
  const server = new ServerTCP(vector, { host: "127.0.0.1", port, unitID: 255, debug: false });
  await new Promise<void>((resolve, reject) => {
    server.once("initialized", () => resolve());
    server.once("serverError", (error) => reject(error ?? new Error("The fake could not listen")));
  });
  // A client that goes away in the middle of an answer is nothing to report.
  server.on("socketError", () => undefined);
  return { host: "127.0.0.1", port, close: () => new Promise<void>((resolve) => server.close(() => resolve())) };
}

function findFreePort(): Promise<number> {
  return new Promise((resolve) => {
    const probe = createServer();
    probe.listen(0, "127.0.0.1", () => {
      const { port } = probe.address() as AddressInfo;
      probe.close(() => resolve(port));
    });
  });
}
