/** What can be done with a type in the open model, and why not where it cannot. Pure. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { isAbstract, type Node } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { StandardType } from "~/domain/address-space/standard-ids";
import { findProperty } from "~/domain/address-space/browse";
import type { QualifiedName } from "~/domain/address-space/qualified-name";
import { isSubtypeOf, listSupertypes } from "~/domain/address-space/type-hierarchy";
import { readTypedValue } from "../model/read-typed-value";

export type TypeUse = "derive" | "instantiate" | "implement" | "add-in";

/** Interfaces are implemented (OPC 10000-3 §4.10.2); an add-in is an instance below HasAddIn (§4.10.3). */
export function listTypeUses(space: AddressSpace, type: Node): TypeUse[] {
  const uses: TypeUse[] = ["derive"];
  if (type.nodeClass === "ObjectType" && isSubtypeOf(space, type.key, StandardType.BaseInterfaceType)) {
    return type.key === StandardType.BaseInterfaceType ? uses : [...uses, "implement"];
  }
  if (isAbstract(type)) return uses;
  if (type.nodeClass === "ObjectType") return [...uses, "instantiate", "add-in"];
  return type.nodeClass === "VariableType" && type.key !== StandardType.PropertyType ? [...uses, "instantiate"] : uses;
}

/**
 * The name that instances of an add-in's type bear: the value of its DefaultInstanceBrowseName (OPC 10000-3 §4.10.3).
 * Undefined where the type has no such Property; without `name` where the Property has no value.
 */
export function findAgreedName(space: AddressSpace, type: NodeKey): { name: QualifiedName | undefined } | undefined {
  for (const key of [type, ...listSupertypes(space, type)]) {
    const property = findProperty(space, key, "DefaultInstanceBrowseName");
    if (!property) continue;
    const variant = readTypedValue(space, property);
    const value = variant?.shape === "scalar" && variant.type === "QualifiedName" ? variant.value : undefined;
    const name = typeof value === "object" && value !== null && "name" in value ? (value as QualifiedName) : undefined;
    return { name: name && name.name !== "" ? name : undefined };
  }
  return undefined;
}

/** `PressType` → `Press`; a name without that ending gets none. */
export function proposeInstanceName(typeName: string): string {
  return typeName.replace(/Type$/, "") || typeName;
}

/** `MachineType` → `MyMachineType`: a beginning that the reader replaces. */
export function proposeSubtypeName(typeName: string): string {
  return `My${typeName.charAt(0).toUpperCase()}${typeName.slice(1)}`;
}

/** Own ObjectTypes that may implement an interface; interfaces themselves are derived instead. */
export function listImplementers(space: AddressSpace): { key: NodeKey; label: string }[] {
  return space
    .listOwnNodes()
    .filter((node) => node.nodeClass === "ObjectType" && !isSubtypeOf(space, node.key, StandardType.BaseInterfaceType))
    .map((node) => ({ key: node.key, label: node.browseName.name }));
}
