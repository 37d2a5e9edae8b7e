import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { sql } from "drizzle-orm";
import { pumpUri, writePumpNodeSet } from "../support/pump-nodeset";
import { startTestApp, type TestApp } from "../support/test-app";
import { setUpFirst } from "../support/test-people";

let app: TestApp;
let cookie: string;
let organizationId: string;

beforeAll(async () => {
  app = await startTestApp();
  ({ cookie, organizationId } = await setUpFirst(app));
});

afterAll(() => app.stop());

const xml = { "content-type": "application/xml" };

type Document = { status: number; code: string; problems: { code: string; message: string; line?: number; column?: number }[] };

async function upload(body: string | Uint8Array, query = ""): Promise<{ status: number; document: Document; type: string | null }> {
  const answer = await app.call("POST", `/api/v1/models${query}`, { cookie, body, headers: xml });
  return { status: answer.status, document: (await answer.json()) as Document, type: answer.headers.get("content-type") };
}

async function countRows(): Promise<Record<string, number>> {
  const { getDatabase } = await import("~/db/client.server");
  const db = getDatabase();
  const tables = await db.all<{ name: string }>(sql`select name from sqlite_master where type = 'table' and name not like 'sqlite_%'`);
  const counts: Record<string, number> = {};
  for (const { name } of tables) {
    const [row] = await db.all<{ n: number }>(sql`select count(*) as n from ${sql.identifier(name)}`);
    counts[name] = row?.n ?? -1;
  }
  return counts;
}

