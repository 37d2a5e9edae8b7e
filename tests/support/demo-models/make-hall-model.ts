/**
 * The demo's model of machines: six rope braiders below the Machines object, each with its identification, as OPC 40001-1
 * §9.2 (Machines) and §8.6 (MachineIdentificationType) ask.
 */
import { addObject } from "~/domain/editing/commands/add-member";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { numericNodeId, toNodeKey, type NodeKey } from "~/domain/address-space/node-id";
import { StandardReferenceType } from "~/domain/address-space/standard-ids";
import { scalar } from "~/domain/nodeset/values/variant";
import { DemoBuilder, inEnglish } from "./demo-builder";
import { hallMachines, MANUFACTURER, PRODUCT_MODEL, productInstanceUri, type HallMachine } from "./hall-description";
import { BRAIDER_NAMESPACE, DI_NAMESPACE } from "./make-braider-model";

export const HALL_NAMESPACE = "http://merrow.example/UA/Hall/";
export const MACHINERY_NAMESPACE = "http://opcfoundation.org/UA/Machinery/";

/** Published NodeIds: Machinery NodeSet of the npm package node-opcua-nodesets. */
const MACHINES = toNodeKey(numericNodeId(MACHINERY_NAMESPACE, 1001));
const MACHINE_IDENTIFICATION_TYPE = toNodeKey(numericNodeId(MACHINERY_NAMESPACE, 1012));
const ROPE_BRAIDER_TYPE = toNodeKey(numericNodeId(BRAIDER_NAMESPACE, 1001));

/** Value of BraiderStateEnum that a machine starts with. */
const RUNNING = 2;

/** `space` is the empty model on its required models, the rope braider's among them. */
export function makeHallModel(space: AddressSpace): AddressSpace {
  const builder = new DemoBuilder(space);
  hallMachines.forEach((machine, index) => {
    // A thousand numbers a machine, so that a member that comes later stands beside the others of its machine.
    builder.startNumbersAt((index + 1) * 1000 + 1);
    addMachine(builder, machine);
  });
  return builder.space;
}

function addMachine(builder: DemoBuilder, machine: HallMachine): void {
  const key = builder.make(
    addObject(builder.space, builder.context, {
      parent: MACHINES,
      referenceType: StandardReferenceType.Organizes,
      name: machine.name,
      typeDefinition: ROPE_BRAIDER_TYPE,
      description: inEnglish(`Rope braider of ${machine.yearOfConstruction}, ${machine.location}.`),
      optional: [
        ...(machine.countsPicks ? ["Process/PicksCounter", "ResetPicks"] : []),
        "Configuration/SensorTag",
        "Energy/PowerFactor",
        "Status/StackLight",
        "SelectRecipe",
      ],
    }),
  );
  addIdentification(builder, key, machine);
  builder.setValue(builder.member(key, "Configuration/RecipeNumber"), scalar("UInt16", machine.recipeNumber));
  builder.setValue(builder.member(key, "Configuration/SensorTag"), scalar("String", `${machine.name}-CREEL`));
  builder.setValue(builder.member(key, "Status/State"), scalar("Int32", RUNNING));
  builder.setValue(builder.member(key, "Status/SensorHealth"), scalar("Int32", 0));
}

function addIdentification(builder: DemoBuilder, machine: NodeKey, description: HallMachine): void {
  const key = builder.make(
    addObject(builder.space, builder.context, {
      parent: machine,
      referenceType: StandardReferenceType.HasAddIn,
      name: "Identification",
      namespaceUri: DI_NAMESPACE,
      typeDefinition: MACHINE_IDENTIFICATION_TYPE,
      optional: ["Model", "YearOfConstruction", "ComponentName", "Location"],
    }),
  );
  const set = (name: string, value: Parameters<DemoBuilder["setValue"]>[1]): void =>
    builder.setValue(builder.member(key, name), value);
  set("ProductInstanceUri", scalar("String", productInstanceUri(description)));
  set("Manufacturer", scalar("LocalizedText", { text: MANUFACTURER }));
  set("Model", scalar("LocalizedText", { locale: "en", text: PRODUCT_MODEL }));
  set("SerialNumber", scalar("String", description.serialNumber));
  set("YearOfConstruction", scalar("UInt16", description.yearOfConstruction));
  set("ComponentName", scalar("LocalizedText", { text: description.name }));
  set("Location", scalar("String", description.location));
}
