/**
 * How long others wait while a file of 4 MB is imported: a process with database, library and reading worker as the server
 * has them answers the list of models, asked without pause by another process, while it takes the file in.
 */
import { mkdtempSync, rmSync } from "node:fs";
import { createServer } from "node:http";
import { tmpdir } from "node:os";
import { join } from "node:path";
import type { Node } from "~/domain/address-space/node";
import { numericNodeId, standardKey, toNodeKey } from "~/domain/address-space/node-id";
import { getValue } from "~/domain/core/result";
import { writeNodeSet } from "~/domain/nodeset/write-nodeset";
import { answerParent, forkChild, waitForMessage } from "./child";
import { record, type BenchResult } from "./result";

const NAMESPACE = "http://merrow.example/bench-import/";
const BYTES = 4_000_000;
const IDLE_MS = 1_500;

export async function measureImport(): Promise<BenchResult[]> {
  const file = makeFile();
  const folder = mkdtempSync(join(tmpdir(), "ferrule-bench-"));
  const child = forkChild("import-server", [folder]);
  try {
    const { port } = await waitForMessage<{ port: number }>(child);
    const url = `http://127.0.0.1:${port}/`;
    const idle = await findSlowest(url, new Promise((resolve) => setTimeout(resolve, IDLE_MS)));
    const since = performance.now();
    const imported = fetch(url, { method: "POST", body: file }).then(async (answer) => {
      if (answer.status !== 201) throw new Error(`The import was refused: ${await answer.text()}`);
      return performance.now() - since;
    });
    const slowest = await findSlowest(url, imported);
    return [
      record("slowest answer to somebody else while nothing is imported", "ms", idle),
      record("slowest answer to somebody else while a 4 MB file is imported", "ms", slowest),
      record("import a 4 MB file, from the request to the stored model", "ms", await imported),
    ];
  } finally {
    child.kill();
    rmSync(folder, { recursive: true, force: true });
  }
}

/** Asks again and again until the other work is done; the longest wait for an answer, ms. */
async function findSlowest(url: string, work: Promise<unknown>): Promise<number> {
  let isDone = false;
  const end = work.finally(() => (isDone = true));
  let slowest = 0;
  while (!isDone) {
    const since = performance.now();
    await (await fetch(url)).text();
    slowest = Math.max(slowest, performance.now() - since);
  }
  await end;
  return slowest;
}

export async function serveImportsInChild([folder = ""]: readonly string[]): Promise<void> {
  Object.assign(process.env, { FERRULE_DATA: folder, FERRULE_DEMO: "0" });
  const { startApplication } = await import("~/services/start-application.server");
  const { keepSetUpCode, setUpOrganization } = await import("~/services/set-up-organization.server");
  const { presentModels } = await import("~/presenters/api-models.server");
  const { readUpload } = await import("~/services/read-upload.server");
  const { importModel } = await import("~/services/import-model.server");
  await startApplication();
  const person = { name: "Bench", email: "bench@merrow.example", password: "a-long-enough-password" };
  const intent = { code: keepSetUpCode(), organizationName: "Bench", ...person };
  const { organizationId } = getValue(await setUpOrganization(new Request("http://127.0.0.1/set-up"), intent));
  const author = { userId: "bench", name: person.name, email: person.email, memberships: [] };
  const importBytes = async (bytes: Uint8Array): Promise<readonly string[]> => {
    const upload = await readUpload(bytes, "bench.xml");
    const result = upload.ok ? await importModel(author, organizationId, upload.value, {}) : upload;
    return result.ok ? [] : result.problems.map((found) => found.code);
  };
  const server = createServer((request, response) => {
    void (async () => {
      if (request.method !== "POST") {
        response.end(JSON.stringify(await presentModels(organizationId)));
        return;
      }
      const chunks: Buffer[] = [];
      for await (const chunk of request) chunks.push(chunk as Buffer);
      const refused = await importBytes(Buffer.concat(chunks));
      response.writeHead(refused.length === 0 ? 201 : 422).end(refused.join(" "));
    })();
  });
  server.listen(0, "127.0.0.1", () => {
    const address = server.address();
    void answerParent({ port: address && typeof address === "object" ? address.port : 0 });
  });
}

/** Objects with ten Variables each, as many as fill the file. */
function makeFile(): string {
  const header = {
    namespaceUris: [NAMESPACE],
    models: [
      {
        modelUri: NAMESPACE,
        requiredModels: [{ modelUri: "http://opcfoundation.org/UA/", requiredModels: [] }],
      },
    ],
  };
  const sample = writeNodeSet({ header, nodes: makeNodes(110) }).xml.length / 110;
  return writeNodeSet({ header, nodes: makeNodes(Math.ceil(BYTES / sample)) }).xml;
}

function makeNodes(count: number): Node[] {
  let owner = standardKey(85);
  return Array.from({ length: count }, (_, order): Node => {
    const nodeId = numericNodeId(NAMESPACE, order + 1);
    const key = toNodeKey(nodeId);
    const isObject = order % 11 === 0;
    const parent = isObject ? standardKey(85) : owner;
    if (isObject) owner = key;
    const common = {
      key,
      nodeId,
      order,
      browseName: { namespaceUri: NAMESPACE, name: `N${order}` },
      displayName: [{ text: `Node ${order}` }],
      description: [{ text: "What this node is for, in a sentence as they stand in files." }],
      parent,
      references: [
        { type: standardKey(isObject ? 35 : 47), target: parent, isForward: false },
        { type: standardKey(40), target: standardKey(isObject ? 58 : 63), isForward: true },
      ],
    };
    return isObject
      ? { ...common, nodeClass: "Object" }
      : { ...common, nodeClass: "Variable", dataType: standardKey(11) };
  });
}
