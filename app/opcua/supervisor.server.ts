/**
 * The supervisor owns the processes of test servers: it forks them, follows their stages, keeps the end of their log, and
 * ends them. Nothing else kills a child, and no child outlives the application: a child leaves when its channel closes.
 *
 * It knows nothing of models, databases or pages; a service hands it a finished start message and listens to changes.
 * A crash of a child is a state with its last lines, never an exception in the application.
 */
import { fork, type ChildProcess } from "node:child_process";
import { existsSync } from "node:fs";
import { join } from "node:path";
import { createInterface } from "node:readline";
import { stripVTControlCharacters } from "node:util";
import { formatProblem } from "~/domain/core/problem-texts";
import { problem, type Problem } from "~/domain/core/result";
import type { FeedInput } from "~/domain/mapping/plan-readings";
import type { LogLine, TestServerStage, TestServerState } from "~/domain/simulation/test-server-state";
import { findProjectRoot } from "~/utils/project-root.server";
import { onShutdown } from "~/utils/shutdown.server";
import { singleton } from "~/utils/singleton.server";
import { toParentSchema, type StartMessage, type ToParentMessage } from "./messages";

export type SupervisorOptions = {
  /** The child's bundle. */
  entry: string;
  /** Limit from fork to ready, ms. */
  startTimeout?: number;
  /** Patience between SIGTERM and SIGKILL, ms. */
  stopTimeout?: number;
  maxRunning?: number;
  /** Old space of a child, MB. */
  maxMemory?: number;
  /** Waits before a crashed child is started again, ms; after as many crashes it stays failed. */
  restartDelays?: readonly number[];
};

/** What the page shows of a server before its process runs. */
export type TestServerSeed = Pick<
  TestServerState,
  "id" | "organizationId" | "modelId" | "modelName" | "applicationName" | "applicationUri" | "security" | "simulatedQuality" | "tokens"
>;

export type SupervisorEvent =
  | { readonly kind: "state"; readonly state: TestServerState }
  | { readonly kind: "log"; readonly id: string; readonly lines: readonly LogLine[] }
  | { readonly kind: "removed"; readonly state: TestServerState };

type Entry = {
  state: TestServerState;
  log: LogLine[];
  certificate: Buffer | undefined;
  child: ChildProcess | undefined;
  startTimer: NodeJS.Timeout | undefined;
  restartTimer: NodeJS.Timeout | undefined;
  message: StartMessage | undefined;
  /** In a row; a server that ran for a while begins anew. */
  crashes: number;
  /** What the child said of itself before it went. */
  lastWords: Problem | undefined;
  /** Why it was started again. */
  restart: Problem | undefined;
  /** Settles when the process is gone. */
  gone: Promise<void>;
};

/** What the library says at every start on Node.js 20 about a padding that no policy offered here uses. */
const NOISE = /\[NODE-OPCUA-W27\]|--security-revert=CVE-2023-46809/;
const LOG_LIMIT = 400;
const LAST_LINES = 5;
const FINISHED_LIMIT = 24;
const RESTART_DELAYS = [1_000, 5_000, 20_000];
/** Running as long as this, a server counts as recovered, ms. */
const RECOVERED = 300_000;

export class Supervisor {
  readonly #options: Required<SupervisorOptions>;
  readonly #entries = new Map<string, Entry>();
  readonly #listeners = new Set<(event: SupervisorEvent) => void>();

