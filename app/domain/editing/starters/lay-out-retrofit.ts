/**
 * The retrofit starter: a machine type with the five groups that every retrofitted machine should publish (process data,
 * environment, configuration, energy, present status: common practice, no source) on building blocks of DI (OPC 10000-100)
 * and Machinery (OPC 40001-1). The members are a beginning: engineers delete what a machine does not tell.
 */
import type { AddressSpace } from "../../address-space/address-space";
import { numericNodeId, toNodeKey, type NodeKey } from "../../address-space/node-id";
import {
  StandardDataType as D,
  StandardModellingRule as M,
  StandardReferenceType,
  StandardType as T,
} from "../../address-space/standard-ids";
import type { Result } from "../../core/result";
import { toEuInformation, unitByCode } from "../../units/units";
import { addEnumeration } from "../commands/add-enumeration";
import { addObject, addVariable } from "../commands/add-member";
import { addType } from "../commands/add-type";
import type { CommandContext, Edit } from "../edit-draft";
import { EditSequence } from "./edit-sequence";
import { DI_URI, MACHINERY_URI } from "./retrofit-models";

/** OPC 10000-100 §4.5.4 DeviceHealthEnumeration; OPC 40001-1 §8.2 MachineIdentificationType. */
const DEVICE_HEALTH = toNodeKey(numericNodeId(DI_URI, 6244));
const MACHINE_IDENTIFICATION = toNodeKey(numericNodeId(MACHINERY_URI, 1012));

type Member = {
  readonly name: string;
  readonly about: string;
  readonly dataType: NodeKey;
  readonly unit?: string;
  readonly range?: readonly [low: number, high: number];
  readonly isOptional?: true;
};

type Group = { readonly name: string; readonly about: string; readonly members: readonly Member[] };

const groups: readonly Group[] = [
  {
    name: "Process",
    about: "Process data: what the machine does.",
    members: [
      {
        name: "Speed",
        about: "Speed of the main drive.",
        dataType: D.Float,
        unit: "RPM",
        range: [0, 3000],
        isOptional: true,
      },
      { name: "PartsCounter", about: "Parts made since the counter was reset.", dataType: D.UInt32, isOptional: true },
    ],
  },
  {
    name: "Environment",
    about: "What the machine is exposed to and what it shows of its condition.",
    members: [
      {
        name: "Temperature",
        about: "Temperature at the drive.",
        dataType: D.Float,
        unit: "CEL",
        range: [-20, 120],
        isOptional: true,
      },
      {
        name: "Vibration",
        about: "Velocity of vibration at the drive, root mean square.",
        dataType: D.Float,
        unit: "C16",
        range: [0, 45],
        isOptional: true,
      },
      {
        name: "Humidity",
        about: "Relative humidity beside the machine.",
        dataType: D.Float,
        unit: "P1",
        range: [0, 100],
        isOptional: true,
      },
    ],
  },
  {
    name: "Configuration",
    about: "What the machine is set up for.",
    members: [{ name: "RecipeNumber", about: "Number of the recipe in use.", dataType: D.UInt16, isOptional: true }],
  },
  {
    name: "Energy",
    about: "Energy consumption, measured at the feed of the machine.",
    members: [
      { name: "ActivePower", about: "Active power taken now.", dataType: D.Float, unit: "KWT", range: [0, 100] },
      {
        name: "ActiveEnergy",
        about: "Active energy taken since the meter was reset.",
        dataType: D.Double,
        unit: "KWH",
        range: [0, 1_000_000],
      },
    ],
  },
  {
    name: "Status",
    about: "Present status of the machine and of its sensors. For information, not for protection.",
    members: [
      { name: "FaultNumber", about: "Number of the fault that stops the machine, 0 for none.", dataType: D.UInt16 },
      { name: "SensorHealth", about: "Worst health of the sensors that feed this machine.", dataType: DEVICE_HEALTH },
    ],
  },
];

const states = ["Off", "Setup", "Running", "Waiting", "Fault"];

/** `name` is the machine's name without `Type`: `RopeBraider`. The first node made is the type. Problems: those of the commands. */
export function layOutRetrofit(
  space: AddressSpace,
  context: CommandContext,
  { name }: { readonly name: string },
): Result<Edit> {
  const sequence = new EditSequence(space, context);
  const type = sequence.do((s, c) =>
    addType(s, c, {
      supertype: T.BaseObjectType,
      name: `${name}Type`,
      description: english(`A machine of the kind ${name}, in five groups.`),
    }),
  );
  const state = sequence.do((s, c) =>
    addEnumeration(s, c, {
      name: `${name}StateEnum`,
      description: english("What the machine does now."),
      fields: states.map((stateName, value) => ({ name: stateName, value })),
    }),
  );
  if (type === undefined || state === undefined) return sequence.finish();
  sequence.do((s, c) =>
    addObject(s, c, {
      parent: type,
      name: "Identification",
      namespaceUri: DI_URI,
      typeDefinition: MACHINE_IDENTIFICATION,
      referenceType: StandardReferenceType.HasAddIn,
      rule: M.Mandatory,
      description: english("Who made the machine, and its serial number."),
    }),
  );
  for (const group of groups) {
    const key = sequence.do((s, c) =>
      addObject(s, c, { parent: type, name: group.name, description: english(group.about) }),
    );
    if (key === undefined) break;
    if (group.name === "Status")
      addMember(sequence, key, { name: "State", about: "What the machine does now.", dataType: state });
    for (const member of group.members) addMember(sequence, key, member);
  }
  return sequence.finish();
}

function addMember(
  sequence: EditSequence,
  parent: NodeKey,
  { name, about, dataType, unit, range, isOptional }: Member,
): void {
  const found = unit === undefined ? undefined : unitByCode(unit);
  sequence.do((s, c) =>
    addVariable(s, c, {
      parent,
      name,
      dataType,
      typeDefinition: found ? T.AnalogUnitRangeType : T.BaseDataVariableType,
      rule: isOptional ? M.Optional : M.Mandatory,
      description: english(about),
      ...(found ? { unit: toEuInformation(found) } : {}),
      ...(range ? { range: { low: range[0], high: range[1] } } : {}),
    }),
  );
}

function english(text: string) {
  return [{ locale: "en", text }];
}
