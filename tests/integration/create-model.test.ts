import { afterAll, beforeAll, expect, test } from "vitest";
import type { Caller } from "~/auth/caller.server";
import { startTestApp, type TestApp } from "../support/test-app";
import { setUpFirst } from "../support/test-people";

let app: TestApp;
let cookie: string;
let organizationId: string;
let caller: Caller;

beforeAll(async () => {
  app = await startTestApp();
  ({ cookie, organizationId } = await setUpFirst(app));
  const { findCaller } = await import("~/auth/caller.server");
  const found = await findCaller(new Request("http://localhost:3000/", { headers: { cookie } }));
  if (!found) throw new Error("Nobody is signed in");
  caller = found;
});

afterAll(() => app.stop());

const intent = {
  kind: "types" as const,
  name: "Winch",
  namespaceUri: "http://merrow.example/UA/Winch/",
  version: "1.0.0",
  requiredModels: ["http://opcfoundation.org/UA/DI/"],
};

test("a new model stands on its required models, has its namespace's metadata, and no findings of severity error", async () => {
  const { createModel } = await import("~/services/create-model.server");
  const { reportModel } = await import("~/services/check-model.server");
  const made = await createModel(caller, organizationId, intent);
  if (!made.ok) throw new Error(JSON.stringify(made.problems));
  const xml = await (await app.call("GET", `/models/${made.value.id}/nodeset`, { cookie })).text();
  // OPC 10000-5 §6.3.13: seven mandatory Properties below an Object of NamespaceMetadataType (i=11616).
  expect(xml).toContain("i=11616");
  for (const name of ["NamespaceUri", "NamespaceVersion", "NamespacePublicationDate", "IsNamespaceSubset", "StaticNodeIdTypes"]) {
    expect(xml).toContain(`BrowseName="${name}"`);
  }
  expect(xml).toMatch(/<RequiredModel ModelUri="http:\/\/opcfoundation.org\/UA\/DI\/" [^>]*Version="1\.\d+/);
  const report = await reportModel(made.value.id);
  expect(report?.report.findings.filter((f) => f.severity === "error")).toEqual([]);
});

test("the same namespace is not made twice, a published one not at all, and ids are not given again after deletion", async () => {
  const { createModel } = await import("~/services/create-model.server");
  const { deleteModel } = await import("~/services/update-model.server");
  const { findModelByNamespace } = await import("~/db/repositories/models.server");
  const again = await createModel(caller, organizationId, { ...intent, name: "Other" });
  expect(again.problems[0]).toMatchObject({ code: "model.namespace-taken", data: { name: "Winch" } });
  const published = await createModel(caller, organizationId, { ...intent, namespaceUri: "http://opcfoundation.org/UA/DI/" });
  expect(published.problems[0]?.code).toBe("model.namespace-published");
  const broken = await createModel(caller, organizationId, { ...intent, namespaceUri: "not a uri" });
  expect(broken.problems[0]?.code).toBe("model.uri");

  const listIds = async (id: string): Promise<number[]> => {
    const xml = await (await app.call("GET", `/models/${id}/nodeset`, { cookie })).text();
    return [...xml.matchAll(/ NodeId="ns=1;i=(\d+)"/g)].map((match) => Number(match[1]));
  };
  const first = await findModelByNamespace(organizationId, intent.namespaceUri);
  if (!first) throw new Error("The model is gone");
  const before = await listIds(first.id);
  expect((await deleteModel(caller, first)).ok).toBe(true);
  const second = await createModel(caller, organizationId, intent);
  if (!second.ok) throw new Error(JSON.stringify(second.problems));
  expect(Math.min(...(await listIds(second.value.id)))).toBeGreaterThan(Math.max(...before));
});

test("a model that others require is not deleted, and what it gains reaches them", async () => {
  const { createModel } = await import("~/services/create-model.server");
  const { findModelByNamespace } = await import("~/db/repositories/models.server");
  const types = await findModelByNamespace(organizationId, intent.namespaceUri);
  // Machines hold a frozen revision (tests/integration/pins.test.ts); types stand on what the others are now.
  const hall = await createModel(caller, organizationId, {
    kind: "types",
    name: "Winch extras",
    namespaceUri: "http://merrow.example/UA/WinchExtras/",
    version: "1.0.0",
    requiredModels: [intent.namespaceUri],
  });
  if (!hall.ok || !types) throw new Error("No models");
  expect((await app.call("DELETE", `/api/v1/models/${types.id}`, { cookie })).status).toBe(409);

  const { loadWorkingModel } = await import("~/services/working-model.server");
  const metadata = (await loadWorkingModel(types.id))?.space.listOwnNodes()[0];
  const json = {
    clientId: "w",
    base: 0,
    transactions: [
      { clientSeq: 1, label: "describe", operations: [{ kind: "setAttribute", key: metadata?.key, attribute: "description", value: [{ text: "Winches" }] }] },
    ],
  };
  expect((await app.call("POST", `/models/${types.id}/transactions`, { cookie, json })).status).toBe(200);
  const seen = (await loadWorkingModel(hall.value.id))?.space.getNode(metadata?.key ?? ("" as never));
  expect(seen?.description).toEqual([{ text: "Winches" }]);
  const layers = (await (await app.call("GET", `/models/${hall.value.id}/layers`, { cookie })).json()) as { layers: { packUrl: string }[] };
  expect(layers.layers.at(-1)?.packUrl).toBe(`/models/${types.id}/pack?seq=1`);
});