  constructor(options: SupervisorOptions) {
    this.#options = {
      entry: options.entry,
      startTimeout: options.startTimeout ?? 120_000,
      stopTimeout: options.stopTimeout ?? 3_000,
      maxRunning: options.maxRunning ?? 8,
      maxMemory: options.maxMemory ?? 1024,
      restartDelays: options.restartDelays ?? RESTART_DELAYS,
    };
  }

  list(): TestServerState[] {
    return [...this.#entries.values()].map((entry) => entry.state);
  }

  get(id: string): TestServerState | undefined {
    return this.#entries.get(id)?.state;
  }

  getLog(id: string): readonly LogLine[] {
    return this.#entries.get(id)?.log ?? [];
  }

  /** The certificate of a running server, DER, for clients of ours to pin. */
  getCertificate(id: string): Buffer | undefined {
    return this.#entries.get(id)?.certificate;
  }

  /** Process id of the child, while it lives. */
  getPid(id: string): number | undefined {
    return this.#entries.get(id)?.child?.pid;
  }

  onChange(listener: (event: SupervisorEvent) => void): () => void {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  }

  /** Whether one more may run; the limit guards the machine's memory. */
  checkRoom(): Problem | undefined {
    const limit = this.#options.maxRunning;
    return this.#countAlive() >= limit ? problem("test-server.limit", { limit }) : undefined;
  }

  /** Notes a server as starting, before its files are made. */
  announce(seed: TestServerSeed): TestServerState {
    const state: TestServerState = {
      ...seed,
      state: "starting",
      stage: "files",
      startedAt: new Date().toISOString(),
      runningAt: null,
      endedAt: null,
      endpointUrl: null,
      certificateThumbprint: null,
      simulation: null,
      feed: null,
      load: null,
      sessions: [],
      problems: [],
      sampleInstances: [],
      landingNode: null,
      servedSeq: null,
    };
    const none = { certificate: undefined, child: undefined, startTimer: undefined, restartTimer: undefined, message: undefined, lastWords: undefined, restart: undefined };
    this.#entries.set(seed.id, { ...none, state, log: [], crashes: 0, gone: Promise.resolve() });
    this.#forgetFinished();
    this.#emit({ kind: "state", state });
    return state;
  }

  /** Forks the process of an announced server. Does nothing when it was stopped meanwhile. */
  launch(message: StartMessage, content: Pick<TestServerState, "sampleInstances" | "landingNode" | "servedSeq">): void {
    const entry = this.#entries.get(message.id);
    if (entry?.state.state !== "starting") return;
    const file = this.#options.entry;
    if (!existsSync(file)) {
      this.#fail(entry, problem("test-server.not-built", { file }));
      return;
    }
    entry.message = message;
    this.#update(entry, { stage: "process", ...content });
    this.#fork(entry, message);
  }

  #fork(entry: Entry, message: StartMessage): void {
    entry.lastWords = undefined;
    const child = fork(this.#options.entry, [], {
      execArgv: [`--max-old-space-size=${this.#options.maxMemory}`],
      silent: true,
      serialization: "advanced",
    });
    entry.child = child;
    entry.gone = new Promise((resolve) => child.once("exit", () => resolve()));
    entry.startTimer = setTimeout(() => {
      this.#fail(entry, problem("test-server.start-timeout", { seconds: this.#options.startTimeout / 1000 }));
      void this.#end(entry);
    }, this.#options.startTimeout);
    this.#readLines(entry, child);
    child.on("message", (raw) => this.#receive(entry, raw));
    child.on("error", (error) => this.#fail(entry, problem("test-server.start", { detail: error.message })));
    child.once("exit", (code, signal) => this.#afterExit(entry, code, signal));
    child.send(message, () => undefined);
  }

  /** Hands inputs of live sources to a server that runs; to any other they are lost, as for a gateway that is off. */
  feed(id: string, inputs: readonly FeedInput[]): void {
    const entry = this.#entries.get(id);
    if (entry?.state.state !== "running" || !entry.child?.connected) return;
    entry.child.send({ kind: "inputs", inputs }, () => undefined);
  }

  /** Notes that the files could not be made. */
  failStart(id: string, problems: readonly Problem[]): void {
    const entry = this.#entries.get(id);
    if (entry) this.#fail(entry, ...problems);
  }

  /** Ends a server and waits until its process, and so its port, is gone. */
  async stop(id: string): Promise<void> {
    const entry = this.#entries.get(id);
    if (!entry) return;
    const isAlive = entry.state.state === "starting" || entry.state.state === "running";
    if (isAlive) this.#update(entry, { state: "stopping" });
    await this.#end(entry);
    if (entry.state.state === "stopping") this.#update(entry, { state: "stopped", endedAt: new Date().toISOString(), endpointUrl: null, sessions: [] });
    this.#entries.delete(id);
    this.#emit({ kind: "removed", state: entry.state });
  }

  async stopAll(): Promise<void> {
    await Promise.all([...this.#entries.keys()].map((id) => this.stop(id)));
  }

  async #end(entry: Entry): Promise<void> {
    const { child } = entry;
    clearTimeout(entry.startTimer);
    clearTimeout(entry.restartTimer);
    if (!child || child.exitCode !== null || child.signalCode !== null) return;
    if (child.connected) child.send({ kind: "stop" }, () => undefined);
    const term = setTimeout(() => child.kill("SIGTERM"), this.#options.stopTimeout / 2);
    const kill = setTimeout(() => child.kill("SIGKILL"), this.#options.stopTimeout);
    await entry.gone;
    clearTimeout(term);
    clearTimeout(kill);
  }

  #receive(entry: Entry, raw: unknown): void {
    const message = toParentSchema.safeParse(raw);
    if (!message.success) {
      this.#log(entry, "warning", "The process sent a message that is not understood.");
      return;
    }
    this.#apply(entry, message.data);
  }

  #apply(entry: Entry, message: ToParentMessage): void {
    switch (message.kind) {
      case "progress":
        if (entry.state.state === "starting") this.#update(entry, { stage: message.stage satisfies TestServerStage });
        return;
      case "ready":
        this.#becomeReady(entry, message);
        return;
      case "feed": {
        const { inputs, changes, delay } = message;
        this.#update(entry, { feed: { inputs, changes, delay } });
        return;
      }
      case "sessions":
        this.#update(entry, { sessions: message.sessions });
        return;
      case "load":
        this.#update(entry, { load: { memory: message.memory, processor: message.processor } });
        return;
      case "log":
        this.#log(entry, message.level, message.text);
        return;
      case "failed":
        entry.lastWords = problem(message.code, message.data);
        // Of a server that ran its process's end decides: it may be started again.
        if (entry.state.state !== "running") this.#fail(entry, entry.lastWords);
        return;
      case "stopped":
        this.#log(entry, "info", "Stopped.");
    }
  }

  #becomeReady(entry: Entry, message: Extract<ToParentMessage, { kind: "ready" }>): void {
    clearTimeout(entry.startTimer);
    if (entry.state.state !== "starting") return;
    entry.certificate = Buffer.from(message.certificate, "base64");
    this.#log(entry, "info", `Listening on ${message.endpointUrl}.`);
    const { moving, fixed, missing } = message;
    this.#update(entry, {
      state: "running",
      stage: null,
      runningAt: new Date().toISOString(),
      endpointUrl: message.endpointUrl,
      certificateThumbprint: message.certificateThumbprint,
      simulation: { moving, fixed },
      problems: [...(entry.restart ? [entry.restart] : []), ...missing.slice(0, 20).map((node) => problem.warning("test-server.node-missing", { node }, { node }))],
    });
  }

  #afterExit(entry: Entry, code: number | null, signal: NodeJS.Signals | null): void {
    clearTimeout(entry.startTimer);
    entry.child = undefined;
    const { state } = entry.state;
    if (state !== "starting" && state !== "running") return;
    const lines = entry.log.filter((line) => line.text !== "Stopped.").slice(-LAST_LINES);
    const lastLines = lines.map((line) => line.text).join("\n") || "The process wrote nothing.";
    const reason = signal ? `signal ${signal}` : `exit code ${String(code)}`;
    if (state === "running" && this.#startAgain(entry, entry.lastWords ? formatProblem(entry.lastWords) : reason)) return;
    this.#fail(entry, entry.lastWords ?? problem("test-server.exited", { reason, lastLines }));
  }

  /** At the same address after a while that grows; false when it crashed too often in a row. */
  #startAgain(entry: Entry, reason: string): boolean {
    const { message, state } = entry;
    if (state.runningAt !== null && Date.now() - Date.parse(state.runningAt) > RECOVERED) entry.crashes = 0;
    const delay = this.#options.restartDelays[entry.crashes];
    if (delay === undefined || !message) return false;
    entry.crashes++;
    entry.restart = problem.warning("test-server.restarted", { reason, crashes: entry.crashes, seconds: delay / 1000 });
    const port = Number(/:(\d+)/.exec(state.endpointUrl?.replace("opc.tcp:", "") ?? "")?.[1] ?? message.port);
    this.#log(entry, "error", formatProblem(entry.restart));
    this.#update(entry, { state: "starting", stage: "process", runningAt: null, endpointUrl: null, load: null, sessions: [], problems: [entry.restart] });
    entry.restartTimer = setTimeout(() => this.#fork(entry, { ...message, port }), delay);
    return true;
  }

  #fail(entry: Entry, ...problems: readonly Problem[]): void {
    if (entry.state.state === "stopping" || entry.state.state === "failed") return;
    clearTimeout(entry.startTimer);
    this.#update(entry, { state: "failed", endedAt: new Date().toISOString(), endpointUrl: null, load: null, sessions: [], problems });
  }

  #update(entry: Entry, change: Partial<TestServerState>): void {
    entry.state = { ...entry.state, ...change };
    this.#emit({ kind: "state", state: entry.state });
  }

  #readLines(entry: Entry, child: ChildProcess): void {
    for (const stream of [child.stdout, child.stderr]) {
      if (!stream) continue;
      createInterface({ input: stream }).on("line", (line) => {
        // Colour codes of a terminal and blank lines say nothing here.
        const text = stripVTControlCharacters(line).trimEnd();
        if (text !== "" && !NOISE.test(text)) this.#log(entry, "output", text.slice(0, 2000));
      });
    }
  }

  #log(entry: Entry, level: LogLine["level"], text: string): void {
    const line: LogLine = { at: new Date().toISOString(), level, text };
    entry.log = [...entry.log.slice(1 - LOG_LIMIT), line];
    this.#emit({ kind: "log", id: entry.state.id, lines: [line] });
  }

  #emit(event: SupervisorEvent): void {
    for (const listener of this.#listeners) listener(event);
  }

  #countAlive(): number {
    return this.list().filter((s) => s.state === "starting" || s.state === "running" || s.state === "stopping").length;
  }

  /** Failed servers stay until somebody takes them away, but not without end. */
  #forgetFinished(): void {
    const finished = [...this.#entries].filter(([, e]) => e.state.state === "failed" || e.state.state === "stopped");
    for (const [id] of finished.slice(0, Math.max(0, finished.length - FINISHED_LIMIT))) this.#entries.delete(id);
  }
}

/** The one supervisor of this process. Its children end before the database closes. */
export function getSupervisor(): Supervisor {
  return singleton("test-server-supervisor", () => {
    const supervisor = new Supervisor({ entry: join(findProjectRoot(), "build/node/test-server.js") });
    onShutdown("test servers", () => supervisor.stopAll());
    return supervisor;
  });
}
