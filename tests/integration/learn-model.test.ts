/** A model learnt from a live server says what the server serves: proved by comparing the server with it. */
import { readFileSync } from "node:fs";
import { afterAll, beforeAll, describe, expect, it, vi } from "vitest";
import type { Caller } from "~/auth/caller.server";
import type { Result } from "~/domain/core/result";
import { getValue } from "~/domain/core/result";
import type { LiveTarget } from "~/domain/live/live-target";
import { toLiveTarget } from "~/domain/live/live-target";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { Supervisor } from "~/opcua/supervisor.server";
import { onShutdown } from "~/utils/shutdown.server";
import { singleton } from "~/utils/singleton.server";
import { startTestApp, type TestApp } from "../support/test-app";
import { addTestPerson, setUpFirst } from "../support/test-people";
import { buildTestServer, type TestServerBundle } from "../support/test-server-bundle";
import { makeSeed, removeTestFolders, startWinch, winchFile, WINCH_URI } from "../support/winch-server";

vi.setConfig({ testTimeout: 120_000, hookTimeout: 180_000 });

let bundle: TestServerBundle;
let app: TestApp;
let caller: Caller;
let cookie: string;
let developer: string;
let target: LiveTarget;

beforeAll(async () => {
  bundle = await buildTestServer("learn-model");
  const supervisor = singleton("test-server-supervisor", () => new Supervisor({ entry: bundle.entry }));
  onShutdown("test servers", () => supervisor.stopAll());
  app = await startTestApp();
  const first = await setUpFirst(app);
  cookie = first.cookie;
  developer = await addTestPerson(app, first.organizationId, "Dev", ["developer"]);
  const { listMemberships, listPeople } = await import("~/db/repositories/people.server");
  const person = (await listPeople(first.organizationId)).find((one) => one.roles.includes("administrator"));
  caller = { userId: person?.id ?? "", name: "Ada", email: "", memberships: await listMemberships(person?.id ?? "") };
  target = toLiveTarget(await startWinch(supervisor, { ...makeSeed("learn"), organizationId: first.organizationId }));
});

afterAll(async () => {
  await app.stop();
  bundle.remove();
  removeTestFolders();
});

describe("learning from a server", () => {
  it("offers the namespaces with what is known of them", async () => {
    const { listServedNamespaces } = await import("~/services/learn-model.server");
    const namespaces = getValue(await listServedNamespaces(target.organizationId, target));
    expect(namespaces.find((one) => one.uri === WINCH_URI)).toMatchObject({ knownAs: null });
  });

  it("shows a preview first and stores nothing", async () => {
    const preview = await showPreview();
    const file = getValue(readNodeSet(readFileSync(winchFile, "utf8")));
    expect(preview.counts.nodes).toBe(file.nodes.length);
    expect(preview.againstModel).toEqual([]);
    expect(await (await app.call("GET", "/api/v1/models", { cookie })).json()).toEqual([]);
  });

  it("makes a model that the server is then found to be", async () => {
    const { takePendingUpload } = await import("~/services/preview-import.server");
    const { importModel } = await import("~/services/import-model.server");
    const { makeAsBuilt, asBuiltIntentSchema } = await import("~/services/make-as-built.server");
    const { requireAsBuiltReport } = await import("~/services/read-as-built.server");
    const preview = await showPreview();
    const upload = getValue(await takePendingUpload(caller, target.organizationId, preview.uploadId));
    const model = getValue(await importModel(caller, target.organizationId, upload, {}));
    const file = getValue(readNodeSet(readFileSync(winchFile, "utf8")));
    const toNames = (nodes: readonly { nodeId: unknown; browseName: unknown; nodeClass: string }[]) => nodes.map((n) => JSON.stringify([n.nodeId, n.browseName, n.nodeClass])).sort();
    expect(toNames(upload.content.nodes)).toEqual(toNames(file.nodes));
    const run = getValue(await makeAsBuilt(caller, model, target, asBuiltIntentSchema.parse({ targetId: target.id, state: 0, watchSeconds: 0 })));
    const { body } = await requireAsBuiltReport(caller, run.reportId ?? "");
    expect({ verdict: run.verdict, differences: body.differences }).toEqual({ verdict: "as released", differences: [] });
  });

  it("refuses what is not there, and a namespace that is a model already", async () => {
    const { previewLearning } = await import("~/services/learn-model.server");
    const codesOf = (result: Result<unknown>) => result.problems.map((found) => found.code);
    expect(codesOf(await previewLearning(caller, target, "http://merrow.example/none/", AbortSignal.timeout(60_000)))).toEqual(["learn.empty"]);
    expect((await showPreview()).againstModel).toMatchObject([{ code: "model.namespace-taken" }]);
  });

  it("is for those who may edit models", async () => {
    expect((await app.call("GET", `/live/${target.id}/learn`, { cookie: developer })).status).toBe(403);
    expect((await app.call("GET", `/live/${target.id}/learn`, { cookie })).status).toBe(200);
  });
});

async function showPreview() {
  const { previewLearning } = await import("~/services/learn-model.server");
  return getValue(await previewLearning(caller, target, WINCH_URI, AbortSignal.timeout(60_000)));
}
