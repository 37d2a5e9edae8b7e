/** Units of IODDs (OPC 30120 Annex C). */
import { toUnitId, UNECE_UNITS_URI } from "../units/units";
import { ioddUnitTable } from "./iodd-unit-table";

/**
 * A unit for people and for OPC UA. `code` is the UN/CEFACT common code and `unitId` the id that OPC 10000-8 §5.6.3 makes
 * of it. Where UN/CEFACT has no such unit, `code` is empty and `unitId` is the IODD code in the namespace of OPC 30120.
 */
export type IoddUnit = {
  readonly ioddCode: number;
  readonly code: string;
  readonly unitId: number;
  readonly symbol: string;
  readonly namespaceUri: string;
};

export const IOLINK_UNIT_NAMESPACE = "http://opcfoundation.org/UA/IOLink";

let table: Map<number, IoddUnit> | undefined;

/** The unit of a unitCode; undefined for a code that the Community has not assigned. */
export function findIoddUnit(unitCode: number): IoddUnit | undefined {
  table ??= new Map(ioddUnitTable.split("\n").map((line) => toEntry(line)));
  return table.get(unitCode);
}

function toEntry(line: string): [number, IoddUnit] {
  const [digits = "", code = "", symbol = ""] = line.split("\t");
  const ioddCode = Number(digits);
  const unitId = code === "" ? ioddCode : toUnitId(code);
  return [
    ioddCode,
    { ioddCode, code, unitId, symbol, namespaceUri: code === "" ? IOLINK_UNIT_NAMESPACE : UNECE_UNITS_URI },
  ];
}
