import { listModels } from "../db/repositories/models.server";
import { toModelJson, type ModelJson } from "../utils/api-schemas";

export async function presentModels(organizationId: string): Promise<ModelJson[]> {
  return (await listModels(organizationId)).map(toModelJson);
}
