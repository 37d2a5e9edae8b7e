import { listWaivers, type StoredWaiver } from "../db/repositories/waivers.server";

export type ShownWaiver = StoredWaiver;

/** The accepted findings of a model, oldest first; whether each still holds is asked of the domain with the model. */
export function presentWaivers(modelId: string): Promise<ShownWaiver[]> {
  return listWaivers(modelId);
}
