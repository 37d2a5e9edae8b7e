/**
 * What a rope braider of the demo exposes, member by member. All of it is invented for the demo; the division into five
 * groups is common practice and follows no standard.
 */

/** A text in English and German; the name alone where the German word is a technical name of its own. */
export type Texts = { readonly en: string; readonly de: string };

type MemberBase = {
  readonly name: string;
  readonly title: Texts;
  readonly description: string;
  readonly isOptional?: true;
};

/** A measured value with unit (UN/CEFACT Rec. 20 code) and range, an AnalogUnitRangeType. */
export type AnalogMember = MemberBase & {
  readonly kind: "analog";
  readonly dataType: "Float" | "Double";
  readonly unit: string;
  readonly range: readonly [low: number, high: number];
  /** Says that it can only be read, for a name that lets one expect more. */
  readonly isReadOnly?: true;
};

/** A plain value, a BaseDataVariableType. `enumeration` names a DataType of the model or of DI. */
export type PlainMember = MemberBase & {
  readonly kind: "plain";
  readonly dataType: "UInt16" | "UInt32" | "String" | "BraiderStateEnum" | "DeviceHealthEnumeration";
};

/** A number out of a list of named values, a MultiStateValueDiscreteType. */
export type DiscreteMember = MemberBase & { readonly kind: "discrete"; readonly values: readonly NamedValue[] };

export type NamedValue = {
  readonly value: number;
  readonly name: string;
  readonly title: Texts;
  readonly description: string;
};

export type BraiderMember = AnalogMember | PlainMember | DiscreteMember;

export type BraiderGroup = {
  readonly name: string;
  readonly title: Texts;
  readonly description: string;
  readonly members: readonly BraiderMember[];
};

export const braiderStates: readonly NamedValue[] = [
  {
    value: 0,
    name: "Off",
    title: { en: "Off", de: "Aus" },
    description: "The main switch is off or the controller does not answer.",
  },
  {
    value: 1,
    name: "Setup",
    title: { en: "Setup", de: "Einrichten" },
    description: "Someone threads, adjusts or changes bobbins.",
  },
  { value: 2, name: "Running", title: { en: "Running", de: "Läuft" }, description: "The machine braids." },
  {
    value: 3,
    name: "Waiting",
    title: { en: "Waiting", de: "Wartet" },
    description: "Ready, but stopped for want of material or an order.",
  },
  {
    value: 4,
    name: "Fault",
    title: { en: "Fault", de: "Störung" },
    description: "Stopped by a fault; FaultNumber names it.",
  },
];

export const braiderFaults: readonly NamedValue[] = [
  { value: 0, name: "None", title: { en: "None", de: "Keine" }, description: "No fault is present." },
  {
    value: 11,
    name: "YarnBreak",
    title: { en: "Yarn break", de: "Garnbruch" },
    description: "A yarn broke or ran out of its guide.",
  },
  {
    value: 12,
    name: "CreelEmpty",
    title: { en: "Creel empty", de: "Gatter leer" },
    description: "The creel has to be refilled.",
  },
  {
    value: 21,
    name: "GuardOpen",
    title: { en: "Guard open", de: "Schutztür offen" },
    description: "A guard stands open. Shown for information; the guard's own circuit protects.",
  },
  {
    value: 31,
    name: "DriveOverload",
    title: { en: "Drive overload", de: "Antrieb überlastet" },
    description: "The main drive was overloaded and switched off.",
  },
];

const process: BraiderGroup = {
  name: "Process",
  title: { en: "Process", de: "Prozess" },
  description: "Process data: what the machine does to the rope.",
  members: [
    {
      kind: "analog",
      name: "CreelDistance",
      title: { en: "Creel distance", de: "Gatterabstand" },
      description:
        "Distance from the sensor above the creel to the yarn: about 60 mm with a full creel, 380 mm with an empty one.",
      dataType: "Float",
      unit: "MMT",
      range: [0, 400],
    },
    {
      kind: "analog",
      name: "CreelFill",
      title: { en: "Creel fill", de: "Gatterfüllung" },
      description: "How full the creel is, computed from the creel distance.",
      dataType: "Float",
      unit: "P1",
      range: [0, 100],
    },
    {
      kind: "analog",
      name: "CarriagePosition",
      title: { en: "Carriage position", de: "Schlittenposition" },
      description: "Measured position of the take-up carriage.",
      dataType: "Float",
      unit: "MMT",
      range: [0, 250],
    },
    {
      kind: "analog",
      name: "CarriageSetpoint",
      title: { en: "Carriage set-point", de: "Schlittensollwert" },
      description: "Position of the take-up carriage that the controller asks for.",
      dataType: "Float",
      unit: "MMT",
      range: [0, 250],
      isReadOnly: true,
    },
    {
      kind: "analog",
      name: "CarriageDeviation",
      title: { en: "Carriage deviation", de: "Schlittenabweichung" },
      description: "Carriage position less carriage set-point.",
      dataType: "Float",
      unit: "MMT",
      range: [-5, 5],
    },
    {
      kind: "analog",
      name: "SpindleSpeed",
      title: { en: "Spindle speed", de: "Spindeldrehzahl" },
      description: "Speed of the main spindle.",
      dataType: "Float",
      unit: "RPM",
      range: [0, 180],
    },
    {
      kind: "plain",
      name: "PicksCounter",
      title: { en: "Picks counter", de: "Flechtungszähler" },
      description: "Picks braided since the last reset; starts again at 0 after 4294967295.",
      dataType: "UInt32",
      isOptional: true,
    },
  ],
};

