/** A comparison with whom each change touches: what reviews, reports and the API show. */
import { listModels, type ModelRow } from "../db/repositories/models.server";
import { listReaders } from "../db/repositories/releases.server";
import type { AddressSpace } from "../domain/address-space/address-space";
import { findParent } from "../domain/address-space/browse";
import type { Node } from "../domain/address-space/node";
import type { NodeKey } from "../domain/address-space/node-id";
import { StandardReferenceType } from "../domain/address-space/standard-ids";
import type { Change, Comparison } from "../domain/compare/change";
import { compareModels } from "../domain/compare/compare-models";
import { AffectedFinder, findOwningType, type Affected, type DependentModel } from "../domain/compare/find-affected";
import { loadState, type StateName } from "./load-revision.server";
import { loadWorkingModel } from "./working-model.server";

export type ChangeForReaders = {
  readonly change: Change;
  readonly affected: Affected;
  readonly nodeClass: Node["nodeClass"] | null;
  readonly isProperty: boolean;
  /** The name of the node, and of the type or owner that it belongs to. */
  readonly name: string;
  readonly owner: string | null;
};

export type ComparisonForReaders = Pick<Comparison, "rating" | "proposedVersion"> & {
  readonly changes: readonly ChangeForReaders[];
  readonly readers: readonly { readonly id: string; readonly name: string }[];
  /** Models of the team that require this one. */
  readonly dependents: readonly { readonly id: string; readonly name: string }[];
};

/** Undefined when the model has not both states. */
export async function compareForReaders(model: ModelRow, from: StateName, to: StateName): Promise<ComparisonForReaders | undefined> {
  const before = await loadState(model, from);
  const after = await loadState(model, to);
  if (!before || !after) return undefined;
  const { changes, rating, proposedVersion } = compareModels(before, after);
  const dependents = await loadDependents(model);
  const readers = await listReaders(model.organizationId);
  const finder = new AffectedFinder({ before, after }, { name: model.name, dependents, readers });
  return {
    rating,
    proposedVersion,
    changes: changes.map((change) => ({ change, affected: finder.find(change), ...describeNode(change.key !== undefined && after.isOwn(change.key) ? after : before, change.key) })),
    readers: readers.map(({ id, name }) => ({ id, name })),
    dependents: dependents.map(({ id, name }) => ({ id, name })),
  };
}

async function loadDependents(model: ModelRow): Promise<DependentModel[]> {
  const rows = (await listModels(model.organizationId)).filter((row) => row.requiredModels.some((required) => required.modelUri === model.namespaceUri));
  const found: DependentModel[] = [];
  for (const row of rows) {
    const working = await loadWorkingModel(row.id);
    if (working) found.push({ id: row.id, name: row.name, space: working.space });
  }
  return found;
}

function describeNode(space: AddressSpace, key: NodeKey | undefined): Pick<ChangeForReaders, "nodeClass" | "isProperty" | "name" | "owner"> {
  const node = key === undefined ? undefined : space.getNode(key);
  if (!node || key === undefined) return { nodeClass: null, isProperty: false, name: "the model", owner: null };
  const type = findOwningType(space, key);
  const parent = type === key ? undefined : (type ?? findParent(space, key));
  return {
    nodeClass: node.nodeClass,
    isProperty: space.edgesTo(key).some((edge) => edge.type === StandardReferenceType.HasProperty),
    name: node.browseName.name,
    owner: parent === undefined ? null : (space.getNode(parent)?.browseName.name ?? null),
  };
}
