/** The demo: its organisation, its people and its models. Seeding again changes nothing that is there. */
import { existsSync, readFileSync } from "node:fs";
import { join } from "node:path";
import type { Caller } from "../auth/caller.server";
import { hashPassword } from "../auth/session.server";
import { writeBatch, type Statement } from "../db/client.server";
import { findModelByNamespace } from "../db/repositories/models.server";
import {
  addMemberStatement,
  addOrganizationStatement,
  addPersonStatements,
  findOrganizationBySlug,
  findUserByEmail,
  listMemberships,
} from "../db/repositories/people.server";
import { formatProblem } from "../domain/core/problem-texts";
import type { Problem } from "../domain/core/result";
import { demoAccounts, demoOrganizationName, demoPassword } from "../utils/demo-accounts";
import { newId } from "../utils/ids.server";
import { findProjectRoot } from "../utils/project-root.server";
import { importModel } from "./import-model.server";
import { seedReaders } from "./seed-demo-readers.server";
import { readUpload } from "./read-upload.server";
import { seedBraiderMapping, seedHallSources } from "./seed-demo-sources.server";

export const DEMO_SLUG = "demo";

/** The demo's models in the order in which they require each other; the file names tell the model's name. */
const demoModels = [
  { file: "merrow-rope-braider.NodeSet2.xml", name: "Rope braider" },
  { file: "merrow-hall.NodeSet2.xml", name: "Merrow hall" },
] as const;

/** Answers lines for the console. Throws when a model of the demo cannot be seeded: half a demo would mislead. */
export async function seedDemo(): Promise<string[]> {
  const organizationId = await seedPeople();
  const author = await findAuthor(organizationId);
  const [types, hall] = demoModels;
  await seedModel(author, organizationId, types.file, types.name);
  await seedBraiderMapping(author, organizationId);
  await seedModel(author, organizationId, hall.file, hall.name);
  await seedHallSources(author, organizationId);
  await seedReaders(author, organizationId);
  return [`Demo organisation: ${demoOrganizationName} (everybody and everything in it is invented)`];
}

async function seedPeople(): Promise<string> {
  const known = await findOrganizationBySlug(DEMO_SLUG);
  const organizationId = known?.id ?? newId();
  const now = new Date();
  const statements: Statement[] = known ? [] : [addOrganizationStatement(organizationId, demoOrganizationName, DEMO_SLUG, now)];
  for (const { name, email, roles } of demoAccounts) {
    const user = await findUserByEmail(email);
    if (!user) {
      const passwordHash = await hashPassword(demoPassword);
      statements.push(...addPersonStatements(organizationId, { name, email, passwordHash, roles }, now).statements);
    } else if (!(await listMemberships(user.id)).some((m) => m.organizationId === organizationId)) {
      statements.push(addMemberStatement(organizationId, user.id, roles, now));
    }
  }
  const [first, ...rest] = statements;
  if (first) await writeBatch([first, ...rest]);
  return organizationId;
}

async function findAuthor(organizationId: string): Promise<Caller> {
  const engineer = demoAccounts.find((account) => account.roles.includes("engineer"));
  const user = engineer ? await findUserByEmail(engineer.email) : undefined;
  if (!user) throw new Error(`The demo organisation ${organizationId} has no engineer`);
  return { userId: user.id, name: user.name, email: user.email, memberships: await listMemberships(user.id) };
}

/** Imports one file unless its namespace is there. */
async function seedModel(author: Caller, organizationId: string, file: string, name: string): Promise<void> {
  const path = join(findProjectRoot(), "nodesets", "demo", file);
  if (!existsSync(path)) throw new Error(`The demo's model ${path} is missing.`);
  const upload = await readUpload(readFileSync(path), file);
  if (!upload.ok) throw new Error(`The demo's model ${file} cannot be read. ${explain(upload.problems)}`);
  if (await findModelByNamespace(organizationId, upload.value.namespaceUri)) return;
  const imported = await importModel(author, organizationId, upload.value, { name });
  if (!imported.ok) throw new Error(`The demo's model ${file} cannot be imported. ${explain(imported.problems)}`);
}

function explain(problems: readonly Problem[]): string {
  return problems.filter((p) => p.severity === "error").map(formatProblem).join(" ");
}
