/** A new model: its header with the required models as the library has them, and the metadata of its namespace. */
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import type { ModelRow } from "../db/repositories/models.server";
import { AddressSpace, buildLayer } from "../domain/address-space/address-space";
import type { ModelEntry, ModelHeader } from "../domain/address-space/model-header";
import { OPC_UA_NAMESPACE } from "../domain/address-space/node-id";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { getLibrary } from "../library/library.server";
import { addModel } from "./add-model.server";
import { resolveRequiredModels, type RequiredLayer } from "./required-models.server";

export const newModelIntentSchema = z.object({
  kind: z.enum(["types", "machines"]),
  name: z.string().trim().min(1).max(100),
  namespaceUri: z.string().trim().min(1).max(400),
  version: z.string().trim().min(1).max(50),
  /** URIs of the models that it requires directly; the base model is always among them. */
  requiredModels: z.array(z.string().max(400)).max(50),
});
export type NewModelIntent = z.infer<typeof newModelIntentSchema>;

/** Problems: `model.namespace-published`, `model.namespace-taken`, missing required models. */
export async function createModel(author: Caller, organizationId: string, intent: NewModelIntent): Promise<Result<ModelRow>> {
  const { namespaceUri, kind, name } = intent;
  if (getLibrary().list().some((entry) => entry.modelUri === namespaceUri)) {
    return fail(problem("model.namespace-published", { namespaceUri }));
  }
  const content = await makeContent(organizationId, intent);
  if (!content.ok) return content;
  return addModel(author, organizationId, { name, kind, content: content.value, message: "Created" });
}

async function makeContent(organizationId: string, intent: NewModelIntent) {
  const uris = [...new Set([OPC_UA_NAMESPACE, ...intent.requiredModels])];
  const asked = makeHeader(intent, uris.map((modelUri) => ({ modelUri, requiredModels: [] })));
  const required = await resolveRequiredModels(organizationId, asked);
  if (required.missing.length > 0) return fail(...required.missing);
  const entries = uris.flatMap((uri) => required.layers.filter((layer) => layer.modelUri === uri).map(toEntry));
  const header = makeHeader(intent, entries);
  const space = AddressSpace.of(required.layers.map((l) => l.layer), buildLayer(header, []));
  return ok({ header: space.own.header, nodes: space.listOwnNodes() });
}

function toEntry({ modelUri, version, publicationDate }: RequiredLayer): ModelEntry {
  return {
    modelUri,
    ...(version === undefined ? {} : { version }),
    ...(publicationDate === undefined ? {} : { publicationDate }),
    requiredModels: [],
  };
}

function makeHeader({ namespaceUri, version }: NewModelIntent, requiredModels: readonly ModelEntry[]): ModelHeader {
  const publicationDate = `${new Date().toISOString().slice(0, 19)}Z`;
  const others = requiredModels.map((entry) => entry.modelUri).filter((uri) => uri !== OPC_UA_NAMESPACE);
  return {
    namespaceUris: [namespaceUri, ...others],
    models: [{ modelUri: namespaceUri, version, publicationDate, requiredModels }],
  };
}
