import { afterAll, beforeAll, expect, test } from "vitest";
import type { Operation } from "~/domain/editing/operation";
import { pumpUri, writePumpNodeSet } from "../support/pump-nodeset";
import { startTestApp, type TestApp } from "../support/test-app";
import { addOtherOrganization, addTestPerson, setUpFirst } from "../support/test-people";

let app: TestApp;
let cookie: string;
let organizationId: string;
let modelId: string;

beforeAll(async () => {
  app = await startTestApp();
  ({ cookie, organizationId } = await setUpFirst(app));
  const answer = await app.call("POST", "/api/v1/models", { cookie, body: writePumpNodeSet(), headers: { "content-type": "application/xml" } });
  modelId = ((await answer.json()) as { id: string }).id;
});

afterAll(() => app.stop());

type Message = { topic: string; seq?: number; data: { seq?: number; text?: number; people?: { name: string }[] } };
type Tab = { streamId: string; next(): Promise<Message>; listen(...topics: string[]): Promise<string[]>; close(): void; ended: Promise<void> };

async function openTab(as: string, after?: number): Promise<Tab> {
  const abort = new AbortController();
  const headers: Record<string, string> = after === undefined ? {} : { "last-event-id": String(after) };
  const answer = await app.call("GET", "/events", { cookie: as, headers, signal: abort.signal });
  expect(answer.headers.get("content-type")).toContain("text/event-stream");
  expect(answer.headers.get("cache-control")).toBe("no-cache, no-transform");
  const reader = (answer.body as ReadableStream<Uint8Array>).getReader();
  const decoder = new TextDecoder();
  let buffer = "";
  let end: () => void = () => undefined;
  const ended = new Promise<void>((resolve) => (end = resolve));
  const nextBlock = async (): Promise<string> => {
    for (;;) {
      const at = buffer.indexOf("\n\n");
      if (at >= 0) {
        const block = buffer.slice(0, at);
        buffer = buffer.slice(at + 2);
        if (block.includes("data: ")) return block;
        continue;
      }
      const { done, value } = await reader.read();
      if (done) {
        end();
        throw new Error("The stream ended");
      }
      buffer += decoder.decode(value, { stream: true });
    }
  };
  const readData = async (): Promise<unknown> => JSON.parse(/^data: (.*)$/m.exec(await nextBlock())?.[1] ?? "null");
  const { streamId } = (await readData()) as { streamId: string };
  return {
    streamId,
    ended,
    next: async () => (await readData()) as Message,
    listen: async (...topics) => {
      const change = await app.call("POST", "/events/topics", { cookie: as, json: { streamId, add: topics } });
      return ((await change.json()) as { refused: string[] }).refused;
    },
    close: () => abort.abort(),
  };
}

let clientSeq = 0;

async function edit(): Promise<number> {
  const operation: Operation = {
    kind: "setAttribute",
    key: `nsu=${pumpUri};i=1002` as never,
    attribute: "displayName",
    value: [{ text: `Speed ${++clientSeq}` }],
  };
  const { head } = (await (await app.call("GET", `/models/${modelId}/transactions`, { cookie })).json()) as { head: number };
  const json = { clientId: "writer", base: head, transactions: [{ clientSeq, label: "rename", operations: [operation] }] };
  const answer = await app.call("POST", `/models/${modelId}/transactions`, { cookie, json });
  expect(answer.status).toBe(200);
  return head + 1;
}

test("a second window sees an edit at once, with its place in both sequences", async () => {
  const tab = await openTab(cookie);
  expect(await tab.listen(`model:${modelId}`)).toEqual([]);
  const seq = await edit();
  const message = await tab.next();
  expect(message.topic).toBe(`model:${modelId}`);
  expect(message.data.seq).toBe(seq);
  expect(message.seq).toBeGreaterThan(0);
  tab.close();
});

test("a tab that was away gets what it missed, once it names what it saw", async () => {
  const tab = await openTab(cookie);
  await tab.listen(`model:${modelId}`);
  await edit();
  const seen = (await tab.next()).seq;
  tab.close();
  const missed = [await edit(), await edit()];
  const back = await openTab(cookie, seen);
  await back.listen(`model:${modelId}`);
  expect([(await back.next()).data.seq, (await back.next()).data.seq]).toEqual(missed);
  back.close();
});

test("topics of another organisation and unknown ones are refused alike", async () => {
  const other = await addOtherOrganization(app);
  const tab = await openTab(other.cookie);
  const asked = [`model:${modelId}`, "model:nosuchmodel", `presence:${modelId}`, `models:${organizationId}`, "secrets:all", "nocolon"];
  expect(await tab.listen(...asked)).toEqual(asked);
  const foreign = await openTab(cookie);
  const stolen = await app.call("POST", "/events/topics", { cookie: other.cookie, json: { streamId: foreign.streamId, add: [] } });
  expect(stolen.status).toBe(404);
  tab.close();
  foreign.close();
});

