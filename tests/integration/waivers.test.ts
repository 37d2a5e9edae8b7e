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
  const answer = await app.call("POST", "/api/v1/models", { cookie, body: writePumpNodeSet(), headers: { "content-type": "application/xml" } });
  modelId = ((await answer.json()) as { id: string }).id;
});

afterAll(() => app.stop());

type Report = { counts: Record<string, number>; findings: { rule: string; nodeId: string }[] };
const speed = `nsu=${pumpUri};i=1002`;

const report = async () => (await (await app.call("GET", `/api/v1/models/${modelId}/findings`, { cookie })).json()) as Report;
/** The report of the API tells rule and node; the attribute is known to the checker. */
async function placeOf(rule: string | undefined): Promise<{ rule: string; nodeId: string; attribute?: string }> {
  const { checkModel } = await import("~/services/check-model.server");
  const finding = (await checkModel(modelId))?.findings.find((f) => f.rule === rule && f.nodeId === speed);
  if (!finding) throw new Error(`No finding ${rule}`);
  const { attribute } = finding;
  return { rule: finding.rule, nodeId: speed, ...(attribute === undefined ? {} : { attribute }) };
}

const rulesAtSpeed = async () => (await report()).findings.filter((f) => f.nodeId === speed).map((f) => f.rule);
const accept = (json: unknown, as = cookie) => app.call("POST", `/models/${modelId}/waivers`, { cookie: as, json });

test("an accepted finding leaves the report until it is taken back", async () => {
  const before = await rulesAtSpeed();
  const rule = before[0] ?? "";
  expect(rule).toMatch(/^R\d{3}$/);
  const saved = await accept({ ...(await placeOf(rule)), reason: "The controller has no more to say" });
  expect(saved.status).toBe(201);
  expect(await rulesAtSpeed()).toEqual(before.slice(1));
  const [waiver] = (await (await app.call("GET", `/models/${modelId}/waivers`, { cookie })).json()) as { id: string; person: string; reason: string }[];
  expect(waiver).toMatchObject({ person: "Ada Quill", reason: "The controller has no more to say" });
  expect((await app.call("DELETE", `/models/${modelId}/waivers/${waiver?.id}`, { cookie })).status).toBe(204);
  expect(await rulesAtSpeed()).toEqual(before);
});

test("a waiver ends when its node changes", async () => {
  const [rule] = await rulesAtSpeed();
  expect((await accept({ ...(await placeOf(rule)), reason: "Accepted" })).status).toBe(201);
  expect(await rulesAtSpeed()).not.toContain(rule);
  const operations = [{ kind: "setAttribute", key: speed, attribute: "displayName", value: [{ text: "Speed of the shaft" }] }];
  const json = { clientId: "w", base: 0, transactions: [{ clientSeq: 1, label: "rename", operations }] };
  expect((await app.call("POST", `/models/${modelId}/transactions`, { cookie, json })).status).toBe(200);
  expect(await rulesAtSpeed()).toContain(rule);
});

test("asks for a finding that is there, a reason, and the role", async () => {
  const [rule] = await rulesAtSpeed();
  expect((await accept({ rule: "R001", nodeId: speed, reason: "x" })).status).toBe(409);
  expect((await accept({ ...(await placeOf(rule)), reason: "  " })).status).toBe(422);
  const reviewer = await addTestPerson(app, organizationId, "Rev", ["reviewer"]);
  expect((await accept({ ...(await placeOf(rule)), reason: "x" }, reviewer)).status).toBe(403);
});
