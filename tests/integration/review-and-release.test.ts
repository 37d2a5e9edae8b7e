/** Review, release, bundle, mail, webhook, delivery, variants: through the API as a pipeline would use it. */
import { createHmac } from "node:crypto";
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { createServer, type IncomingMessage, type Server } from "node:http";
import type { AddressInfo } from "node:net";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { unzipSync, zipSync } from "fflate";
import { SMTPServer } from "smtp-server";
import { afterAll, beforeAll, describe, expect, test, vi } from "vitest";
import { parseCommandLine } from "~/cli/parse-command-line";
import { verify } from "~/cli/verify-command";
import type { NodeKey } from "~/domain/address-space/node-id";
import type { Operation } from "~/domain/editing/operation";
import { sha256 } from "~/utils/ids.server";
import { projectRoot } from "../support/source-files";
import { startTestApp, type TestApp } from "../support/test-app";
import { addTestPerson, setUpFirst } from "../support/test-people";

let app: TestApp;
let engineer: string;
let reviewer: string;
let administrator: string;
let organizationId: string;
let modelId: string;
const ids = new Map<string, string>();

beforeAll(async () => {
  app = await startTestApp({ FERRULE_SMTP_URL: "local" });
  const first = await setUpFirst(app);
  administrator = first.cookie;
  organizationId = first.organizationId;
  engineer = await addTestPerson(app, organizationId, "Edda", ["engineer"]);
  reviewer = await addTestPerson(app, organizationId, "Rene", ["reviewer"]);
  const { listPeople } = await import("~/db/repositories/people.server");
  for (const person of await listPeople(organizationId)) ids.set(person.name, person.id);
  const answer = await app.call("POST", "/api/v1/models", {
    cookie: engineer,
    body: readFileSync(join(projectRoot, "nodesets/demo/merrow-rope-braider.NodeSet2.xml"), "utf8"),
    headers: { "content-type": "application/xml" },
  });
  modelId = ((await answer.json()) as { id: string }).id;
});

afterAll(() => app.stop());

async function ask<T>(
  method: string,
  path: string,
  cookie: string,
  json?: unknown,
): Promise<{ status: number; body: T }> {
  const answer = await app.call(method, path, { cookie, ...(json === undefined ? {} : { json }) });
  const text = await answer.text();
  return { status: answer.status, body: (text === "" ? undefined : JSON.parse(text)) as T };
}

let clientSeq = 0;
async function edit(id: string, operations: readonly Operation[], cookie = engineer): Promise<number> {
  const { findModel } = await import("~/db/repositories/models.server");
  const base = (await findModel(id))?.headSeq ?? 0;
  const intent = { clientId: "test", base, transactions: [{ clientSeq: ++clientSeq, label: "test", operations }] };
  return (await app.call("POST", `/models/${id}/transactions`, { cookie, json: intent })).status;
}

async function listNodes(id: string) {
  const { loadWorkingModel } = await import("~/services/working-model.server");
  return (await loadWorkingModel(id))?.space.listOwnNodes() ?? [];
}

const describeNode = (key: NodeKey, text: string): Operation => ({
  kind: "setAttribute",
  key,
  attribute: "description",
  value: [{ text }],
});

type Review = {
  id: string;
  state: string;
  revision: number;
  obstacles: string[];
  reviewers: { name: string; holds: boolean }[];
};
type Release = {
  id: string;
  version: string;
  modelVersion: string;
  bundleHash: string;
  fileName: string;
  revision: number;
  withdrawn: unknown;
};

let review: Review;
let release: Release;
let bundle: Buffer;

