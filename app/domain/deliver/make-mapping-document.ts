/** Out of a model into a mapping document, and back. */
import type { AddressSpace } from "../address-space/address-space";
import { getDisplayName } from "../address-space/browse";
import { getOwnNamespace, type ModelHeader } from "../address-space/model-header";
import type { Node } from "../address-space/node";
import { formatNodeId, type NodeKey } from "../address-space/node-id";
import { fail, ok, problem, type Result } from "../core/result";
import type { Operation } from "../editing/operation";
import type { Direction } from "../iodd/device-description";
import { findMappedType, listBoundRoles, toMachineMapping } from "../mapping/bindings";
import { findMachineNode, findTarget, findTargetByPath, type Target } from "../mapping/list-targets";
import { listParts } from "../mapping/mapping-entries";
import type { CheckCase, Role } from "../mapping/mapping-parts";
import type { SourceAddress, SourceKind } from "../mapping/source-settings";
import { fromMapping, toMapping } from "../mapping/type-mapping";
import { MAPPING_DOCUMENT_FORMAT, MAPPING_DOCUMENT_VERSION, type MappingDocument } from "./mapping-document";

/** A source as a document needs it, by id. */
export type KnownSource = { readonly id: string; readonly name: string; readonly kind: SourceKind; readonly address: SourceAddress };

export type DocumentOptions = {
  /** Name of the frozen revision; null for a working state. */
  readonly revision?: string | null;
};

/** The document of a machine type; `nodes` are its instance declarations. */
export function makeTypeDocument(space: AddressSpace, type: NodeKey, options: DocumentOptions = {}): MappingDocument {
  const mapping = toMapping(space, type);
  const targets = mapping.rows.flatMap((row) => findTargetByPath(space, type, row.target) ?? []);
  const checkCases = listParts(space, "check-case", type).map(({ value }) => toDocumentCase(space, type, value));
  return {
    ...makeHead(space, type, options),
    mapping,
    layouts: listLayouts(space, type),
    nodes: targets.map((target) => toDocumentNode(target, space.getNode(target.key))),
    ...(checkCases.length > 0 ? { checkCases } : {}),
  };
}

/**
 * The document of one machine: its exceptions applied, its own NodeIds, where it finds each role. Problem:
 * `deliver.no-mapping` for a machine whose type has none.
 */
export function makeMachineDocument(
  space: AddressSpace,
  machine: NodeKey,
  sources: readonly KnownSource[],
  options: DocumentOptions = {},
): Result<MappingDocument> {
  const type = findMappedType(space, machine);
  const mapping = toMachineMapping(space, machine);
  const node = space.getNode(machine);
  if (type === undefined || !mapping || !node) return fail(problem("deliver.no-mapping", { machine: node ? getDisplayName(node) : machine }));
  const nodes = mapping.rows.flatMap((row) => {
    const target = findTargetByPath(space, type, row.target);
    const found = target && findMachineNode(space, machine, target);
    return target && found ? [toDocumentNode(target, found)] : [];
  });
  const bindings = listBoundRoles(space, machine).flatMap(({ role, binding }) => {
    const source = sources.find((s) => s.id === binding?.sourceId);
    if (!binding || !source) return [];
    const { sourceId: _source, deviceDescriptionId: _description, ...rest } = binding;
    return [{ role, ...rest, source: { name: source.name, kind: source.kind, address: source.address } }];
  });
  return ok({
    ...makeHead(space, type, options),
    mapping,
    layouts: listLayouts(space, type),
    nodes,
    machine: { name: getDisplayName(node), nodeId: formatNodeId(node.nodeId), bindings },
  });
}

/** The operations that give a type the mapping of a document. Problems: those of `fromMapping`. */
export function applyMappingDocument(space: AddressSpace, type: NodeKey, document: MappingDocument): Result<Operation[]> {
  const roles = new Map<string, Pick<Role, "layouts" | "profileCharacteristic">>();
  for (const { role, direction, profileCharacteristic, image } of document.layouts) {
    const known = roles.get(role);
    roles.set(role, { profileCharacteristic, layouts: { ...known?.layouts, [direction]: image } });
  }
  return fromMapping(space, type, document.mapping, { roles, ...(document.checkCases ? { cases: document.checkCases } : {}) });
}

function makeHead(space: AddressSpace, type: NodeKey, { revision = null }: DocumentOptions) {
  const header = findHeader(space, type);
  return {
    format: MAPPING_DOCUMENT_FORMAT,
    formatVersion: MAPPING_DOCUMENT_VERSION,
    model: { namespaceUri: getOwnNamespace(header), version: header.models[0]?.version ?? null, revision },
  } as const;
}

/** Of the model that defines the type: a machine's type stands in a required one. */
function findHeader(space: AddressSpace, type: NodeKey): ModelHeader {
  return (space.layers.find((layer) => layer.nodes.has(type)) ?? space.own).header;
}

function listLayouts(space: AddressSpace, type: NodeKey): MappingDocument["layouts"] {
  return listParts(space, "role", type).flatMap(({ id: role, value }) =>
    (["in", "out"] satisfies Direction[]).flatMap((direction) => {
      const image = value.layouts?.[direction];
      return image ? [{ role, direction, profileCharacteristic: value.profileCharacteristic ?? [], image }] : [];
    }),
  );
}

function toDocumentNode(target: Target, node: Node | undefined): MappingDocument["nodes"][number] {
  return {
    target: target.path,
    nodeId: node ? formatNodeId(node.nodeId) : target.target,
    dataType: target.dataTypeName,
    unit: target.unit ? { ...target.unit } : null,
    range: target.range ? { ...target.range } : null,
  };
}

function toDocumentCase(space: AddressSpace, type: NodeKey, value: CheckCase): CheckCase {
  return { ...value, expected: value.expected.map((e) => ({ ...e, target: findTarget(space, type, e.target)?.path ?? e.target })) };
}
