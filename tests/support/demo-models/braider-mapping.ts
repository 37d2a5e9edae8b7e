/** The mapping of the scenario's rope braider: rows of the table "fed by" and of the device tables of the demo scenario. */
import { readFileSync } from "node:fs";
import { getValue } from "~/domain/core/result";
import {
  MAPPING_DOCUMENT_FORMAT,
  MAPPING_DOCUMENT_VERSION,
  mappingDocumentSchema,
  type MappingDocument,
} from "~/domain/deliver/mapping-document";
import { readDevicePackage } from "~/domain/iodd/read-package";
import type { DeviceDescription, Direction } from "~/domain/iodd/device-description";
import { chooseLayout } from "~/domain/mapping/choose-layout";
import type { InputReference, MappingRow, Transform } from "~/domain/mapping/mapping";
import type { CheckCase } from "~/domain/mapping/mapping-parts";
import { unitByCode } from "~/domain/units/units";

const devices = {
  "creel sensor": "QS-U30",
  "carriage sensor": "QS-P12",
  "condition monitor": "QS-C04",
  "stack light": "QS-L5",
} as const;

type DeviceRole = keyof typeof devices;

export function readDemoDevice(product: string): DeviceDescription {
  const file = `Quillon-${product}-20261102-IODD1.1.xml`;
  const [first] = getValue(readDevicePackage(readFileSync(`nodesets/demo/iodd/${file}`), file)).devices;
  if (!first) throw new Error(`${file} holds no description`);
  return first.device;
}

function field(role: DeviceRole, subindex: number): InputReference {
  return { kind: "process-data", role, direction: role === "stack light" ? "out" : "in", subindex };
}

type RegisterType = NonNullable<Extract<InputReference, { kind: "register" }>["type"]>;

function register(role: "controller" | "meter", address: number, type: RegisterType): InputReference {
  const table = role === "meter" ? "input-register" : "holding-register";
  return { kind: "register", role, table, address, type, order: "ABCD" };
}

const scaled = (gradient: number): Transform => ({ kind: "linear", gradient, offset: 0 });

function row(
  target: string,
  source: MappingRow["source"],
  transforms: Transform[] = [],
  more: Partial<MappingRow> = {},
): MappingRow {
  return { target, source, transforms, period: 500, ...more };
}

/** Of the IODD's values (off, green, yellow, red, blue, white; steady, flash, blink slowly, blink fast) to those of IA. */
const colours = [0, 2, 4, 1, 3, 7];
const patterns = [0, 2, 1, 1];

const rows: MappingRow[] = [
  row("Process/CreelDistance", field("creel sensor", 1)),
  row("Process/CreelFill", field("creel sensor", 1), [
    {
      kind: "lookup",
      points: [
        [60, 100],
        [380, 0],
      ],
    },
  ]),
  row("Process/CarriagePosition", field("carriage sensor", 1)),
  row("Process/CarriageSetpoint", register("controller", 12, "Float32")),
  row("Process/CarriageDeviation", {
    kind: "formula",
    expression: "position - setpoint",
    inputs: {
      position: { kind: "member", target: "Process/CarriagePosition" },
      setpoint: { kind: "member", target: "Process/CarriageSetpoint" },
    },
  }),
  row("Process/SpindleSpeed", register("controller", 10, "Float32")),
  row("Process/PicksCounter", register("controller", 14, "UInt32"), [{ kind: "counter", bits: 32 }]),
  row("Environment/GearboxVibration", field("condition monitor", 1)),
  row("Environment/GearboxTemperature", field("condition monitor", 2)),
  row("Environment/Humidity", field("condition monitor", 3)),
  row("Environment/AmbientPressure", field("condition monitor", 4)),
  row("Configuration/RecipeNumber", register("controller", 2, "UInt16")),
  row("Configuration/SensorTag", { kind: "parameter", role: "creel sensor", index: 24, subindex: 0 }, [], {
    period: 60_000,
  }),
  row("Energy/ActivePower", register("meter", 0, "Int32"), [scaled(0.001)]),
  row("Energy/ActiveEnergy", register("meter", 2, "UInt32"), [
    { kind: "counter", bits: 32, resets: true },
    scaled(0.01),
  ]),
  row("Energy/Voltage", register("meter", 4, "UInt16"), [scaled(0.1)]),
  row("Energy/Current", register("meter", 5, "UInt16"), [scaled(0.01)]),
  row("Energy/PowerFactor", register("meter", 6, "Int16"), [scaled(0.001)]),
  row("Status/State", register("controller", 0, "UInt16")),
  row("Status/FaultNumber", register("controller", 1, "UInt16"), [], {
    mirrorsSafetySignal: true,
    comment: "Guard open is shown only; no protection.",
  }),
  row(
    "Status/SensorHealth",
    { kind: "device-status", roles: ["creel sensor", "carriage sensor", "condition monitor"] },
    [],
    { period: 5_000 },
  ),
  ...[1, 2, 3, 4, 5].flatMap(segmentRows),
];

