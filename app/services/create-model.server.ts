/**
 * A new model: its header with the required models as the library has them, the metadata of its namespace, and what its
 * starter lays out. All of that is revision 0; when a part of it cannot be made there is no model.
 */
import type { Caller } from "../auth/caller.server";
import type { ModelRow } from "../db/repositories/models.server";
import type { ModelKind } from "../db/schema/models";
import { findHighestIdentifier } from "../db/repositories/node-ids.server";
import { AddressSpace, buildLayer, type Layer } from "../domain/address-space/address-space";
import type { ModelEntry } from "../domain/address-space/model-header";
import { OPC_UA_NAMESPACE } from "../domain/address-space/node-id";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { BlockAllocator } from "../domain/editing/allocate-node-id";
import { applyOperations } from "../domain/editing/apply-operation";
import { createModel as makeModel, type ModelContent } from "../domain/editing/commands/create-model";
import type { CommandContext } from "../domain/editing/edit-draft";
import { layOutRetrofit } from "../domain/editing/starters/lay-out-retrofit";
import { getLibrary } from "../library/library.server";
import { addModel } from "./add-model.server";
import { freezeForMachines } from "./freeze-for-machines.server";
import { FIRST_IDENTIFIER } from "./lease-node-ids.server";
import { choosePins } from "./pins.server";
import { resolveRequiredModels, type RequiredLayer } from "./required-models.server";

export type NewModelIntent = {
  readonly kind: ModelKind;
  readonly name: string;
  readonly namespaceUri: string;
  readonly version: string;
  /** URIs of the models that it requires directly; the base model is always among them. */
  readonly requiredModels: readonly string[];
  /** The machine type that the retrofit starter lays out, by its name without `Type`. */
  readonly retrofitOf?: string;
};

/** The namespace's metadata takes 8; a starter a few hundred. */
const FIRST_IDS = 2_000;

/** Problems: `model.namespace-published`, `model.uri`, `model.namespace-taken`, missing required models. */
export async function createModel(author: Caller, organizationId: string, intent: NewModelIntent): Promise<Result<ModelRow>> {
  const { namespaceUri, kind, name } = intent;
  if (getLibrary().list().some((entry) => entry.modelUri === namespaceUri)) {
    return fail(problem("model.namespace-published", { namespaceUri }));
  }
  if (kind === "machines") {
    const frozen = await freezeForMachines(author, organizationId, intent.requiredModels, name);
    if (!frozen.ok) return frozen;
  }
  const content = await makeContent(organizationId, intent);
  if (!content.ok) return content;
  const message = intent.retrofitOf === undefined ? "Created" : "Created from the retrofit starter";
  return addModel(author, organizationId, { name, kind, content: content.value, message });
}

async function makeContent(organizationId: string, intent: NewModelIntent): Promise<Result<ModelContent>> {
  const { namespaceUri, version } = intent;
  const uris = [...new Set([OPC_UA_NAMESPACE, ...intent.requiredModels])];
  const entry = { modelUri: namespaceUri, requiredModels: uris.map((modelUri) => ({ modelUri, requiredModels: [] })) };
  const header = { namespaceUris: [namespaceUri], models: [entry] };
  const pins = intent.kind === "machines" ? await choosePins(organizationId, header, []) : null;
  const required = await resolveRequiredModels(organizationId, header, pins);
  if (required.missing.length > 0) return fail(...required.missing);
  const publicationDate = `${new Date().toISOString().slice(0, 19)}Z`;
  const layers = required.layers.map((l) => l.layer);
  const requiredModels = uris.flatMap((uri) => required.layers.filter((layer) => layer.modelUri === uri).map(toRequiredEntry));
  // A namespace that was deleted once goes on where it ended, so that none of its identifiers is given again.
  const from = Math.max((await findHighestIdentifier(organizationId, namespaceUri)) + 1, FIRST_IDENTIFIER);
  const ids = new BlockAllocator(namespaceUri, [{ from, to: from + FIRST_IDS - 1 }]);
  const blank = makeModel(layers, ids, { namespaceUri, version, publicationDate, requiredModels });
  if (!blank.ok || intent.retrofitOf === undefined) return blank;
  return withRetrofit(layers, ids, blank.value, intent.retrofitOf);
}

/** Problems: those of the commands, and of models that the starter needs and that are not there. */
function withRetrofit(layers: readonly Layer[], ids: CommandContext, blank: ModelContent, name: string): Result<ModelContent> {
  const space = AddressSpace.of(layers, buildLayer(blank.header, blank.nodes));
  const edit = layOutRetrofit(space, ids, { name });
  if (!edit.ok) return edit;
  const laidOut = applyOperations(space, edit.value.operations);
  return laidOut.ok ? ok({ header: laidOut.value.own.header, nodes: laidOut.value.listOwnNodes() }) : laidOut;
}

/** The row of a required model as it stands in the header of a model that requires this layer. */
export function toRequiredEntry({ modelUri, version, publicationDate, entry }: RequiredLayer): ModelEntry {
  return {
    modelUri,
    ...(version === undefined ? {} : { version }),
    ...(entry.modelVersion === undefined ? {} : { modelVersion: entry.modelVersion }),
    ...(publicationDate === undefined ? {} : { publicationDate }),
    requiredModels: [],
  };
}
