/** Users, organisations and who belongs where with which roles. */
import { and, asc, count, eq, sql } from "drizzle-orm";
import { newId } from "../../utils/ids.server";
import { formatRoles, parseRoles, type Role } from "../../auth/permissions";
import { getDatabase } from "../client.server";
import { account, member, organization, session, user } from "../schema/auth";

export type Membership = { readonly organizationId: string; readonly organizationName: string; readonly roles: readonly Role[] };

export async function listMemberships(userId: string): Promise<Membership[]> {
  const rows = await getDatabase()
    .select({ organizationId: member.organizationId, organizationName: organization.name, role: member.role })
    .from(member)
    .innerJoin(organization, eq(member.organizationId, organization.id))
    .where(eq(member.userId, userId))
    .orderBy(asc(organization.name));
  return rows.map((row) => ({
    organizationId: row.organizationId,
    organizationName: row.organizationName,
    roles: parseRoles(row.role),
  }));
}

export async function countUsers(): Promise<number> {
  const [row] = await getDatabase().select({ n: count() }).from(user);
  return row?.n ?? 0;
}

export async function findUserByEmail(email: string) {
  const [row] = await getDatabase()
    .select()
    .from(user)
    .where(eq(sql`lower(${user.email})`, email.trim().toLowerCase()));
  return row;
}

export type Person = {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly roles: readonly Role[];
  readonly since: string;
};

export async function listPeople(organizationId: string): Promise<Person[]> {
  const rows = await getDatabase()
    .select({ id: user.id, name: user.name, email: user.email, role: member.role, since: member.createdAt })
    .from(member)
    .innerJoin(user, eq(member.userId, user.id))
    .where(eq(member.organizationId, organizationId))
    .orderBy(asc(user.name));
  return rows.map(({ role, since, ...row }) => ({ ...row, roles: parseRoles(role), since: since.toISOString() }));
}

export type NewPerson = { name: string; email: string; passwordHash: string; roles: readonly Role[] };

/** The statements that add a person to an organisation, for one batch with others. */
export function addPersonStatements(organizationId: string, person: NewPerson, now: Date) {
  const db = getDatabase();
  const userId = newId();
  const email = person.email.trim().toLowerCase();
  return {
    userId,
    statements: [
      db.insert(user).values({ id: userId, name: person.name, email, emailVerified: true, createdAt: now, updatedAt: now }),
      db.insert(account).values({
        id: newId(),
        accountId: userId,
        providerId: "credential",
        userId,
        password: person.passwordHash,
        createdAt: now,
        updatedAt: now,
      }),
      addMemberStatement(organizationId, userId, person.roles, now),
    ] as const,
  };
}

export function addMemberStatement(organizationId: string, userId: string, roles: readonly Role[], now: Date) {
  return getDatabase()
    .insert(member)
    .values({ id: newId(), organizationId, userId, role: formatRoles(roles), createdAt: now });
}

export function addOrganizationStatement(id: string, name: string, slug: string, now: Date) {
  return getDatabase().insert(organization).values({ id, name, slug, createdAt: now });
}

export function setRolesStatement(organizationId: string, userId: string, roles: readonly Role[]) {
  return getDatabase()
    .update(member)
    .set({ role: formatRoles(roles) })
    .where(and(eq(member.organizationId, organizationId), eq(member.userId, userId)));
}

export function removeMemberStatement(organizationId: string, userId: string) {
  return getDatabase()
    .delete(member)
    .where(and(eq(member.organizationId, organizationId), eq(member.userId, userId)));
}

export function setPasswordStatement(userId: string, passwordHash: string, now: Date) {
  return getDatabase()
    .update(account)
    .set({ password: passwordHash, updatedAt: now })
    .where(and(eq(account.userId, userId), eq(account.providerId, "credential")));
}

export function endSessionsStatement(userId: string) {
  return getDatabase().delete(session).where(eq(session.userId, userId));
}

export async function findOrganizationBySlug(slug: string) {
  const [row] = await getDatabase().select().from(organization).where(eq(organization.slug, slug));
  return row;
}
