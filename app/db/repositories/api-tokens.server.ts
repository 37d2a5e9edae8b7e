import { and, desc, eq, isNull } from "drizzle-orm";
import { newId } from "../../utils/ids.server";
import { getDatabase } from "../client.server";
import { apiToken, user } from "../schema/auth";

export type TokenRow = typeof apiToken.$inferSelect;

export function addTokenStatement(row: Omit<TokenRow, "id" | "lastUsedAt" | "revokedAt"> & { id?: string }) {
  return getDatabase()
    .insert(apiToken)
    .values({ ...row, id: row.id ?? newId() });
}

export async function findTokenByHash(tokenHash: string) {
  const [row] = await getDatabase()
    .select({ token: apiToken, userName: user.name, userEmail: user.email })
    .from(apiToken)
    .innerJoin(user, eq(apiToken.userId, user.id))
    .where(eq(apiToken.tokenHash, tokenHash));
  return row;
}

export async function saveTokenUse(id: string, at: Date): Promise<void> {
  await getDatabase().update(apiToken).set({ lastUsedAt: at }).where(eq(apiToken.id, id));
}

export async function listTokens(organizationId: string) {
  return getDatabase()
    .select({ token: apiToken, userName: user.name })
    .from(apiToken)
    .innerJoin(user, eq(apiToken.userId, user.id))
    .where(and(eq(apiToken.organizationId, organizationId), isNull(apiToken.revokedAt)))
    .orderBy(desc(apiToken.createdAt));
}

export async function findToken(id: string): Promise<TokenRow | undefined> {
  const [row] = await getDatabase().select().from(apiToken).where(eq(apiToken.id, id));
  return row;
}

export function revokeTokenStatement(id: string, at: Date) {
  return getDatabase().update(apiToken).set({ revokedAt: at }).where(eq(apiToken.id, id));
}

/** Ends all tokens of somebody who leaves the organisation. */
export function revokeTokensOfUserStatement(organizationId: string, userId: string, at: Date) {
  return getDatabase()
    .update(apiToken)
    .set({ revokedAt: at })
    .where(and(eq(apiToken.organizationId, organizationId), eq(apiToken.userId, userId), isNull(apiToken.revokedAt)));
}
