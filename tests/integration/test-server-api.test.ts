/** Test servers through the API and the event stream, with roles and organisations; the winch of the fixtures is served. */
import { readFileSync } from "node:fs";
import { afterAll, beforeAll, describe, expect, it, vi } from "vitest";
import { Supervisor } from "~/opcua/supervisor.server";
import type { TestServerAnswer } from "~/services/describe-test-server.server";
import { onShutdown } from "~/utils/shutdown.server";
import { singleton } from "~/utils/singleton.server";
import { startTestApp, type TestApp } from "../support/test-app";
import { addOtherOrganization, addTestPerson, setUpFirst } from "../support/test-people";
import { buildTestServer, type TestServerBundle } from "../support/test-server-bundle";
import { waitFor, winchFile, WINCH_URI } from "../support/winch-server";

// Each test starts real processes; a busy machine takes its time over them.
vi.setConfig({ testTimeout: 180_000, hookTimeout: 180_000 });

let bundle: TestServerBundle;
let app: TestApp;
let cookie: string;
let organizationId: string;
let modelId: string;
let supervisor: Supervisor;

beforeAll(async () => {
  bundle = await buildTestServer("test-server-api");
  supervisor = singleton("test-server-supervisor", () => new Supervisor({ entry: bundle.entry, restartDelays: [] }));
  onShutdown("test servers", () => supervisor.stopAll());
  app = await startTestApp();
  ({ cookie, organizationId } = await setUpFirst(app));
  const made = await app.call("POST", "/api/v1/models?name=Winch", { cookie, body: readFileSync(winchFile), headers: { "content-type": "application/xml" } });
  expect(made.status).toBe(201);
  modelId = ((await made.json()) as { id: string }).id;
});

afterAll(async () => {
  await app.stop();
  bundle.remove();
});

const start = (json: unknown, who = cookie) => app.call("POST", `/api/v1/models/${modelId}/test-servers`, { cookie: who, json });
const get = async (id: string) => (await (await app.call("GET", `/api/v1/test-servers/${id}`, { cookie })).json()) as TestServerAnswer;
const until = (id: string, state: string) =>
  waitFor(async () => {
    const answer = await get(id);
    return answer.state === state ? answer : undefined;
  }, 60_000);

describe("test servers over the API", () => {
  it("start at once, run with an endpoint, and are gone after DELETE", async () => {
    const answer = await start({});
    expect(answer.status).toBe(201);
    const started = (await answer.json()) as TestServerAnswer;
    expect(started).toMatchObject({ state: "starting", endpointUrl: null, security: ["basic256sha256"], simulatedQuality: "uncertain" });
    expect(answer.headers.get("location")).toBe(`/api/v1/test-servers/${started.id}`);
    const running = await until(started.id, "running");
    expect(running.endpointUrl).toMatch(/^opc\.tcp:\/\/127\.0\.0\.1:\d+$/);
    expect(running.problems).toEqual([]);
    const listed = (await (await app.call("GET", `/api/v1/models/${modelId}/test-servers`, { cookie })).json()) as TestServerAnswer[];
    expect(listed.map(({ id }) => id)).toEqual([started.id]);
    const ended = await app.call("DELETE", `/api/v1/test-servers/${started.id}`, { cookie });
    expect(ended.status).toBe(204);
    expect((await app.call("GET", `/api/v1/test-servers/${started.id}`, { cookie })).status).toBe(404);
  });

  it("take security None and status Good when asked, and nothing else", async () => {
    const started = (await (await start({ security: ["none"], simulatedQuality: "good" })).json()) as TestServerAnswer;
    expect(started).toMatchObject({ security: ["none"], simulatedQuality: "good" });
    await app.call("DELETE", `/api/v1/test-servers/${started.id}`, { cookie });
    for (const wrong of [{ security: ["basic128"] }, { security: [] }, { simulatedQuality: "bad" }, { port: 4840 }]) {
      const refused = await start(wrong);
      expect(refused.status, JSON.stringify(wrong)).toBe(422);
      expect(refused.headers.get("content-type")).toBe("application/problem+json");
    }
  });

  it("take a start without a body", async () => {
    const answer = await app.call("POST", `/api/v1/models/${modelId}/test-servers`, { cookie });
    expect(answer.status).toBe(201);
    await app.call("DELETE", `/api/v1/test-servers/${((await answer.json()) as TestServerAnswer).id}`, { cookie });
  });

  it("are everybody's within the organisation and nobody's outside", async () => {
    const reviewer = await addTestPerson(app, organizationId, "Rita", ["reviewer"]);
    const started = (await (await start({}, reviewer)).json()) as TestServerAnswer;
    const other = await addOtherOrganization(app);
    for (const [method, path] of [
      ["GET", `/api/v1/test-servers/${started.id}`],
      ["DELETE", `/api/v1/test-servers/${started.id}`],
      ["GET", `/api/v1/models/${modelId}/test-servers`],
      ["POST", `/api/v1/models/${modelId}/test-servers`],
      ["GET", `/live/${started.id}/children?node=i=85`],
      ["GET", `/live/${started.id}/node?node=i=85`],
      ["GET", `/live/${started.id}/path?node=i=85`],
    ] as const) {
      expect((await app.call(method, path, { cookie: other.cookie })).status, `${method} ${path}`).toBe(404);
    }
    await app.call("DELETE", `/api/v1/test-servers/${started.id}`, { cookie: reviewer });
  });

  it("are refused with a problem when as many run as the limit allows", async () => {
    const ids: string[] = [];
    for (let i = 0; i < 9; i++) {
      const answer = await start({});
      if (answer.status === 201) ids.push(((await answer.json()) as TestServerAnswer).id);
      else {
        expect(answer.status).toBe(503);
        expect(await answer.json()).toMatchObject({ code: "test-server.limit" });
      }
    }
    expect(ids).toHaveLength(8);
    await Promise.all(ids.map((id) => app.call("DELETE", `/api/v1/test-servers/${id}`, { cookie })));
    expect(supervisor.list()).toEqual([]);
  });
});

