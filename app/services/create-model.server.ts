/** A new model: its header with the required models as the library has them, and the metadata of its namespace. */
import type { Caller } from "../auth/caller.server";
import type { ModelRow } from "../db/repositories/models.server";
import type { ModelKind } from "../db/schema/models";
import { findHighestIdentifier } from "../db/repositories/node-ids.server";
import type { ModelEntry } from "../domain/address-space/model-header";
import { OPC_UA_NAMESPACE } from "../domain/address-space/node-id";
import { fail, problem, type Result } from "../domain/core/result";
import { BlockAllocator } from "../domain/editing/allocate-node-id";
import { createModel as makeModel, type ModelContent } from "../domain/editing/commands/create-model";
import { getLibrary } from "../library/library.server";
import { addModel } from "./add-model.server";
import { FIRST_IDENTIFIER } from "./lease-node-ids.server";
import { resolveRequiredModels, type RequiredLayer } from "./required-models.server";

export type NewModelIntent = {
  readonly kind: ModelKind;
  readonly name: string;
  readonly namespaceUri: string;
  readonly version: string;
  /** URIs of the models that it requires directly; the base model is always among them. */
  readonly requiredModels: readonly string[];
};

/** The namespace's metadata Object and its Properties take fewer. */
const METADATA_IDS = 64;

/** Problems: `model.namespace-published`, `model.uri`, `model.namespace-taken`, missing required models. */
export async function createModel(author: Caller, organizationId: string, intent: NewModelIntent): Promise<Result<ModelRow>> {
  const { namespaceUri, kind, name } = intent;
  if (getLibrary().list().some((entry) => entry.modelUri === namespaceUri)) {
    return fail(problem("model.namespace-published", { namespaceUri }));
  }
  const content = await makeContent(organizationId, intent);
  if (!content.ok) return content;
  return addModel(author, organizationId, { name, kind, content: content.value, message: "Created" });
}

async function makeContent(organizationId: string, intent: NewModelIntent): Promise<Result<ModelContent>> {
  const { namespaceUri, version } = intent;
  const uris = [...new Set([OPC_UA_NAMESPACE, ...intent.requiredModels])];
  const entry = { modelUri: namespaceUri, requiredModels: uris.map((modelUri) => ({ modelUri, requiredModels: [] })) };
  const required = await resolveRequiredModels(organizationId, { namespaceUris: [namespaceUri], models: [entry] });
  if (required.missing.length > 0) return fail(...required.missing);
  const publicationDate = `${new Date().toISOString().slice(0, 19)}Z`;
  const layers = required.layers.map((l) => l.layer);
  const requiredModels = uris.flatMap((uri) => required.layers.filter((layer) => layer.modelUri === uri).map(toRequiredEntry));
  // A namespace that was deleted once goes on where it ended, so that none of its identifiers is given again.
  const from = Math.max((await findHighestIdentifier(organizationId, namespaceUri)) + 1, FIRST_IDENTIFIER);
  const ids = new BlockAllocator(namespaceUri, [{ from, to: from + METADATA_IDS - 1 }]);
  return makeModel(layers, ids, { namespaceUri, version, publicationDate, requiredModels });
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
