import { readFileSync, existsSync } from "node:fs";
import { join } from "node:path";
import { afterAll, beforeAll, expect, test } from "vitest";
import { startTestApp, type TestApp } from "../support/test-app";
import { addOtherOrganization, addTestPerson, setUpFirst, testPassword } from "../support/test-people";

let app: TestApp;
let cookie: string;
let organizationId: string;

beforeAll(async () => {
  app = await startTestApp();
});

afterAll(() => app.stop());

const request = new Request("http://localhost:3000/set-up", { method: "POST" });
const intent = { organizationName: "Harbour works", name: "Ada Quill", email: "ada@harbour.example", password: testPassword };

test("an empty installation prints a code and takes nobody without it", async () => {
  const { needsSetUp, setUpOrganization } = await import("~/services/set-up-organization.server");
  const code = readFileSync(join(app.dataFolder, "set-up-code"), "utf8");
  expect(app.lines.join("\n")).toContain(code);
  expect(await needsSetUp()).toBe(true);
  const wrong = await setUpOrganization(request, { ...intent, code: "AAAA-BBBB-CCCC" });
  expect(wrong.problems[0]?.code).toBe("set-up.wrong-code");
  expect(await needsSetUp()).toBe(true);
});

test("the code makes the first administrator once, and is gone afterwards", async () => {
  const { setUpOrganization } = await import("~/services/set-up-organization.server");
  ({ cookie, organizationId } = await setUpFirst(app));
  expect(existsSync(join(app.dataFolder, "set-up-code"))).toBe(false);
  const again = await setUpOrganization(request, { ...intent, code: "x" });
  expect(again.problems[0]?.code).toBe("set-up.done");
});

test("cookies are http-only and same-site", async () => {
  const answer = await app.call("POST", "/api/auth/sign-in/email", { json: { email: intent.email, password: testPassword } });
  const [session] = answer.headers.getSetCookie();
  expect(session).toMatch(/HttpOnly/i);
  expect(session).toMatch(/SameSite=Lax/i);
  expect(JSON.stringify(await answer.json())).not.toContain("token");
});

test("sign-up and everything else that better-auth would offer is closed", async () => {
  const closed = [
    ["POST", "sign-up/email"],
    ["POST", "organization/create"],
    ["POST", "organization/update-member-role"],
    ["POST", "organization/invite-member"],
    ["POST", "update-user"],
    ["POST", "change-password"],
    ["POST", "delete-user"],
    ["GET", "organization/list"],
    ["GET", "list-sessions"],
  ] as const;
  for (const [method, path] of closed) {
    const answer = await app.call(method, `/api/auth/${path}`, { cookie, ...(method === "POST" ? { json: {} } : {}) });
    expect(`${path} ${answer.status}`).toBe(`${path} 404`);
  }
  const own = await app.call("GET", "/api/auth/get-session", { cookie });
  expect(((await own.json()) as { user: { email: string } }).user.email).toBe(intent.email);
});

test("a foreign origin cannot sign anybody in", async () => {
  const answer = await app.call("POST", "/api/auth/sign-in/email", {
    json: { email: intent.email, password: testPassword },
    origin: "http://evil.example",
  });
  expect(answer.status).toBe(403);
});

test("wrong password and unknown account get the same answer, and guessing is slowed down by account", async () => {
  await addTestPerson(app, organizationId, "Bela", ["engineer"]);
  const attempt = async (email: string, password: string) => {
    const answer = await app.call("POST", "/api/auth/sign-in/email", {
      json: { email, password },
      headers: { "x-ferrule-client-address": `10.0.0.${Math.floor(Math.random() * 250)}` },
    });
    return { status: answer.status, text: await answer.text(), retry: answer.headers.get("retry-after") };
  };
  const wrong = await attempt("bela@harbour.example", "not-the-password");
  const unknown = await attempt("nobody@harbour.example", "not-the-password");
  expect(wrong.status).toBe(401);
  expect(wrong).toEqual(unknown);
  const statuses: number[] = [];
  for (let i = 0; i < 10; i++) statuses.push((await attempt("BELA@harbour.example", `guess-${i}`)).status);
  expect(statuses.filter((s) => s === 401)).toHaveLength(7);
  const locked = await attempt("bela@harbour.example", testPassword);
  expect(locked.status).toBe(429);
  expect(Number(locked.retry)).toBeGreaterThan(0);
  expect((await attempt("ada@harbour.example", testPassword)).status).toBe(200);
});