describe("import through the API", () => {
  test("makes a model, lists it, and gives back its file and findings", async () => {
    const answer = await app.call("POST", "/api/v1/models?name=Pump%20types", { cookie, body: writePumpNodeSet(), headers: xml });
    expect(answer.status).toBe(201);
    const model = (await answer.json()) as { id: string };
    expect(model).toEqual({ id: model.id, name: "Pump types", kind: "types", namespaceUri: pumpUri, version: "1.0.0" });
    expect(answer.headers.get("location")).toBe(`/api/v1/models/${model.id}`);
    expect(await (await app.call("GET", "/api/v1/models", { cookie })).json()).toEqual([model]);

    const file = await app.call("GET", `/api/v1/models/${model.id}/nodeset`, { cookie });
    expect(file.headers.get("content-type")).toContain("application/xml");
    const text = await file.text();
    expect(text).toContain('BrowseName="1:PumpType"');
    const findings = (await (await app.call("GET", `/api/v1/models/${model.id}/findings`, { cookie })).json()) as {
      counts: object;
      findings: { rule: string; line: number; nodeId: string }[];
      problems: unknown[];
    };
    expect(Object.keys(findings)).toEqual(["file", "counts", "findings", "problems"]);
    const lines = text.split("\n");
    for (const finding of findings.findings.filter((f) => f.nodeId !== "")) {
      expect(lines[finding.line - 1]).toContain(`ns=1;i=${finding.nodeId.split(";i=")[1]}`);
    }
  });

  test("tells findings as text and SARIF, from a severity on, and without what was accepted", async () => {
    const file = writePumpNodeSet({ uri: "http://merrow.example/UA/Formats/" });
    const made = (await (await app.call("POST", "/api/v1/models", { cookie, body: file, headers: xml })).json()) as { id: string };
    const ask = (query: string) => app.call("GET", `/api/v1/models/${made.id}/findings${query}`, { cookie });
    const all = (await (await ask("")).json()) as { findings: { rule: string; severity: string; nodeId: string; attribute?: string; message: string }[] };
    const [first] = all.findings;
    if (!first) throw new Error("The file has no findings to speak of");
    const text = await ask("?format=text");
    expect(text.headers.get("content-type")).toBe("text/plain; charset=utf-8");
    expect(await text.text()).toContain(first.message);
    const sarif = await ask("?format=sarif");
    expect(sarif.headers.get("content-type")).toBe("application/sarif+json");
    type Log = { version: string; runs: { results: { ruleId: string; suppressions?: object[] }[] }[] };
    expect((await sarif.json()) as Log).toMatchObject({ version: "2.1.0" });
    const errors = (await (await ask("?severity=error")).json()) as typeof all;
    expect(errors.findings).toEqual(all.findings.filter((f) => f.severity === "error"));
    expect((await ask("?format=pdf")).status).toBe(422);

    const { rule, nodeId, attribute } = first;
    const body = JSON.stringify({ rule, nodeId, attribute, reason: "Agreed with the plant." });
    const accepted = await app.call("POST", `/models/${made.id}/waivers`, { cookie, body, headers: { "content-type": "application/json" } });
    expect(accepted.status).toBe(201);
    const left = (await (await ask("")).json()) as typeof all;
    expect(left.findings.some((f) => f.rule === rule && f.nodeId === nodeId && f.attribute === attribute)).toBe(false);
    const log = (await (await ask("?format=sarif")).json()) as Log;
    expect(log.runs[0]?.results.find((r) => r.ruleId === rule && r.suppressions)?.suppressions).toHaveLength(1);
    const waivers = (await (await app.call("GET", `/api/v1/models/${made.id}/waivers`, { cookie })).json()) as { waivers: object[] };
    expect(waivers.waivers).toMatchObject([{ rule, nodeId, reason: "Agreed with the plant." }]);
  });

  test("answers 409 to the same namespace, also when both come at the same time", async () => {
    const file = writePumpNodeSet({ uri: "http://merrow.example/UA/Twice/" });
    const statuses = await Promise.all([upload(file), upload(file), upload(file)]);
    expect(statuses.map((s) => s.status).sort()).toEqual([201, 409, 409]);
    expect(statuses.find((s) => s.status === 409)?.document.code).toBe("model.namespace-taken");
  });

  const uri = "http://merrow.example/UA/Refused/";
  const good = writePumpNodeSet({ uri });
  const latin1 = Buffer.from(good.replace("utf-8", "iso-8859-1").replace("PumpType</Disp", "Pümpe</Disp"), "latin1");
  const refusals: readonly (readonly [name: string, body: string | Uint8Array, status: number, code: string])[] = [
    ["not XML", "hello, world", 422, "file.other-kind"],
    ["nothing", "", 422, "request.body-empty"],
    ["a truncated file", good.slice(0, good.length - 200), 422, "xml.truncated"],
    ["a list of changes", `<UANodeSetChanges xmlns="http://opcfoundation.org/UA/2011/03/UANodeSet.xsd"/>`, 422, "nodeset.wrong-root"],
    ["an entity bomb", `<!DOCTYPE a [<!ENTITY b "bbbb"><!ENTITY c "&b;&b;&b;">]><UANodeSet>&c;</UANodeSet>`, 422, "xml.doctype"],
    ["elements 300 deep", `${"<a>".repeat(300)}${"</a>".repeat(300)}`, 422, "nodeset.wrong-root"],
    ["a namespace index out of range", good.replace("ns=1;i=1003", "ns=7;i=1003"), 422, "node-id.namespace-index"],
    ["a numeric id beyond 32 bits", good.replace("ns=1;i=1003", "ns=1;i=4294967296"), 422, "node-id.numeric-range"],
    ["a NodeId given twice", good.replace('NodeId="ns=1;i=1003"', 'NodeId="ns=1;i=1002"'), 422, "nodeset.duplicate-node-id"],
    ["the namespace of the standard", writePumpNodeSet({ uri: "http://opcfoundation.org/UA/" }), 422, "nodeset.own-namespace-zero"],
    [
      "two own models",
      good.replace("</Models>", `<Model ModelUri="http://merrow.example/UA/Second/"/></Models>`),
      422,
      "model.several-own",
    ],
    [
      "a required model that is not there",
      writePumpNodeSet({ uri, required: `<RequiredModel ModelUri="http://merrow.example/UA/Absent/" Version="2.1.0"/>` }),
      422,
      "library.model-missing",
    ],
    ["a circle of subtypes", good.replace('IsForward="false">i=58', 'IsForward="false">ns=1;i=1001'), 422, "nodeset.type-cycle"],
  ];

  test.each(refusals)("refuses %s with a code and leaves every row count as it was", async (_name, body, status, code) => {
    const before = await countRows();
    const answer = await upload(body);
    expect(answer.type).toBe("application/problem+json");
    expect(answer.document.problems.map((p) => p.code)).toContain(code);
    expect(answer.status).toBe(status);
    expect(JSON.stringify(answer.document)).not.toMatch(/\bat \S+ \(|node_modules/);
    expect(await countRows()).toEqual(before);
  });

  test("names who requires what in which version", async () => {
    const answer = await upload(writePumpNodeSet({ uri, required: `<RequiredModel ModelUri="http://merrow.example/UA/Absent/" Version="2.1.0"/>` }));
    const [missing] = answer.document.problems;
    expect(missing?.message).toContain(uri);
    expect(missing?.message).toContain("http://merrow.example/UA/Absent/");
    expect(missing?.message).toContain("2.1.0");
  });

  test("reads Latin-1, UTF-16 and CRLF", async () => {
    expect((await upload(latin1)).status).toBe(201);
    const utf16 = writePumpNodeSet({ uri: "http://merrow.example/UA/Wide/" }).replace("utf-8", "utf-16");
    expect((await upload(Buffer.concat([Buffer.from([0xff, 0xfe]), Buffer.from(utf16, "utf16le")]))).status).toBe(201);
    const crlf = writePumpNodeSet({ uri: "http://merrow.example/UA/Lines/" }).replaceAll("\n", "\r\n");
    expect((await upload(crlf)).status).toBe(201);
  });

  test("stops at 50 MB while the bytes still come, without storing anything", async () => {
    const before = await countRows();
    let sent = 0;
    const endless = new ReadableStream<Uint8Array>({
      pull(controller) {
        sent += 1;
        if (sent > 60) controller.close();
        else controller.enqueue(new Uint8Array(1024 * 1024).fill(32));
      },
    });
    const answer = await app.call("POST", "/api/v1/models", { cookie, body: endless, headers: xml });
    expect(answer.status).toBe(413);
    expect(((await answer.json()) as Document).problems[0]?.message).toContain("50 MB");
    expect(await countRows()).toEqual(before);
  });

  test("wants the right content type and method", async () => {
    const wrong = await app.call("POST", "/api/v1/models", { cookie, body: writePumpNodeSet(), headers: { "content-type": "text/plain" } });
    expect(wrong.status).toBe(415);
    expect((await app.call("PUT", "/api/v1/models", { cookie, body: "x", headers: xml })).status).toBe(405);
    expect((await app.call("GET", "/api/v1/nothing-here", { cookie })).status).toBe(404);
  });
});

describe("preview and library", () => {
  const uri = "http://merrow.example/UA/Shelf/";

  test("a preview stores nothing, and the kept file can be imported once it is confirmed", async () => {
    const { previewImport, takePendingUpload } = await import("~/services/preview-import.server");
    const { addToLibrary, importModel, removeFromLibrary } = await import("~/services/import-model.server");
    const { findCaller } = await import("~/auth/caller.server");
    const caller = await findCaller(new Request("http://localhost:3000/", { headers: { cookie } }));
    if (!caller) throw new Error("Nobody is signed in");
    const before = await countRows();
    const preview = await previewImport(caller, organizationId, Buffer.from(writePumpNodeSet({ uri })), "shelf.xml");
    if (!preview.ok) throw new Error(preview.problems[0]?.code);
    expect(preview.value.counts).toMatchObject({ nodes: 3, byClass: { ObjectType: 1, Variable: 2 } });
    expect(preview.value.required[0]).toMatchObject({ modelUri: "http://opcfoundation.org/UA/", state: "other-version" });
    expect(preview.value.suggestedName).toBe("Shelf");
    expect(await countRows()).toEqual(before);
    expect((await takePendingUpload(caller, "otherorganization000", preview.value.uploadId)).ok).toBe(false);

    const upload = await takePendingUpload(caller, organizationId, preview.value.uploadId);
    if (!upload.ok) throw new Error(upload.problems[0]?.code);
    const entry = await addToLibrary(caller, organizationId, upload.value);
    if (!entry.ok) throw new Error(entry.problems[0]?.code);
    expect((await addToLibrary(caller, organizationId, upload.value)).problems[0]?.code).toBe("library.entry-exists");

    // A model on top of the library's entry gets its layer, and keeps the entry from being removed.
    const top = writePumpNodeSet({ uri: "http://merrow.example/UA/Top/", required: `<RequiredModel ModelUri="${uri}" Version="1.0.0"/>` });
    const { readUpload } = await import("~/services/read-upload.server");
    const read = await readUpload(Buffer.from(top), "top.xml");
    if (!read.ok) throw new Error(read.problems[0]?.code);
    const model = await importModel(caller, organizationId, read.value, { name: "Top" });
    if (!model.ok) throw new Error(model.problems[0]?.code);
    const layers = (await (await app.call("GET", `/models/${model.value.id}/layers`, { cookie })).json()) as {
      layers: { modelUri: string; packUrl: string }[];
    };
    expect(layers.layers.map((l) => l.modelUri)).toEqual(["http://opcfoundation.org/UA/", uri]);
    for (const { packUrl } of layers.layers) expect((await app.call("GET", packUrl, { cookie })).status).toBe(200);
    expect((await removeFromLibrary(caller, organizationId, entry.value.id)).problems[0]?.code).toBe("library.entry-used");
    // The same namespace as a model of the team may go again, since the library has it for those who require it.
    const copy = await importModel(caller, organizationId, upload.value, { name: "Shelf" });
    if (!copy.ok) throw new Error(copy.problems[0]?.code);
    expect((await app.call("DELETE", `/api/v1/models/${copy.value.id}`, { cookie })).status).toBe(204);
    expect((await app.call("DELETE", `/api/v1/models/${model.value.id}`, { cookie })).status).toBe(204);
    expect((await removeFromLibrary(caller, organizationId, entry.value.id)).ok).toBe(true);
  });

  test("two models that would require each other are refused, and neither hangs", async () => {
    const a = "http://merrow.example/UA/CircleA/";
    const b = "http://merrow.example/UA/CircleB/";
    expect((await upload(writePumpNodeSet({ uri: a }))).status).toBe(201);
    const onA = await upload(writePumpNodeSet({ uri: b, required: `<RequiredModel ModelUri="${a}"/>` }));
    expect(onA.status).toBe(201);
    const models = (await (await app.call("GET", "/api/v1/models", { cookie })).json()) as { id: string; namespaceUri: string }[];
    const idOfA = models.find((m) => m.namespaceUri === a)?.id ?? "";
    const entry = { modelUri: a, version: "1.0.0", requiredModels: [{ modelUri: "http://opcfoundation.org/UA/", requiredModels: [] }, { modelUri: b, requiredModels: [] }] };
    const answer = await app.call("POST", `/models/${idOfA}/transactions`, {
      cookie,
      json: { clientId: "w", base: 0, transactions: [{ clientSeq: 1, label: "require", operations: [{ kind: "setHeader", field: "models", value: [entry] }] }] },
    });
    expect(answer.status).toBe(422);
    expect(((await answer.json()) as Document).problems[0]?.code).toBe("library.required-cycle");
  });
});

describe("the OpenAPI document", () => {
  type OpenApi = { openapi: string; paths: Record<string, Record<string, { responses: Record<string, unknown> }>>; components: { schemas: object } };

  test("describes every API route of the table, and only these", async () => {
    const answer = await app.call("GET", "/api/v1/openapi.json");
    expect(answer.status).toBe(200);
    const document = (await answer.json()) as OpenApi;
    expect(document.openapi).toMatch(/^3\.1\./);
    const described = Object.keys(document.paths).sort();
    const routes = app.routes
      .filter(({ path }) => path.startsWith("/api/v1/") && !path.endsWith("openapi.json"))
      .map(({ path }) => path.slice("/api/v1".length).replace(/:(\w+)/g, "{$1}"))
      .sort();
    expect(described).toEqual(routes);
  });

  test("resolves every reference inside itself", async () => {
    const document = (await (await app.call("GET", "/api/v1/openapi.json")).json()) as OpenApi;
    const names = new Set(Object.keys(document.components.schemas));
    for (const [, name] of JSON.stringify(document).matchAll(/"\$ref":"#\/components\/schemas\/(\w+)"/g)) expect(names).toContain(name);
    expect(JSON.stringify(document)).not.toContain("$defs");
  });
});

describe("the list of NodeIds", () => {
  test("leaves, comes back changed, and is refused as a whole where a line is wrong", async () => {
    const made = await app.call("POST", "/api/v1/models?name=Numbered", {
      cookie,
      body: writePumpNodeSet({ uri: "http://merrow.example/UA/Numbered/" }),
      headers: xml,
    });
    const { id } = (await made.json()) as { id: string };
    const path = `/api/v1/models/${id}/node-ids`;
    const csv = await (await app.call("GET", path, { cookie })).text();
    expect(csv).toMatch(/^PumpType,1001,ObjectType$/m);
    const put = (body: string) => app.call("PUT", path, { cookie, body, headers: { "content-type": "text/csv" } });

    const moved = await put("PumpType,7001,ObjectType\nNobody,7002,Object\n");
    expect(moved.status).toBe(200);
    expect(await moved.json()).toMatchObject({ changed: 1, unknown: [{ symbol: "Nobody", line: 2 }] });
    expect(await (await app.call("GET", path, { cookie })).text()).toMatch(/^PumpType,7001,ObjectType$/m);
    expect(await (await app.call("GET", `/api/v1/models/${id}/nodeset`, { cookie })).text()).toContain('NodeId="ns=1;i=7001"');

    const wrong = await put("PumpType,7003,ObjectType\nPumpType_Speed,4294967296,Variable\n");
    expect(wrong.status).toBe(422);
    expect(((await wrong.json()) as Document).problems[0]).toMatchObject({ code: "node-id.numeric-range", line: 2 });
    const taken = await put("PumpType,1001,ObjectType\n");
    expect([taken.status, (await put("PumpType,1002,ObjectType\n")).status]).toEqual([200, 422]);
    expect((await app.call("PUT", path, { cookie, body: "x", headers: xml })).status).toBe(415);
  });
});
