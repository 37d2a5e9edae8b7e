/** Organisations and people for tests, made by the services themselves. */
import { readFileSync } from "node:fs";
import { join } from "node:path";
import type { Role } from "~/auth/permissions";
import { getValue } from "~/domain/core/result";
import type { TestApp } from "./test-app";

export const testPassword = "a-long-enough-password";

/** The first administrator, made on the set-up path; answers the cookie and the organisation. */
export async function setUpFirst(app: TestApp): Promise<{ cookie: string; organizationId: string }> {
  const { setUpOrganization } = await import("~/services/set-up-organization.server");
  const request = new Request("http://localhost:3000/set-up", { method: "POST" });
  const code = readFileSync(join(app.dataFolder, "set-up-code"), "utf8");
  const intent = {
    code,
    organizationName: "Harbour works",
    name: "Ada Quill",
    email: "ada@harbour.example",
    password: testPassword,
  };
  const { organizationId } = getValue(await setUpOrganization(request, intent));
  return { organizationId, cookie: await app.signIn("ada@harbour.example", testPassword) };
}

/** A person with these roles; answers the cookie. */
export async function addTestPerson(
  app: TestApp,
  organizationId: string,
  name: string,
  roles: readonly Role[],
): Promise<string> {
  const { addPerson } = await import("~/services/manage-people.server");
  const email = `${name.toLowerCase()}@harbour.example`;
  const author = { userId: "test", name: "Test", email: "test@harbour.example", memberships: [] };
  getValue(await addPerson(author, organizationId, { name, email, password: testPassword, roles: [...roles] }));
  return app.signIn(email, testPassword);
}

/** A second organisation with one administrator. */
export async function addOtherOrganization(app: TestApp): Promise<{ cookie: string; organizationId: string }> {
  const { addOrganizationStatement } = await import("~/db/repositories/people.server");
  const { writeBatch } = await import("~/db/client.server");
  const organizationId = "otherorganization000";
  await writeBatch([addOrganizationStatement(organizationId, "Other works", "other", new Date())]);
  return { organizationId, cookie: await addTestPerson(app, organizationId, "Otto", ["administrator"]) };
}
