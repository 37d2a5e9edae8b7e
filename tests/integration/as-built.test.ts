/** As-built reports through the API: a test server is what the model says, until the model says something else. */
import { createHash, createPublicKey, verify } from "node:crypto";
import { readFileSync } from "node:fs";
import { afterAll, beforeAll, describe, expect, it, vi } from "vitest";
import type { AsBuiltReport } from "~/domain/as-built/as-built-report";
import { Supervisor } from "~/opcua/supervisor.server";
import { onShutdown } from "~/utils/shutdown.server";
import { singleton } from "~/utils/singleton.server";
import { startTestApp, type TestApp } from "../support/test-app";
import { addOtherOrganization, addTestPerson, setUpFirst } from "../support/test-people";
import { buildTestServer, type TestServerBundle } from "../support/test-server-bundle";
import { waitFor, winchFile, WINCH_URI } from "../support/winch-server";

vi.setConfig({ testTimeout: 180_000, hookTimeout: 180_000 });

let bundle: TestServerBundle;
let app: TestApp;
let cookie: string;
let developer: string;
let stranger: string;
let modelId: string;
let serverId: string;

const ask = async <T>(path: string, who = cookie) => (await (await app.call("GET", path, { cookie: who })).json()) as T;

beforeAll(async () => {
  bundle = await buildTestServer("as-built");
  const supervisor = singleton("test-server-supervisor", () => new Supervisor({ entry: bundle.entry }));
  onShutdown("test servers", () => supervisor.stopAll());
  app = await startTestApp();
  const first = await setUpFirst(app);
  cookie = first.cookie;
  developer = await addTestPerson(app, first.organizationId, "Dev", ["developer"]);
  stranger = (await addOtherOrganization(app)).cookie;
  const made = await app.call("POST", "/api/v1/models?name=Winch", { cookie, body: readFileSync(winchFile), headers: { "content-type": "application/xml" } });
  modelId = ((await made.json()) as { id: string }).id;
  const started = await app.call("POST", `/api/v1/models/${modelId}/test-servers`, { cookie, json: {} });
  serverId = ((await started.json()) as { id: string }).id;
  await waitFor(async () => ((await ask<{ state: string }>(`/api/v1/test-servers/${serverId}`)).state === "running" ? true : undefined), 90_000);
});

afterAll(async () => {
  await app.stop();
  bundle.remove();
});

type Run = { id: string; state: string; reportId: string | null; verdict: string | null; problems: unknown[] };

async function report(change: Record<string, unknown> = {}): Promise<{ run: Run; body: AsBuiltReport; text: string; signature: string }> {
  const started = await app.call("POST", `/api/v1/models/${modelId}/as-built-reports`, { cookie, json: { targetId: serverId, state: 0, watchSeconds: 1, ...change } });
  expect(started.status).toBe(202);
  const { id } = (await started.json()) as Run;
  const run = await waitFor(async () => {
    const now = await ask<Run>(`/api/v1/as-built-runs/${id}`);
    return now.state === "running" ? undefined : now;
  }, 90_000);
  const answer = await app.call("GET", `/api/v1/as-built-reports/${run.reportId}`, { cookie });
  const text = await answer.text();
  return { run, body: JSON.parse(text) as AsBuiltReport, text, signature: answer.headers.get("x-ferrule-signature") ?? "" };
}

