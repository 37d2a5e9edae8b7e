/**
 * Who is asking, and may they. Every loader, action and API route begins with one of the functions here. A permission
 * is asked for the organisation of the row that is read or changed, never for one that a session has chosen; what
 * belongs to another organisation does not exist for the caller (404).
 */
import { redirect } from "react-router";
import { findTokenByHash, saveTokenUse } from "../db/repositories/api-tokens.server";
import { listMemberships, type Membership } from "../db/repositories/people.server";
import { sha256 } from "../utils/ids.server";
import { failWith } from "../utils/problem-response.server";
import { getAuth } from "./auth.server";
import { can, getScope, tokenScopes, type Action, type Role, type TokenScope } from "./permissions";
import { isFromOwnOrigin, isStateChanging } from "./same-origin.server";

export type Caller = {
  readonly userId: string;
  readonly name: string;
  readonly email: string;
  readonly memberships: readonly Membership[];
  /** Set when the caller came with a bearer token instead of a session. */
  readonly token?: { readonly id: string; readonly organizationId: string; readonly scopes: readonly TokenScope[] };
};

const TOKEN_USE_RESOLUTION_MS = 60_000;

/** The caller, or undefined when nobody is signed in. A bearer token that does not hold is nobody. */
export async function findCaller(request: Request): Promise<Caller | undefined> {
  const authorization = request.headers.get("authorization");
  if (authorization !== null) return findTokenCaller(authorization);
  const session = await getAuth().api.getSession({ headers: request.headers });
  if (!session) return undefined;
  const { id, name, email } = session.user;
  return { userId: id, name, email, memberships: await listMemberships(id) };
}

async function findTokenCaller(authorization: string): Promise<Caller | undefined> {
  const secret = /^Bearer ([\w-]{20,200})$/i.exec(authorization)?.[1];
  if (secret === undefined) return undefined;
  const found = await findTokenByHash(sha256(secret));
  if (!found) return undefined;
  const { token } = found;
  const now = new Date();
  if (token.revokedAt !== null || (token.expiresAt !== null && token.expiresAt <= now)) return undefined;
  const memberships = (await listMemberships(token.userId)).filter((m) => m.organizationId === token.organizationId);
  if (memberships.length === 0) return undefined;
  if (token.lastUsedAt === null || now.getTime() - token.lastUsedAt.getTime() > TOKEN_USE_RESOLUTION_MS) {
    await saveTokenUse(token.id, now);
  }
  const scopes = tokenScopes.filter((scope) => token.scopes.includes(scope));
  return {
    userId: token.userId,
    name: found.userName,
    email: found.userEmail,
    memberships,
    token: { id: token.id, organizationId: token.organizationId, scopes },
  };
}

/** For data routes and the API: the caller, else a 401 problem document is thrown. */
export async function requireCaller(request: Request): Promise<Caller> {
  const caller = await findCaller(request);
  if (!caller) throw failWith(401, "auth.sign-in-first", undefined, { "www-authenticate": "Bearer" });
  requireOwnOrigin(request, caller);
  return caller;
}

/** For pages: the signed-in user, else a redirect to the sign-in page that leads back here. */
export async function requireUser(request: Request): Promise<Caller> {
  const caller = await findCaller(request);
  if (!caller) {
    const url = new URL(request.url);
    const back = isStateChanging(request) ? "/" : url.pathname.replace(/\.data$/, "") + url.search;
    throw redirect(back === "/" || back === "/_root" ? "/sign-in" : `/sign-in?to=${encodeURIComponent(back)}`);
  }
  requireOwnOrigin(request, caller);
  return caller;
}

/** Cookies travel by themselves, so a change must prove that our own page asked for it; a token proves itself. */
function requireOwnOrigin(request: Request, caller: Caller): void {
  if (caller.token) return;
  if (isStateChanging(request) && !isFromOwnOrigin(request)) throw failWith(403, "auth.foreign-origin");
}

export function rolesIn(caller: Caller, organizationId: string): readonly Role[] {
  return caller.memberships.find((m) => m.organizationId === organizationId)?.roles ?? [];
}

export function isMember(caller: Caller, organizationId: string): boolean {
  return caller.memberships.some((m) => m.organizationId === organizationId);
}

/** Whether the caller may do it in this organisation, the token's scopes included. */
export function mayDo(caller: Caller, action: Action, organizationId: string): boolean {
  if (caller.token && !caller.token.scopes.includes(getScope(action))) return false;
  return can(rolesIn(caller, organizationId), action);
}

/**
 * Throws 404 when the row's organisation (undefined: there is no such row) is not the caller's, 403 when it is and the
 * caller's roles do not allow the action.
 */
export function assertMay(caller: Caller, action: Action, organizationIdOfRow: string | undefined): asserts organizationIdOfRow is string {
  if (organizationIdOfRow === undefined || !isMember(caller, organizationIdOfRow)) throw failWith(404, "request.not-found");
  if (!mayDo(caller, action, organizationIdOfRow)) throw failWith(403, "auth.not-allowed", { action });
}

/**
 * The organisation that a request without a row means: the token's, else `?organization=`, else the caller's only one.
 * Throws 400 when the caller belongs to several and names none, 404 when to none or to another.
 */
export function requireOrganization(request: Request, caller: Caller): Membership {
  const asked = caller.token?.organizationId ?? new URL(request.url).searchParams.get("organization");
  if (asked !== null) {
    const membership = caller.memberships.find((m) => m.organizationId === asked);
    if (!membership) throw failWith(404, "request.not-found");
    return membership;
  }
  const [only, second] = caller.memberships;
  if (!only) throw failWith(404, "auth.no-organization");
  if (second) throw failWith(400, "auth.choose-organization");
  return only;
}