function segmentRows(segment: number): MappingRow[] {
  const first = 3 * segment - 2;
  const member = (name: string): string => `Status/StackLight/Segment${segment}/${name}`;
  return [
    row(member("Intensity"), field("stack light", first + 2), [
      {
        kind: "lookup",
        points: [
          [0, 0],
          [3, 100],
        ],
      },
    ]),
    row(member("SignalColor"), field("stack light", first), [toMap(colours)]),
    row(member("SignalMode"), field("stack light", first + 1), [toMap(patterns)]),
  ];
}

function toMap(values: readonly number[]): Transform {
  return { kind: "value-map", entries: values.map((to, from) => ({ from, to })) };
}

/** Numbers worked out by hand from the layouts of the scenario. */
const checkCases: CheckCase[] = [
  {
    name: "Running, creel half full",
    frames: [
      { role: "creel sensor", direction: "in", hex: "08 98 FC 00" },
      { role: "carriage sensor", direction: "in", hex: "27 74 FB 00" },
      { role: "condition monitor", direction: "in", hex: "00 E7 02 82 61 27 94 00 00 00 00 00" },
      { role: "stack light", direction: "out", hex: "23 00 4B 00 00" },
    ],
    samples: [
      { reference: register("controller", 12, "Float32"), value: 100.5 },
      { reference: register("meter", 0, "Int32"), value: 3840 },
    ],
    expected: [
      { target: "Process/CreelDistance", value: 220, status: 0 },
      { target: "Process/CreelFill", value: 50, status: 0 },
      { target: "Process/CarriagePosition", value: 101, status: 0 },
      { target: "Process/CarriageDeviation", value: 0.5, tolerance: 1e-9, status: 0 },
      { target: "Environment/GearboxVibration", value: 2.31, status: 0 },
      { target: "Environment/GearboxTemperature", value: 64.2, status: 0 },
      { target: "Environment/Humidity", value: 48.5, status: 0 },
      { target: "Environment/AmbientPressure", value: 1013.2, status: 0 },
      { target: "Energy/ActivePower", value: 3.84, status: 0 },
      { target: "Status/StackLight/Segment1/SignalColor", value: 2, status: 0 },
      { target: "Status/StackLight/Segment3/SignalMode", value: 1, status: 0 },
    ],
    note: "Green at the lowest segment, the third one blinks yellow.",
  },
  {
    name: "No echo from the creel",
    frames: [{ role: "creel sensor", direction: "in", hex: "7F FC FC 00" }],
    samples: [],
    expected: [
      { target: "Process/CreelDistance", value: null, status: 0x808c0000 },
      { target: "Process/CreelFill", value: null, status: 0x808c0000 },
    ],
  },
  {
    name: "Creel out of range, carriage invalid",
    frames: [
      { role: "creel sensor", direction: "in", hex: "7F F8 FC 00" },
      { role: "carriage sensor", direction: "in", hex: "00 00 FB 00", isValid: false },
    ],
    samples: [],
    expected: [
      { target: "Process/CreelDistance", value: null, status: 0x808c0600 },
      { target: "Process/CarriagePosition", value: null, status: 0x80000000 },
    ],
  },
];