describe("Live over data routes and topics", () => {
  it("browses, reads and streams values until the server ends", async () => {
    const started = (await (await start({})).json()) as TestServerAnswer;
    await until(started.id, "running");
    const children = (await (await app.call("GET", `/live/${started.id}/children?node=i=85`, { cookie })).json()) as { children: { displayName: string; nodeId: string }[] };
    expect(children.children.map((c) => c.displayName)).toEqual(expect.arrayContaining(["W1", "Winch", "Simulation, not for control"]));
    const load = `nsu=${WINCH_URI};i=6100`;
    const card = await (await app.call("GET", `/live/${started.id}/node?${new URLSearchParams({ node: load })}`, { cookie })).json();
    expect(card).toMatchObject({ displayName: "Load", unit: { text: "°C" }, range: { low: -20, high: 120 } });
    expect((await app.call("GET", `/live/${started.id}/node?node=nonsense`, { cookie })).status).toBe(503);
    expect((await app.call("GET", `/live/${started.id}/node`, { cookie })).status).toBe(400);

    // Writing asks for a role that a reviewer has not, and every act stands in the audit, refused ones too.
    const act = (who: string, value: string) => app.call("POST", `/live/${started.id}/write`, { cookie: who, json: { node: `nsu=${WINCH_URI};s=Rope;Length=1`, value } });
    const rosa = await addTestPerson(app, organizationId, "Rosa", ["reviewer"]);
    expect((await act(rosa, "8")).status).toBe(403);
    expect(await (await act(cookie, "8")).json()).toMatchObject({ isDone: true, after: { value: 8 } });
    expect((await act(cookie, "eight")).status).toBe(422);
    const { listAudit } = await import("~/db/repositories/audit.server");
    const audit = await listAudit(organizationId, 10);
    expect(audit.filter((entry) => entry.action === "live.write").map((entry) => entry.details)).toMatchObject([
      { value: "eight", refused: "endpoint.input" },
      { value: "8", before: "12.5", after: "8", status: "Good" },
    ]);

    const stream = await openStream();
    await stream.listen([`value:${started.id}:${load}`, `test-server:${started.id}`, `connection:${started.id}`]);
    const values = await waitFor(() => {
      const samples = stream.messages.filter((m) => m.topic.startsWith("value:"));
      return samples.length >= 3 ? samples : undefined;
    }, 15_000);
    expect(values[0]?.data).toMatchObject({ status: { name: "Uncertain_SimulatedValue", severity: "uncertain" } });
    expect(new Set(values.map((m) => (m.data as { value: number }).value)).size).toBeGreaterThan(1);

    process.kill(supervisor.getPid(started.id) ?? 0, "SIGKILL");
    const failed = await waitFor(() => stream.messages.find((m) => (m.data as { state?: { state?: string } }).state?.state === "failed"));
    expect(failed.topic).toBe(`test-server:${started.id}`);
    // The application goes on: the failed server is told by the API and can be taken off the list.
    expect((await get(started.id)).problems[0]).toMatchObject({ code: "test-server.exited" });
    expect((await app.call("DELETE", `/api/v1/test-servers/${started.id}`, { cookie })).status).toBe(204);
    await stream.close();
  });
});

type Message = { topic: string; data: unknown };

/** A browser's event stream: what came, and how to ask for topics. */
async function openStream() {
  const stop = new AbortController();
  const answer = await app.call("GET", "/events", { cookie, signal: stop.signal });
  const reader = answer.body?.getReader();
  const messages: Message[] = [];
  let streamId = "";
  const read = async (): Promise<void> => {
    const decoder = new TextDecoder();
    let text = "";
    for (;;) {
      const { done, value } = (await reader?.read()) ?? { done: true, value: undefined };
      if (done) return;
      text += decoder.decode(value, { stream: true });
      const events = text.split("\n\n");
      text = events.pop() ?? "";
      for (const event of events) {
        const line = event.split("\n").find((l) => l.startsWith("data: "));
        if (!line) continue;
        const data = JSON.parse(line.slice(6)) as Message & { streamId?: string };
        if (data.streamId !== undefined) streamId = data.streamId;
        else messages.push(data);
      }
    }
  };
  void read().catch(() => undefined);
  await waitFor(() => (streamId === "" ? undefined : true));
  return {
    messages,
    listen: async (topics: string[]) => {
      const listening = await app.call("POST", "/events/topics", { cookie, json: { streamId, add: topics, remove: [] } });
      expect(await listening.json()).toEqual({ refused: [] });
    },
    close: async () => {
      stop.abort();
      await reader?.cancel().catch(() => undefined);
    },
  };
}
