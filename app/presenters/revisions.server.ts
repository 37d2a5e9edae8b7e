import { listRevisions, type ModelRow } from "../db/repositories/models.server";
import type { RevisionJson } from "../utils/api-schemas";

/** The revisions of a model, newest first; number 0 is what it began with. */
export async function presentRevisions(model: ModelRow): Promise<RevisionJson[]> {
  const rows = await listRevisions(model.id);
  return rows.map(({ number, seq, packHash, message, author, at, nodeCount, counts, changes, pinned }) => ({
    number,
    seq,
    hash: packHash,
    message,
    author,
    at: at.toISOString(),
    nodeCount,
    counts,
    changes,
    pinned: (pinned ?? []).map(({ modelUri, version, publicationDate }) => ({
      modelUri,
      version: version ?? null,
      publicationDate: publicationDate ?? null,
    })),
  }));
}
