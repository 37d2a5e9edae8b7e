/** The first start on an empty database: the first administrator and the organisation, guarded by a code from the console. */
import { existsSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { randomInt, timingSafeEqual } from "node:crypto";
import { join } from "node:path";
import { hashPassword } from "../auth/session.server";
import { getDatabase, writeInTurn } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import { addOrganizationStatement, addPersonStatements, countUsers } from "../db/repositories/people.server";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { getClientAddress } from "../utils/client-address.server";
import { getEnvironment } from "../utils/env.server";
import { newId, sha256 } from "../utils/ids.server";
import { noteFailure, secondsUntilAllowed } from "./sign-in-limiter.server";

export type SetUpIntent = {
  readonly code: string;
  readonly organizationName: string;
  readonly name: string;
  readonly email: string;
  readonly password: string;
};

/** Whether the installation still waits for its first administrator. */
export async function needsSetUp(): Promise<boolean> {
  return (await countUsers()) === 0;
}

const codeFile = () => join(getEnvironment().dataFolder, "set-up-code");

/** The code that the console prints; kept in the data folder until it has been used, so that a restart does not change it. */
export function keepSetUpCode(): string {
  const file = codeFile();
  if (!existsSync(file)) {
    const letters = "ABCDEFGHJKMNPQRSTUVWXYZ23456789";
    const group = () => Array.from({ length: 4 }, () => letters[randomInt(letters.length)]).join("");
    writeFileSync(file, `${group()}-${group()}-${group()}`, { mode: 0o600 });
  }
  return readFileSync(file, "utf8").trim();
}

/** Problems: `set-up.done`, `set-up.wrong-code`, `auth.too-many-attempts`. */
export async function setUpOrganization(request: Request, intent: SetUpIntent): Promise<Result<{ organizationId: string }>> {
  if (!(await needsSetUp())) return fail(problem("set-up.done"));
  const address = getClientAddress(request);
  const seconds = secondsUntilAllowed("set-up", address);
  if (seconds > 0) return fail(problem("auth.too-many-attempts", { seconds }));
  if (!isSameText(intent.code.toUpperCase(), keepSetUpCode())) {
    noteFailure("set-up", address);
    return fail(problem("set-up.wrong-code"));
  }
  const passwordHash = await hashPassword(intent.password);
  const result = await writeInTurn(async () => {
    if (!(await needsSetUp())) return fail(problem("set-up.done"));
    return ok({ organizationId: await addFirstOrganization(intent, passwordHash) });
  });
  if (result.ok) rmSync(codeFile(), { force: true });
  return result;
}

async function addFirstOrganization(intent: SetUpIntent, passwordHash: string): Promise<string> {
  const now = new Date();
  const organizationId = newId();
  const person = addPersonStatements(
    organizationId,
    { name: intent.name, email: intent.email, passwordHash, roles: ["administrator"] },
    now,
  );
  await getDatabase().batch([
    addOrganizationStatement(organizationId, intent.organizationName, "main", now),
    ...person.statements,
    addAuditStatement({
      organizationId,
      userId: person.userId,
      userName: intent.name,
      action: "organization.set-up",
      subject: { kind: "organization", id: organizationId, name: intent.organizationName },
    }),
  ]);
  return organizationId;
}

function isSameText(a: string, b: string): boolean {
  return timingSafeEqual(Buffer.from(sha256(a)), Buffer.from(sha256(b)));
}
