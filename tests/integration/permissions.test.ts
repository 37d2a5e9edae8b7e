import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { actions, can, roles, type Action, type Role } from "~/auth/permissions";
import { writePumpNodeSet } from "../support/pump-nodeset";
import { startTestApp, type TestApp } from "../support/test-app";
import { addOtherOrganization, addTestPerson, setUpFirst } from "../support/test-people";

let app: TestApp;
let administrator: string;
let stranger: string;
let modelId: string;
const people = new Map<Role, string>();

beforeAll(async () => {
  app = await startTestApp();
  const first = await setUpFirst(app);
  administrator = first.cookie;
  stranger = (await addOtherOrganization(app)).cookie;
  for (const role of roles.slice(1)) people.set(role, await addTestPerson(app, first.organizationId, `P${role}`, [role]));
  people.set("administrator", administrator);
  const body = writePumpNodeSet();
  const answer = await app.call("POST", "/api/v1/models", { cookie: administrator, body, headers: { "content-type": "application/xml" } });
  modelId = ((await answer.json()) as { id: string }).id;
});

afterAll(() => app.stop());

/** Routes that somebody who is not signed in may use, and why. */
const open: Readonly<Record<string, string>> = {
  "routes/sign-in.tsx": "the door",
  "routes/set-up.tsx": "the door of an empty installation, guarded by the code",
  "routes/mail.unsubscribe.tsx": "the way out of mails, guarded by a mark that only the installation makes",
  "routes/theme.tsx": "a choice of colours in a cookie",
  "routes/api/auth.ts": "the door for programs",
  "routes/api/openapi.ts": "describes, tells nothing",
  "routes/api/not-found.ts": "nothing there",
  "routes/not-found.tsx": "nothing there",
};

/** Redirects only, to a page that asks itself. */
const onlyRedirects = new Set(["routes/sign-out.tsx", "routes/organization.tsx"]);

function fill(path: string, id: string): string {
  return path.replace(":modelId", id).replace(":testServerId", "nosuchserver00000000").replace(/:\w+/g, "0".repeat(64)).replace("*", "nothing");
}

test("the table of roles and actions is that of the design", () => {
  // Source: the plan of the house, "Who may do what"; each string lists the roles that may, by their first letters.
  const expected: Record<Action, string> = {
    read: "aeird",
    "model.edit": "ae",
    "mapping.edit": "aei",
    "revision.freeze": "aei",
    comment: "aeird",
    "review.decide": "aeir",
    release: "aer",
    "test-server.run": "aeird",
    "test-server.write": "aeid",
    "endpoint.write": "ai",
    "as-built.record": "aeir",
    "organization.administer": "a",
  };
  const found = actions.map((action) => [action, roles.filter((role) => can([role], action)).map((role) => role[0]).join("")]);
  expect(Object.fromEntries(found)).toEqual(expected);
  expect(can(["reviewer", "integrator"], "mapping.edit")).toBe(true);
  expect(can([], "read")).toBe(false);
});

describe("every route of the table", () => {
  test("answers 401 or leads to the sign-in page when nobody is signed in", async () => {
    const wrong: string[] = [];
    for (const { path, file } of app.routes) {
      if (file in open) continue;
      for (const method of ["GET", "POST", "PUT", "DELETE"]) {
        const answer = await app.ask(file, method, fill(path, modelId));
        if (!answer || (onlyRedirects.has(file) && method === "GET" && answer.status === 302)) continue;
        const isDoor = answer.status === 302 && (answer.headers.get("location") ?? "").startsWith("/sign-in");
        if (answer.status !== 401 && answer.status !== 405 && !isDoor) wrong.push(`${method} ${path} answered ${answer.status}`);
      }
    }
    expect(wrong).toEqual([]);
  });

  test("hides another organisation's model: 404 for every method", async () => {
    const wrong: string[] = [];
    for (const { path, file } of app.routes) {
      if (!path.includes(":modelId")) continue;
      for (const method of ["GET", "POST", "PUT", "DELETE"]) {
        const answer = await app.ask(file, method, fill(path, modelId), { cookie: stranger });
        if (answer && answer.status !== 404 && answer.status !== 405) wrong.push(`${method} ${path} answered ${answer.status}`);
      }
    }
    expect(wrong).toEqual([]);
  });

  test("refuses changes that come from a foreign origin, although the cookie is good", async () => {
    const wrong: string[] = [];
    for (const { path, file } of app.routes) {
      if (file in open) continue;
      const answer = await app.ask(file, "POST", fill(path, modelId), { cookie: administrator, origin: "http://evil.example" });
      if (answer && answer.status !== 403 && answer.status !== 405) wrong.push(`POST ${path} answered ${answer.status}`);
    }
    expect(wrong).toEqual([]);
  });
});

describe("roles decide", () => {
  test.each([...roles])("%s edits models only when the table says so", async (role) => {
    const cookie = people.get(role) ?? "";
    const lease = await app.call("POST", `/models/${modelId}/lease`, { cookie, json: { clientId: role } });
    expect(lease.status).toBe(can([role], "model.edit") ? 200 : 403);
    const upload = await app.call("POST", "/api/v1/models", { cookie, body: "<x/>", headers: { "content-type": "application/xml" } });
    expect(upload.status).toBe(can([role], "model.edit") ? 422 : 403);
    expect((await app.call("GET", `/api/v1/models/${modelId}/findings`, { cookie })).status).toBe(200);
  });
});
