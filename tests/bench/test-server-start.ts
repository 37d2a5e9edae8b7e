/**
 * Start of the test server with the demo's hall against a bare node-opcua server that loads the same files: from fork to
 * the message that it is ready, and the memory that each then holds. Both have keys of their own from a round before.
 */
import { fork, type ChildProcess } from "node:child_process";
import { mkdtempSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { AddressSpace, buildLayer, type Layer } from "~/domain/address-space/address-space";
import { getValue } from "~/domain/core/result";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { listAnsweredMethods } from "~/domain/simulation/list-answered-methods";
import { planSimulation } from "~/domain/simulation/plan-simulation";
import { getPackageFolder } from "~/library/published.server";
import { findProjectRoot } from "~/utils/project-root.server";
import { answerParent, forkChild, readMemory, waitForMessage } from "./child";
import { compare, median, type BenchResult } from "./result";

type Start = { time: number; memory: number };

const ROUNDS = 5;

export async function measureTestServerStart(): Promise<BenchResult[]> {
  const files = listHallFiles();
  const scratch = mkdtempSync(join(tmpdir(), "ferrule-bench-"));
  const message = makeStartMessage(files, join(scratch, "own"));
  const startOwn = (): ChildProcess => {
    const child = fork(fileURLToPath(import.meta.resolve("./test-server.js")), [], {
      execArgv: [],
      silent: true,
      serialization: "advanced",
    });
    child.send(message);
    return child;
  };
  const startBare = (): ChildProcess => forkChild("bare-server", [join(scratch, "bare"), ...files]);
  try {
    await measureStart(startOwn());
    await measureStart(startBare());
    const own: Start[] = [];
    const bare: Start[] = [];
    for (let round = 0; round < ROUNDS; round++) {
      own.push(await measureStart(startOwn()));
      bare.push(await measureStart(startBare()));
    }
    const of = (list: Start[], pick: keyof Start): number => median(list.map((start) => start[pick]));
    return [
      compare("start of a test server with six machines", "ms", of(own, "time"), of(bare, "time"), 1.25),
      compare("memory of a test server with six machines", "MB", of(own, "memory"), of(bare, "memory"), 1.2),
    ];
  } finally {
    rmSync(scratch, { recursive: true, force: true });
  }
}

/** Forked just before; the time of a fork itself is below a millisecond. */
async function measureStart(child: ChildProcess): Promise<Start> {
  const since = performance.now();
  const gone = new Promise<void>((resolve) => child.once("exit", () => resolve()));
  await waitForMessage(child, (message) => (message as { kind?: string }).kind === "ready");
  const time = performance.now() - since;
  const memory = readMemory(child.pid ?? 0);
  child.kill("SIGTERM");
  await gone;
  return { time, memory };
}

export async function runBareServer(pkiFolder: string, files: readonly string[]): Promise<void> {
  const { OPCUACertificateManager, OPCUAServer } = await import("node-opcua");
  const certificates = new OPCUACertificateManager({
    rootFolder: pkiFolder,
    automaticallyAcceptUnknownCertificate: true,
  });
  const server = new OPCUAServer({
    port: 0,
    hostname: "127.0.0.1",
    nodeset_filename: [...files],
    serverCertificateManager: certificates,
  });
  await server.initialize();
  await server.start();
  process.on("SIGTERM", () => void server.shutdown(0).then(() => process.exit(0)));
  await answerParent({ kind: "ready", endpointUrl: `opc.tcp://127.0.0.1:${server.endpoints[0]?.port ?? 0}` });
}

function listHallFiles(): string[] {
  const published = [
    "Opc.Ua.NodeSet2.xml",
    "Opc.Ua.Di.NodeSet2.xml",
    "Opc.Ua.IA.NodeSet2.xml",
    "Opc.Ua.Machinery.NodeSet2.xml",
  ];
  const demo = ["merrow-rope-braider.NodeSet2.xml", "merrow-hall.NodeSet2.xml"];
  return [
    ...published.map((name) => join(getPackageFolder(), name)),
    ...demo.map((name) => join(findProjectRoot(), "nodesets", "demo", name)),
  ];
}

function makeStartMessage(files: readonly string[], pkiFolder: string): object {
  const layers = files.map(readLayer);
  const own = layers.pop();
  if (!own) throw new RangeError("No files");
  return {
    kind: "start",
    id: "bench",
    applicationName: "Merrow hall (simulation)",
    applicationUri: "urn:ferrule:simulation:bench",
    pkiFolder,
    host: "127.0.0.1",
    port: 0,
    security: ["basic256sha256"],
    userName: "tester",
    password: "hawser",
    simulatedQuality: "uncertain",
    nodeSetFiles: files,
    simulation: planSimulation(AddressSpace.of(layers, own)),
    methods: listAnsweredMethods(AddressSpace.of(layers, own), [own]),
    maxSessions: 20,
  };
}

function readLayer(file: string): Layer {
  const { header, nodes } = getValue(readNodeSet(readFileSync(file, "utf8")));
  return buildLayer(header, nodes);
}
