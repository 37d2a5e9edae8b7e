/** The built application as a process of its own, on a free port and with a data folder of its own. */
import { spawn, type ChildProcess } from "node:child_process";
import { mkdtempSync, rmSync } from "node:fs";
import { createServer } from "node:net";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { findProjectRoot } from "~/utils/project-root.server";

const START_LIMIT_MS = 120_000;
/** What the application promises after SIGTERM. */
const STOP_LIMIT_MS = 5_000;

export type AppServer = {
  readonly url: string;
  /** What it has printed so far. */
  output(): string;
  /** Ends it as a power cut does, and leaves its data folder as it is. */
  kill(): Promise<void>;
  /** Ends it with SIGTERM; fails when it takes longer than promised. */
  stop(): Promise<void>;
};

/** Starts `npm run demo` or `npm start` as the launcher does, and waits until it answers. */
export async function startApp(
  target: "demo" | "server",
  env: Readonly<Record<string, string>> = {},
): Promise<AppServer> {
  const dataFolder = mkdtempSync(join(tmpdir(), "ferrule-e2e-"));
  const port = await findFreePort();
  const url = `http://127.0.0.1:${port}`;
  const child = spawn(process.execPath, ["app/cli/launch.mjs", target], {
    cwd: findProjectRoot(),
    env: { ...process.env, NODE_ENV: "production", PORT: String(port), FERRULE_DATA: dataFolder, ...env },
    detached: true,
  });
  let printed = "";
  child.stdout.on("data", (chunk) => (printed += String(chunk)));
  child.stderr.on("data", (chunk) => (printed += String(chunk)));
  const end = (): void => {
    killGroup(child);
    rmSync(dataFolder, { recursive: true, force: true });
  };
  try {
    await waitUntilAnswers(url, child, () => printed);
  } catch (error) {
    end();
    throw error;
  }
  return {
    url,
    output: () => printed,
    kill: async () => {
      const ended = new Promise((resolve) => child.once("exit", resolve));
      killGroup(child);
      await ended;
    },
    stop: async () => {
      const ended = await stopInTime(child);
      end();
      if (!ended) throw new Error(`The application did not end within ${STOP_LIMIT_MS} ms after SIGTERM:\n${printed}`);
    },
  };
}

async function waitUntilAnswers(url: string, child: ChildProcess, output: () => string): Promise<void> {
  const deadline = Date.now() + START_LIMIT_MS;
  while (Date.now() < deadline) {
    if (child.exitCode !== null)
      throw new Error(`The application ended with exit code ${child.exitCode}:\n${output()}`);
    const answered = await fetch(url, { redirect: "manual", signal: AbortSignal.timeout(10_000) }).catch(
      () => undefined,
    );
    if (answered && answered.status < 500) return;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  throw new Error(`The application did not answer within ${START_LIMIT_MS} ms:\n${output()}`);
}

async function stopInTime(child: ChildProcess): Promise<boolean> {
  if (child.exitCode !== null) return true;
  const ended = new Promise<true>((resolve) => child.once("exit", () => resolve(true)));
  child.kill("SIGTERM");
  const late = new Promise<false>((resolve) => setTimeout(() => resolve(false), STOP_LIMIT_MS).unref());
  return Promise.race([ended, late]);
}

/** The launcher leads a process group; what it left behind goes with it. */
function killGroup(child: ChildProcess): void {
  if (child.pid === undefined) return;
  try {
    process.kill(-child.pid, "SIGKILL");
  } catch {
    child.kill("SIGKILL");
  }
}

export async function findFreePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const server = createServer();
    server.on("error", reject);
    server.listen(0, "127.0.0.1", () => {
      const address = server.address();
      server.close(() =>
        address && typeof address === "object" ? resolve(address.port) : reject(new Error("No port")),
      );
    });
  });
}
