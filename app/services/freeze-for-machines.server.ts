/** Machines stand on frozen revisions only, so types that were edited and never frozen are frozen for them. */
import type { Caller } from "../auth/caller.server";
import { findModelByNamespace, listRevisions } from "../db/repositories/models.server";
import { ok, type Result } from "../domain/core/result";
import { freezeRevision } from "./freeze-revision.server";

/** Freezes each required model of the team whose only revision is what it began with. Problems: those of freezing. */
export async function freezeForMachines(
  author: Caller,
  organizationId: string,
  requiredUris: readonly string[],
  machinesName: string,
): Promise<Result<null>> {
  for (const uri of requiredUris) {
    const model = await findModelByNamespace(organizationId, uri);
    const [newest] = model ? await listRevisions(model.id) : [];
    if (!model || !newest || newest.number > 0 || model.headSeq === newest.seq) continue;
    const frozen = await freezeRevision(author, model, `First revision, for the machines of ${machinesName}`);
    if (!frozen.ok) return frozen;
  }
  return ok(null);
}
