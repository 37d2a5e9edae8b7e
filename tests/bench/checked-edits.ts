/** Ten edits of the large model that a person makes in one go, from a text of one Variable to a new member of a type. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { Node, VariableNode } from "~/domain/address-space/node";
import { numericNodeId, toNodeKey, type NodeKey } from "~/domain/address-space/node-id";
import {
  StandardDataType as D,
  StandardModellingRule as M,
  StandardReferenceType as R,
  StandardType as T,
} from "~/domain/address-space/standard-ids";
import { range, unit } from "~/domain/checks/example-values";
import type { AttributeName, Operation } from "~/domain/editing/operation";

export type NamedEdit = { readonly name: string; readonly operations: readonly Operation[] };

/** K of UN/CEFACT Recommendation 20. */
const KELVIN = unit({ unitId: 4932940, symbol: "K", name: "kelvin" });

export function listEdits(space: AddressSpace): readonly NamedEdit[] {
  const nodes = space.listOwnNodes();
  const find = (name: string, parent?: NodeKey): Node => {
    const node = nodes.find((n) => n.browseName.name === name && (parent === undefined || isBelow(n, parent)));
    if (!node) throw new RangeError(`The large model has no ${name}`);
    return node;
  };
  const type = find("Machine3Type");
  const declared = find("Value2", find("Group2", type.key).key);
  const machine = find("Machine3");
  const member = find("Value4", find("Group1", machine.key).key);
  const set = (node: Node, attribute: AttributeName, value: unknown): Operation[] => [
    { kind: "setAttribute", key: node.key, attribute, value },
  ];
  const named = (node: Node, name: string): object => ({ ...node.browseName, name });
  return [
    { name: "describe a Variable of a machine", operations: set(member, "description", [{ text: "Oil in the sump" }]) },
    { name: "rename a Variable of a machine", operations: set(member, "browseName", named(member, "OilTemperature")) },
    {
      name: "change the unit of a machine's Variable",
      operations: set(find("EngineeringUnits", member.key), "value", KELVIN),
    },
    { name: "rename a machine", operations: set(machine, "browseName", named(machine, "Press7")) },
    {
      name: "change the range of a declaration",
      operations: set(find("EURange", declared.key), "value", range(0, 50)),
    },
    { name: "change the DataType of a declaration", operations: set(declared, "dataType", D.Int16) },
    { name: "make a mandatory declaration optional", operations: swapRule(declared, M.Mandatory, M.Optional) },
    { name: "rename a machine type", operations: set(type, "browseName", named(type, "PressType")) },
    {
      name: "add a mandatory Variable to a machine type",
      operations: [{ kind: "addNode", node: makeMember(find("Group2", type.key), nodes.length) }],
    },
    {
      name: "change the version of the model",
      operations: [
        {
          kind: "setHeader",
          field: "models",
          value: space.own.header.models.map((m) => ({ ...m, version: "2.0.0", modelVersion: "2.0.0" })),
        },
      ],
    },
  ];
}

function isBelow(node: Node, parent: NodeKey): boolean {
  return node.references.some((r) => !r.isForward && r.target === parent);
}

function swapRule(node: Node, from: NodeKey, to: NodeKey): Operation[] {
  const edge = { source: node.key, type: R.HasModellingRule };
  return [
    { kind: "removeReference", ...edge, target: from },
    { kind: "addReference", ...edge, target: to, declaredAt: "source" },
  ];
}

function makeMember(parent: Node, order: number): VariableNode {
  const nodeId = numericNodeId(parent.nodeId.namespaceUri, 900_000);
  return {
    key: toNodeKey(nodeId),
    nodeId,
    nodeClass: "Variable",
    order,
    browseName: { ...parent.browseName, name: "Torque" },
    displayName: [{ text: "Torque" }],
    description: [{ text: "Torque at the spindle" }],
    dataType: D.Double,
    parent: parent.key,
    references: [
      { type: R.HasTypeDefinition, target: T.BaseDataVariableType, isForward: true },
      { type: R.HasModellingRule, target: M.Mandatory, isForward: true },
      { type: R.HasComponent, target: parent.key, isForward: false },
    ],
  };
}