describe("as-built reports", () => {
  it("say that a test server serves what the revision holds, and sign it", async () => {
    const { run, body, text, signature } = await report();
    expect({ verdict: run.verdict, differences: body.differences }).toEqual({ verdict: "as released", differences: [] });
    expect(body.counts.watched).toBeGreaterThan(3);
    expect(body.model).toMatchObject({ namespaceUri: WINCH_URI, revision: 0 });
    const hash = createHash("sha256").update(text).digest("hex");
    const [listed] = await ask<{ sha256: string; verdict: string; number: number }[]>(`/api/v1/models/${modelId}/as-built-reports`);
    expect(listed).toMatchObject({ sha256: hash, number: 1 });
    const key = await findPublicKey(signature.split(".")[0] ?? "");
    expect(verify(null, Buffer.from(hash), createPublicKey(key), Buffer.from(signature.split(".")[1] ?? "", "base64"))).toBe(true);
  });

  it("name what the model says otherwise by now", async () => {
    const nodeSet = readFileSync(winchFile, "utf8").replaceAll(WINCH_URI, "http://merrow.example/UA/OtherWinch/");
    const other = await app.call("POST", "/api/v1/models?name=Other", { cookie, body: nodeSet, headers: { "content-type": "application/xml" } });
    const otherId = ((await other.json()) as { id: string }).id;
    const started = await app.call("POST", `/api/v1/models/${otherId}/as-built-reports`, { cookie, json: { targetId: serverId, state: "working", watchSeconds: 0 } });
    const { id } = (await started.json()) as Run;
    const run = await waitFor(async () => {
      const now = await ask<Run>(`/api/v1/as-built-runs/${id}`);
      return now.state === "running" ? undefined : now;
    }, 60_000);
    expect(run.verdict).toBe("differs");
    const body = await ask<AsBuiltReport>(`/api/v1/as-built-reports/${run.reportId}`);
    expect(body.differences.map((d) => d.aspect)).toEqual(expect.arrayContaining(["namespace", "missing"]));
  });

  it("are made by those who may, and seen by nobody else", async () => {
    const json = { targetId: serverId, state: 0, watchSeconds: 0 };
    expect((await app.call("POST", `/api/v1/models/${modelId}/as-built-reports`, { cookie: developer, json })).status).toBe(403);
    expect((await app.call("POST", `/api/v1/models/${modelId}/as-built-reports`, { cookie, json: { ...json, state: 99 } })).status).toBe(422);
    expect((await app.call("POST", `/api/v1/models/${modelId}/as-built-reports`, { cookie, json: { ...json, targetId: "nowhere" } })).status).toBe(404);
    const [first] = await ask<{ id: string }[]>(`/api/v1/models/${modelId}/as-built-reports`);
    expect((await app.call("GET", `/api/v1/as-built-reports/${first?.id}`, { cookie: stranger })).status).toBe(404);
  });

  it("quote point checks, which compare the shown value with the reading beside the machine", async () => {
    const record = (fields: Record<string, string>) =>
      app.call("POST", `/models/${modelId}/as-built`, { cookie, body: new URLSearchParams({ intent: "point-check", ...fields }).toString(), headers: { "content-type": "application/x-www-form-urlencoded" } });
    const fields = { nodeId: `nsu=${WINCH_URI};i=6100`, stimulus: "ice water at the sensor", localReading: "0.2", shownValue: "0.6", tolerance: "0.5", unit: "°C" };
    expect((await record(fields)).status).toBe(200);
    expect((await record({ ...fields, shownValue: "1.2" })).status).toBe(200);
    expect((await record({ ...fields, nodeId: `nsu=${WINCH_URI};i=5001` })).status).toBe(422);
    const { body } = await report({ watchSeconds: 0 });
    expect(body.pointChecks.map((check) => [check.path, check.isWithin])).toEqual([
      ["W1/Load", false],
      ["W1/Load", true],
    ]);
  });
});

