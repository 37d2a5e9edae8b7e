/** People of an organisation and their roles. Each act ends what the change took away: sessions, tokens. */
import type { Caller } from "../auth/caller.server";
import type { Role } from "../auth/permissions";
import { hashPassword } from "../auth/session.server";
import { writeBatch, writeInTurn } from "../db/client.server";
import { revokeTokensOfUserStatement } from "../db/repositories/api-tokens.server";
import { addAuditStatement, type NewAuditEntry } from "../db/repositories/audit.server";
import {
  addMemberStatement,
  addPersonStatements,
  endSessionsStatement,
  findUserByEmail,
  listPeople,
  removeMemberStatement,
  setPasswordStatement,
  setRolesStatement,
  type Person,
} from "../db/repositories/people.server";
import { fail, ok, problem, type Problem, type Result } from "../domain/core/result";
import { closeStreamsOf } from "./event-hub.server";

export type NewPerson = {
  readonly name: string;
  readonly email: string;
  readonly password: string;
  readonly roles: readonly Role[];
};

/**
 * Adds a person with a first password. Somebody who is known from another organisation of this installation joins with
 * the password that they have. Problem: `people.exists`.
 */
export async function addPerson(author: Caller, organizationId: string, intent: NewPerson): Promise<Result<{ userId: string }>> {
  const passwordHash = await hashPassword(intent.password);
  return writeInTurn(async (db) => {
    const known = await findUserByEmail(intent.email);
    const isMember = known && (await listPeople(organizationId)).some((p) => p.id === known.id);
    if (isMember) return fail(problem("people.exists", { email: intent.email }));
    const now = new Date();
    const person = known ? undefined : addPersonStatements(organizationId, { ...intent, passwordHash }, now);
    const userId = known?.id ?? person?.userId ?? "";
    const audit = addAuditStatement(describe(author, organizationId, "person.add", userId, intent.name, { roles: intent.roles }));
    if (person) await db.batch([...person.statements, audit]);
    else await db.batch([addMemberStatement(organizationId, userId, intent.roles, now), audit]);
    return ok({ userId });
  });
}

/** Problems: `request.not-found`, `people.no-role`, `people.last-administrator`. */
export async function setRoles(author: Caller, organizationId: string, userId: string, roles: readonly Role[]): Promise<Result<null>> {
  const result = await writeInTurn(async (db): Promise<Result<null>> => {
    const people = await listPeople(organizationId);
    const person = people.find((p) => p.id === userId);
    if (!person) return fail(problem("request.not-found"));
    if (roles.length === 0) return fail(problem("people.no-role"));
    const refusal = findRefusal(people, userId, roles);
    if (refusal) return fail(refusal);
    const details = { from: person.roles, to: roles };
    await db.batch([
      setRolesStatement(organizationId, userId, roles),
      addAuditStatement(describe(author, organizationId, "person.set-roles", userId, person.name, details)),
    ]);
    return ok(null);
  });
  if (result.ok) closeStreamsOf(userId);
  return result;
}

/** Takes a person out of the organisation, with their sessions and tokens. Problems as `setRoles`. */
export async function removePerson(author: Caller, organizationId: string, userId: string): Promise<Result<null>> {
  const result = await writeInTurn(async (db): Promise<Result<null>> => {
    const people = await listPeople(organizationId);
    const person = people.find((p) => p.id === userId);
    if (!person) return fail(problem("request.not-found"));
    const refusal = findRefusal(people, userId, []);
    if (refusal) return fail(refusal);
    await db.batch([
      removeMemberStatement(organizationId, userId),
      revokeTokensOfUserStatement(organizationId, userId, new Date()),
      endSessionsStatement(userId),
      addAuditStatement(describe(author, organizationId, "person.remove", userId, person.name, { roles: person.roles })),
    ]);
    return ok(null);
  });
  if (result.ok) closeStreamsOf(userId);
  return result;
}

/** Gives a person a new password and ends their sessions. Problem: `request.not-found`. */
export async function setPassword(author: Caller, organizationId: string, userId: string, password: string): Promise<Result<null>> {
  const person = (await listPeople(organizationId)).find((p) => p.id === userId);
  if (!person) return fail(problem("request.not-found"));
  const passwordHash = await hashPassword(password);
  await writeBatch([
    setPasswordStatement(userId, passwordHash, new Date()),
    endSessionsStatement(userId),
    addAuditStatement(describe(author, organizationId, "person.set-password", userId, person.name, {})),
  ]);
  closeStreamsOf(userId);
  return ok(null);
}

/** An organisation without an administrator could not be mended by anybody. */
function findRefusal(people: readonly Person[], userId: string, roles: readonly Role[]): Problem | undefined {
  const remains = people.some((p) => (p.id === userId ? roles : p.roles).includes("administrator"));
  return remains ? undefined : problem("people.last-administrator");
}

function describe(
  author: Caller,
  organizationId: string,
  action: string,
  id: string,
  name: string,
  details: Readonly<Record<string, unknown>>,
): NewAuditEntry {
  return { organizationId, userId: author.userId, userName: author.name, action, subject: { kind: "person", id, name }, details };
}
