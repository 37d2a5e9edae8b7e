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
        })),
        { role: "controller", kind: "modbus-unit" },
        { role: "meter", kind: "modbus-unit" },
      ],
      rows,
    },
    layouts: deviceRoles.flatMap(({ role, device }) =>
      (["in", "out"] satisfies Direction[]).flatMap((direction) => {
        const image = chooseLayout(device, direction);
        return image.ok
          ? [{ role, direction, profileCharacteristic: [...device.profileCharacteristic], image: image.value }]
          : [];
      }),
    ),
    nodes: rows.map(({ target }) => {
      const [dataType, code, range] = units[target] ?? ["BaseDataType", null, null];
      const unit = code === null ? undefined : unitByCode(code);
      return {
        target,
        nodeId: nodeIdOf(target),
        dataType,
        unit: unit ? { code: unit.code, unitId: unit.unitId, symbol: unit.symbol } : null,
        range: range ? { low: range[0], high: range[1] } : null,
      };
    }),
  });
}
