/** The demo's model of machine types: `RopeBraiderType` with its five groups, its enumeration and its methods. */
import { addEnumeration } from "~/domain/editing/commands/add-enumeration";
import { addMethod, addObject, addVariable } from "~/domain/editing/commands/add-member";
import { addType } from "~/domain/editing/commands/add-type";
import { setDataType } from "~/domain/editing/commands/set-data-type";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { numericNodeId, toNodeKey, type NodeKey } from "~/domain/address-space/node-id";
import {
  StandardDataType,
  StandardModellingRule,
  StandardReferenceType,
  StandardType,
} from "~/domain/address-space/standard-ids";
import { makeEnumValues, type EUInformation } from "~/domain/nodeset/values/standard-values";
import { scalar } from "~/domain/nodeset/values/variant";
import { toEuInformation, unitByCode } from "~/domain/units/units";
import {
  braiderFaults,
  braiderGroups,
  braiderStates,
  STACK_LIGHT_SEGMENTS,
  type AnalogMember,
  type BraiderMember,
  type DiscreteMember,
  type PlainMember,
} from "./braider-description";
import { DemoBuilder, inEnglish, toLocalized } from "./demo-builder";

export const BRAIDER_NAMESPACE = "http://merrow.example/UA/RopeBraider/";
export const DI_NAMESPACE = "http://opcfoundation.org/UA/DI/";
export const IA_NAMESPACE = "http://opcfoundation.org/UA/IA/";

/** Published NodeIds: DI and IA NodeSets of the npm package node-opcua-nodesets. */
const DEVICE_HEALTH_ENUMERATION = toNodeKey(numericNodeId(DI_NAMESPACE, 6244));
const BASIC_STACKLIGHT_TYPE = toNodeKey(numericNodeId(IA_NAMESPACE, 1002));
const STACK_ELEMENT_LIGHT_TYPE = toNodeKey(numericNodeId(IA_NAMESPACE, 1006));

/** `space` is the empty model on its required models. */
export function makeBraiderModel(space: AddressSpace): AddressSpace {
  const builder = new DemoBuilder(space);
  const states = addStates(builder);
  const type = builder.make(
    addType(builder.space, builder.context, {
      supertype: StandardType.BaseObjectType,
      name: "RopeBraiderType",
      description: inEnglish(
        "A rope braider as it is published after the retrofit: five groups of members, the same for every machine.",
      ),
    }),
  );
  builder.set(type, "displayName", toLocalized({ en: "RopeBraiderType", de: "Seilflechtmaschine (Typ)" }));
  for (const group of braiderGroups) {
    const object = builder.make(
      addObject(builder.space, builder.context, {
        parent: type,
        name: group.name,
        displayName: toLocalized(group.title),
        description: inEnglish(group.description),
      }),
    );
    for (const member of group.members) addMember(builder, object, member, states);
    if (group.name === "Status") addStackLight(builder, object);
  }
  addMethods(builder, type);
  return builder.space;
}

function addStates(builder: DemoBuilder): NodeKey {
  return builder.make(
    addEnumeration(builder.space, builder.context, {
      name: "BraiderStateEnum",
      description: inEnglish("What a rope braider is doing."),
      fields: braiderStates.map(({ name, value, title, description }) => ({
        name,
        value,
        displayName: toLocalized(title),
        description: inEnglish(description),
      })),
    }),
  );
}

function addMember(builder: DemoBuilder, group: NodeKey, member: BraiderMember, states: NodeKey): void {
  switch (member.kind) {
    case "analog":
      addAnalog(builder, group, member);
      return;
    case "discrete":
      addDiscrete(builder, group, member);
      return;
    case "plain":
      addPlain(builder, group, member, states);
      return;
  }
}

/** What all members have in common. */
function describe(group: NodeKey, member: BraiderMember) {
  return {
    parent: group,
    name: member.name,
    rule: member.isOptional ? StandardModellingRule.Optional : StandardModellingRule.Mandatory,
    displayName: toLocalized(member.title),
    description: inEnglish(member.description),
  };
}

function addAnalog(builder: DemoBuilder, group: NodeKey, member: AnalogMember): void {
  const [low, high] = member.range;
  builder.run(
    addVariable(builder.space, builder.context, {
      ...describe(group, member),
      typeDefinition: StandardType.AnalogUnitRangeType,
      dataType: StandardDataType[member.dataType],
      unit: getUnit(member.unit),
      range: { low, high },
      ...(member.isReadOnly ? { accessLevel: 1 } : {}),
    }),
  );
}

