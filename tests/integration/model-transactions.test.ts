import { afterAll, beforeAll, expect, test } from "vitest";
import type { Operation } from "~/domain/editing/operation";
import { gunzipSync } from "node:zlib";
import { pumpUri, writePumpNodeSet } from "../support/pump-nodeset";
import { startTestApp, type TestApp } from "../support/test-app";
import { addOtherOrganization, setUpFirst } from "../support/test-people";

let app: TestApp;
let cookie: string;
let organizationId: string;
let modelId: string;

beforeAll(async () => {
  app = await startTestApp();
  ({ cookie, organizationId } = await setUpFirst(app));
  const answer = await app.call("POST", "/api/v1/models?name=Pump", {
    cookie,
    body: writePumpNodeSet(),
    headers: { "content-type": "application/xml" },
  });
  expect(answer.status).toBe(201);
  modelId = ((await answer.json()) as { id: string }).id;
});

afterAll(() => app.stop());

const speed = `nsu=${pumpUri};i=1002`;

function rename(text: string): Operation {
  return { kind: "setAttribute", key: speed as never, attribute: "displayName", value: [{ text }] };
}

async function post(body: unknown, as = cookie): Promise<{ status: number; json: Record<string, never> & Answer }> {
  const answer = await app.call("POST", `/models/${modelId}/transactions`, { cookie: as, json: body });
  return { status: answer.status, json: (await answer.json()) as never };
}

type Answer = {
  head: number;
  accepted: { clientSeq: number; seq: number; at: string }[];
  between: { seq: number; label: string; operations: unknown[]; inverse: unknown[] }[];
  problems: { code: string }[];
};

test("accepts a transaction, answers a resend as the first time, and keeps it over a restart of the cache", async () => {
  const body = { clientId: "w1", base: 0, transactions: [{ clientSeq: 1, label: "rename", operations: [rename("Drehzahl")] }] };
  const first = await post(body);
  expect(first.status).toBe(200);
  expect(first.json.head).toBe(1);
  expect(first.json.accepted[0]).toMatchObject({ clientSeq: 1, seq: 1 });
  const again = await post(body);
  expect(again.status).toBe(200);
  expect(again.json.accepted).toEqual(first.json.accepted);

  const { forgetWorkingModel } = await import("~/services/working-model.server");
  forgetWorkingModel(modelId);
  const pack = await app.call("GET", `/models/${modelId}/pack`, { cookie, headers: { "accept-encoding": "gzip" } });
  expect(pack.headers.get("x-ferrule-seq")).toBe("1");
  const text = gunzipSync(new Uint8Array(await pack.arrayBuffer())).toString("utf8");
  expect(text).toContain("Drehzahl");
});

test("answers 409 with what came between when another window was quicker", async () => {
  const stale = await post({ clientId: "w2", base: 0, transactions: [{ clientSeq: 1, label: "rename", operations: [rename("Vitesse")] }] });
  expect(stale.status).toBe(409);
  expect(stale.json.head).toBe(1);
  expect(stale.json.between).toHaveLength(1);
  expect(stale.json.between[0]).toMatchObject({ seq: 1, label: "rename" });
  expect(stale.json.between[0]?.inverse[0]).toMatchObject({ kind: "setAttribute", attribute: "displayName" });
  const rebased = await post({ clientId: "w2", base: 1, transactions: [{ clientSeq: 1, label: "rename", operations: [rename("Vitesse")] }] });
  expect(rebased.status).toBe(200);
  expect(rebased.json.head).toBe(2);
});

test("of two windows that send at the same time exactly one is accepted", async () => {
  const send = (clientId: string) =>
    post({ clientId, base: 2, transactions: [{ clientSeq: 7, label: "rename", operations: [rename(clientId)] }] });
  const answers = await Promise.all([send("w3"), send("w4"), send("w5")]);
  expect(answers.map((a) => a.status).sort()).toEqual([200, 409, 409]);
});

