/**
 * The field devices of the demo's hall, on loopback: three masters with the JSON integration and twelve Modbus units (a
 * controller and a meter for each braider). All invented; the values move as braider-signals.ts says.
 */
import { encodeRegisters } from "../../domain/mapping/decode-registers";
import {
  encodeCarriageSensor,
  encodeCreelSensor,
  encodeStackLight,
  makeBraiderSignals,
} from "./braider-signals";
import { startFakeModbusUnits, type FakeModbusUnits, type FakeUnit } from "./fake-modbus-units.server";
import { startFakeRestMaster, type FakeDevice, type FakeRestMaster } from "./fake-rest-master.server";

export type DemoHall = {
  /** M1, M2, M3. */
  readonly masters: readonly FakeRestMaster[];
  readonly units: FakeModbusUnits;
  close(): Promise<void>;
};

const VENDOR_ID = 65_001;
const BRAIDERS = [1, 2, 3, 4, 5, 6];
const TAG_INDEX = 24;

export async function startDemoHall(now: () => number = Date.now): Promise<DemoHall> {
  const pairs = [BRAIDERS.slice(0, 2), BRAIDERS.slice(2, 4), BRAIDERS.slice(4, 6)];
  const masters = await Promise.all(
    pairs.map((pair) => startFakeRestMaster(pair.flatMap((braider, i) => makeDevices(braider, 3 * i)), now)),
  );
  const units = await startFakeModbusUnits(makeUnits(), now);
  return {
    masters,
    units,
    close: async () => {
      await Promise.all([...masters.map((master) => master.close()), units.close()]);
    },
  };
}

function makeDevices(braider: number, before: number): FakeDevice[] {
  const common = { vendorId: VENDOR_ID };
  const frame = (octets: readonly number[]) => ({ octets, isValid: true });
  return [
    {
      ...common,
      port: before + 1,
      alias: `B${braider}_creel`,
      deviceId: 1030,
      productName: "QS-U30",
      serialNumber: `U30-26-${100 + braider}`,
      readIn: (time) => frame(encodeCreelSensor(makeBraiderSignals(braider, time))),
      parameters: { [TAG_INDEX]: toText(`Creel B${braider}`, 32), 36: [0] },
    },
    {
      ...common,
      port: before + 2,
      alias: `B${braider}_carriage`,
      deviceId: 1012,
      productName: "QS-P12",
      serialNumber: `P12-26-${200 + braider}`,
      readIn: (time) => frame(encodeCarriageSensor(makeBraiderSignals(braider, time))),
      parameters: { 36: [0] },
    },
    {
      ...common,
      port: before + 3,
      alias: `B${braider}_light`,
      deviceId: 1005,
      productName: "QS-L5",
      serialNumber: `L5-26-${300 + braider}`,
      readOut: (time) => frame(encodeStackLight(makeBraiderSignals(braider, time))),
      parameters: { 36: [0] },
    },
  ];
}

/** Octets of a text parameter, filled up with zeros. */
function toText(text: string, length: number): number[] {
  return Array.from({ length }, (_, i) => text.charCodeAt(i) || 0);
}

/** Unit 10 + n is the controller of braider n, 20 + n its meter. */
function makeUnits(): Map<number, FakeUnit> {
  const units = new Map<number, FakeUnit>();
  for (const braider of BRAIDERS) {
    units.set(10 + braider, { holding: (time) => readController(braider, time), input: () => ({}) });
    units.set(20 + braider, { holding: () => ({}), input: (time) => readMeter(braider, time) });
  }
  return units;
}

function readController(braider: number, time: number): Record<number, number> {
  const signals = makeBraiderSignals(braider, time);
  // The older controllers of B1 and B2 send the low word first and count no picks.
  const order = braider <= 2 ? "CDAB" : "ABCD";
  return {
    ...place(0, [signals.state, signals.faultNumber, signals.recipeNumber]),
    ...place(10, encodeRegisters(signals.spindleSpeed, "Float32", order)),
    ...place(12, encodeRegisters(signals.carriageSetpoint, "Float32", order)),
    ...(braider <= 2 ? {} : place(14, encodeRegisters(signals.picks, "UInt32"))),
  };
}

function readMeter(braider: number, time: number): Record<number, number> {
  const { activePower, activeEnergy, voltage, current, powerFactor } = makeBraiderSignals(braider, time);
  return {
    ...place(0, encodeRegisters(Math.round(activePower * 1000), "Int32")),
    ...place(2, encodeRegisters(Math.round(activeEnergy * 100), "UInt32")),
    ...place(4, [Math.round(voltage * 10), Math.round(current * 100), Math.round(powerFactor * 1000)]),
  };
}

function place(first: number, words: readonly number[]): Record<number, number> {
  return Object.fromEntries(words.map((word, i) => [first + i, word]));
}
