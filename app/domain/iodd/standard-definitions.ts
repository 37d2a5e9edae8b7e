/**
 * Variables and events that every IODD may refer to without defining them. Indices, types and access rights:
 * IODDStandardDefinitions V1.1.3 (IO-Link Community, 2021-01-21). Names are ours, short.
 */
import type { IoddDatatype, IoddSimpleDatatype, IoddVariable, SingleValue } from "./device-description";

const UINT8: IoddSimpleDatatype = { kind: "UIntegerT", bitLength: 8, singleValues: [], ranges: [] };

function text(fixedLength: number): IoddSimpleDatatype {
  return { kind: "StringT", fixedLength, encoding: "UTF-8" };
}

function values(names: Readonly<Record<number, string>>): SingleValue[] {
  return Object.entries(names).map(([value, name]) => ({ value: Number(value), name: { en: name } }));
}

const SYSTEM_COMMAND: IoddSimpleDatatype = {
  kind: "UIntegerT",
  bitLength: 8,
  ranges: [],
  singleValues: values({
    128: "Device reset",
    129: "Application reset",
    130: "Restore factory settings",
    131: "Back-to-box",
  }),
};

const LOCK: IoddSimpleDatatype = {
  kind: "BooleanT",
  ranges: [],
  singleValues: [
    { value: true, name: { en: "locked" } },
    { value: false, name: { en: "unlocked" } },
  ],
};

/** 16 octets in a row, subindex 1 first; each an unsigned octet but the command in subindex 16 of page 1. */
function directParameterPage(last: IoddSimpleDatatype): IoddDatatype {
  return {
    kind: "RecordT",
    bitLength: 128,
    items: Array.from({ length: 16 }, (_, i) => ({
      subindex: i + 1,
      bitOffset: 120 - 8 * i,
      type: i === 15 ? last : UINT8,
    })),
  };
}

const LOCK_NAMES = ["Parameter access", "Data storage", "Local parameterization", "Local user interface"];

const DEVICE_STATUS: IoddSimpleDatatype = {
  kind: "UIntegerT",
  bitLength: 8,
  ranges: [],
  singleValues: values({
    0: "OK",
    1: "Maintenance required",
    2: "Out of specification",
    3: "Functional check",
    4: "Failure",
  }),
};

type Row = readonly [id: string, index: number, access: "ro" | "rw" | "wo", type: IoddDatatype, name: string];

const ROWS: readonly Row[] = [
  ["V_DirectParameters_1", 0, "rw", directParameterPage(SYSTEM_COMMAND), "Direct parameters, page 1"],
  ["V_DirectParameters_2", 1, "rw", directParameterPage(UINT8), "Direct parameters, page 2"],
  ["V_SystemCommand", 2, "wo", SYSTEM_COMMAND, "System command"],
  [
    "V_DeviceAccessLocks",
    12,
    "rw",
    {
      kind: "RecordT",
      bitLength: 16,
      items: LOCK_NAMES.map((name, i) => ({ subindex: i + 1, bitOffset: i, type: LOCK, name: { en: name } })),
    },
    "Device access locks",
  ],
  ["V_VendorName", 16, "ro", text(64), "Vendor name"],
  ["V_VendorText", 17, "ro", text(64), "Vendor text"],
  ["V_ProductName", 18, "ro", text(64), "Product name"],
  ["V_ProductID", 19, "ro", text(64), "Product ID"],
  ["V_ProductText", 20, "ro", text(64), "Product text"],
  ["V_SerialNumber", 21, "ro", text(16), "Serial number"],
  ["V_HardwareRevision", 22, "ro", text(64), "Hardware revision"],
  ["V_FirmwareRevision", 23, "ro", text(64), "Firmware revision"],
  ["V_ApplicationSpecificTag", 24, "rw", text(32), "Application-specific tag"],
  ["V_ErrorCount", 32, "ro", { kind: "UIntegerT", bitLength: 16, singleValues: [], ranges: [] }, "Error count"],
  ["V_DeviceStatus", 36, "ro", DEVICE_STATUS, "Device status"],
  [
    "V_DetailedDeviceStatus",
    37,
    "ro",
    { kind: "ArrayT", count: 64, element: { kind: "OctetStringT", fixedLength: 3 } },
    "Detailed device status",
  ],
  ["V_ProcessDataInput", 40, "ro", { kind: "ProcessDataInUnionT" }, "Process data input"],
  ["V_ProcessDataOutput", 41, "ro", { kind: "ProcessDataOutUnionT" }, "Process data output"],
  ["V_OffsetTime", 48, "rw", UINT8, "Offset time"],
];

/** The standard variable of an id such as `V_DeviceStatus`. */
export function findStandardVariable(id: string): IoddVariable | undefined {
  const row = ROWS.find((r) => r[0] === id);
  if (!row) return undefined;
  const [, index, accessRights, type, name] = row;
  return { id, index, accessRights, type, isStandard: true, name: { en: name }, shownAs: [] };
}

const EVENT_NAMES: Readonly<Record<number, readonly ["Notification" | "Warning" | "Error", string]>> = {
  0x0000: ["Notification", "No malfunction"],
  0x1000: ["Error", "General malfunction"],
  0x4000: ["Error", "Temperature fault"],
  0x4210: ["Warning", "Over-temperature"],
  0x4220: ["Warning", "Under-temperature"],
  0x5000: ["Error", "Hardware fault"],
  0x5010: ["Error", "Component malfunction"],
  0x5011: ["Error", "Memory loss"],
  0x5012: ["Warning", "Battery low"],
  0x5100: ["Error", "Supply fault"],
  0x5101: ["Error", "Fuse blown"],
  0x5110: ["Warning", "Primary supply voltage high"],
  0x5111: ["Warning", "Primary supply voltage low"],
  0x5112: ["Warning", "Secondary supply voltage fault"],
  0x6000: ["Error", "Software fault"],
  0x6320: ["Error", "Parameter error"],
  0x6321: ["Error", "Parameter missing"],
  0x7710: ["Error", "Short circuit"],
  0x7711: ["Error", "Ground fault"],
  0x8c00: ["Error", "Application fault"],
  0x8c01: ["Warning", "Simulation active"],
  0x8c10: ["Warning", "Process variable over range"],
  0x8c20: ["Error", "Measuring range exceeded"],
  0x8c30: ["Warning", "Process variable under range"],
  0x8c40: ["Warning", "Maintenance: cleaning"],
  0x8c41: ["Warning", "Maintenance: refill"],
  0x8c42: ["Warning", "Maintenance: wear"],
};

/** Type and name of a standard event; 0x7700 … 0x770F are wire breaks of one subordinate each. */
export function findStandardEvent(code: number): readonly ["Notification" | "Warning" | "Error", string] | undefined {
  return code >= 0x7700 && code <= 0x770f ? ["Error", `Wire break (${code - 0x7700})`] : EVENT_NAMES[code];
}
