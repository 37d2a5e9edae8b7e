/**
 * The rope braider as it is to be modelled: what the journeys say to the stencil, and what the NodeSet2 file must then hold.
 * Both are written down here from the plan of the retrofit, independently of the demo's own model.
 */

export type PlannedMember = {
  readonly path: string;
  /** What is typed into the field that makes members. */
  readonly phrase: string;
  readonly dataType: string;
  readonly type: string;
  /** UNECE common code as a number (OPC 10000-8 §5.6.3.4: the characters of the code as bytes). */
  readonly unitId?: number;
  readonly range?: readonly [low: number, high: number];
  readonly isOptional?: true;
};

const ANALOG = "AnalogUnitRangeType";
const PLAIN = "BaseDataVariableType";

function toUnitId(code: string): number {
  return [...code].reduce((number, letter) => number * 256 + letter.charCodeAt(0), 0);
}

function analog(path: string, phrase: string, code: string, range: readonly [number, number], more: Partial<PlannedMember> = {}): PlannedMember {
  return { path, phrase, dataType: "Float", type: ANALOG, unitId: toUnitId(code), range, ...more };
}

export const BRAIDER_MEMBERS: readonly PlannedMember[] = [
  analog("Process/CreelDistance", "creel distance mm 0..400", "MMT", [0, 400]),
  analog("Process/CreelFill", "creel fill % 0..100", "P1", [0, 100]),
  analog("Process/CarriagePosition", "carriage position mm 0..250", "MMT", [0, 250]),
  analog("Process/CarriageSetpoint", "carriage setpoint mm 0..250", "MMT", [0, 250]),
  analog("Process/CarriageDeviation", "carriage deviation mm -5..5", "MMT", [-5, 5]),
  analog("Process/SpindleSpeed", "spindle speed r/min 0..180", "RPM", [0, 180]),
  { path: "Process/PicksCounter", phrase: "picks counter optional", dataType: "UInt32", type: PLAIN, isOptional: true },
  analog("Environment/GearboxVibration", "gearbox vibration mm/s 0..20", "C16", [0, 20]),
  analog("Environment/GearboxTemperature", "gearbox temperature °C -20..90", "CEL", [-20, 90]),
  analog("Environment/Humidity", "humidity % 0..100", "P1", [0, 100]),
  analog("Environment/AmbientPressure", "ambient pressure hPa 900..1100", "A97", [900, 1100]),
  { path: "Configuration/RecipeNumber", phrase: "recipe number", dataType: "UInt16", type: PLAIN },
  { path: "Configuration/SensorTag", phrase: "sensor tag optional", dataType: "String", type: PLAIN, isOptional: true },
  analog("Energy/ActivePower", "active power kW 0..15", "KWT", [0, 15]),
  analog("Energy/ActiveEnergy", "active energy Double kWh 0..1000000", "KWH", [0, 1_000_000], { dataType: "Double" }),
  analog("Energy/Voltage", "voltage V 0..250", "VLT", [0, 250]),
  analog("Energy/Current", "current A 0..63", "AMP", [0, 63]),
  analog("Energy/PowerFactor", "power factor one -1..1 optional", "C62", [-1, 1], { isOptional: true }),
  { path: "Status/State", phrase: "state BraiderStateEnum", dataType: "BraiderStateEnum", type: PLAIN },
  { path: "Status/FaultNumber", phrase: "fault number UInt16 MultiStateValueDiscreteType", dataType: "UInt16", type: "MultiStateValueDiscreteType" },
  { path: "Status/SensorHealth", phrase: "sensor health DeviceHealthEnumeration", dataType: "DeviceHealthEnumeration", type: PLAIN },
];

export const BRAIDER_GROUPS = ["Process", "Environment", "Configuration", "Energy", "Status"] as const;

export function listPhrases(group: string): string[] {
  return BRAIDER_MEMBERS.flatMap((member) => (member.path.startsWith(`${group}/`) ? [member.phrase] : []));
}
