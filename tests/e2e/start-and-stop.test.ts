import { spawn, type ChildProcess } from "node:child_process";
import { mkdtempSync, readdirSync, readFileSync, rmSync } from "node:fs";
import { createServer, type Server } from "node:net";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, afterEach, expect, test } from "vitest";
import { findFreePort } from "../support/app-server";
import { pumpUri, writePumpNodeSet } from "../support/pump-nodeset";
import { projectRoot } from "../support/source-files";

const running: ChildProcess[] = [];
const folders: string[] = [];

afterEach(() => {
  for (const child of running.splice(0)) if (child.exitCode === null) child.kill("SIGKILL");
});

afterAll(() => {
  for (const folder of folders) rmSync(folder, { recursive: true, force: true });
});

function makeFolder(): string {
  const folder = mkdtempSync(join(tmpdir(), "ferrule-process-"));
  folders.push(folder);
  return folder;
}

type Started = { child: ChildProcess; output: () => string; ended: Promise<number | null> };

function start(args: readonly string[], env: Readonly<Record<string, string>>): Started {
  const child = spawn(process.execPath, ["app/cli/launch.mjs", ...args], {
    cwd: projectRoot,
    env: { ...process.env, ...env },
  });
  running.push(child);
  let printed = "";
  child.stdout.on("data", (chunk) => (printed += String(chunk)));
  child.stderr.on("data", (chunk) => (printed += String(chunk)));
  return { child, output: () => printed, ended: new Promise((resolve) => child.once("exit", resolve)) };
}

async function waitFor(check: () => boolean, what: string, limitMs = 120_000): Promise<void> {
  const deadline = Date.now() + limitMs;
  while (!check()) {
    if (Date.now() > deadline) throw new Error(`Waited too long for ${what}`);
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}

async function startReady(args: readonly string[], port: number, data: string): Promise<Started & { url: string }> {
  const started = start(args, { PORT: String(port), FERRULE_DATA: data, DATABASE_URL: "" });
  await waitFor(() => started.output().includes("Ferrule ready:") || started.child.exitCode !== null, "the ready line");
  expect(started.output()).toContain(`Ferrule ready: http://localhost:${port}`);
  expect(started.output().trimEnd().split("\n").at(-1)).toBe(`Ferrule ready: http://localhost:${port}`);
  return { ...started, url: `http://127.0.0.1:${port}` };
}

async function signIn(url: string): Promise<string> {
  const answer = await fetch(`${url}/api/auth/sign-in/email`, {
    method: "POST",
    headers: { "content-type": "application/json", origin: url },
    body: JSON.stringify({ email: "tomas@merrow.example", password: "six-braiders-one-model" }),
  });
  expect(answer.status).toBe(200);
  return answer.headers
    .getSetCookie()
    .map((cookie) => cookie.split(";")[0])
    .join("; ");
}

async function listModels(url: string, cookie: string): Promise<{ id: string; name: string }[]> {
  return (await (await fetch(`${url}/api/v1/models`, { headers: { cookie } })).json()) as {
    id: string;
    name: string;
  }[];
}

function isAlive(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return true;
  } catch {
    return false;
  }
}

/** Process ids of the children of a process, from Linux's table of processes. */
function listChildren(pid: number): number[] {
  return readdirSync("/proc")
    .filter((name) => /^\d+$/.test(name))
    .filter((name) => {
      try {
        return readFileSync(`/proc/${name}/stat`, "utf8").split(") ")[1]?.split(" ")[1] === String(pid);
      } catch {
        return false;
      }
    })
    .map(Number);
}

test("the demo ends with streams and a test server open in under five seconds, children too", async () => {
  const port = await findFreePort();
  const app = await startReady(["demo"], port, makeFolder());
  const cookie = await signIn(app.url);
  const created = await fetch(`${app.url}/api/v1/models?name=Pump`, {
    method: "POST",
    headers: { cookie, "content-type": "application/xml" },
    body: writePumpNodeSet(),
  });
  expect(created.status).toBe(201);
  const { id } = (await created.json()) as { id: string };
  const stream = await fetch(`${app.url}/events`, { headers: { cookie } });
  const reader = stream.body?.getReader();
  expect(new TextDecoder().decode((await reader?.read())?.value)).toContain("event: hello");
  const server = await fetch(`${app.url}/api/v1/models/${id}/test-servers`, { method: "POST", headers: { cookie } });
  expect(server.status).toBe(201);
  await waitFor(() => listChildren(app.child.pid ?? 0).length > 0, "the test server's process", 30_000);
  const children = listChildren(app.child.pid ?? 0);

  const from = Date.now();
  app.child.kill("SIGTERM");
  expect(await app.ended).toBe(0);
  expect(Date.now() - from).toBeLessThan(5000);
  await waitFor(() => children.every((pid) => !isAlive(pid)), "the end of the children", 1000);
  await reader?.cancel().catch(() => undefined);
});

