/** Bearer tokens for /api/v1: shown once, kept as a hash, bound to one organisation, ended by date or by hand. */
import { randomBytes } from "node:crypto";
import { mayDo, type Caller } from "../auth/caller.server";
import type { TokenScope } from "../auth/permissions";
import { writeBatch } from "../db/client.server";
import { addTokenStatement, findToken, listTokens, revokeTokenStatement } from "../db/repositories/api-tokens.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { newId, sha256 } from "../utils/ids.server";

const MAX_DAYS = 366;
const DAY_MS = 24 * 3600_000;

export type NewToken = {
  readonly name: string;
  readonly scopes: readonly TokenScope[];
  /** Until it ends; a year at most. */
  readonly days: number;
};

/** Answers the secret, which nobody can read again. */
export async function createToken(
  author: Caller,
  organizationId: string,
  intent: NewToken,
): Promise<{ id: string; secret: string; expiresAt: string }> {
  const secret = `ferrule_${randomBytes(32).toString("base64url")}`;
  const now = new Date();
  const id = newId();
  const expiresAt = new Date(now.getTime() + Math.min(intent.days, MAX_DAYS) * DAY_MS);
  await writeBatch([
    addTokenStatement({
      id,
      organizationId,
      userId: author.userId,
      name: intent.name,
      tokenHash: sha256(secret),
      hint: secret.slice(0, 14),
      scopes: intent.scopes,
      createdAt: now,
      expiresAt,
    }),
    addAuditStatement({
      organizationId,
      userId: author.userId,
      userName: author.name,
      action: "token.create",
      subject: { kind: "token", id, name: intent.name },
      details: { scopes: intent.scopes, expiresAt: expiresAt.toISOString() },
    }),
  ]);
  return { id, secret, expiresAt: expiresAt.toISOString() };
}

/** Ends a token: one's own, or anybody's for administrators. Problem: `request.not-found`. */
export async function revokeToken(author: Caller, tokenId: string): Promise<Result<null>> {
  const token = await findToken(tokenId);
  const mayEnd = token && (token.userId === author.userId || mayDo(author, "organization.administer", token.organizationId));
  if (!mayEnd) return fail(problem("request.not-found"));
  const now = new Date();
  await writeBatch([
    revokeTokenStatement(token.id, now),
    addAuditStatement({
      organizationId: token.organizationId,
      userId: author.userId,
      userName: author.name,
      action: "token.revoke",
      subject: { kind: "token", id: token.id, name: token.name },
    }),
  ]);
  return ok(null);
}

export type TokenSummary = {
  readonly id: string;
  readonly name: string;
  readonly hint: string;
  readonly owner: string;
  readonly isOwn: boolean;
  readonly scopes: readonly string[];
  readonly createdAt: string;
  readonly expiresAt: string | null;
  readonly lastUsedAt: string | null;
};

/** One's own tokens; all of the organisation for administrators. */
export async function listVisibleTokens(caller: Caller, organizationId: string): Promise<TokenSummary[]> {
  const seesAll = mayDo(caller, "organization.administer", organizationId);
  const rows = await listTokens(organizationId);
  return rows
    .filter(({ token }) => seesAll || token.userId === caller.userId)
    .map(({ token, userName }) => ({
      id: token.id,
      name: token.name,
      hint: token.hint,
      owner: userName,
      isOwn: token.userId === caller.userId,
      scopes: token.scopes,
      createdAt: token.createdAt.toISOString(),
      expiresAt: token.expiresAt?.toISOString() ?? null,
      lastUsedAt: token.lastUsedAt?.toISOString() ?? null,
    }));
}
