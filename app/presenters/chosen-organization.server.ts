/**
 * Which organisation the listing pages show: the one chosen by the person, kept in a cookie, else the first. Only a
 * choice of view: permissions are always asked for the organisation of the row.
 */
import type { Caller } from "../auth/caller.server";
import type { Membership } from "../db/repositories/people.server";
import { failWith } from "../utils/problem-response.server";

const cookieName = "ferrule-organization";
const year = 365 * 24 * 3600;

/** Throws 404 when the caller belongs to no organisation. */
export function chooseOrganization(request: Request, caller: Caller): Membership {
  const chosen = new RegExp(`(?:^|;\\s*)${cookieName}=([\\w-]+)`).exec(request.headers.get("cookie") ?? "")?.[1];
  const membership = caller.memberships.find((m) => m.organizationId === chosen) ?? caller.memberships[0];
  if (!membership) throw failWith(404, "auth.no-organization");
  return membership;
}

export function formatOrganizationCookie(organizationId: string): string {
  return `${cookieName}=${encodeURIComponent(organizationId)}; Path=/; Max-Age=${year}; SameSite=Lax; HttpOnly`;
}
