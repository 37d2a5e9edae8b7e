/** Reads an exported NodeSet2 file as its readers do and tells the members of a type by path. */
import { AddressSpace, buildLayer } from "~/domain/address-space/address-space";
import { findModellingRule, findTypeDefinition, listMembers } from "~/domain/address-space/browse";
import { hasValueAttributes } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { getValue } from "~/domain/core/result";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { getPublishedLayer, getStandardLayer } from "./published-layers";
import { BRAIDER_GROUPS, type PlannedMember } from "./braider-plan";

export type ReadType = { readonly members: ReadonlyMap<string, Omit<PlannedMember, "path" | "phrase">>; readonly methods: readonly string[]; readonly enumeration: readonly string[] };

/** Members of the five groups of the ObjectType of this name; the values of the enumeration are read beside them. */
export function readTypeMembers(xml: string, typeName: string, enumerationName: string): ReadType {
  const { header, nodes } = getValue(readNodeSet(xml));
  const required = [getStandardLayer(), getPublishedLayer("Opc.Ua.Di.NodeSet2.xml"), getPublishedLayer("Opc.Ua.Machinery.NodeSet2.xml")];
  const space = AddressSpace.of(required, buildLayer(header, nodes));
  const type = nodes.find((node) => node.nodeClass === "ObjectType" && node.browseName.name === typeName);
  const enumeration = nodes.find((node) => node.nodeClass === "DataType" && node.browseName.name === enumerationName);
  if (!type) throw new Error(`No ObjectType ${typeName} in the file`);
  const members = new Map<string, Omit<PlannedMember, "path" | "phrase">>();
  const methods: string[] = [];
  for (const group of listMembers(space, type.key)) {
    if (group.nodeClass === "Method") methods.push(group.browseName.name);
    if (group.nodeClass !== "Object" || !BRAIDER_GROUPS.some((name) => name === group.browseName.name)) continue;
    for (const member of listMembers(space, group.key)) {
      if (member.nodeClass === "Variable") members.set(`${group.browseName.name}/${member.browseName.name}`, describe(space, member.key));
    }
  }
  const fields = enumeration?.nodeClass === "DataType" ? (enumeration.definition?.fields ?? []) : [];
  return { members, methods: methods.sort(), enumeration: fields.map((field) => `${field.value ?? ""} ${field.name}`) };
}

function describe(space: AddressSpace, key: NodeKey): Omit<PlannedMember, "path" | "phrase"> {
  const node = space.requireNode(key);
  const nameOf = (found: NodeKey | undefined): string => (found === undefined ? "" : (space.getNode(found)?.browseName.name ?? ""));
  const property = (name: string): string => {
    const found = listMembers(space, key).find((member) => member.browseName.name === name);
    return found && hasValueAttributes(found) ? (found.value?.xml ?? "") : "";
  };
  const unitId = /UnitId>(-?\d+)</.exec(property("EngineeringUnits"))?.[1];
  const [low, high] = ["Low", "High"].map((end) => new RegExp(`${end}>([^<]*)<`).exec(property("EURange"))?.[1]);
  return {
    dataType: hasValueAttributes(node) ? nameOf(node.dataType) : "",
    type: nameOf(findTypeDefinition(space, key)),
    ...(unitId === undefined ? {} : { unitId: Number(unitId) }),
    ...(low === undefined || high === undefined ? {} : { range: [Number(low), Number(high)] as const }),
    ...(nameOf(findModellingRule(space, key)) === "Optional" ? { isOptional: true as const } : {}),
  };
}
