/** Makes library entries of NodeSets that are not published: uploads, files in a folder, models of the team. */
import { createHash } from "node:crypto";
import type { Layer } from "../domain/address-space/address-space";
import { getOwnNamespace, type ModelEntry, type ModelHeader } from "../domain/address-space/model-header";
import { OPC_UA_NAMESPACE } from "../domain/address-space/node-id";
import { ok, type Result } from "../domain/core/result";
import { decodeXmlBytes } from "../domain/nodeset/decode-xml-bytes";
import { readModelHeader } from "../domain/nodeset/read-header";
import type { LibraryEntry, LibraryOrigin, LibrarySource } from "./library-entry";
import { toTitle } from "./published.server";

/** An entry from the bytes of a NodeSet2 file; only its head is read. Fails when it is none. */
export function describeBytes(
  bytes: Uint8Array,
  file: string,
  source: LibrarySource = { kind: "bytes", bytes },
): Result<LibraryEntry> {
  const text = decodeXmlBytes(bytes);
  if (!text.ok) return text;
  const header = readModelHeader(text.value);
  if (!header.ok) return header;
  const sha256 = createHash("sha256").update(bytes).digest("hex");
  return ok(toEntry(header.value, "added", file, sha256, source));
}

/** An entry for a layer that is in memory. `contentId` must change whenever the layer does. */
export function describeLayer(layer: Layer, file: string, contentId: string): LibraryEntry {
  const entry = toEntry(layer.header, "team", file, contentId, { kind: "layer", layer });
  return { ...entry, nodeCount: layer.nodes.size };
}

function toEntry(
  header: ModelHeader,
  origin: LibraryOrigin,
  file: string,
  sha256: string,
  source: LibrarySource,
): LibraryEntry {
  const modelUri = getOwnNamespace(header);
  const { version, modelVersion, publicationDate } = header.models[0] ?? {};
  return {
    origin,
    title: toTitle(modelUri),
    file,
    modelUri,
    ...(version === undefined ? {} : { version }),
    ...(modelVersion === undefined ? {} : { modelVersion }),
    ...(publicationDate === undefined ? {} : { publicationDate }),
    requiredModels: listRequired(header),
    sha256,
    source,
  };
}

/**
 * The models that a file requires, first those of its own models. A file without Models table names what it needs in
 * its namespace table only.
 */
export function listRequired(header: ModelHeader): ModelEntry[] {
  const own = new Set(header.models.map((model) => model.modelUri));
  if (header.models.length > 0) {
    return header.models.flatMap((model) => model.requiredModels).filter((model) => !own.has(model.modelUri));
  }
  const [, ...others] = header.namespaceUris;
  return [OPC_UA_NAMESPACE, ...others].map((modelUri) => ({ modelUri, requiredModels: [] }));
}
