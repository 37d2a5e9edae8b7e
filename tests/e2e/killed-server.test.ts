/** The server is killed in the middle of a burst of edits and started again on the same data: what it acknowledged is there. */
import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { numericNodeId, toNodeKey } from "~/domain/address-space/node-id";
import { startApp, type AppServer } from "../support/app-server";

const URI = "http://merrow.example/UA/RopeBraider/";
/** Process/RecipeNumber's Description is written over and over. */
const NODE = toNodeKey(numericNodeId(URI, 6033));
const WINDOWS = 4;
const KILLED_AFTER = 60;

let dataFolder: string;
let app: AppServer | undefined;
let cookie = "";

beforeAll(async () => {
  dataFolder = mkdtempSync(join(tmpdir(), "ferrule-killed-"));
  app = await startApp("demo", { FERRULE_DATA: dataFolder });
});

afterAll(async () => {
  await app?.stop();
  rmSync(dataFolder, { recursive: true, force: true });
});

async function send(method: string, path: string, body?: unknown): Promise<Response> {
  const url = app?.url ?? "";
  return fetch(url + path, {
    method,
    headers: { cookie, origin: url, ...(body === undefined ? {} : { "content-type": "application/json" }) },
    ...(body === undefined ? {} : { body: JSON.stringify(body) }),
  });
}

async function signIn(): Promise<void> {
  const answer = await send("POST", "/api/auth/sign-in/email", { email: "tomas@merrow.example", password: "six-braiders-one-model" });
  cookie = answer.headers.getSetCookie().map((one) => one.split(";")[0]).join("; ");
}

type Acknowledged = { readonly clientId: string; readonly clientSeq: number; readonly seq: number; readonly text: string };

describe("killing the server in a burst of edits", () => {
  it("loses nothing that it acknowledged", async () => {
    await signIn();
    const models = (await (await send("GET", "/api/v1/models")).json()) as { id: string; name: string }[];
    const modelId = models.find((model) => model.name === "Rope braider")?.id ?? "";
    const acknowledged: Acknowledged[] = [];
    let isKilled = false;

    async function edit(clientId: string): Promise<void> {
      let base = ((await (await send("GET", `/models/${modelId}/transactions?since=0`)).json()) as { head: number }).head;
      for (let clientSeq = 1; !isKilled; clientSeq++) {
        const text = `${clientId} wrote ${clientSeq}`;
        const operations = [{ kind: "setAttribute", key: NODE, attribute: "description", value: [{ locale: "en", text }] }];
        for (let isTold = false; !isTold && !isKilled; ) {
          const body = { clientId, base, transactions: [{ clientSeq, label: "set-description", operations }] };
          const answer = await send("POST", `/models/${modelId}/transactions`, body).catch(() => undefined);
          if (!answer) return;
          const told = (await answer.json().catch(() => undefined)) as { head: number; accepted?: { seq: number }[] } | undefined;
          if (!told) return;
          base = told.head;
          isTold = answer.status === 200;
          if (isTold) acknowledged.push({ clientId, clientSeq, seq: told.accepted?.[0]?.seq ?? 0, text });
        }
        if (acknowledged.length >= KILLED_AFTER && !isKilled) {
          isKilled = true;
          await app?.kill();
        }
      }
    }

    await Promise.all(Array.from({ length: WINDOWS }, (_, index) => edit(`window-${index}`)));
    expect(acknowledged.length).toBeGreaterThanOrEqual(KILLED_AFTER);

    app = await startApp("demo", { FERRULE_DATA: dataFolder });
    await signIn();
    const page = (await (await send("GET", `/models/${modelId}/transactions?since=0`)).json()) as {
      head: number;
      transactions: { seq: number; clientId: string; clientSeq: number; operations: { value?: { text: string }[] }[] }[];
    };
    const stored = new Map(page.transactions.map((t) => [t.seq, t]));
    for (const { seq, clientId, clientSeq, text } of acknowledged) {
      const kept = stored.get(seq);
      expect([kept?.clientId, kept?.clientSeq, kept?.operations[0]?.value?.[0]?.text]).toEqual([clientId, clientSeq, text]);
    }
    const last = page.transactions.at(-1)?.operations[0]?.value?.[0]?.text ?? "";
    const file = await (await send("GET", `/api/v1/models/${modelId}/nodeset`)).text();
    expect(file).toContain(last);
  });
});
