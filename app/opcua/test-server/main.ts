/**
 * The process of one test server. It is told everything by one message, reads files only, reports by messages, and ends
 * when it is told to, when it fails, or when its parent is gone.
 */
import { join } from "node:path";
import { setTimeout as wait } from "node:timers/promises";
import type { OPCUAServer } from "node-opcua";
import type { FeedInput } from "~/domain/mapping/plan-readings";
import { toChildSchema, type StartMessage, type ToParentMessage } from "../messages";

/** Sessions are looked at this often while the server runs, ms. */
const SESSION_REPORT_INTERVAL = 1000;
const SHUTDOWN_LIMIT = 2500;
/** The load is told with every so many looks at the sessions. */
const LOOKS_A_LOAD = 5;

let running: { server: OPCUAServer; timer: NodeJS.Timeout } | undefined;
let feed: { offer(inputs: readonly FeedInput[]): void; stop(): void } | undefined;
let isEnding = false;

process.on("message", (raw) => {
  const message = toChildSchema.safeParse(raw);
  if (!message.success) {
    void fail("test-server.message", { detail: message.error.issues[0]?.message ?? "unreadable" });
  } else if (message.data.kind === "stop") {
    void end(0);
  } else if (message.data.kind === "inputs") {
    feed?.offer(message.data.inputs);
  } else {
    start(message.data).catch((error: unknown) => fail("test-server.start", { detail: error instanceof Error ? error.message : String(error) }));
  }
});
process.on("disconnect", () => void end(0));
process.on("SIGTERM", () => void end(0));
// The terminal's Ctrl+C reaches the whole group; the parent decides when its children end.
process.on("SIGINT", () => undefined);
process.on("uncaughtException", (error) => void fail("test-server.crash", { detail: error.message }));
process.on("unhandledRejection", (error) => void fail("test-server.crash", { detail: error instanceof Error ? error.message : String(error) }));

async function start(config: StartMessage): Promise<void> {
  send({ kind: "progress", stage: "process" });
  // Loaded here and not at the head, so that "process" is reported before the one or two seconds that this takes.
  const { createCertificateManager, createServer } = await import("./create-server");
  const { addNotice } = await import("./add-notice");
  const { answerMethods } = await import("./answer-methods");
  const { bindSimulation } = await import("./bind-simulation");

  send({ kind: "progress", stage: "certificate" });
  const certificates = await createCertificateManager(join(config.pkiFolder, "server"), { acceptsUnknown: true });
  const userCertificates = await createCertificateManager(join(config.pkiFolder, "users"), { acceptsUnknown: false });
  const server = createServer(config, certificates, userCertificates);

  send({ kind: "progress", stage: "nodesets" });
  await server.initialize();
  const space = server.engine.addressSpace;
  if (!space) throw new Error("The server has no address space after its initialisation.");

  send({ kind: "progress", stage: "simulation" });
  addNotice(space);
  const bound = bindSimulation(space, config.simulation, config.simulatedQuality, () => Date.now(), !config.feed);
  answerMethods(space, config.methods, (text) => log("info", text));
  if (config.feed) {
    const { startFeed } = await import("./bind-feed");
    feed = startFeed(space, config.feed, { now: () => Date.now(), log: (text) => log("warning", text), report: (state) => send({ kind: "feed", ...state }) });
  }

  send({ kind: "progress", stage: "endpoint" });
  await server.start();
  const timer = await watchSessions(server);
  running = { server, timer };
  if (isEnding) return;
  for (const { nodeId, detail } of bound.refused) log("warning", `${nodeId} is not simulated: ${detail}`);
  const port = server.endpoints[0]?.port ?? config.port;
  const certificate = server.getCertificate();
  const { createHash } = await import("node:crypto");
  send({
    kind: "ready",
    endpointUrl: `opc.tcp://${config.host}:${port}`,
    certificate: Buffer.from(certificate).toString("base64"),
    certificateThumbprint: createHash("sha1").update(certificate).digest("hex"),
    moving: bound.moving,
    fixed: bound.fixed,
    missing: bound.missing,
  });
}

async function watchSessions(server: OPCUAServer): Promise<NodeJS.Timeout> {
  const { listSessions } = await import("./list-sessions");
  let last = "[]";
  let looks = 0;
  let before = { at: performance.now(), used: process.cpuUsage() };
  const reportLoad = (): void => {
    const now = { at: performance.now(), used: process.cpuUsage() };
    const used = now.used.user + now.used.system - before.used.user - before.used.system;
    send({ kind: "load", memory: Math.round(process.memoryUsage.rss() / 1e6), processor: used / 1000 / (now.at - before.at) });
    before = now;
  };
  const report = (): void => {
    if (++looks % LOOKS_A_LOAD === 0) reportLoad();
    const sessions = listSessions(server);
    const text = JSON.stringify(sessions);
    if (text === last) return;
    last = text;
    send({ kind: "sessions", sessions });
  };
  server.on("session_activated", (session) => log("info", `Session “${session.sessionName}” opened.`));
  server.on("session_closed", (session) => log("info", `Session “${session.sessionName}” closed.`));
  server.on("connectionRefused", () => log("warning", "A connection was refused: too many connections."));
  server.on("openSecureChannelFailure", () => log("warning", "A secure channel could not be opened."));
  return setInterval(report, SESSION_REPORT_INTERVAL);
}

function log(level: "info" | "warning" | "error", text: string): void {
  send({ kind: "log", level, text });
}

function send(message: ToParentMessage): void {
  if (process.connected) process.send?.(message);
}

async function fail(code: string, data: Record<string, string | number | boolean>): Promise<void> {
  send({ kind: "failed", code, data });
  await end(1);
}

/** Ends within the limit whatever the server does; sessions get a chance to be told. */
async function end(exitCode: number): Promise<void> {
  if (isEnding) return;
  isEnding = true;
  if (running) {
    clearInterval(running.timer);
    feed?.stop();
    await Promise.race([running.server.shutdown(100), wait(SHUTDOWN_LIMIT)]).catch(() => undefined);
  }
  send({ kind: "stopped" });
  // Leaves the channel a turn for the last message; nothing else keeps the process.
  setImmediate(() => process.exit(exitCode));
}