describe("a review", () => {
  test("asks named reviewers, who get a mail", async () => {
    const asked = await ask<Review>("POST", `/api/v1/models/${modelId}/reviews`, engineer, {
      title: "First version",
      reviewers: [ids.get("Rene")],
    });
    expect(asked.status).toBe(201);
    review = asked.body;
    expect(review).toMatchObject({ state: "open", obstacles: ["approvals"] });
    const again = await ask("POST", `/api/v1/models/${modelId}/reviews`, engineer, {
      title: "Twice",
      reviewers: [ids.get("Rene")],
    });
    expect(again.status).toBe(409);
    const mail = await findMail((m) => m.subject.includes("First version"));
    expect(mail).toMatchObject({ toAddress: "rene@harbour.example", kind: "review-asked" });
    expect(mail?.text).toContain(`/reviews/${review.id}`);
    expect(mail?.html).toContain("Open the review");
  });

  test("is not approved by its author, nor released without approval", async () => {
    const own = await ask<{ code: string }>("POST", `/api/v1/reviews/${review.id}/decision`, engineer, {
      decision: "approved",
    });
    expect([own.status, own.body.code]).toEqual([409, "review.own-work"]);
    const early = await ask<{ code: string }>("POST", `/api/v1/reviews/${review.id}/release`, administrator, {
      version: "1.0.0",
    });
    expect([early.status, early.body.code]).toEqual([409, "release.blocked-approvals"]);
  });

  test("an edit after the approval voids it; nobody who edited may approve", async () => {
    const approved = await ask<Review>("POST", `/api/v1/reviews/${review.id}/decision`, reviewer, {
      decision: "approved",
      note: "Fine.",
    });
    expect(approved.body).toMatchObject({ state: "approved", obstacles: [] });
    const [node] = await listNodes(modelId);
    expect(await edit(modelId, [describeNode(node?.key as NodeKey, "Edited after approval.")], administrator)).toBe(
      200,
    );
    const after = await ask<Review>("GET", `/api/v1/reviews/${review.id}`, engineer);
    expect(after.body).toMatchObject({
      state: "open",
      obstacles: ["edited", "approvals"],
      reviewers: [{ name: "Rene", holds: false }],
    });
    expect(
      (await ask<{ code: string }>("POST", `/api/v1/reviews/${review.id}/decision`, reviewer, { decision: "approved" }))
        .body.code,
    ).toBe("review.edited");
    await follow();
    const byEditor = await ask<{ code: string }>("POST", `/api/v1/reviews/${review.id}/decision`, administrator, {
      decision: "approved",
    });
    expect(byEditor.body.code).toBe("review.own-work");
  });

  test("keeps comments at their node, with replies; a suggestion is applied as one edit", async () => {
    const [node] = await listNodes(modelId);
    const path = `/api/v1/reviews/${review.id}/comments`;
    const made = await ask<{ id: string; suggestion: string }>("POST", path, reviewer, {
      text: "Keep it as it was.",
      nodeKey: node?.key,
      change: "text-changed Description",
      takesBack: true,
    });
    expect(made.body.suggestion).toContain("take back");
    const reply = await ask<{ parentId: string; nodeKey: string }>("POST", path, engineer, {
      text: "Agreed.",
      parentId: made.body.id,
    });
    expect(reply.body).toMatchObject({ parentId: made.body.id, nodeKey: node?.key });
    const { applySuggestion } = await import("~/services/comment-review.server");
    const { caller, model, row } = await loadAccess("Edda");
    expect((await applySuggestion(caller, model, row, made.body.id)).ok).toBe(true);
    expect((await listNodes(modelId))[0]?.description).toEqual(
      node?.description === undefined ? undefined : expect.not.arrayContaining([{ text: "Edited after approval." }]),
    );
    const comments = await ask<{ id: string; resolvedBy: string | null; appliedBy: string | null }[]>(
      "GET",
      path,
      engineer,
    );
    expect(comments.body.find((c) => c.id === made.body.id)).toMatchObject({ appliedBy: "Edda", resolvedBy: "Edda" });
    await edit(modelId, [describeNode(node?.key as NodeKey, "The pump.")]);
    await follow();
  });
});

async function loadAccess(name: string) {
  const { findModel } = await import("~/db/repositories/models.server");
  const { findReview } = await import("~/db/repositories/reviews.server");
  const { listMemberships } = await import("~/db/repositories/people.server");
  const [model, row] = [await findModel(modelId), await findReview(review.id)];
  const userId = ids.get(name) ?? "";
  if (!model || !row) throw new Error("The review is missing");
  return { model, row, caller: { userId, name, email: "", memberships: await listMemberships(userId) } };
}

async function follow(): Promise<void> {
  const { followReview } = await import("~/services/ask-review.server");
  const { caller, model, row } = await loadAccess("Edda");
  const followed = await followReview(caller, model, row);
  expect(followed.ok).toBe(true);
}

async function findMail(isIt: (mail: { subject: string }) => boolean) {
  const { listMail } = await import("~/db/repositories/outbox.server");
  return (await listMail(organizationId, 100)).find(isIt);
}

