/**
 * Reads the bytes of a NodeSet2 file off the thread that answers requests. Small files are read at once: starting a
 * worker would take longer than they do.
 */
import { Worker } from "node:worker_threads";
import { decodeXmlBytes } from "../domain/nodeset/decode-xml-bytes";
import { READ_LIMITS } from "../domain/nodeset/limits";
import type { NodeSetContent } from "../domain/nodeset/nodeset-content";
import { readNodeSet } from "../domain/nodeset/read-nodeset";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { findReadWorker } from "./find-read-worker.server";
import { unpackResult, type ReadRequest, type ReadStep } from "./read-messages";

export type ReadFileOptions = {
  readonly fileName?: string;
  readonly onProgress?: (done: number, total: number) => void;
  /** Ends the read with the problem `read.cancelled`. */
  readonly signal?: AbortSignal;
};

const SMALL_FILE_BYTES = 128 * 1024;
/** The worker watches its own time; this much later it is ended from outside. */
const GRACE_MS = 2_000;
const MAX_WORKERS = 2;
const MILLISECONDS = READ_LIMITS.maxSeconds * 1_000;

let running = 0;
const waiting: (() => void)[] = [];

/** Problems: those of `decodeXmlBytes` and `readNodeSet`, `read.cancelled`, `read.worker-ended`. */
export async function readFileBytes(bytes: Uint8Array, options: ReadFileOptions = {}): Promise<Result<NodeSetContent>> {
  if (options.signal?.aborted) return fail(problem("read.cancelled"));
  const worker = bytes.length > SMALL_FILE_BYTES && bytes.length <= READ_LIMITS.maxBytes ? findReadWorker() : undefined;
  if (worker === undefined) return readHere(bytes, options);
  if (running >= MAX_WORKERS) await new Promise<void>((resolve) => waiting.push(resolve));
  running++;
  try {
    return options.signal?.aborted ? fail(problem("read.cancelled")) : await readInWorker(worker, bytes, options);
  } finally {
    running--;
    waiting.shift()?.();
  }
}

/** The same in the calling thread. */
export function readHere(bytes: Uint8Array, options: ReadFileOptions = {}): Result<NodeSetContent> {
  const text = decodeXmlBytes(bytes);
  if (!text.ok) return text;
  const deadline = Date.now() + MILLISECONDS;
  const result = readNodeSet(text.value, {
    ...(options.fileName === undefined ? {} : { fileName: options.fileName }),
    ...(options.onProgress ? { onProgress: options.onProgress } : {}),
    shouldStop: () => Date.now() > deadline,
  });
  const problems = [...text.problems, ...result.problems];
  return result.ok ? ok(result.value, problems) : fail(...problems);
}

/** The same in a thread of its own, started from the built worker. */
export function readInWorker(
  file: string,
  bytes: Uint8Array,
  options: ReadFileOptions = {},
): Promise<Result<NodeSetContent>> {
  const { fileName, onProgress, signal } = options;
  const request: ReadRequest = { bytes, fileName, milliseconds: MILLISECONDS };
  return new Promise((resolve) => {
    const worker = new Worker(file, { workerData: request, execArgv: [] });
    const finish = (result: Result<NodeSetContent>): void => {
      clearTimeout(timer);
      signal?.removeEventListener("abort", cancel);
      resolve(result);
      void worker.terminate();
    };
    const cancel = (): void => finish(fail(problem("read.cancelled")));
    const timer = setTimeout(
      () => finish(fail(problem("limit.time", { limit: READ_LIMITS.maxSeconds }))),
      MILLISECONDS + GRACE_MS,
    );
    signal?.addEventListener("abort", cancel, { once: true });
    worker.on("message", (step: ReadStep) => {
      if (step.kind === "progress") onProgress?.(step.done, step.total);
      else finish(step.result.ok ? ok(unpackResult(step.result.value), step.result.problems) : step.result);
    });
    worker.on("error", (error) => finish(fail(problem("read.worker-ended", { detail: error.message }))));
    worker.on("exit", (code) => finish(fail(problem("read.worker-ended", { detail: `exit code ${code}` }))));
  });
}
