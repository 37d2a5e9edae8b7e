/** What the page for a new model needs to know of the team's other models. */
import { listModels } from "../db/repositories/models.server";
import type { Membership } from "../db/repositories/people.server";

export type NewModelPage = {
  readonly organizationName: string;
  readonly taken: readonly { readonly name: string; readonly namespaceUri: string }[];
};

export async function readNewModelPage(organization: Membership): Promise<NewModelPage> {
  const models = await listModels(organization.organizationId);
  return {
    organizationName: organization.organizationName,
    taken: models.map(({ name, namespaceUri }) => ({ name, namespaceUri })),
  };
}
