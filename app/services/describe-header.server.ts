import type { RequiredModelRow } from "../db/schema/models";
import type { ModelHeader } from "../domain/address-space/model-header";

export type HeaderColumns = {
  readonly version: string | null;
  readonly publicationDate: string | null;
  readonly requiredModels: readonly RequiredModelRow[];
};

/** What rows keep of a header, so that lists and questions of dependency need no contents. */
export function describeHeader(header: ModelHeader): HeaderColumns {
  const entry = header.models[0];
  const requiredModels = (entry?.requiredModels ?? []).map(({ modelUri, version, publicationDate }) => ({
    modelUri,
    ...(version === undefined ? {} : { version }),
    ...(publicationDate === undefined ? {} : { publicationDate }),
  }));
  return { version: entry?.version ?? null, publicationDate: entry?.publicationDate ?? null, requiredModels };
}