const environment: BraiderGroup = {
  name: "Environment",
  title: { en: "Environment", de: "Umgebung" },
  description: "Environment: what the machine is exposed to and what it shows of its condition.",
  members: [
    {
      kind: "analog",
      name: "GearboxVibration",
      title: { en: "Gearbox vibration", de: "Getriebeschwingung" },
      description: "Vibration velocity at the gearbox, root mean square.",
      dataType: "Float",
      unit: "C16",
      range: [0, 20],
    },
    {
      kind: "analog",
      name: "GearboxTemperature",
      title: { en: "Gearbox temperature", de: "Getriebetemperatur" },
      description: "Surface temperature of the gearbox.",
      dataType: "Float",
      unit: "CEL",
      range: [-20, 90],
    },
    {
      kind: "analog",
      name: "Humidity",
      title: { en: "Humidity", de: "Luftfeuchte" },
      description: "Relative humidity of the air at the machine.",
      dataType: "Float",
      unit: "P1",
      range: [0, 100],
    },
    {
      kind: "analog",
      name: "AmbientPressure",
      title: { en: "Ambient pressure", de: "Luftdruck" },
      description: "Air pressure at the machine.",
      dataType: "Float",
      unit: "A97",
      range: [900, 1100],
    },
  ],
};

const configuration: BraiderGroup = {
  name: "Configuration",
  title: { en: "Configuration", de: "Konfiguration" },
  description: "Configuration: what the machine is set up for.",
  members: [
    {
      kind: "plain",
      name: "RecipeNumber",
      title: { en: "Recipe number", de: "Rezeptnummer" },
      description: "Number of the recipe that is selected in the controller.",
      dataType: "UInt16",
    },
    {
      kind: "plain",
      name: "SensorTag",
      title: { en: "Sensor tag", de: "Sensorkennzeichen" },
      description: "Tag that is stored in the creel distance sensor.",
      dataType: "String",
      isOptional: true,
    },
  ],
};

const energy: BraiderGroup = {
  name: "Energy",
  title: { en: "Energy", de: "Energie" },
  description: "Energy consumption, measured at the machine's feed.",
  members: [
    {
      kind: "analog",
      name: "ActivePower",
      title: { en: "Active power", de: "Wirkleistung" },
      description: "Active power drawn now.",
      dataType: "Float",
      unit: "KWT",
      range: [0, 15],
    },
    {
      kind: "analog",
      name: "ActiveEnergy",
      title: { en: "Active energy", de: "Wirkenergie" },
      description: "Active energy since the meter was last reset.",
      dataType: "Double",
      unit: "KWH",
      range: [0, 1_000_000],
    },
    {
      kind: "analog",
      name: "Voltage",
      title: { en: "Voltage", de: "Spannung" },
      description: "Voltage between phase and neutral.",
      dataType: "Float",
      unit: "VLT",
      range: [0, 250],
    },
    {
      kind: "analog",
      name: "Current",
      title: { en: "Current", de: "Stromstärke" },
      description: "Current of the measured phase.",
      dataType: "Float",
      unit: "AMP",
      range: [0, 63],
    },
    {
      kind: "analog",
      name: "PowerFactor",
      title: { en: "Power factor", de: "Leistungsfaktor" },
      description: "Active power over apparent power, negative when the machine feeds back.",
      dataType: "Float",
      unit: "C62",
      range: [-1, 1],
      isOptional: true,
    },
  ],
};

const status: BraiderGroup = {
  name: "Status",
  title: { en: "Status", de: "Status" },
  description: "Present status of the machine and of its sensors. For information, never for protection.",
  members: [
    {
      kind: "plain",
      name: "State",
      title: { en: "State", de: "Zustand" },
      description: "What the machine is doing.",
      dataType: "BraiderStateEnum",
    },
    {
      kind: "discrete",
      name: "FaultNumber",
      title: { en: "Fault number", de: "Störungsnummer" },
      description: "The fault that is present, 0 when there is none.",
      values: braiderFaults,
    },
    {
      kind: "plain",
      name: "SensorHealth",
      title: { en: "Sensor health", de: "Sensorzustand" },
      description: "Worst health of the three sensors of the machine.",
      dataType: "DeviceHealthEnumeration",
    },
  ],
};

export const braiderGroups: readonly BraiderGroup[] = [process, environment, configuration, energy, status];

/** Number of segments of a stack light. */
export const STACK_LIGHT_SEGMENTS = 5;
