/** A worker thread that reads one NodeSet2 file; see read-file.server.ts, which starts and ends it. */
import { parentPort, workerData } from "node:worker_threads";
import { decodeXmlBytes } from "../domain/nodeset/decode-xml-bytes";
import { readNodeSet } from "../domain/nodeset/read-nodeset";
import { fail, ok, type Result } from "../domain/core/result";
import { packResult, type ReadAnswer, type ReadRequest, type ReadStep } from "./read-messages";

const PROGRESS_MS = 100;

function read({ bytes, fileName, milliseconds }: ReadRequest): Result<ReadAnswer> {
  const start = Date.now();
  const text = decodeXmlBytes(bytes);
  if (!text.ok) return text;
  let told = start;
  const result = readNodeSet(text.value, {
    ...(fileName === undefined ? {} : { fileName }),
    shouldStop: () => Date.now() - start > milliseconds,
    onProgress: (done, total) => {
      if (Date.now() - told < PROGRESS_MS) return;
      told = Date.now();
      post({ kind: "progress", done, total });
    },
  });
  const problems = [...text.problems, ...result.problems];
  return result.ok ? ok(packResult(result.value), problems) : fail(...problems);
}

function post(step: ReadStep): void {
  parentPort?.postMessage(step);
}

post({ kind: "done", result: read(workerData as ReadRequest) });
