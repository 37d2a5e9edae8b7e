import { DataType, type AddressSpace } from "node-opcua";

const TEXT = "Simulation, not for control. Simulated values; no machine is connected.";

/** A Variable at the top of Objects that no client can miss. */
export function addNotice(space: AddressSpace): void {
  space.getOwnNamespace().addVariable({
    organizedBy: space.rootFolder.objects,
    browseName: "Simulation",
    displayName: "Simulation, not for control",
    description: TEXT,
    dataType: DataType.String,
    accessLevel: "CurrentRead",
    userAccessLevel: "CurrentRead",
    value: { dataType: DataType.String, value: TEXT },
  });
}
