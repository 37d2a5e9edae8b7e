/** The demo's machine type with its mapping, as a model keeps it. */
import { readFileSync } from "node:fs";
import { join } from "node:path";
import { AddressSpace, buildLayer } from "~/domain/address-space/address-space";
import { numericNodeId, toNodeKey } from "~/domain/address-space/node-id";
import { getValue } from "~/domain/core/result";
import { applyMappingDocument } from "~/domain/deliver/make-mapping-document";
import { readMappingDocument, type MappingDocument } from "~/domain/deliver/mapping-document";
import { applyOperations } from "~/domain/editing/apply-operation";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { getPublishedLayer } from "./published-layers";
import { projectRoot } from "./source-files";

export const BRAIDER_NAMESPACE = "http://merrow.example/UA/RopeBraider/";
export const HALL_NAMESPACE = "http://merrow.example/UA/Hall/";
export const braiderType = toNodeKey(numericNodeId(BRAIDER_NAMESPACE, 1001));

const read = (file: string) => readFileSync(join(projectRoot, "nodesets/demo", file), "utf8");

export function readDemoDocument(): MappingDocument {
  return getValue(readMappingDocument(read("rope-braider.mapping.json")));
}

/** The types model without its mapping. */
export function makeBraiderSpace(): AddressSpace {
  const { header, nodes } = getValue(readNodeSet(read("merrow-rope-braider.NodeSet2.xml")));
  const required = ["Opc.Ua.NodeSet2.xml", "Opc.Ua.Di.NodeSet2.xml", "Opc.Ua.IA.NodeSet2.xml"].map(getPublishedLayer);
  return AddressSpace.of(required, buildLayer(header, nodes));
}

export function makeMappedBraiderSpace(): AddressSpace {
  const space = makeBraiderSpace();
  const operations = getValue(applyMappingDocument(space, braiderType, readDemoDocument()));
  return getValue(applyOperations(space, operations));
}

/** The hall on the mapped type. */
export function makeHallSpace(): AddressSpace {
  const braider = makeMappedBraiderSpace();
  const { header, nodes } = getValue(readNodeSet(read("merrow-hall.NodeSet2.xml")));
  return AddressSpace.of([...braider.layers, getPublishedLayer("Opc.Ua.Machinery.NodeSet2.xml")], buildLayer(header, nodes));
}
