import { randomBytes } from "node:crypto";
import { hostname } from "node:os";
import { join } from "node:path";
import { z } from "zod";
import { addAuditStatement } from "../db/repositories/audit.server";
import { saveNewTestServer } from "../db/repositories/test-servers.server";
import { AddressSpace } from "../domain/address-space/address-space";
import { fail, ok, problem, type Result } from "../domain/core/result";
import type { MachineFeed } from "../domain/mapping/make-feed";
import { listAnsweredMethods } from "../domain/simulation/list-answered-methods";
import { makeSampleInstances } from "../domain/simulation/make-sample-instances";
import { planSimulation, type SimulatedVariable } from "../domain/simulation/plan-simulation";
import type { TestServerState } from "../domain/simulation/test-server-state";
import type { StartMessage } from "../opcua/messages";
import { getSupervisor, type TestServerSeed } from "../opcua/supervisor.server";
import { getEnvironment } from "../utils/env.server";
import { newId } from "../utils/ids.server";
import { logError } from "../utils/log.server";
import { feedTestServer, planFeed } from "./feed-test-server.server";
import { followTestServers } from "./follow-test-servers.server";
import { getTestServerFolder, removeTestServerFiles, writeTestServerFiles } from "./test-server-files.server";
import { loadWorkingModel } from "./working-model.server";

/** What a caller may choose; the API takes it as its body. "none" opens the server to everybody on this host. */
export const testServerIntentSchema = z.strictObject({
  security: z.array(z.enum(["basic256sha256", "none"])).min(1).max(2).default(["basic256sha256"]),
  simulatedQuality: z.enum(["uncertain", "good"]).default("uncertain"),
  /** `live`: machines with a mapping are fed by their sources; what nothing feeds has no value then. */
  values: z.enum(["simulated", "live"]).default("simulated"),
});
export type TestServerIntent = z.infer<typeof testServerIntentSchema>;

/** Who starts it, for the audit. */
type Person = { readonly userId: string; readonly name: string };
type ModelOfServer = { readonly id: string; readonly organizationId: string; readonly name: string };

const MAX_SESSIONS = 50;
const HOST = "127.0.0.1";

/**
 * Starts a test server on the model's working state and answers at once, in state "starting"; who asked for it has the
 * permission. Problems: `test-server.limit`. What goes wrong later is in the server's state.
 */
export async function startTestServer(model: ModelOfServer, by: Person, intent: TestServerIntent): Promise<Result<TestServerState>> {
  const supervisor = getSupervisor();
  await followTestServers();
  const full = supervisor.checkRoom();
  if (full) return fail(full);
  const seed = makeSeed(model, intent);
  const state = supervisor.announce(seed);
  const row = {
    id: seed.id,
    organizationId: model.organizationId,
    modelId: model.id,
    state: "starting" as const,
    options: { ...intent },
    problems: [],
    ownerPid: process.pid,
    ownerHost: hostname(),
    startedBy: by.userId,
    startedAt: new Date(state.startedAt),
    heartbeatAt: new Date(state.startedAt),
  };
  await saveNewTestServer(row, auditOf("test-server.start", model, by, { testServer: seed.id, ...intent }));
  void prepare(seed, intent.values)
    .catch((error: unknown) => failStart(seed, error))
    .then(() => clearWhenStopped(seed.id));
  return ok(state);
}

function auditOf(action: "test-server.start", model: ModelOfServer, by: Person, details: Readonly<Record<string, unknown>>): ReturnType<typeof addAuditStatement> {
  const { id, name, organizationId } = model;
  return addAuditStatement({ organizationId, userId: by.userId, userName: by.name, action, subject: { kind: "model", id, name }, details });
}

function failStart(seed: TestServerSeed, error: unknown): void {
  const supervisor = getSupervisor();
  // Whoever stopped it meanwhile has taken its folder away too; that is no error.
  if (!supervisor.get(seed.id)) return;
  logError(error, "start of a test server");
  supervisor.failStart(seed.id, [problem("test-server.start", { detail: "the model's files could not be written" })]);
}

