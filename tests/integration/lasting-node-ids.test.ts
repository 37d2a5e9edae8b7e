/** NodeIds that last, through the server: the choice of a model, blocks by class, exchanges, and what outlives a model. */
import { afterAll, beforeAll, expect, test } from "vitest";
import type { Operation } from "~/domain/editing/operation";
import { pumpUri, writePumpNodeSet } from "../support/pump-nodeset";
import { startTestApp, type TestApp } from "../support/test-app";
import { setUpFirst } from "../support/test-people";

let app: TestApp;
let cookie: string;
let modelId: string;
let clientSeq = 0;

beforeAll(async () => {
  app = await startTestApp();
  ({ cookie } = await setUpFirst(app));
  modelId = await importPump();
});

afterAll(() => app.stop());

async function importPump(): Promise<string> {
  const headers = { "content-type": "application/xml" };
  const answer = await app.call("POST", "/api/v1/models?name=Pump", { cookie, body: writePumpNodeSet(), headers });
  expect(answer.status).toBe(201);
  return ((await answer.json()) as { id: string }).id;
}

async function setPolicy(fields: Readonly<Record<string, string>>): Promise<number> {
  const body = new URLSearchParams({ intent: "set-id-policy", ...fields }).toString();
  const headers = { "content-type": "application/x-www-form-urlencoded" };
  const answer = await app.ask("routes/models.$modelId.about.tsx", "POST", `/models/${modelId}/about`, { cookie, body, headers });
  return answer?.status ?? 0;
}

type Lease = { block?: { from: number; to: number }; given?: string[] };

async function lease(json: Readonly<Record<string, unknown>>): Promise<Lease> {
  return (await (await app.call("POST", `/models/${modelId}/lease`, { cookie, json: { clientId: "w", ...json } })).json()) as Lease;
}

async function send(operations: readonly Operation[], label = "edit"): Promise<{ status: number; codes: string[] }> {
  const { loadWorkingModel } = await import("~/services/working-model.server");
  const base = (await loadWorkingModel(modelId))?.seq ?? 0;
  const transactions = [{ clientSeq: ++clientSeq, label, operations }];
  const answer = await app.call("POST", `/models/${modelId}/transactions`, { cookie, json: { clientId: "ids", base, transactions } });
  const { problems = [] } = (await answer.json()) as { problems?: { code: string }[] };
  return { status: answer.status, codes: problems.map((found) => found.code) };
}

const keyOf = (id: string) => `nsu=${pumpUri};${id}` as never;
const nodeId = (identifier: number) => ({ namespaceUri: pumpUri, type: "i" as const, identifier });

test("leases from the range of a class, around what is taken, until the range is used up", async () => {
  expect(await setPolicy({ kind: "ranges", "from.Variable": "1002", "to.Variable": "1008" })).toBe(200);
  // 1002 and 1003 are nodes of the file.
  expect((await lease({ nodeClass: "Variable", count: 2 })).block).toEqual({ from: 1004, to: 1005 });
  const general = (await lease({ count: 10 })).block;
  expect(general?.from).toBe(1006);
  // The block for all others reaches over the rest of the range.
  expect((await lease({ nodeClass: "Variable" })).block).toBeUndefined();
  expect(await setPolicy({ kind: "ranges", "from.Variable": "1002", "to.Variable": "6999" })).toBe(200);
  expect((await lease({ nodeClass: "Variable", count: 3 })).block).toEqual({ from: 1016, to: 1018 });
  expect((await lease({ count: 1 })).block).toEqual({ from: 1019, to: 1019 });
});

test("refuses a choice that cannot work", async () => {
  expect(await setPolicy({ kind: "ranges", "from.Object": "20", "to.Object": "10" })).toBe(409);
  expect(await setPolicy({ kind: "paths", pattern: "Hall2", separator: "." })).toBe(409);
});

