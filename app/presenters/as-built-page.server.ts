import { listPointChecks } from "../db/repositories/as-built.server";
import { listEndpoints } from "../db/repositories/endpoints.server";
import { listRevisions, type ModelRow } from "../db/repositories/models.server";
import type { QuotedPointCheck } from "../domain/as-built/as-built-report";
import { listTestServers } from "./list-test-servers.server";

export type AsBuiltPage = {
  readonly targets: readonly { readonly id: string; readonly name: string; readonly isTestServer: boolean }[];
  readonly revisions: readonly { readonly number: number; readonly message: string }[];
  readonly pointChecks: readonly (QuotedPointCheck & { readonly id: string; readonly note: string })[];
};

/** What an as-built report can be made of, and the point checks so far. */
export async function presentAsBuiltPage(model: ModelRow): Promise<AsBuiltPage> {
  const [endpoints, revisions, checks] = await Promise.all([listEndpoints(model.organizationId), listRevisions(model.id), listPointChecks(model.id)]);
  const servers = listTestServers(model.organizationId).filter((server) => server.state === "running");
  return {
    targets: [
      ...endpoints.map(({ id, name }) => ({ id, name, isTestServer: false })),
      ...servers.map(({ id, modelName }) => ({ id, name: `Test server of ${modelName}`, isTestServer: true })),
    ],
    revisions: revisions.map(({ number, message }) => ({ number, message })),
    pointChecks: checks.map(({ id, path, nodeId, stimulus, localReading, shownValue, unit, tolerance, isWithin, note, checkedBy, at }) => ({
      id,
      path,
      nodeId,
      stimulus,
      localReading,
      shownValue,
      unit,
      tolerance,
      isWithin,
      note,
      checkedBy,
      at: at.toISOString(),
    })),
  };
}