describe("an endpoint of a gateway", () => {
  it("proves what was delivered to it, and nothing else does", async () => {
    const { author, model, endpointId } = await prepareEndpoint();
    const { writeBatch } = await import("~/db/client.server");
    const { findRevisionByNumber } = await import("~/db/repositories/models.server");
    const { addDeliveryStatement, addReleaseStatement, findDelivery } = await import("~/db/repositories/releases.server");
    const packHash = (await findRevisionByNumber(model.id, 0))?.packHash ?? "";
    const at = new Date();
    const texts = { version: "1.0.0", modelVersion: "1.0.0", publicationDate: "2026-01-01T00:00:00Z", fileName: "winch.zip", keyId: "none", notes: "", releasedBy: "Ada" };
    await writeBatch([
      addReleaseStatement({ ...texts, id: "release-1", organizationId: model.organizationId, modelId: model.id, revision: 0, packHash, bundleHash: packHash, bundleSize: 1, files: [], required: [], at }),
      addDeliveryStatement({ id: "delivery-1", releaseId: "release-1", gatewayId: "gw-1", gatewayName: "GW-North", bundleHash: packHash, state: "loaded", sentBy: "Ada", sentAt: at, note: "" }),
    ]);
    const json = { targetId: serverId, state: 0, watchSeconds: 0, deliveryId: "delivery-1" };
    expect((await app.call("POST", `/api/v1/models/${modelId}/as-built-reports`, { cookie, json })).status).toBe(422);
    // The newest check of the signal was outside: the report stands, the delivery does not.
    const { body } = await report({ ...json, targetId: endpointId });
    expect(body).toMatchObject({ verdict: "as released", delivery: { version: "1.0.0", gateway: "GW-North" } });
    expect((await findDelivery("delivery-1"))?.state).toBe("loaded");
    const { recordPointCheck } = await import("~/services/record-point-check.server");
    await recordPointCheck(author, model, { nodeId: `nsu=${WINCH_URI};i=6100`, stimulus: "again", localReading: 1, shownValue: 1, tolerance: 0.5, unit: "", note: "" });
    await report({ ...json, targetId: endpointId });
    expect(await findDelivery("delivery-1")).toMatchObject({ state: "proved", provedBy: author.name });
  });

  it("is compared on a schedule, with a mail when the verdict changes", async () => {
    const { author, model, endpointId } = await prepareEndpoint();
    const { writeBatch } = await import("~/db/client.server");
    const { listSchedules, updateScheduleStatement } = await import("~/db/repositories/as-built-schedules.server");
    const { listMail } = await import("~/db/repositories/outbox.server");
    const { runDueSchedules, saveSchedule } = await import("~/services/schedule-as-built.server");
    expect((await saveSchedule(author, model, { endpointId: serverId, everyMinutes: 60 })).problems.map((p) => p.code)).toEqual(["as-built.endpoint"]);
    await saveSchedule(author, model, { endpointId, everyMinutes: 60 });
    const now = new Date(Date.now() + 1_000);
    await runDueSchedules(now);
    const [first] = await listSchedules(model.id);
    expect(first).toMatchObject({ lastVerdict: "as released", nextAt: new Date(now.getTime() + 3_600_000) });
    expect(await listMail(model.organizationId, 10)).toEqual([]);
    await runDueSchedules(now);
    await writeBatch([updateScheduleStatement(first?.id ?? "", { lastVerdict: "differs" })]);
    await runDueSchedules(new Date(now.getTime() + 3_600_000));
    expect(await listMail(model.organizationId, 10)).toMatchObject([{ kind: "as-built", subject: "Winch gateway: as released" }]);
  });
});

/** The test server once more, as an endpoint that the team named. */
async function prepareEndpoint() {
  const { writeBatch } = await import("~/db/client.server");
  const { addAllowanceStatement, findEndpoint, saveEndpointStatement } = await import("~/db/repositories/endpoints.server");
  const { findModel } = await import("~/db/repositories/models.server");
  const { listPeople } = await import("~/db/repositories/people.server");
  const model = await findModel(modelId);
  if (!model) throw new Error("The model is gone");
  const { organizationId } = model;
  const [person] = (await listPeople(organizationId)).filter((one) => one.roles.includes("administrator"));
  const author = { userId: person?.id ?? "", name: person?.name ?? "", email: "", memberships: [] };
  if (!(await findEndpoint("endpoint-1"))) {
    const supervisor = singleton<Supervisor>("test-server-supervisor", () => new Supervisor({ entry: bundle.entry }));
    const now = new Date();
    const certificate = supervisor.getCertificate(serverId)?.toString("base64") ?? null;
    const url = supervisor.get(serverId)?.endpointUrl ?? "";
    const security = { securityMode: "sign-and-encrypt", securityPolicy: "Basic256Sha256", tokenKind: "anonymous", serverCertificate: certificate };
    await writeBatch([
      addAllowanceStatement({ id: "place-1", organizationId, host: "127.0.0.1", portFrom: 1, portTo: 65_535, note: "", addedBy: "Ada", addedAt: now }),
      saveEndpointStatement({ ...security, id: "endpoint-1", organizationId, name: "Winch gateway", url, note: "", updatedBy: "Ada", updatedAt: now }),
    ]);
  }
  return { author, model, endpointId: "endpoint-1" };
}

async function findPublicKey(id: string): Promise<string> {
  const { findSigningKeyById } = await import("~/db/repositories/releases.server");
  return (await findSigningKeyById(id))?.publicKey ?? "";
}
