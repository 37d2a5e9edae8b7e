/** What the pages of one model start from; contents come as packs after the first paint. */
import { mayDo, rolesIn, type Caller } from "../auth/caller.server";
import { listPermissions, type Action } from "../auth/permissions";
import { listSheets, type ModelRow } from "../db/repositories/models.server";
import type { ModelKind } from "../db/schema/models";
import type { Problem } from "../domain/core/result";
import { toProblemJson, type ProblemJson } from "../utils/problem-response.server";
import type { SheetSummary } from "./sheets.server";

export type LayerSummary = {
  readonly modelUri: string;
  readonly version: string | null;
  readonly publicationDate: string | null;
  /** The pack at this address never changes. */
  readonly packUrl: string;
};

export type ModelLayers = { readonly layers: readonly LayerSummary[]; readonly problems: readonly ProblemJson[] };

/** A model of the team that this one holds at a frozen revision. */
export type PinnedSummary = {
  readonly modelUri: string;
  readonly modelId: string;
  readonly modelName: string;
  readonly number: number;
  readonly message: string;
  /** The newest frozen revision, and how many edits the working state has had since. */
  readonly newest: number;
  readonly editsSince: number;
};

export type ModelWorkspace = ModelLayers & {
  readonly pins: readonly PinnedSummary[];
  readonly model: {
    readonly id: string;
    readonly organizationId: string;
    readonly name: string;
    readonly kind: ModelKind;
    readonly namespaceUri: string;
    readonly version: string | null;
    readonly publicationDate: string | null;
    readonly headSeq: number;
    readonly nodeCount: number;
    readonly createdAt: string;
    readonly updatedAt: string;
    readonly updatedBy: string;
  };
  readonly workingPackUrl: string;
  readonly sheets: readonly SheetSummary[];
  readonly permissions: readonly Action[];
  readonly user: { readonly id: string; readonly name: string; readonly email: string };
};

/** The part of a working model that is shown; the route loads it and passes it in. */
export type WorkingState = {
  readonly model: ModelRow;
  readonly seq: number;
  readonly layers: readonly {
    readonly modelUri: string;
    readonly version: string | undefined;
    readonly publicationDate: string | undefined;
    readonly packUrl: string;
  }[];
  readonly missing: readonly Problem[];
  readonly warnings: readonly Problem[];
};

export function presentLayers(working: WorkingState): ModelLayers {
  return {
    layers: working.layers.map(({ modelUri, version, publicationDate, packUrl }) => ({
      modelUri,
      version: version ?? null,
      publicationDate: publicationDate ?? null,
      packUrl,
    })),
    problems: [...working.missing, ...working.warnings].map(toProblemJson),
  };
}

export async function presentWorkspace(
  caller: Caller,
  working: WorkingState,
  pins: readonly PinnedSummary[],
): Promise<ModelWorkspace> {
  const { model, seq } = working;
  const sheets = await listSheets(model.id);
  const { id, organizationId, name, kind, namespaceUri, version, publicationDate, nodeCount, updatedBy } = model;
  const allowed = listPermissions(rolesIn(caller, organizationId)).filter((action) => mayDo(caller, action, organizationId));
  return {
    model: {
      id,
      organizationId,
      name,
      kind,
      namespaceUri,
      version,
      publicationDate,
      headSeq: seq,
      nodeCount,
      createdAt: model.createdAt.toISOString(),
      updatedAt: model.updatedAt.toISOString(),
      updatedBy,
    },
    ...presentLayers(working),
    pins: pins.map(({ modelUri, modelId, modelName, number, message, newest, editsSince }) => ({
      modelUri,
      modelId,
      modelName,
      number,
      message,
      newest,
      editsSince,
    })),
    workingPackUrl: `/models/${id}/pack?seq=${seq}`,
    sheets: sheets.map((sheet) => ({ id: sheet.id, name: sheet.name, version: sheet.version })),
    permissions: allowed,
    user: { id: caller.userId, name: caller.name, email: caller.email },
  };
}
