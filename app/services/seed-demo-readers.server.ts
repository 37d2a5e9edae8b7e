/** The demo's readers: who reads the hall, by the groups of its machines. Seeding again changes nothing that is there. */
import type { Caller } from "../auth/caller.server";
import { findModelByNamespace } from "../db/repositories/models.server";
import { listReaders } from "../db/repositories/releases.server";
import { findMember } from "../domain/address-space/browse";
import { formatNodeId } from "../domain/address-space/node-id";
import { getValue } from "../domain/core/result";
import { listMachines } from "../domain/instantiation/list-machines";
import { saveReader } from "./manage-readers.server";
import { loadWorkingModel } from "./working-model.server";

const HALL = "http://merrow.example/UA/Hall/";
const BRAIDER = "http://merrow.example/UA/RopeBraider/";

const readers = [
  { name: "Energy board", about: "Power and energy of the works", groups: ["Energy"] },
  { name: "Maintenance planner", about: "Condition of the gearboxes, faults", groups: ["Environment", "Status"] },
  { name: "Trend page", about: "What the braiders do", groups: ["Process"] },
] as const;

export async function seedReaders(author: Caller, organizationId: string): Promise<void> {
  if ((await listReaders(organizationId)).length > 0) return;
  const hall = await findModelByNamespace(organizationId, HALL);
  const working = hall && (await loadWorkingModel(hall.id));
  if (!working) return;
  const { space } = working;
  for (const { name, about, groups } of readers) {
    const nodeIds = listMachines(space).flatMap(({ key }) =>
      groups.flatMap((group) => {
        const node = findMember(space, key, group, BRAIDER);
        return node ? [formatNodeId(node.nodeId)] : [];
      }),
    );
    getValue(await saveReader(author, organizationId, { name, about, contact: "", nodeIds }));
  }
}
