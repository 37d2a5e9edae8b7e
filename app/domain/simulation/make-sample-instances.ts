/**
 * Instances for a model that holds types alone: one of each concrete ObjectType, below Objects, in a namespace of the test
 * server's own. They let people watch what a machine of the type would show; they never become part of the model.
 */
import { AddressSpace, buildLayer, type Layer } from "../address-space/address-space";
import { getOwnNamespace, type ModelHeader } from "../address-space/model-header";
import type { Node } from "../address-space/node";
import { numericNodeId, type NodeKey } from "../address-space/node-id";
import { StandardObject, StandardType } from "../address-space/standard-ids";
import { isSubtypeOf } from "../address-space/type-hierarchy";
import { ok, type Result } from "../core/result";
import { applyOperations } from "../editing/apply-operation";
import type { Edit } from "../editing/edit-draft";
import { addDeclaredMembers, instantiate } from "../instantiation/instantiate";
import { listOfferedMembers } from "../instantiation/missing-members";

export const SAMPLE_NAMESPACE = "urn:ferrule:simulation:instances";

export type SampleInstances = { readonly layer: Layer; readonly names: readonly string[] };

const FIRST_IDENTIFIER = 5001;
const MAX_INSTANCES = 40;
/** Optional members may offer further ones; deeper than this nobody looks. */
const MAX_ROUNDS = 4;

/** Undefined when the model has no type that could be shown. A type that cannot be instantiated is left out. */
export function makeSampleInstances(space: AddressSpace): SampleInstances | undefined {
  let next = FIRST_IDENTIFIER;
  const context = { allocate: () => ok(numericNodeId(SAMPLE_NAMESPACE, next++)) };
  let sample = AddressSpace.of(space.layers, buildLayer(makeHeader(space.own.header), []));
  const names: string[] = [];
  for (const type of space.listOwnNodes().filter((node) => isShown(space, node)).slice(0, MAX_INSTANCES)) {
    const name = type.browseName.name.replace(/Type$/, "") || type.browseName.name;
    const made = applyEdit(sample, instantiate(sample, context, { type: type.key, parent: StandardObject.ObjectsFolder, name }));
    if (!made) continue;
    sample = made.instance === undefined ? made.space : addOptional(made.space, made.instance, space.own, context);
    names.push(name);
  }
  return names.length > 0 ? { layer: sample.own, names } : undefined;
}

function isShown(space: AddressSpace, node: Node): boolean {
  if (node.nodeClass !== "ObjectType" || node.isAbstract === true) return false;
  return !isSubtypeOf(space, node.key, StandardType.BaseEventType) && !isSubtypeOf(space, node.key, StandardType.BaseInterfaceType);
}

/** The optional members that the model itself declares; those of the standard's base types would bury them. */
function addOptional(space: AddressSpace, instance: NodeKey, model: Layer, context: Parameters<typeof instantiate>[1]): AddressSpace {
  let at = space;
  for (let round = 0; round < MAX_ROUNDS; round++) {
    const offered = listOfferedMembers(at, instance).filter((member) => !member.isPlaceholder && model.nodes.has(member.declaration));
    if (offered.length === 0) return at;
    const added = applyEdit(at, addDeclaredMembers(at, context, { instance, optional: offered.map((member) => member.pathKey) }));
    if (!added) return at;
    at = added.space;
  }
  return at;
}

function applyEdit(space: AddressSpace, edit: Result<Edit>): { space: AddressSpace; instance: NodeKey | undefined } | undefined {
  if (!edit.ok) return undefined;
  const applied = applyOperations(space, edit.value.operations);
  return applied.ok ? { space: applied.value, instance: edit.value.made[0] } : undefined;
}

function makeHeader(model: ModelHeader): ModelHeader {
  const own = model.models[0];
  const uri = getOwnNamespace(model);
  const required = own ? { ...own, requiredModels: [] } : { modelUri: uri, requiredModels: [] };
  return { namespaceUris: [SAMPLE_NAMESPACE], models: [{ modelUri: SAMPLE_NAMESPACE, requiredModels: [required] }] };
}