test("a source is opened for the first listener and disposed of after the last", async () => {
  const { countOpenStreams, registerTopicProvider } = await import("~/services/event-hub.server");
  const log: string[] = [];
  registerTopicProvider("clock", {
    authorise: () => true,
    keepsNewestOnly: true,
    open: (topic, emit) => {
      log.push(`open ${topic}`);
      emit({ text: 1 });
      return () => void log.push(`close ${topic}`);
    },
  });
  const [first, second] = [await openTab(cookie), await openTab(cookie)];
  await first.listen("clock:a");
  expect((await first.next()).data.text).toBe(1);
  await second.listen("clock:a");
  expect((await second.next()).data.text).toBe(1);
  first.close();
  await app.call("POST", "/events/topics", { cookie, json: { streamId: second.streamId, remove: ["clock:a"] } });
  await new Promise((resolve) => setTimeout(resolve, 20));
  expect(log).toEqual(["open clock:a", "close clock:a"]);
  second.close();
  // A tab that closes is noticed in a turn of its own; those of earlier tests, too.
  await expect.poll(() => countOpenStreams().topics, { timeout: 5_000 }).toBe(0);
});

test("a slow tab gets the newest value only, and a tab that never reads is let go", async () => {
  const { publish, registerTopicProvider } = await import("~/services/event-hub.server");
  registerTopicProvider("value-of", { authorise: () => true, keepsNewestOnly: true });
  registerTopicProvider("list-of", { authorise: () => true });
  const slow = await openTab(cookie);
  await slow.listen("value-of:x");
  const filler = "x".repeat(8000);
  for (let text = 1; text <= 500; text++) publish("value-of:x", { text, filler });
  let last = 0;
  let count = 0;
  while (last < 500) {
    last = (await slow.next()).data.text ?? 0;
    count++;
  }
  expect(count).toBeLessThan(50);
  slow.close();

  const stuck = await openTab(cookie);
  await stuck.listen("list-of:x");
  for (let text = 1; text <= 3000; text++) publish("list-of:x", { text, filler });
  await expect(
    (async () => {
      for (;;) await stuck.next();
    })(),
  ).rejects.toThrow("The stream ended");
});

test("presence tells who is there, and forgets who left", async () => {
  const bela = await addTestPerson(app, organizationId, "Bela", ["reviewer"]);
  const watcher = await openTab(cookie);
  await watcher.listen(`presence:${modelId}`);
  const tab = await openTab(bela);
  await tab.listen(`presence:${modelId}`);
  await app.call("POST", `/models/${modelId}/presence`, { cookie: bela, json: { clientId: "b1", place: "sheet", selection: [] } });
  let people: { name: string }[] = [];
  while (people.length === 0) people = (await watcher.next()).data.people ?? [];
  expect(people[0]?.name).toBe("Bela");
  tab.close();
  while (people.length > 0) people = (await watcher.next()).data.people ?? [];
  watcher.close();
});

test("who loses a role loses the open stream with it", async () => {
  const cookieOfMira = await addTestPerson(app, organizationId, "Mira", ["engineer"]);
  const tab = await openTab(cookieOfMira);
  const { setRoles } = await import("~/services/manage-people.server");
  const { listPeople } = await import("~/db/repositories/people.server");
  const mira = (await listPeople(organizationId)).find((p) => p.name === "Mira");
  const author = { userId: "x", name: "X", email: "x@harbour.example", memberships: [] };
  expect((await setRoles(author, organizationId, mira?.id ?? "", ["developer"])).ok).toBe(true);
  await expect(tab.next()).rejects.toThrow("The stream ended");
});

test("what another process stored reaches the tabs of this one, once", async () => {
  const tab = await openTab(cookie);
  await tab.listen(`model:${modelId}`);
  const seq = await storeAsAnotherProcess();
  const message = await tab.next();
  expect([message.topic, message.data.seq]).toEqual([`model:${modelId}`, seq]);
  // The next thing that the tab hears is the next edit, not the same one again.
  const next = await edit();
  expect((await tab.next()).data.seq).toBe(next);
  tab.close();
});

test("signing out ends the open stream", async () => {
  const own = await addTestPerson(app, organizationId, "Sanne", ["engineer"]);
  const tab = await openTab(own);
  await app.call("POST", "/sign-out", { cookie: own });
  await expect(tab.next()).rejects.toThrow("The stream ended");
  await expect(app.call("GET", "/events", { cookie: own }).then((answer) => answer.status)).resolves.toBe(401);
});

/** Rows as a second process on the same database writes them; nothing here is told of it. */
async function storeAsAnotherProcess(): Promise<number> {
  const rows = await import("~/db/repositories/models.server");
  const { writeBatch } = await import("~/db/client.server");
  const model = await rows.findModel(modelId);
  if (!model) throw new Error("The model is gone");
  const seq = model.headSeq + 1;
  const operation: Operation = { kind: "setAttribute", key: `nsu=${pumpUri};i=1002` as never, attribute: "displayName", value: [{ text: "Written elsewhere" }] };
  const entry = { seq, base: model.headSeq, clientId: "elsewhere", clientSeq: seq, author: "Elsewhere", at: new Date().toISOString(), label: "set-displayName", operations: [operation], inverse: [] };
  await writeBatch([
    rows.updateModelStatement(modelId, { headSeq: seq }),
    rows.addTransactionStatement(modelId, model.createdBy, entry),
    rows.addEventStatement(`model:${modelId}`, seq, new Date()),
  ]);
  return seq;
}