test("exchanges NodeIds, takes accepted findings along, lists old and new, and undoes", async () => {
  const { listAllFindings } = await import("~/services/check-model.server");
  const waivedAt = async () => (await (await app.call("GET", `/models/${modelId}/waivers`, { cookie })).json()) as { nodeId: string }[];
  const finding = (await listAllFindings(modelId))?.findings.find((one) => one.nodeId === keyOf("i=1002"));
  if (!finding) throw new Error("Nothing found at the Variable");
  const place = { rule: finding.rule, nodeId: finding.nodeId, ...(finding.attribute === undefined ? {} : { attribute: finding.attribute }) };
  expect((await app.call("POST", `/models/${modelId}/waivers`, { cookie, json: { ...place, reason: "Accepted" } })).status).toBe(201);
  const isOpen = async (id: string) => {
    const report = (await (await app.call("GET", `/api/v1/models/${modelId}/findings`, { cookie })).json()) as { findings: { rule: string; nodeId: string }[] };
    return report.findings.some((one) => one.rule === finding.rule && one.nodeId === keyOf(id));
  };
  expect(await isOpen("i=1002")).toBe(false);
  const exchange: Operation = {
    kind: "renumber",
    changes: [
      { key: keyOf("i=1002"), nodeId: nodeId(1003) },
      { key: keyOf("i=1003"), nodeId: nodeId(1002) },
    ],
  };
  expect(await send([exchange], "renumber")).toEqual({ status: 200, codes: [] });
  expect((await waivedAt()).map((waiver) => waiver.nodeId)).toEqual([keyOf("i=1003")]);
  expect(await isOpen("i=1003")).toBe(false);
  const file = await (await app.call("GET", `/api/v1/models/${modelId}/nodeset?order=canonical`, { cookie })).text();
  expect(file).toContain('NodeId="ns=1;i=1003" BrowseName="1:Speed"');
  expect(file).toContain('NodeId="ns=1;i=1002" BrowseName="1:Maker"');
  const { listRenumberings } = await import("~/presenters/renumberings.server");
  expect((await listRenumberings(modelId))[0]).toMatchObject({
    author: "Ada Quill",
    changes: [
      { from: keyOf("i=1002"), to: keyOf("i=1003") },
      { from: keyOf("i=1003"), to: keyOf("i=1002") },
    ],
  });
  const back: Operation = { ...exchange, changes: exchange.changes.map(({ key }) => ({ key, nodeId: nodeId(Number(String(key).split("i=")[1])) })) };
  expect(await send([back], "undo")).toEqual({ status: 200, codes: [] });
  expect((await waivedAt()).map((waiver) => waiver.nodeId)).toEqual([keyOf("i=1002")]);
});

test("gives no NodeId of any kind to another node, also after the model was deleted", async () => {
  const { loadWorkingModel } = await import("~/services/working-model.server");
  const maker = (await loadWorkingModel(modelId))?.space.getNode(keyOf("i=1003"));
  if (!maker) throw new Error("The Property is gone");
  const ids = ["s=B1.Maker", "g=09087e75-8e5e-499b-954f-f2a9603db28a", "b=M/RbKBsRVkePCePcx24oRA=="].map((text) => {
    const [type = "", identifier = ""] = [text[0], text.slice(2)];
    return { namespaceUri: pumpUri, type: type as "s" | "g" | "b", identifier };
  });
  const make = (one: (typeof ids)[number], name: string) => ({
    ...maker,
    key: keyOf(`${one.type}=${one.identifier}`),
    nodeId: one,
    order: 100,
    browseName: { ...maker.browseName, name },
  });
  for (const one of ids) {
    expect(await send([{ kind: "addNode", node: make(one, one.type) }])).toEqual({ status: 200, codes: [] });
    expect(await send([{ kind: "removeNode", key: make(one, "").key }])).toEqual({ status: 200, codes: [] });
    expect(await send([{ kind: "addNode", node: make(one, "Other") }])).toEqual({ status: 422, codes: ["operation.node-id-taken"] });
    expect(await send([{ kind: "addNode", node: make(one, one.type) }])).toEqual({ status: 200, codes: [] });
  }
  expect((await app.call("DELETE", `/api/v1/models/${modelId}`, { cookie })).status).toBe(204);
  modelId = await importPump();
  for (const one of ids) {
    expect(await send([{ kind: "addNode", node: make(one, "Other") }])).toEqual({ status: 422, codes: ["operation.node-id-taken"] });
  }
  expect(await setPolicy({ kind: "paths", pattern: "{path}", separator: "." })).toBe(200);
  expect((await lease({})).given).toEqual([keyOf("s=B1.Maker")]);
});

test("rolls machines out as the model chooses, and never onto a path that was given up", async () => {
  const { loadWorkingModel } = await import("~/services/working-model.server");
  const { rollOut } = await import("~/services/roll-out-machines.server");
  const { findModel } = await import("~/db/repositories/models.server");
  const model = await findModel(modelId);
  if (!model) throw new Error("The model is gone");
  const author = { userId: "test", name: "Test", email: "t@harbour.example", memberships: [] };
  const roll = (name: string) =>
    rollOut(author, model, {
      type: keyOf("i=1001"),
      parent: "i=85" as never,
      optional: ["Maker"],
      manufacturer: "",
      rows: [{ name, serialNumber: "", location: "" }],
      nodeIds: { kind: "numbers" },
    });
  expect((await roll("B1")).ok).toBe(true);
  const texts = (await loadWorkingModel(modelId))?.space.listOwnNodes().flatMap((node) => (node.nodeId.type === "s" ? [node.nodeId.identifier] : []));
  expect(texts).toEqual(["B1", "B1.Speed", "B1.Maker_2"]);
});
