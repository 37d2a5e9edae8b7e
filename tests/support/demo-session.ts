/** What the browser tests ask of the running demo through its API, with the session of the page. */
import type { Page } from "playwright-core";

const START_LIMIT_MS = 60_000;

type ModelSummary = { id: string; name: string };

export async function findModelId(page: Page, name: string): Promise<string> {
  const models = await askJson<ModelSummary[]>(page, "/api/v1/models");
  const found = models.find((model) => model.name === name);
  if (!found) throw new Error(`No model ${name} among ${models.map((model) => model.name).join(", ")}`);
  return found.id;
}

/** Starts a test server and waits until it runs; answers its id. */
export async function startTestServer(page: Page, modelId: string): Promise<string> {
  const answer = await page.request.post(`/api/v1/models/${modelId}/test-servers`, {
    data: {},
    headers: { origin: originOf(page) },
  });
  if (answer.status() !== 201)
    throw new Error(`The test server was not started: ${answer.status()} ${await answer.text()}`);
  const { id } = (await answer.json()) as { id: string };
  for (const deadline = Date.now() + START_LIMIT_MS; Date.now() < deadline;) {
    const { state } = await askJson<{ state: string }>(page, `/api/v1/test-servers/${id}`);
    if (state === "running") return id;
    if (state === "failed") break;
    await page.waitForTimeout(200);
  }
  throw new Error("The test server does not run");
}

async function askJson<T>(page: Page, path: string): Promise<T> {
  const answer = await page.request.get(path);
  if (!answer.ok()) throw new Error(`${path} answers ${answer.status()}: ${await answer.text()}`);
  return (await answer.json()) as T;
}

function originOf(page: Page): string {
  return new URL(page.url()).origin;
}