const units: Readonly<
  Record<string, readonly [dataType: string, unit: string | null, range: readonly [number, number] | null]>
> = {
  "Process/CreelDistance": ["Float", "MMT", [0, 400]],
  "Process/CreelFill": ["Float", "P1", [0, 100]],
  "Process/CarriagePosition": ["Float", "MMT", [0, 250]],
  "Process/CarriageSetpoint": ["Float", "MMT", [0, 250]],
  "Process/CarriageDeviation": ["Float", "MMT", [-5, 5]],
  "Process/SpindleSpeed": ["Float", "RPM", [0, 180]],
  "Process/PicksCounter": ["UInt32", null, null],
  "Environment/GearboxVibration": ["Float", "C16", [0, 20]],
  "Environment/GearboxTemperature": ["Float", "CEL", [-20, 90]],
  "Environment/Humidity": ["Float", "P1", [0, 100]],
  "Environment/AmbientPressure": ["Float", "A97", [900, 1100]],
  "Configuration/RecipeNumber": ["UInt16", null, null],
  "Configuration/SensorTag": ["String", null, null],
  "Energy/ActivePower": ["Float", "KWT", [0, 15]],
  "Energy/ActiveEnergy": ["Double", "KWH", [0, 1_000_000]],
  "Energy/Voltage": ["Float", "VLT", [0, 250]],
  "Energy/Current": ["Float", "AMP", [0, 63]],
  "Energy/PowerFactor": ["Float", "C62", [-1, 1]],
  "Status/State": ["BraiderStateEnum", null, null],
  "Status/FaultNumber": ["UInt16", null, null],
  "Status/SensorHealth": ["DeviceHealthEnumeration", null, null],
};

/** Data types of the elements of IA's stack light. */
const stackLightTypes: Readonly<Record<string, string>> = {
  Intensity: "Float",
  SignalColor: "SignalColor",
  SignalMode: "SignalModeLight",
};

/** `nodeIdOf` answers the NodeId text of a member of the type by its path. */
export function makeBraiderMapping(nodeIdOf: (target: string) => string): MappingDocument {
  const deviceRoles = Object.entries(devices).map(([role, product]) => ({ role, device: readDemoDevice(product) }));
  return mappingDocumentSchema.parse({
    format: MAPPING_DOCUMENT_FORMAT,
    formatVersion: MAPPING_DOCUMENT_VERSION,
    model: { namespaceUri: "http://merrow.example/UA/RopeBraider/", version: "1.0.0", revision: null },
    mapping: {
      machineType: "RopeBraiderType",
      roles: [
        ...deviceRoles.map(({ role, device }) => ({
          role,
          kind: "io-link-device",
          vendorId: device.vendorId,
          deviceId: device.deviceId,
          productName: devices[role as DeviceRole],
        })),
        { role: "controller", kind: "modbus-unit", description: "The braider's own controller, read only." },
        { role: "meter", kind: "modbus-unit" },
      ].sort((a, b) => (a.role < b.role ? -1 : 1)),
      rows,
    },
    layouts: [...deviceRoles].sort((a, b) => (a.role < b.role ? -1 : 1)).flatMap(({ role, device }) =>
      (["in", "out"] satisfies Direction[]).flatMap((direction) => {
        const image = chooseLayout(device, direction);
        return image.ok
          ? [{ role, direction, profileCharacteristic: [...device.profileCharacteristic], image: image.value }]
          : [];
      }),
    ),
    nodes: rows.map(({ target }) => {
      const [dataType, code, range] = units[target] ?? [stackLightTypes[target.split("/").at(-1) ?? ""] ?? "", null, null];
      const unit = code === null ? undefined : unitByCode(code);
      return {
        target,
        nodeId: nodeIdOf(target),
        dataType,
        unit: unit ? { code: unit.code, unitId: unit.unitId, symbol: unit.symbol } : null,
        range: range ? { low: range[0], high: range[1] } : null,
      };
    }),
    checkCases: [...checkCases],
  });
}
