/** What the frame around every signed-in page shows. */
import type { Caller } from "../auth/caller.server";
import { listPermissions, type Action, type Role } from "../auth/permissions";
import { chooseOrganization } from "./chosen-organization.server";
import { listTestServers } from "./list-test-servers.server";

export type FrameData = {
  readonly user: { readonly id: string; readonly name: string; readonly email: string };
  readonly roles: readonly Role[];
  readonly permissions: readonly Action[];
  readonly organization: { readonly id: string; readonly name: string };
  readonly organizations: readonly { readonly id: string; readonly name: string }[];
  readonly testServers: readonly { readonly id: string; readonly state: string }[];
};

export function readFrame(request: Request, caller: Caller): FrameData {
  const membership = chooseOrganization(request, caller);
  return {
    user: { id: caller.userId, name: caller.name, email: caller.email },
    roles: membership.roles,
    permissions: listPermissions(membership.roles),
    organization: { id: membership.organizationId, name: membership.organizationName },
    organizations: caller.memberships.map((m) => ({ id: m.organizationId, name: m.organizationName })),
    testServers: listTestServers(membership.organizationId).map(({ id, state }) => ({ id, state })),
  };
}