test("seeding twice changes nothing, and --reset starts anew without touching the data beside it", async () => {
  const data = makeFolder();
  const port = await findFreePort();
  const own = await startReady(["server"], port, data);
  own.child.kill("SIGTERM");
  await own.ended;
  const ownDatabase = readFileSync(join(data, "ferrule.db"));

  const first = await startReady(["demo"], port, data);
  let cookie = await signIn(first.url);
  const seeded = await listModels(first.url, cookie);
  await fetch(`${first.url}/api/v1/models?name=Pump`, {
    method: "POST",
    headers: { cookie, "content-type": "application/xml" },
    body: writePumpNodeSet(),
  });
  first.child.kill("SIGTERM");
  await first.ended;

  const second = await startReady(["demo"], port, data);
  const again = await listModels(second.url, cookie);
  expect(again.filter((model) => model.name !== "Pump")).toEqual(seeded);
  expect(again).toHaveLength(seeded.length + 1);
  second.child.kill("SIGTERM");
  await second.ended;

  const third = await startReady(["demo", "--reset"], port, data);
  cookie = await signIn(third.url);
  expect((await listModels(third.url, cookie)).map((model) => model.name)).toEqual(seeded.map((model) => model.name));
  third.child.kill("SIGTERM");
  await third.ended;
  expect(readFileSync(join(data, "ferrule.db")).equals(ownDatabase)).toBe(true);
});

test("killed in the middle of a burst of edits, it loses none that it had acknowledged", async () => {
  const data = makeFolder();
  const port = await findFreePort();
  const app = await startReady(["demo"], port, data);
  const cookie = await signIn(app.url);
  const created = await fetch(`${app.url}/api/v1/models?name=Pump`, {
    method: "POST",
    headers: { cookie, "content-type": "application/xml" },
    body: writePumpNodeSet(),
  });
  const { id } = (await created.json()) as { id: string };
  const acknowledged: number[] = [];
  const burst = (async () => {
    for (let base = 0; base < 2000; base++) {
      const operations = [
        {
          kind: "setAttribute",
          key: `nsu=${pumpUri};i=1002`,
          attribute: "displayName",
          value: [{ text: `Speed ${base}` }],
        },
      ];
      const answer = await fetch(`${app.url}/models/${id}/transactions`, {
        method: "POST",
        headers: { cookie, "content-type": "application/json", origin: app.url },
        body: JSON.stringify({ clientId: "w", base, transactions: [{ clientSeq: base, label: "rename", operations }] }),
      });
      if (answer.status === 200) acknowledged.push(base + 1);
    }
  })().catch(() => undefined);
  await waitFor(() => acknowledged.length > 30, "some edits");
  app.child.kill("SIGKILL");
  await app.ended;
  await burst;

  const again = await startReady(["demo"], port, data);
  const answer = await fetch(`${again.url}/models/${id}/transactions?since=0`, { headers: { cookie } });
  const { transactions } = (await answer.json()) as { transactions: { seq: number }[] };
  const kept = new Set(transactions.map((transaction) => transaction.seq));
  expect(acknowledged.filter((seq) => !kept.has(seq))).toEqual([]);
  again.child.kill("SIGTERM");
  expect(await again.ended).toBe(0);
});

test("a taken port is told, ends with 1 and never becomes another port", async () => {
  const blocker: Server = createServer().listen(0, "127.0.0.1");
  await new Promise((resolve) => blocker.once("listening", resolve));
  const address = blocker.address();
  const port = typeof address === "object" && address ? address.port : 0;
  const app = start(["demo"], { PORT: String(port), FERRULE_DATA: makeFolder() });
  expect(await app.ended).toBe(1);
  expect(app.output()).toContain(`Port ${port} is taken`);
  expect(app.output()).not.toContain("Ferrule ready");
  await new Promise((resolve) => blocker.close(resolve));
});

test("an empty installation leads to the set-up page and prints its code before the ready line", async () => {
  const app = await startReady(["server"], await findFreePort(), makeFolder());
  expect(app.output()).toMatch(/Set-up code: [A-Z2-9]{4}-[A-Z2-9]{4}-[A-Z2-9]{4}\n/);
  const page = await fetch(`${app.url}/`);
  expect(new URL(page.url).pathname).toBe("/set-up");
  const policy = page.headers.get("content-security-policy") ?? "";
  const nonce = /'nonce-([^']+)'/.exec(policy)?.[1] ?? "";
  const html = await page.text();
  const scripts = html.match(/<script\b[^>]*>/g) ?? [];
  expect(scripts.length).toBeGreaterThan(0);
  for (const script of scripts) expect(script).toContain(`nonce="${nonce}"`);
  expect(policy).not.toContain("unsafe-eval");
  const asset = /\/assets\/[\w.-]+\.js/.exec(html)?.[0] ?? "";
  const script = await fetch(`${app.url}${asset}`, { headers: { "accept-encoding": "gzip" } });
  expect(script.headers.get("cache-control")).toContain("immutable");
  expect(script.headers.get("content-encoding")).toBe("gzip");
  expect((await script.text()).length).toBeGreaterThan(Number(script.headers.get("content-length")));
  const plain = await fetch(`${app.url}${asset}`, { headers: { "accept-encoding": "identity" } });
  expect(plain.headers.get("content-encoding")).toBeNull();
  expect(plain.headers.get("cache-control")).toContain("immutable");
  expect((await fetch(`${app.url}/assets/..%2f..%2fserver%2findex.js`)).status).toBe(403);
  app.child.kill("SIGTERM");
  expect(await app.ended).toBe(0);
});
