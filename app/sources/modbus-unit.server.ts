/**
 * Units behind Modbus TCP. One connection an address, shared by its units; requests go out one after the other, since many
 * small controllers take one at a time. Reads only: coils, discrete inputs, holding and input registers.
 */
import ModbusRTU from "modbus-serial";
import { problem } from "../domain/core/result";
import { StatusCode } from "../domain/mapping/status";
import type { Reading } from "../domain/mapping/live-source";

export type ModbusTable = "coil" | "discrete-input" | "holding-register" | "input-register";

export type ModbusAddress = { readonly host: string; readonly port: number; readonly timeoutMs?: number };

/** Zero-based wire address, as in the protocol data unit. */
export type ModbusRange = {
  readonly unitId: number;
  readonly table: ModbusTable;
  readonly address: number;
  readonly count: number;
};

const DEFAULT_TIMEOUT_MS = 2_000;
/** Limits of one request (MODBUS Application Protocol V1.1b3 §6.1, §6.3): 2000 bits, 125 registers. */
export const MAX_REGISTERS = 125;
export const MAX_BITS = 2_000;

export class ModbusConnection {
  readonly #address: ModbusAddress;
  #client: ModbusRTU | undefined;
  #queue: Promise<unknown> = Promise.resolve();
  #isClosed = false;

  constructor(address: ModbusAddress) {
    this.#address = address;
  }

  /** The words of registers, or 0 and 1 of coils and inputs. */
  read(range: ModbusRange): Promise<Reading<number[]>> {
    const limit = range.table.endsWith("register") ? MAX_REGISTERS : MAX_BITS;
    if (range.count < 1 || range.count > limit || range.address + range.count > 65_536) {
      throw new RangeError(`${range.count} items from ${range.address}`);
    }
    const reading = this.#queue.then(() => this.#read(range));
    this.#queue = reading;
    return reading;
  }

  /** Waits for the running request and closes the connection. */
  async close(): Promise<void> {
    this.#isClosed = true;
    await this.#queue;
    this.#drop();
  }

  async #read(range: ModbusRange): Promise<Reading<number[]>> {
    try {
      const client = await this.#connect();
      client.setID(range.unitId);
      const data = await this.#request(client, range);
      return { ok: true, value: data.map(Number), time: Date.now() };
    } catch (error) {
      return this.#explain(range, error);
    }
  }

  #request(client: ModbusRTU, { table, address, count }: ModbusRange): Promise<readonly (number | boolean)[]> {
    switch (table) {
      case "coil":
        return client.readCoils(address, count).then((answer) => answer.data.slice(0, count));
      case "discrete-input":
        return client.readDiscreteInputs(address, count).then((answer) => answer.data.slice(0, count));
      case "holding-register":
        return client.readHoldingRegisters(address, count).then((answer) => answer.data);
      case "input-register":
        return client.readInputRegisters(address, count).then((answer) => answer.data);
    }
  }

  async #connect(): Promise<ModbusRTU> {
    if (this.#isClosed) throw new Error("The connection is closed.");
    if (this.#client?.isOpen) return this.#client;
    this.#drop();
    const client = new ModbusRTU();
    const timeout = this.#address.timeoutMs ?? DEFAULT_TIMEOUT_MS;
    client.setTimeout(timeout);
    // An error after the connection stands shows as a failed request; without a listener it would end the process.
    client.on("error", () => this.#drop());
    this.#client = client;
    await client.connectTCP(this.#address.host, { port: this.#address.port, timeout });
    return client;
  }

  #drop(): void {
    const client = this.#client;
    this.#client = undefined;
    client?.destroy(() => undefined);
  }

  /** An exception of the unit (01 … 0B) is an answer: the connection stays. Anything else is an outage. */
  #explain({ unitId, table, address }: ModbusRange, error: unknown): Reading<number[]> {
    const time = Date.now();
    const { host, port } = this.#address;
    const code: unknown = error instanceof Error ? Reflect.get(error, "modbusCode") : undefined;
    if (typeof code === "number") {
      return {
        ok: false,
        status: StatusCode.Bad_ConfigurationError,
        problem: problem("source.modbus-exception", { unitId, table, address, code }),
        time,
      };
    }
    this.#drop();
    const message = error instanceof Error ? error.message : String(error);
    return {
      ok: false,
      status: StatusCode.Bad_NoCommunication,
      problem: problem("source.unreachable", { url: `${host}:${port}`, message }),
      time,
    };
  }
}
