/** What the frame around every signed-in page shows. */
import type { Caller } from "../auth/caller.server";
import { listPermissions, type Action, type Role } from "../auth/permissions";
import { listModels } from "../db/repositories/models.server";
import type { ModelKind } from "../db/schema/models";
import { chooseOrganization } from "./chosen-organization.server";
import { listTestServers } from "./list-test-servers.server";

export type FrameData = {
  readonly user: { readonly id: string; readonly name: string; readonly email: string };
  readonly roles: readonly Role[];
  readonly permissions: readonly Action[];
  readonly organization: { readonly id: string; readonly name: string };
  readonly organizations: readonly { readonly id: string; readonly name: string }[];
  /** For the command palette. */
  readonly models: readonly { readonly id: string; readonly name: string; readonly kind: ModelKind }[];
  readonly testServers: readonly { readonly id: string; readonly state: string; readonly modelId: string }[];
};

export async function readFrame(request: Request, caller: Caller): Promise<FrameData> {
  const membership = chooseOrganization(request, caller);
  const models = await listModels(membership.organizationId);
  return {
    user: { id: caller.userId, name: caller.name, email: caller.email },
    roles: membership.roles,
    permissions: listPermissions(membership.roles),
    organization: { id: membership.organizationId, name: membership.organizationName },
    organizations: caller.memberships.map((m) => ({ id: m.organizationId, name: m.organizationName })),
    models: models.map(({ id, name, kind }) => ({ id, name, kind })),
    testServers: listTestServers(membership.organizationId).map(({ id, state, modelId }) => ({ id, state, modelId })),
  };
}
