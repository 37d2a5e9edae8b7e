/** Version and required models of a model: edits like any other, made on a page instead of in the editor. */
import type { Caller } from "../auth/caller.server";
import type { ModelRow } from "../db/repositories/models.server";
import type { AddressSpace } from "../domain/address-space/address-space";
import type { IdPolicy } from "../domain/address-space/id-policy";
import { OPC_UA_NAMESPACE } from "../domain/address-space/node-id";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { BlockAllocator } from "../domain/editing/allocate-node-id";
import { setIdPolicy } from "../domain/editing/commands/set-id-policy";
import { setModelInfo, setRequiredModels } from "../domain/editing/commands/set-model-info";
import type { Edit } from "../domain/editing/edit-draft";
import { newId } from "../utils/ids.server";
import { toRequiredEntry } from "./create-model.server";
import { freezeForMachines } from "./freeze-for-machines.server";
import { choosePins } from "./pins.server";
import { resolveRequiredModels } from "./required-models.server";
import { appendTransactions, loadWorkingModel } from "./working-model.server";

/** These commands make no nodes, so no identifiers are needed. */
const noIdentifiers = (model: ModelRow) => new BlockAllocator(model.namespaceUri, []);

/** Sets the version, with the date of today, in the header and in the namespace's metadata. */
export function changeVersion(author: Caller, model: ModelRow, version: string): Promise<Result<null>> {
  const publicationDate = `${new Date().toISOString().slice(0, 19)}Z`;
  return append(author, model, "set-version", (space) =>
    setModelInfo(space, noIdentifiers(model), { version, publicationDate }),
  );
}

/** Problems: missing ones, `model.required-in-use` where nodes still use one that would go. */
export async function changeRequiredModels(
  author: Caller,
  model: ModelRow,
  modelUris: readonly string[],
): Promise<Result<null>> {
  const uris = [...new Set([OPC_UA_NAMESPACE, ...modelUris])];
  const isPinned = model.kind === "machines";
  if (isPinned) {
    const frozen = await freezeForMachines(author, model.organizationId, modelUris, model.name);
    if (!frozen.ok) return frozen;
  }
  const asked = {
    modelUri: model.namespaceUri,
    requiredModels: uris.map((modelUri) => ({ modelUri, requiredModels: [] })),
  };
  const header = { namespaceUris: [model.namespaceUri], models: [asked] };
  const pins = isPinned ? await choosePins(model.organizationId, header, model.pins ?? []) : null;
  const { layers, missing } = await resolveRequiredModels(model.organizationId, header, pins);
  if (missing.length > 0) return fail(...missing);
  const requiredModels = uris.flatMap((uri) => layers.filter((layer) => layer.modelUri === uri).map(toRequiredEntry));
  return append(author, model, "set-required-models", (space) =>
    setRequiredModels(space, noIdentifiers(model), { requiredModels }),
  );
}

/** How new nodes get their NodeIds from now on. Problems: those of `checkIdPolicy`. */
export function changeIdPolicy(author: Caller, model: ModelRow, policy: IdPolicy): Promise<Result<null>> {
  return append(author, model, "set-id-policy", (space) => setIdPolicy(space, noIdentifiers(model), { policy }));
}

async function append(
  author: Caller,
  model: ModelRow,
  label: string,
  edit: (space: AddressSpace) => Result<Edit>,
): Promise<Result<null>> {
  const working = await loadWorkingModel(model.id);
  if (!working) return fail(problem("request.not-found"));
  const made = edit(working.space);
  if (!made.ok) return made;
  if (made.value.operations.length === 0) return ok(null);
  const outcome = await appendTransactions(model.id, author, {
    clientId: `page-${newId()}`,
    base: working.seq,
    transactions: [{ clientSeq: 1, label, operations: made.value.operations }],
  });
  switch (outcome.kind) {
    case "accepted":
      return ok(null);
    case "refused":
      return fail(...outcome.problems);
    case "stale":
      return fail(problem("transactions.stale"));
    case "gone":
      return fail(problem("request.not-found"));
  }
}
