/** The demo's two models as NodeSet2 text, each on the published models and the hall on the rope braider's. */
import { createModel, findNamespaceMetadata } from "~/domain/editing/commands/create-model";
import { setModelInfo } from "~/domain/editing/commands/set-model-info";
import { AddressSpace, buildLayer, type Layer } from "~/domain/address-space/address-space";
import { numericNodeId } from "~/domain/address-space/node-id";
import { getValue, ok } from "~/domain/core/result";
import { addDeclaredMembers } from "~/domain/instantiation/instantiate";
import { scalar } from "~/domain/nodeset/values/variant";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { writeNodeSet } from "~/domain/nodeset/write-nodeset";
import { getPublishedLayer } from "../published-layers";
import { DemoBuilder } from "./demo-builder";
import { BRAIDER_NAMESPACE, makeBraiderModel } from "./make-braider-model";
import { HALL_NAMESPACE, makeHallModel } from "./make-hall-model";

const VERSION = "1.0.0";
const PUBLICATION_DATE = "2026-11-02T00:00:00Z";
/** The namespace's metadata stands below all numbers of members. */
const METADATA_BASE = 101;

export function buildBraiderXml(): string {
  const required = ["Opc.Ua.NodeSet2.xml", "Opc.Ua.Di.NodeSet2.xml", "Opc.Ua.IA.NodeSet2.xml"];
  return toXml(makeBraiderModel(startModel(BRAIDER_NAMESPACE, required.map(getPublishedLayer))));
}

export function buildHallXml(): string {
  const braider = getValue(readNodeSet(buildBraiderXml()));
  const required = [
    "Opc.Ua.NodeSet2.xml",
    "Opc.Ua.Di.NodeSet2.xml",
    "Opc.Ua.IA.NodeSet2.xml",
    "Opc.Ua.Machinery.NodeSet2.xml",
  ];
  const layers = [...required.map(getPublishedLayer), buildLayer(braider.header, braider.nodes)];
  return toXml(makeHallModel(startModel(HALL_NAMESPACE, layers)));
}

function startModel(namespaceUri: string, required: readonly Layer[]): AddressSpace {
  let next = METADATA_BASE;
  const context = { allocate: () => ok(numericNodeId(namespaceUri, next++)) };
  const { header, nodes } = getValue(
    createModel(required, context, {
      namespaceUri,
      version: VERSION,
      publicationDate: PUBLICATION_DATE,
      requiredModels: required.flatMap((layer) => layer.header.models.slice(0, 1)),
    }),
  );
  const builder = new DemoBuilder(AddressSpace.of(required, buildLayer(header, nodes)));
  builder.startNumbersAt(next);
  builder.run(setModelInfo(builder.space, builder.context, { modelVersion: VERSION }));
  const metadata = findNamespaceMetadata(builder.space);
  if (metadata === undefined) throw new RangeError("The model has no namespace metadata");
  builder.run(addDeclaredMembers(builder.space, builder.context, { instance: metadata, optional: ["ModelVersion"] }));
  builder.setValue(builder.member(metadata, "ModelVersion"), scalar("String", VERSION));
  return builder.space;
}

function toXml(space: AddressSpace): string {
  return writeNodeSet({ header: space.own.header, nodes: space.listOwnNodes() }).xml;
}