test("a session ends with sign-out", async () => {
  const own = await app.signIn(intent.email, testPassword);
  expect((await app.call("GET", "/api/v1/models", { cookie: own })).status).toBe(200);
  await app.call("POST", "/api/auth/sign-out", { cookie: own });
  expect((await app.call("GET", "/api/v1/models", { cookie: own })).status).toBe(401);
});

test("an expired session is nobody", async () => {
  const own = await app.signIn(intent.email, testPassword);
  const { getDatabase } = await import("~/db/client.server");
  const { session } = await import("~/db/schema/auth");
  await getDatabase().update(session).set({ expiresAt: new Date(Date.now() - 1000) });
  expect((await app.call("GET", "/api/v1/models", { cookie: own })).status).toBe(401);
  cookie = await app.signIn(intent.email, testPassword);
});

test("tokens: shown once, kept as a hash, with scope, expiry and end", async () => {
  const { createToken, listVisibleTokens, revokeToken } = await import("~/services/manage-tokens.server");
  const { findCaller } = await import("~/auth/caller.server");
  const caller = await findCaller(new Request("http://localhost:3000/", { headers: { cookie } }));
  if (!caller) throw new Error("Nobody is signed in");
  const reading = await createToken(caller, organizationId, { name: "CI", scopes: ["read"], days: 30 });
  const stored = readFileSync(join(app.dataFolder, "ferrule.db"));
  expect(stored.includes(reading.secret)).toBe(false);
  expect((await app.call("GET", "/api/v1/models", { token: reading.secret })).status).toBe(200);
  const write = await app.call("POST", "/api/v1/models", { token: reading.secret, body: "<x/>", headers: { "content-type": "application/xml" } });
  expect(write.status).toBe(403);
  const writing = await createToken(caller, organizationId, { name: "CD", scopes: ["read", "write"], days: 1 });
  const accepted = await app.call("POST", "/api/v1/models", {
    token: writing.secret,
    origin: null,
    body: "<x/>",
    headers: { "content-type": "application/xml" },
  });
  expect(accepted.status).toBe(422);
  const [summary] = (await listVisibleTokens(caller, organizationId)).filter((t) => t.name === "CI");
  expect(summary?.lastUsedAt).not.toBeNull();
  expect((await revokeToken(caller, reading.id)).ok).toBe(true);
  expect((await app.call("GET", "/api/v1/models", { token: reading.secret })).status).toBe(401);

  const { getDatabase } = await import("~/db/client.server");
  const { apiToken } = await import("~/db/schema/auth");
  await getDatabase().update(apiToken).set({ expiresAt: new Date(Date.now() - 1000) });
  expect((await app.call("GET", "/api/v1/models", { token: writing.secret })).status).toBe(401);
  expect((await app.call("GET", "/api/v1/models", { token: "not-a-token-at-all-really" })).status).toBe(401);
});

test("the last administrator stays, and who is removed loses sessions at once", async () => {
  const { removePerson, setRoles } = await import("~/services/manage-people.server");
  const { listPeople } = await import("~/db/repositories/people.server");
  const author = { userId: "x", name: "X", email: "x@harbour.example", memberships: [] };
  const ada = (await listPeople(organizationId)).find((p) => p.name === "Ada Quill");
  const refused = await setRoles(author, organizationId, ada?.id ?? "", ["engineer"]);
  expect(refused.problems[0]?.code).toBe("people.last-administrator");
  const own = await addTestPerson(app, organizationId, "Cyra", ["integrator"]);
  const cyra = (await listPeople(organizationId)).find((p) => p.name === "Cyra");
  expect((await removePerson(author, organizationId, cyra?.id ?? "")).ok).toBe(true);
  expect((await app.call("GET", "/api/v1/models", { cookie: own })).status).toBe(401);
});

test("somebody in two organisations must name one, and cannot name a third", async () => {
  const other = await addOtherOrganization(app);
  const { addPerson } = await import("~/services/manage-people.server");
  const author = { userId: "x", name: "X", email: "x@harbour.example", memberships: [] };
  const twice = { name: "Ada Quill", email: intent.email, password: testPassword, roles: ["reviewer" as const] };
  expect((await addPerson(author, other.organizationId, twice)).ok).toBe(true);
  const both = await app.signIn(intent.email, testPassword);
  expect((await app.call("GET", "/api/v1/models", { cookie: both })).status).toBe(400);
  expect((await app.call("GET", `/api/v1/models?organization=${other.organizationId}`, { cookie: both })).status).toBe(200);
  expect((await app.call("GET", "/api/v1/models?organization=nothere", { cookie: both })).status).toBe(404);
});
