import { afterAll, beforeAll, expect, test } from "vitest";
import { pumpUri, writePumpNodeSet } from "../support/pump-nodeset";
import { startTestApp, type TestApp } from "../support/test-app";
import { addTestPerson, setUpFirst } from "../support/test-people";

let app: TestApp;
let cookie: string;
let organizationId: string;
let modelId: string;

beforeAll(async () => {
  app = await startTestApp();
  ({ cookie, organizationId } = await setUpFirst(app));
  const answer = await app.call("POST", "/api/v1/models?name=Pump", { cookie, body: writePumpNodeSet(), headers: { "content-type": "application/xml" } });
  modelId = ((await answer.json()) as { id: string }).id;
});

afterAll(() => app.stop());

type Revision = { number: number; seq: number; hash: string; message: string; counts: { error: number }; pinned: { modelUri: string }[]; code: string };

async function freeze(message: string): Promise<{ status: number; revision: Revision }> {
  const answer = await app.call("POST", `/api/v1/models/${modelId}/revisions`, { cookie, json: { message } });
  return { status: answer.status, revision: (await answer.json()) as Revision };
}

async function rename(text: string, base: number): Promise<void> {
  const operations = [{ kind: "setAttribute", key: `nsu=${pumpUri};i=1002`, attribute: "displayName", value: [{ text }] }];
  const json = { clientId: "w", base, transactions: [{ clientSeq: base + 1, label: "rename", operations }] };
  expect((await app.call("POST", `/models/${modelId}/transactions`, { cookie, json })).status).toBe(200);
}

const fileOf = async (number: number) => (await app.call("GET", `/api/v1/models/${modelId}/revisions/${number}/nodeset`, { cookie })).text();

test("freezes what is there, and later edits do not touch it", async () => {
  const first = await freeze("As imported");
  expect(first.status).toBe(201);
  expect(first.revision).toMatchObject({ number: 1, seq: 0, message: "As imported" });
  expect(first.revision.pinned.map((p) => p.modelUri)).toEqual(["http://opcfoundation.org/UA/"]);
  const before = await fileOf(1);
  await rename("Drehzahl", 0);
  expect(await fileOf(1)).toBe(before);
  const second = await freeze("Renamed");
  expect(second.revision).toMatchObject({ number: 2, seq: 1 });
  expect(second.revision.hash).not.toBe(first.revision.hash);
  expect(await fileOf(2)).toContain("Drehzahl");
});

test("the same contents have the same hash, and freezing without a change is refused", async () => {
  const unchanged = await freeze("Again");
  expect(unchanged.status).toBe(409);
  expect(unchanged.revision.code).toBe("revision.unchanged");
  await rename("Speed", 1);
  const back = await freeze("Back");
  const list = (await (await app.call("GET", `/api/v1/models/${modelId}/revisions`, { cookie })).json()) as Revision[];
  expect(list.map((r) => r.number)).toEqual([3, 2, 1, 0]);
  expect(back.revision.hash).toBe(list.find((r) => r.number === 1)?.hash);
});

test("compares two states by meaning, and names a state that is not there", async () => {
  const compare = (query: string) => app.call("GET", `/api/v1/models/${modelId}/comparison?${query}`, { cookie });
  const renamed = (await (await compare("from=1&to=2")).json()) as { changes: { kind: string; nodeId: string; before: string; after: string }[]; rating: string };
  expect(renamed.changes).toHaveLength(1);
  expect(renamed.changes[0]).toMatchObject({ kind: "text-changed", nodeId: `nsu=${pumpUri};i=1002` });
  expect(renamed.rating).toBe("neutral");
  const same = (await (await compare("from=1&to=working")).json()) as { changes: unknown[]; rating: null };
  expect(same).toMatchObject({ changes: [], rating: null });
  expect((await compare("from=1&to=77")).status).toBe(404);
  expect((await compare("from=first&to=2")).status).toBe(400);
  expect((await compare("from=0&to=1")).status).toBe(200);
});

test("asks for a message and for the role", async () => {
  expect((await freeze("  ")).status).toBe(422);
  const developer = await addTestPerson(app, organizationId, "Dev", ["developer"]);
  const answer = await app.call("POST", `/api/v1/models/${modelId}/revisions`, { cookie: developer, json: { message: "x" } });
  expect(answer.status).toBe(403);
  expect((await app.call("GET", `/api/v1/models/${modelId}/revisions/99/nodeset`, { cookie })).status).toBe(404);
});

test("the audit tells who did what, as a file for administrators only", async () => {
  const answer = await app.call("GET", "/team/audit.csv", { cookie });
  expect(answer.headers.get("content-type")).toContain("text/csv");
  const lines = (await answer.text()).split("\r\n");
  expect(lines[0]).toBe("id,at,who,action,subjectKind,subject,details");
  const actions = lines.slice(1, -1).map((line) => line.split(",")[3]);
  expect(actions).toContain('"revision.freeze"');
  expect(actions).toContain('"model.import"');
  expect(actions.at(-1)).toBe('"organization.set-up"');
  const developer = await app.signIn("dev@harbour.example", "a-long-enough-password");
  expect((await app.call("GET", "/team/audit.csv", { cookie: developer })).status).toBe(403);
});

test("cleaning up takes the bytes of what was deleted, and nothing that a revision names", async () => {
  const { removeUnusedBlobs } = await import("~/db/repositories/blobs.server");
  const uri = "http://merrow.example/UA/Gone/";
  const made = await app.call("POST", "/api/v1/models?name=Gone", { cookie, body: writePumpNodeSet({ uri }), headers: { "content-type": "application/xml" } });
  const { id } = (await made.json()) as { id: string };
  expect(await removeUnusedBlobs()).toBe(0);
  expect((await app.call("DELETE", `/api/v1/models/${id}`, { cookie })).status).toBe(204);
  // The pack and the file of revision 0.
  expect(await removeUnusedBlobs()).toBe(2);
  expect(await fileOf(1)).toContain("PumpType");
});
