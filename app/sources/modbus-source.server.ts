/** Modbus units behind one address as a live source. */
import type { LiveSource } from "../domain/mapping/live-source";
import { ModbusConnection, type ModbusAddress } from "./modbus-unit.server";
import { mapReading, refuseItem } from "./rest-source.server";

export function openModbusUnits(address: ModbusAddress): LiveSource {
  const connection = new ModbusConnection(address);
  return {
    read: async (item) => {
      if (item.kind !== "registers") return refuseItem(item);
      const { unitId, table, address: first, count } = item;
      return mapReading(await connection.read({ unitId, table, address: first, count }), (words) => ({ kind: "words", words }));
    },
    close: () => connection.close(),
  };
}
