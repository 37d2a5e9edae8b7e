/** A model of a given size on top of DI and Machinery: machine types with analog members, and machines of these types. */
import { AddressSpace, buildLayer } from "~/domain/address-space/address-space";
import type { ModelHeader } from "~/domain/address-space/model-header";
import type { Node } from "~/domain/address-space/node";
import { numericNodeId, toNodeKey, type NodeKey } from "~/domain/address-space/node-id";
import {
  StandardDataType as D,
  StandardReferenceType as R,
  StandardType as T,
} from "~/domain/address-space/standard-ids";
import { CELSIUS, range, scalar } from "~/domain/checks/example-values";
import { ExampleModel } from "~/domain/checks/example-model";
import { getPublishedLayer, getStandardLayer } from "./published-layers";

const DI = "http://opcfoundation.org/UA/DI/";
const MACHINERY = "http://opcfoundation.org/UA/Machinery/";

export function makeLargeModel(size: number): { header: ModelHeader; nodes: Node[] } {
  const m = new ExampleModel();
  const [base] = m.header.models[0]?.requiredModels ?? [];
  m.setHeader({ namespaceUris: [m.uri, DI, MACHINERY] });
  m.setModel({
    requiredModels: [
      ...(base ? [base] : []),
      { modelUri: DI, requiredModels: [] },
      { modelUri: MACHINERY, requiredModels: [] },
    ],
  });
  const types: NodeKey[] = [];
  for (let t = 0; t < Math.ceil(size / 500); t++) types.push(addType(m, t));
  for (let i = 0; m.build().nodes.length < size; i++) addMachine(m, i, types[i % types.length] as NodeKey);
  return m.build();
}

function addType(m: ExampleModel, number: number): NodeKey {
  const parent = m.objectType(`Machine${number}Type`, { supertype: toNodeKey(numericNodeId(DI, 1001)) });
  for (let g = 0; g < 5; g++) addGroup(m, m.object(`Group${g}`, { parent, rule: "Mandatory" }), "Mandatory");
  return parent;
}

function addGroup(m: ExampleModel, parent: NodeKey, rule?: "Mandatory"): void {
  const with_ = rule ? { rule } : {};
  for (let v = 0; v < 6; v++) {
    const variable = m.variable(`Value${v}`, {
      parent,
      type: T.AnalogUnitRangeType,
      dataType: D.Float,
      value: scalar("Float", v),
      ...with_,
    });
    m.property("0:EURange", { parent: variable, dataType: D.Range, value: range(0, 100), ...with_ });
    m.property("0:EngineeringUnits", { parent: variable, dataType: D.EUInformation, value: CELSIUS, ...with_ });
  }
}

function addMachine(m: ExampleModel, number: number, type: NodeKey): void {
  const parent = m.object(`Machine${number}`, {
    parent: toNodeKey(numericNodeId(MACHINERY, 1001)),
    reference: R.Organizes,
    type,
  });
  for (let g = 0; g < 5; g++) addGroup(m, m.object(`Group${g}`, { parent }));
}

export function makeLargeSpace(size: number): AddressSpace {
  const { header, nodes } = makeLargeModel(size);
  const required = [
    getStandardLayer(),
    getPublishedLayer("Opc.Ua.Di.NodeSet2.xml"),
    getPublishedLayer("Opc.Ua.Machinery.NodeSet2.xml"),
  ];
  return AddressSpace.of(required, buildLayer(header, nodes));
}