test("refuses the whole when one operation does not apply, and stores nothing of it", async () => {
  const before = await app.call("GET", `/models/${modelId}/transactions?since=0`, { cookie });
  const { head } = (await before.json()) as Answer;
  const removal: Operation = { kind: "removeNode", key: `nsu=${pumpUri};i=9999` as never };
  const refused = await post({
    clientId: "w1",
    base: head,
    transactions: [{ clientSeq: 20, label: "mixed", operations: [rename("Never"), removal] }],
  });
  expect(refused.status).toBe(422);
  expect(refused.json.problems[0]?.code).toBe("operation.node-missing");
  const after = (await (await app.call("GET", `/models/${modelId}/transactions?since=0`, { cookie })).json()) as Answer;
  expect(after.head).toBe(head);
});

test("refuses a body that is no operation, with the field named", async () => {
  const bad = await post({ clientId: "w1", base: 0, transactions: [{ clientSeq: 1, label: "x", operations: [{ kind: "explode" }] }] });
  expect(bad.status).toBe(422);
  expect(bad.json.problems[0]?.code).toBe("request.field");
});

test("leases blocks that never overlap, also after the model was deleted and imported again", async () => {
  const lease = async (id: string, clientId: string) =>
    ((await (await app.call("POST", `/models/${id}/lease`, { cookie, json: { clientId } })).json()) as { block: { from: number; to: number } }).block;
  const blocks = await Promise.all(["a", "b", "c"].map((client) => lease(modelId, client)));
  const sorted = [...blocks].sort((a, b) => a.from - b.from);
  expect(sorted[0]?.from).toBeGreaterThan(1003);
  for (let i = 1; i < sorted.length; i++) expect(sorted[i]?.from).toBeGreaterThan(sorted[i - 1]?.to ?? 0);
  const highest = sorted.at(-1)?.to ?? 0;

  const { findModel } = await import("~/db/repositories/models.server");
  const { deleteModel } = await import("~/services/update-model.server");
  const model = await findModel(modelId);
  if (!model) throw new Error("The model is gone");
  const author = { userId: "test", name: "Test", email: "t@harbour.example", memberships: [] };
  expect((await deleteModel(author, model)).ok).toBe(true);
  const again = await app.call("POST", "/api/v1/models?name=Pump", { cookie, body: writePumpNodeSet(), headers: { "content-type": "application/xml" } });
  modelId = ((await again.json()) as { id: string }).id;
  expect((await lease(modelId, "d")).from).toBeGreaterThan(highest);
});

test("a NodeId that was given up goes back to its own node only", async () => {
  const { loadWorkingModel } = await import("~/services/working-model.server");
  const working = await loadWorkingModel(modelId);
  const maker = working?.space.getNode(`nsu=${pumpUri};i=1003` as never);
  if (!working || !maker) throw new Error("The Property is gone");
  const send = (clientSeq: number, base: number, operations: Operation[]) =>
    post({ clientId: "ids", base, transactions: [{ clientSeq, label: "edit", operations }] });
  const base = working.seq;
  expect((await send(1, base, [{ kind: "removeNode", key: maker.key }])).status).toBe(200);
  const other = { ...maker, browseName: { ...maker.browseName, name: "Colour" } };
  const refused = await send(2, base + 1, [{ kind: "addNode", node: other }]);
  expect(refused.status).toBe(422);
  expect(refused.json.problems[0]?.code).toBe("operation.node-id-taken");
  expect((await send(3, base + 1, [{ kind: "addNode", node: maker }])).status).toBe(200);
  const renumbered = { ...maker.nodeId, identifier: 40_000 };
  expect((await send(4, base + 2, [{ kind: "setAttribute", key: maker.key, attribute: "nodeId", value: renumbered }])).status).toBe(200);
  const key = `nsu=${pumpUri};i=40001` as never;
  const thief = { ...other, key, nodeId: maker.nodeId };
  expect((await send(5, base + 3, [{ kind: "addNode", node: thief }])).status).toBe(422);
  expect((await send(6, base + 3, [{ kind: "setAttribute", key: maker.key, attribute: "nodeId", value: maker.nodeId }])).status).toBe(200);
});