/** The command in this process; what it prints is caught. */
function runVerify(...args: string[]): { code: number; stdout: string } {
  let stdout = "";
  const spies = [process.stdout, process.stderr].map((stream) =>
    vi.spyOn(stream, "write").mockImplementation((text) => {
      stdout += String(text);
      return true;
    }),
  );
  try {
    const command = parseCommandLine(["verify", ...args]);
    if (command.name !== "verify") throw new Error("Another command was read");
    return { code: verify(command), stdout };
  } finally {
    for (const spy of spies) spy.mockRestore();
  }
}

describe("a release", () => {
  let hook: Hook;
  beforeAll(async () => {
    hook = await startHook();
    const { addWebhook } = await import("~/services/manage-outbox.server");
    const added = await addWebhook((await loadAccess("Ada Quill")).caller, organizationId, hook.url);
    if (!added.ok) throw new Error("The webhook was refused");
    hook.secret = added.value.secret;
  });
  afterAll(() => hook.server.close());

  test("takes its version by rule, and only after an approval that holds", async () => {
    await ask("POST", `/api/v1/reviews/${review.id}/decision`, reviewer, { decision: "approved" });
    const wrong = await ask<{ code: string }>("POST", `/api/v1/reviews/${review.id}/release`, administrator, {
      version: "next",
    });
    expect(wrong.body.code).toBe("release.version");
    const made = await ask<Release>("POST", `/api/v1/reviews/${review.id}/release`, administrator, {
      version: "1.02.0",
      notes: "The first.",
    });
    expect(made.status).toBe(201);
    release = made.body;
    expect(release).toMatchObject({ version: "1.02.0", modelVersion: "1.2.0", withdrawn: null });
  });

  test("keeps the bundle under the hash that it names, with a hash for every file", async () => {
    const answer = await app.call("GET", `/api/v1/releases/${release.id}/bundle`, { cookie: reviewer });
    bundle = Buffer.from(await answer.arrayBuffer());
    expect(sha256(bundle)).toBe(release.bundleHash);
    const files = unzipSync(bundle);
    const manifest = JSON.parse(Buffer.from(files["manifest.json"] ?? []).toString()) as {
      files: { path: string; sha256: string }[];
      model: { version: string };
    };
    for (const file of manifest.files) expect(sha256(files[file.path] ?? new Uint8Array())).toBe(file.sha256);
    const paths = manifest.files.map((file) => file.path);
    for (const ending of [".NodeSet2.xml", ".NodeIds.csv", ".en.html", ".ts", ".py", "changes.html"]) {
      expect(
        paths.some((path) => path.endsWith(ending)),
        ending,
      ).toBe(true);
    }
    const xml = Buffer.from(files[paths.find((path) => path.endsWith(".NodeSet2.xml")) ?? ""] ?? []).toString();
    // OPC 10000-6 §F.2: Version is text, ModelVersion a semantic version without leading zeros.
    expect(xml).toMatch(/<Model [^>]*Version="1\.02\.0"/);
    expect(xml).toMatch(/<Model [^>]*ModelVersion="1\.2\.0"/);
    expect(xml).toMatch(/<RequiredModel [^>]*ModelUri="http:\/\/opcfoundation\.org\/UA\/"[^>]*PublicationDate="\d{4}-/);
  });

  test("gives the same bytes when it is built again from its revision", async () => {
    const { proveReproducible } = await import("~/services/release-revision.server");
    const { findRelease } = await import("~/db/repositories/releases.server");
    const row = await findRelease(release.id);
    const { model } = await loadAccess("Edda");
    expect(row && (await proveReproducible(model, row))).toBe(release.bundleHash);
  });

  test("is verified by the command line, and a changed file, another key or a missing file is told", async () => {
    const folder = mkdtempSync(join(tmpdir(), "ferrule-verify-"));
    try {
      const keep = (name: string, bytes: Uint8Array | string): string => {
        writeFileSync(join(folder, name), bytes);
        return join(folder, name);
      };
      const key = keep("key.pem", await (await app.call("GET", "/api/v1/signing-key", { cookie: reviewer })).text());
      const whole = keep("bundle.zip", bundle);
      const good = runVerify(whole, "--key", key, "--json");
      expect([good.code, JSON.parse(good.stdout)]).toMatchObject([
        0,
        { ok: true, sha256: release.bundleHash, problems: [] },
      ]);
      const files = unzipSync(bundle);
      const csv = Object.keys(files).find((path) => path.endsWith(".csv")) ?? "";
      const changed = runVerify(
        keep("changed.zip", zipSync({ ...files, [csv]: Buffer.from("X,1,Object\n") })),
        "--json",
      );
      expect([changed.code, JSON.parse(changed.stdout)]).toMatchObject([
        1,
        { problems: [{ code: "bundle.file-changed" }] },
      ]);
      const { [csv]: _left, ...rest } = files;
      expect(runVerify(keep("missing.zip", zipSync(rest))).stdout).toContain("bundle.file-missing");
      const forged = {
        ...files,
        "manifest.json": Buffer.from(
          Buffer.from(files["manifest.json"] ?? [])
            .toString()
            .replace("1.02.0", "1.03.0"),
        ),
      };
      expect(runVerify(keep("forged.zip", zipSync(forged))).stdout).toContain("bundle.signature");
      const { generateKeyPairSync } = await import("node:crypto");
      const other = keep(
        "other.pem",
        generateKeyPairSync("ed25519").publicKey.export({ type: "spki", format: "pem" }).toString(),
      );
      expect(runVerify(whole, "--key", other).stdout).toContain("bundle.key");
      expect(runVerify(keep("no.zip", "no archive")).code).toBe(2);
    } finally {
      rmSync(folder, { recursive: true, force: true });
    }
  });

  test("calls the webhook with a signature, again after an outage, and logs each attempt", async () => {
    const { callDueWebhooks } = await import("~/services/call-webhooks.server");
    const { listWebhookDeliveries, listWebhooks } = await import("~/db/repositories/outbox.server");
    const later = (minutes: number) => new Date(Date.now() + minutes * 60_000);
    const log = async () =>
      (
        await listWebhookDeliveries(
          (await listWebhooks(organizationId)).map((h) => h.id),
          10,
        )
      )[0];
    await callDueWebhooks(later(5));
    expect(await log()).toMatchObject({ event: "release.published", state: "waiting", lastStatus: 503 });
    hook.status = 204;
    await callDueWebhooks(later(30));
    expect(await log()).toMatchObject({ state: "sent", lastStatus: 204 });
    const call = hook.calls.at(-1);
    // Standard Webhooks: HMAC-SHA256 of `id.timestamp.body` with the secret behind `whsec_`.
    const expected = createHmac("sha256", Buffer.from(hook.secret.replace("whsec_", ""), "base64"))
      .update(`${call?.id}.${call?.timestamp}.${call?.body}`)
      .digest("base64");
    expect(call?.signature).toBe(`v1,${expected}`);
    expect(JSON.parse(call?.body ?? "{}")).toMatchObject({
      type: "release.published",
      data: { release: { id: release.id, sha256: release.bundleHash } },
    });
  });

  test("is handed to a gateway: sent, loaded, proved once", async () => {
    const { getDatabase } = await import("~/db/client.server");
    const { gateway } = await import("~/db/schema/sources");
    await getDatabase()
      .insert(gateway)
      .values({ id: "gw-north", organizationId, name: "GW-North", note: "", updatedBy: "Edda", updatedAt: new Date() });
    const path = `/api/v1/releases/${release.id}/deliveries`;
    expect((await ask("POST", path, engineer, { gatewayId: "nowhere" })).status).toBe(422);
    const sent = await ask<{ id: string; state: string; hash: string }>("POST", path, engineer, {
      gatewayId: "gw-north",
      note: "by stick",
    });
    expect(sent.body).toMatchObject({ state: "sent", hash: release.bundleHash, gateway: "GW-North" });
    expect((await ask("POST", `${path}/${sent.body.id}`, engineer, { state: "loaded" })).status).toBe(204);
    expect((await ask("POST", `${path}/${sent.body.id}`, engineer, { state: "loaded" })).status).toBe(409);
    const { readGatewayStates } = await import("~/services/read-release.server");
    expect(await readGatewayStates(organizationId)).toMatchObject([
      { gateway: "GW-North", delivered: { version: "1.02.0", state: "loaded" }, proved: null },
    ]);
  });

  test("keeps its model from being deleted, and stays visible when it is withdrawn", async () => {
    expect((await ask<{ code: string }>("DELETE", `/api/v1/models/${modelId}`, engineer)).body.code).toBe(
      "model.has-releases",
    );
    expect(
      (await ask("POST", `/api/v1/releases/${release.id}/withdrawal`, engineer, { reason: "A wrong range." })).status,
    ).toBe(204);
    const listed = await ask<Release[]>("GET", `/api/v1/models/${modelId}/releases`, reviewer);
    expect(listed.body).toMatchObject([{ version: "1.02.0", withdrawn: { reason: "A wrong range." } }]);
    expect(
      (await ask("POST", `/api/v1/releases/${release.id}/deliveries`, engineer, { gatewayId: "gw-north" })).status,
    ).toBe(409);
  });

  test("leaves its traces in the audit", async () => {
    const { listAudit } = await import("~/db/repositories/audit.server");
    const actions = (await listAudit(organizationId, 200)).map((entry) => entry.action);
    for (const action of [
      "review.ask",
      "review.approve",
      "review.void",
      "review.follow",
      "signing-key.create",
      "release.publish",
      "release.deliver",
      "release.loaded",
      "release.withdraw",
      "webhook.add",
    ]) {
      expect(actions, action).toContain(action);
    }
  });
});

type Hook = {
  url: string;
  server: Server;
  secret: string;
  status: number;
  calls: { id: string; timestamp: string; signature: string; body: string }[];
};

async function startHook(): Promise<Hook> {
  const hook: Hook = { url: "", server: createServer(), secret: "", status: 503, calls: [] };
  const header = (request: IncomingMessage, name: string): string => String(request.headers[name] ?? "");
  hook.server.on("request", (request, response) => {
    const chunks: Buffer[] = [];
    request.on("data", (chunk: Buffer) => chunks.push(chunk));
    request.on("end", () => {
      const body = Buffer.concat(chunks).toString();
      hook.calls.push({
        id: header(request, "webhook-id"),
        timestamp: header(request, "webhook-timestamp"),
        signature: header(request, "webhook-signature"),
        body,
      });
      response.writeHead(hook.status).end();
    });
  });
  await new Promise<void>((resolve) => hook.server.listen(0, "127.0.0.1", resolve));
  hook.url = `http://127.0.0.1:${(hook.server.address() as AddressInfo).port}/hook`;
  return hook;
}

describe("mail", () => {
  test("waits while the mail server is away and is sent when it is back; a link stops one kind", async () => {
    const { sendDueMail } = await import("~/services/send-mail.server");
    const { getEnvironment } = await import("~/utils/env.server");
    const { listMailStatements } = await import("~/services/queue-mail.server");
    const { writeBatch } = await import("~/db/client.server");
    const environment = getEnvironment() as { smtpUrl: string };
    const port = await findFreePort();
    environment.smtpUrl = `smtp://127.0.0.1:${port}`;
    const person = { id: ids.get("Rene") ?? "", name: "Rene", email: "rene@harbour.example" };
    const content = {
      subject: "Patience\r\nBcc: x@y.example",
      paragraphs: ["One <b>thing</b>."],
      link: { text: "Open", path: "/" },
    };
    const [statement] = await listMailStatements(organizationId, "release", [person], content);
    if (!statement) throw new Error("No mail was queued");
    await writeBatch([statement]);
    await sendDueMail(new Date());
    expect(await findMail((m) => m.subject.startsWith("Patience"))).toMatchObject({ state: "waiting", attempts: 1 });
    const server = await startMailServer(port);
    try {
      expect(await sendDueMail(new Date(Date.now() + 120_000))).toBeGreaterThan(0);
      const mail = await findMail((m) => m.subject.startsWith("Patience"));
      expect(mail).toMatchObject({ state: "sent", attempts: 2, subject: "Patience Bcc: x@y.example" });
      const source = server.received.find((one) => one.includes("Patience")) ?? "";
      expect(source).toMatch(/List-Unsubscribe-Post: List-Unsubscribe=One-Click/);
      expect(source).toContain("text/plain");
      expect(source).toContain("text/html");
      expect(source).toContain("&#60;b&#62;thing");
      const link = new URL(mail?.unsubscribeUrl ?? "");
      const forged = await app.ask(
        "routes/mail.unsubscribe.tsx",
        "POST",
        `/mail/unsubscribe?user=${person.id}&kind=release&mark=false`,
      );
      expect(forged?.status).toBe(404);
      const stopped = await app.ask("routes/mail.unsubscribe.tsx", "POST", link.pathname + link.search);
      expect(stopped?.status).toBe(200);
      expect(await listMailStatements(organizationId, "release", [person], content)).toEqual([]);
      expect(await listMailStatements(organizationId, "review-asked", [person], content)).toHaveLength(1);
    } finally {
      server.stop();
      environment.smtpUrl = "local";
    }
  });
});

async function findFreePort(): Promise<number> {
  const server = createServer();
  await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve));
  const { port } = server.address() as AddressInfo;
  await new Promise((resolve) => server.close(resolve));
  return port;
}

