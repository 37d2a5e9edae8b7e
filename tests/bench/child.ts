/** Fresh processes of a benchmark: this very bundle, told by its arguments what to do. */
import { fork, type ChildProcess } from "node:child_process";
import { readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";

const LIMIT_MS = 120_000;

/** Runs `--child name …args` in a process of its own and answers the one message that it sends. */
export async function runChild<T>(name: string, args: readonly string[]): Promise<T> {
  const child = forkChild(name, args);
  const answer = await waitForMessage<T>(child);
  child.kill();
  return answer;
}

export function forkChild(name: string, args: readonly string[]): ChildProcess {
  return fork(fileURLToPath(import.meta.resolve("./bench.js")), ["--child", name, ...args], {
    execArgv: ["--expose-gc"],
    silent: true,
  });
}

/** The first message that `accept` takes; throws with what the process printed when it ends before, or is too slow. */
export async function waitForMessage<T>(
  child: ChildProcess,
  accept: (message: unknown) => boolean = () => true,
): Promise<T> {
  let printed = "";
  child.stderr?.on("data", (chunk) => (printed += String(chunk)));
  child.stdout?.resume();
  return new Promise<T>((resolve, reject) => {
    const timer = setTimeout(() => {
      child.kill("SIGKILL");
      reject(new Error(`A process of the benchmark took more than ${LIMIT_MS} ms: ${printed}`));
    }, LIMIT_MS);
    child.on("message", (message) => {
      if (!accept(message)) return;
      clearTimeout(timer);
      resolve(message as T);
    });
    child.once("exit", (code) => {
      clearTimeout(timer);
      reject(new Error(`A process of the benchmark ended with ${code}: ${printed}`));
    });
  });
}

export async function answerParent(message: object): Promise<void> {
  await new Promise<void>((resolve) => process.send?.(message, () => resolve()));
}

/** Resident memory of a process in MB, as Linux counts it. */
export function readMemory(pid: number): number {
  const match = /^VmRSS:\s+(\d+) kB/m.exec(readFileSync(`/proc/${pid}/status`, "utf8"));
  if (!match) throw new Error(`No memory figure for process ${pid}`);
  return Number(match[1]) / 1024;
}

/** Heap in use after a collection, MB. */
export function readHeap(): number {
  globalThis.gc?.();
  globalThis.gc?.();
  return process.memoryUsage().heapUsed / 1024 / 1024;
}