test("an edit that another process has stored is seen, and wins over one that comes too late", async () => {
  const { addTransactionStatement, listTransactions, updateModelStatement } = await import("~/db/repositories/models.server");
  const { loadWorkingModel } = await import("~/services/working-model.server");
  const { writeBatch } = await import("~/db/client.server");
  const seq = (await loadWorkingModel(modelId))?.seq ?? 0;
  const [last] = await listTransactions(modelId, seq - 1, 1);
  if (!last) throw new Error("No transaction");
  const foreign = { ...last, seq: seq + 1, base: seq, clientId: "other process", clientSeq: 1, operations: [rename("From elsewhere")], inverse: [] };
  await writeBatch([addTransactionStatement(modelId, "someone", foreign), updateModelStatement(modelId, { headSeq: seq + 1 })]);
  const late = await post({ clientId: "late", base: seq, transactions: [{ clientSeq: 1, label: "rename", operations: [rename("Late")] }] });
  expect(late.status).toBe(409);
  expect(late.json.between.map((t) => t.seq)).toEqual([seq + 1]);
  expect((await post({ clientId: "late", base: seq + 1, transactions: [{ clientSeq: 1, label: "rename", operations: [rename("Late")] }] })).status).toBe(200);
});

test("hundreds of edits are snapshotted, and a fresh load replays to the same state", async () => {
  const { head } = (await (await app.call("GET", `/models/${modelId}/transactions?since=0`, { cookie })).json()) as Answer;
  let base = head;
  for (let batch = 0; batch < 9; batch++) {
    const transactions = Array.from({ length: 50 }, (_, i) => {
      const clientSeq = batch * 50 + i;
      return { clientSeq, label: "rename", operations: [rename(`Speed ${clientSeq}`)] };
    });
    const answer = await post({ clientId: "burst", base, transactions });
    expect(answer.status).toBe(200);
    base = answer.json.head;
  }
  expect(base).toBe(head + 450);
  const { loadWorkingModel, forgetWorkingModel } = await import("~/services/working-model.server");
  const { findStoredState } = await import("~/db/repositories/models.server");
  await expect.poll(async () => (await findStoredState(modelId, base))?.seq).toBeGreaterThanOrEqual(400);
  const before = (await loadWorkingModel(modelId))?.space.listOwnNodes();
  forgetWorkingModel(modelId);
  const after = await loadWorkingModel(modelId);
  expect(after?.seq).toBe(head + 450);
  expect(after?.space.listOwnNodes()).toEqual(before);
  const older = await app.call("GET", `/models/${modelId}/pack?seq=${head + 7}`, { cookie });
  expect(await older.text()).toContain("Speed 6");
});

test("a sheet keeps its layout with unknown parts, and an old version is refused", async () => {
  const [sheet] = (await (await app.call("GET", `/models/${modelId}/sheets`, { cookie })).json()) as { id: string }[];
  const path = `/models/${modelId}/sheets/${sheet?.id}`;
  const layout = { positions: { [speed]: { x: 12, y: 40 } }, captions: [{ text: "Drive" }] };
  const saved = await app.call("PUT", path, { cookie, json: layout, headers: { "if-match": '"1"' } });
  expect(saved.status).toBe(200);
  expect(await (await app.call("GET", path, { cookie })).json()).toEqual(layout);
  expect((await app.call("PUT", path, { cookie, json: layout, headers: { "if-match": '"1"' } })).status).toBe(409);
});

test("another organisation cannot tell the model from one that does not exist", async () => {
  const other = await addOtherOrganization(app);
  for (const path of ["pack", "transactions", "layers", "sheets", "nodeset"]) {
    const foreign = await app.call("GET", `/models/${modelId}/${path}`, { cookie: other.cookie });
    const absent = await app.call("GET", `/models/nosuchmodel0000000000/${path}`, { cookie: other.cookie });
    expect(foreign.status).toBe(404);
    expect(await foreign.text()).toBe(await absent.text());
  }
  expect(organizationId).not.toBe(other.organizationId);
});
