/** A live server's address space as a model: read whole, made a NodeSet2 text, and shown before anything is stored. */
import type { Caller } from "../auth/caller.server";
import { listModels } from "../db/repositories/models.server";
import type { ServedModel } from "../domain/as-built/as-built";
import { OPC_UA_NAMESPACE } from "../domain/address-space/node-id";
import { ok, type Result } from "../domain/core/result";
import { learnModel } from "../domain/live/learn-model";
import type { LiveTarget } from "../domain/live/live-target";
import { writeNodeSet } from "../domain/nodeset/write-nodeset";
import { getLibrary } from "../library/library.server";
import { toProblemJson } from "../utils/problem-response.server";
import { askEndpoint } from "./live-endpoint.server";
import { previewImport, suggestName, type ImportPreview } from "./preview-import.server";
import { resolveRequiredModels } from "./required-models.server";

export type ServedNamespace = {
  readonly uri: string;
  readonly version: string | null;
  /** Whether the library, or a model of the team, describes it already. */
  readonly knownAs: "published" | "model" | null;
};

/** More is no machine, and one request must end. */
const MAX_NODES = 200_000;

/** The namespaces of a server but the base one. */
export async function listServedNamespaces(organizationId: string, target: LiveTarget): Promise<Result<ServedNamespace[]>> {
  const served = await readServed(target);
  if (!served.ok) return served;
  const published = new Set(getLibrary().list().map((entry) => entry.modelUri));
  const own = new Set((await listModels(organizationId)).map((model) => model.namespaceUri));
  const toKnown = (uri: string): ServedNamespace["knownAs"] => (published.has(uri) ? "published" : own.has(uri) ? "model" : null);
  return ok(served.value.filter((model) => model.modelUri !== OPC_UA_NAMESPACE).map(({ modelUri, version }) => ({ uri: modelUri, version: version ?? null, knownAs: toKnown(modelUri) })));
}

function readServed(target: LiveTarget): Promise<Result<ServedModel[]>> {
  return askEndpoint(target.id, async (client) => {
    const { readServedModels } = await import("../opcua/client/read-served-models.server");
    return ok(await readServedModels(client));
  });
}

/** Keeps the text for the import. Problems: those of the endpoint, `learn.empty`, those of the preview. */
export async function previewLearning(caller: Caller, target: LiveTarget, namespaceUri: string, signal: AbortSignal): Promise<Result<ImportPreview>> {
  const { organizationId } = target;
  const served = await readServed(target);
  if (!served.ok) return served;
  const others = served.value.map(({ modelUri }) => modelUri).filter((uri) => uri !== namespaceUri);
  const required = others.map((modelUri) => ({ modelUri, requiredModels: [] }));
  // What is nowhere described is left out below, so that what is missing here does not end it.
  const known = await resolveRequiredModels(organizationId, { namespaceUris: [namespaceUri], models: [{ modelUri: namespaceUri, requiredModels: required }] });
  const layers = known.layers.map(({ layer }) => layer);
  const read = await askEndpoint(target.id, async (client) => {
    const { readAddressSpace } = await import("../opcua/client/read-address-space.server");
    return readAddressSpace(client, { namespaceUris: [namespaceUri], layers, maxNodes: MAX_NODES, shouldStop: () => signal.aborted });
  });
  if (!read.ok) return read;
  const learnt = learnModel(read.value.nodes, { namespaceUri, served: served.value, layers, now: new Date().toISOString() });
  if (!learnt.ok) return learnt;
  const { xml } = writeNodeSet(learnt.value);
  const fileName = `${suggestName({ namespaceUri, fileName: target.name })}.NodeSet2.xml`;
  const preview = await previewImport(caller, organizationId, new TextEncoder().encode(xml), fileName, { signal });
  if (!preview.ok) return preview;
  const told = [...read.problems, ...learnt.problems].map(toProblemJson);
  return ok({ ...preview.value, problems: [...told, ...preview.value.problems] });
}