async function startMailServer(port: number): Promise<{ received: string[]; stop: () => void }> {
  const received: string[] = [];
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ["AUTH", "STARTTLS"],
    onData(stream, _session, done) {
      const chunks: Buffer[] = [];
      stream.on("data", (chunk: Buffer) => chunks.push(chunk));
      stream.on("end", () => {
        received.push(Buffer.concat(chunks).toString());
        done();
      });
    },
  });
  await new Promise<void>((resolve) => server.listen(port, "127.0.0.1", () => resolve()));
  return { received, stop: () => void server.close(() => undefined) };
}

describe("variants and revisions", () => {
  test("a variant is edited by itself and merged home; two changes to one thing ask for a choice", async () => {
    const made = await ask<{ id: string; name: string }>("POST", `/api/v1/models/${modelId}/variants`, engineer, {
      revision: 1,
      name: "Trial",
    });
    expect(made.status).toBe(201);
    const variantId = made.body.id;
    const [first, second] = await listNodes(variantId);
    expect(
      await edit(variantId, [
        describeNode(first?.key as NodeKey, "From the trial."),
        describeNode(second?.key as NodeKey, "Only in the trial."),
      ]),
    ).toBe(200);
    expect(await edit(modelId, [describeNode(first?.key as NodeKey, "From the model.")])).toBe(200);
    type Preview = {
      ours: { seq: number };
      theirs: { seq: number };
      conflicts: { id: string; what: string; ours: string; theirs: string }[];
      operations: number;
    };
    const preview = (await ask<Preview>("GET", `/api/v1/models/${variantId}/merge`, engineer)).body;
    expect(preview.conflicts).toMatchObject([
      { what: "description", ours: "From the model.", theirs: "From the trial." },
    ]);
    const seqs = { ours: preview.ours.seq, theirs: preview.theirs.seq };
    const open = await ask<{ code: string }>("POST", `/api/v1/models/${variantId}/merge`, engineer, {
      direction: "into-model",
      seqs,
      choices: {},
    });
    expect(open.body.code).toBe("merge.open-conflicts");
    const choices = { [preview.conflicts[0]?.id ?? ""]: "theirs" };
    expect(
      (await ask("POST", `/api/v1/models/${variantId}/merge`, engineer, { direction: "into-model", seqs, choices }))
        .status,
    ).toBe(200);
    const nodes = new Map((await listNodes(modelId)).map((node) => [node.key, node]));
    expect(nodes.get(first?.key as NodeKey)?.description).toEqual([{ text: "From the trial." }]);
    expect(nodes.get(second?.key as NodeKey)?.description).toEqual([{ text: "Only in the trial." }]);
    const after = (await ask<Preview>("GET", `/api/v1/models/${variantId}/merge`, engineer)).body;
    expect([after.conflicts, after.operations]).toEqual([[], 0]);
  });

  test("a revision is restored as a new working state, exactly", async () => {
    const { findRevisionByNumber, listRevisions } = await import("~/db/repositories/models.server");
    const wanted = await findRevisionByNumber(modelId, 1);
    expect((await ask("POST", `/api/v1/models/${modelId}/revisions/1/restore`, engineer)).status).toBe(200);
    expect((await ask("POST", `/api/v1/models/${modelId}/revisions`, engineer, { message: "Restored" })).status).toBe(
      201,
    );
    expect((await listRevisions(modelId))[0]?.packHash).toBe(wanted?.packHash);
    expect(
      (await ask<{ code: string }>("POST", `/api/v1/models/${modelId}/revisions/1/restore`, engineer)).body.code,
    ).toBe("revision.is-now");
  });
});