/** A server that was stopped while its files were written leaves none behind. */
async function clearWhenStopped(id: string): Promise<void> {
  if (!getSupervisor().get(id)) await removeTestServerFiles(getTestServerFolder(id));
}

function makeSeed(model: ModelOfServer, { security, simulatedQuality }: TestServerIntent): TestServerSeed {
  return {
    id: newId(),
    organizationId: model.organizationId,
    modelId: model.id,
    modelName: model.name,
    applicationName: `${model.name} (simulation)`,
    applicationUri: `urn:ferrule:simulation:${model.id}`,
    security: [...new Set(security)],
    simulatedQuality,
    tokens: { anonymous: true, userName: "tester", password: randomBytes(9).toString("base64url") },
  };
}

async function prepare(seed: TestServerSeed, values: TestServerIntent["values"]): Promise<void> {
  const supervisor = getSupervisor();
  const working = await loadWorkingModel(seed.modelId);
  if (!working) return supervisor.failStart(seed.id, [problem("test-server.model-gone")]);
  if (working.missing.length > 0) return supervisor.failStart(seed.id, working.missing);
  const { space, model, layers } = working;
  const samples = model.kind === "types" ? makeSampleInstances(space) : undefined;
  const nodeSetFiles = await writeTestServerFiles(getTestServerFolder(seed.id), working, samples ? [samples.layer] : []);
  // Machines of required models are part of what the server shows, so they move too.
  const team = layers.filter((required) => required.from).map((required) => required.layer);
  const served = samples ? AddressSpace.of(space.layers, samples.layer) : space;
  const moved = [...team, space.own, ...(samples ? [samples.layer] : [])];
  const feed = values === "live" ? await planFeed(model.organizationId, space) : undefined;
  const simulation = feed ? planSimulation(served, moved).map(holdStill) : planSimulation(served, moved);
  const message = { ...toStartMessage(seed, nodeSetFiles, simulation), methods: listAnsweredMethods(served, moved) };
  supervisor.launch({ ...message, ...(feed ? { feed: feed.machines.map(toFeedMessage) } : {}) }, {
    servedSeq: working.seq,
    sampleInstances: samples?.names ?? [],
    landingNode: (simulation.find(({ motion }) => motion.kind === "sine" || motion.kind === "ramp") ?? simulation[0])?.nodeId ?? null,
  });
  if (feed) await feedTestServer(seed.id, model.organizationId, feed);
}

/** On a server with live values nothing is made up: what moves in a simulation keeps the model's value, or has none. */
function holdStill(entry: SimulatedVariable): SimulatedVariable {
  return entry.motion.kind === "static" ? entry : { ...entry, motion: { kind: "static" } };
}

/** Plain data for the message, lists copied. */
function toFeedMessage(machine: MachineFeed): NonNullable<StartMessage["feed"]>[number] {
  const layouts = machine.layouts.map((layout) => ({ ...layout, profileCharacteristic: [...layout.profileCharacteristic] }));
  return { ...machine, layouts, unbound: [...machine.unbound], nodes: [...machine.nodes], ranges: { ...machine.ranges } };
}

function toStartMessage(seed: TestServerSeed, nodeSetFiles: string[], simulation: readonly SimulatedVariable[]): Omit<StartMessage, "methods"> {
  const { id, applicationName, applicationUri, security, simulatedQuality, tokens } = seed;
  return {
    kind: "start",
    id,
    applicationName,
    applicationUri,
    // One folder a model: its certificate stays the same from start to start, so that clients need to trust it once.
    pkiFolder: join(getEnvironment().dataFolder, "pki", `test-server-${seed.modelId}`),
    host: HOST,
    port: 0,
    security: [...security],
    userName: tokens.userName,
    password: tokens.password,
    simulatedQuality,
    nodeSetFiles,
    simulation: simulation.map(toMessage),
    maxSessions: MAX_SESSIONS,
  };
}

function toMessage(entry: SimulatedVariable): StartMessage["simulation"][number] {
  const { motion } = entry;
  return {
    ...entry,
    dimensions: [...entry.dimensions],
    motion: motion.kind === "steps" ? { ...motion, values: [...motion.values] } : motion,
  };
}