function getUnit(code: string): EUInformation {
  const unit = unitByCode(code);
  if (!unit) throw new RangeError(`No unit ${code}`);
  return toEuInformation(unit);
}

function addDiscrete(builder: DemoBuilder, group: NodeKey, member: DiscreteMember): void {
  const key = builder.make(
    addVariable(builder.space, builder.context, {
      ...describe(group, member),
      typeDefinition: StandardType.MultiStateValueDiscreteType,
      dataType: StandardDataType.UInt16,
      value: scalar("UInt16", 0),
    }),
  );
  const values = member.values.map(({ value, title, description }) => ({
    value,
    displayName: { locale: "en", text: title.en },
    description: { locale: "en", text: description },
  }));
  builder.setValue(builder.member(key, "EnumValues"), makeEnumValues(values));
  builder.setValue(
    builder.member(key, "ValueAsText"),
    scalar("LocalizedText", { locale: "en", text: getNone().title.en }),
  );
}

function getNone(): (typeof braiderFaults)[number] {
  const none = braiderFaults.find((fault) => fault.value === 0);
  if (!none) throw new RangeError("The faults have no zero");
  return none;
}

function addPlain(builder: DemoBuilder, group: NodeKey, member: PlainMember, states: NodeKey): void {
  const dataTypes = {
    BraiderStateEnum: states,
    DeviceHealthEnumeration: DEVICE_HEALTH_ENUMERATION,
    ...StandardDataType,
  };
  builder.run(
    addVariable(builder.space, builder.context, { ...describe(group, member), dataType: dataTypes[member.dataType] }),
  );
}

/**
 * The light may be missing, but one that is there has all its segments. Each shows what the controller set: on or off,
 * colour, mode and intensity.
 */
function addStackLight(builder: DemoBuilder, group: NodeKey): void {
  const light = builder.make(
    addObject(builder.space, builder.context, {
      parent: group,
      name: "StackLight",
      typeDefinition: BASIC_STACKLIGHT_TYPE,
      rule: StandardModellingRule.Optional,
      displayName: toLocalized({ en: "Stack light", de: "Signalsäule" }),
      description: inEnglish(
        "What the stack light shows, segment 1 at the bottom. It is set by the controller and only read here.",
      ),
    }),
  );
  const mode = builder.member(light, "StacklightMode");
  builder.setValue(mode, scalar("Int32", 0));
  // The standard lets clients write it; here the controller alone does.
  builder.set(mode, "accessLevel", 1);
  for (let number = 1; number <= STACK_LIGHT_SEGMENTS; number++) addSegment(builder, light, number);
}

function addSegment(builder: DemoBuilder, light: NodeKey, number: number): void {
  const segment = builder.make(
    addObject(builder.space, builder.context, {
      parent: light,
      name: `Segment${number}`,
      referenceType: StandardReferenceType.HasOrderedComponent,
      typeDefinition: STACK_ELEMENT_LIGHT_TYPE,
      optional: ["SignalOn", "SignalColor", "SignalMode", "Intensity"],
      displayName: toLocalized({ en: `Segment ${number}`, de: `Segment ${number}` }),
      description: inEnglish(`Segment ${number} of the stack light, counted from the bottom.`),
    }),
  );
  const place = builder.member(segment, "NumberInList");
  builder.run(setDataType(builder.space, builder.context, { node: place, dataType: StandardDataType.UInt16 }));
  builder.setValue(place, scalar("UInt16", number));
}

function addMethods(builder: DemoBuilder, type: NodeKey): void {
  builder.run(
    addMethod(builder.space, builder.context, {
      parent: type,
      name: "ResetPicks",
      rule: StandardModellingRule.Optional,
      displayName: toLocalized({ en: "Reset picks", de: "Flechtungszähler zurücksetzen" }),
      description: inEnglish("Sets the picks counter to 0."),
    }),
  );
  builder.run(
    addMethod(builder.space, builder.context, {
      parent: type,
      name: "SelectRecipe",
      rule: StandardModellingRule.Optional,
      displayName: toLocalized({ en: "Select recipe", de: "Rezept wählen" }),
      description: inEnglish("Asks the machine to take another recipe at its next start."),
      inputArguments: [
        {
          name: "RecipeNumber",
          dataType: StandardDataType.UInt16,
          description: { locale: "en", text: "Number of the recipe." },
        },
      ],
      outputArguments: [
        {
          name: "Accepted",
          dataType: StandardDataType.Boolean,
          description: { locale: "en", text: "Whether the machine knows the recipe and is ready to take it." },
        },
      ],
    }),
  );
}
