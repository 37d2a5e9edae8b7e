import { describe, expect, it } from "vitest";
import { AddressSpace, buildLayer } from "~/domain/address-space/address-space";
import { findMember, findTypeDefinition, listMembers } from "~/domain/address-space/browse";
import type { NodeKey } from "~/domain/address-space/node-id";
import { runChecks } from "~/domain/checks/run-checks";
import { getValue } from "~/domain/core/result";
import { BlockAllocator } from "~/domain/editing/allocate-node-id";
import { applyOperations } from "~/domain/editing/apply-operation";
import { createModel } from "~/domain/editing/commands/create-model";
import { layOutRetrofit } from "~/domain/editing/starters/lay-out-retrofit";
import { DI_URI, MACHINERY_URI } from "~/domain/editing/starters/retrofit-models";
import { getPublishedLayer, getStandardLayer } from "../../../../support/published-layers";

const namespaceUri = "http://works.example/UA/Press/";
const required = [
  getStandardLayer(),
  getPublishedLayer("Opc.Ua.Di.NodeSet2.xml"),
  getPublishedLayer("Opc.Ua.IA.NodeSet2.xml"),
  getPublishedLayer("Opc.Ua.Machinery.NodeSet2.xml"),
];

function makeSpace(): { space: AddressSpace; type: NodeKey } {
  const ids = new BlockAllocator(namespaceUri, [{ from: 1001, to: 3000 }]);
  const content = getValue(
    createModel(required, ids, {
      namespaceUri,
      version: "1.0.0",
      publicationDate: "2026-05-01T00:00:00Z",
      requiredModels: required.flatMap((layer) => layer.header.models.slice(0, 1)),
    }),
  );
  const before = AddressSpace.of(required, buildLayer(content.header, content.nodes));
  const edit = getValue(layOutRetrofit(before, ids, { name: "Press" }));
  return { space: getValue(applyOperations(before, edit.operations)), type: edit.made[0] as NodeKey };
}

const { space, type } = makeSpace();

describe("layOutRetrofit", () => {
  it("lays out the five groups and the identification", () => {
    expect(listMembers(space, type).map((node) => node.browseName.name)).toEqual([
      "Identification",
      "Process",
      "Environment",
      "Configuration",
      "Energy",
      "Status",
    ]);
  });

  it("uses the building blocks of Machinery and DI", () => {
    const identification = findMember(space, type, "Identification", DI_URI);
    const definition = identification && findTypeDefinition(space, identification.key);
    expect(definition && space.requireNode(definition).browseName).toEqual({
      namespaceUri: MACHINERY_URI,
      name: "MachineIdentificationType",
    });
    const status = findMember(space, type, "Status", namespaceUri);
    const health = status && findMember(space, status.key, "SensorHealth", namespaceUri);
    const dataType = health?.nodeClass === "Variable" ? health.dataType : undefined;
    expect(dataType && space.requireNode(dataType).browseName).toEqual({
      namespaceUri: DI_URI,
      name: "DeviceHealthEnumeration",
    });
  });

  it("makes a model in which the checker finds neither error nor warning", () => {
    expect(runChecks(space).filter((finding) => finding.severity !== "hint")).toEqual([]);
  });
});
