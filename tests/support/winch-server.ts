/** A small model with one of each kind of Variable, and how to start a test server on it without database or web. */
import { mkdtempSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { nodesets } from "node-opcua-nodesets";
import { AddressSpace, buildLayer, type Layer } from "~/domain/address-space/address-space";
import { getValue } from "~/domain/core/result";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { planSimulation, type SimulatedVariable } from "~/domain/simulation/plan-simulation";
import type { StartMessage } from "~/opcua/messages";
import type { Supervisor, TestServerSeed } from "~/opcua/supervisor.server";
import type { TestServerState } from "~/domain/simulation/test-server-state";

export const WINCH_URI = "http://merrow.example/UA/Winch/";
export const winchFile = fileURLToPath(new URL("../fixtures/test-server/winch.NodeSet2.xml", import.meta.url));

const folders: string[] = [];

/** A folder for one test file; `removeTestFolders` takes all of them away. */
export function makeTestFolder(name: string): string {
  const folder = mkdtempSync(join(tmpdir(), `ferrule-${name}-`));
  folders.push(folder);
  return folder;
}

export function removeTestFolders(): void {
  for (const folder of folders.splice(0)) rmSync(folder, { recursive: true, force: true, maxRetries: 5 });
}

let planned: SimulatedVariable[] | undefined;

export function planWinch(): SimulatedVariable[] {
  return (planned ??= planSimulation(AddressSpace.of([readLayer(nodesets.standard)], readLayer(winchFile))));
}

function readLayer(file: string): Layer {
  const { header, nodes } = getValue(readNodeSet(readFileSync(file, "utf8")));
  return buildLayer(header, nodes);
}

export function makeSeed(id: string, security: TestServerSeed["security"] = ["basic256sha256"]): TestServerSeed {
  return {
    id,
    organizationId: "merrow",
    modelId: "winch",
    modelName: "Winch",
    applicationName: "Winch (simulation)",
    applicationUri: "urn:ferrule:simulation:winch",
    security,
    simulatedQuality: "uncertain",
    tokens: { anonymous: true, userName: "tester", password: "hawser" },
  };
}

export function makeStartMessage(seed: TestServerSeed, change: Partial<StartMessage> = {}): StartMessage {
  return {
    kind: "start",
    id: seed.id,
    applicationName: seed.applicationName,
    applicationUri: seed.applicationUri,
    pkiFolder: makeTestFolder("pki"),
    host: "127.0.0.1",
    port: 0,
    security: [...seed.security],
    userName: seed.tokens.userName,
    password: seed.tokens.password,
    simulatedQuality: seed.simulatedQuality,
    nodeSetFiles: [nodesets.standard, winchFile],
    simulation: planWinch().map((entry) => ({
      ...entry,
      dimensions: [...entry.dimensions],
      motion: copyMotion(entry.motion),
    })),
    methods: [`nsu=${WINCH_URI};i=7001`, `nsu=${WINCH_URI};i=7002`],
    maxSessions: 20,
    ...change,
  };
}

function copyMotion(motion: SimulatedVariable["motion"]): StartMessage["simulation"][number]["motion"] {
  return motion.kind === "steps" ? { ...motion, values: [...motion.values] } : motion;
}

/** Starts and waits for running or failed, at most 40 s. */
export async function startWinch(
  supervisor: Supervisor,
  seed: TestServerSeed,
  change: Partial<StartMessage> = {},
): Promise<TestServerState> {
  supervisor.announce(seed);
  supervisor.launch(makeStartMessage(seed, change), { sampleInstances: [], landingNode: null, servedSeq: 0 });
  return waitFor(() => {
    const state = supervisor.get(seed.id);
    return state && state.state !== "starting" ? state : undefined;
  }, 90_000);
}

/** Polls until the answer is there; throws when it does not come within the limit. */
export async function waitFor<T>(ask: () => T | undefined | Promise<T | undefined>, limit = 10_000): Promise<T> {
  const end = Date.now() + limit;
  for (;;) {
    const answer = await ask();
    if (answer !== undefined) return answer;
    if (Date.now() > end) throw new Error(`Nothing came within ${limit} ms`);
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}
