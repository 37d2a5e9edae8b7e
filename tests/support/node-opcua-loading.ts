/** Loads NodeSet2 files by node-opcua, the reference implementation, in a fresh process. */
import { fork } from "node:child_process";
import { join } from "node:path";
import type { NodeId } from "~/domain/address-space/node-id";
import { projectRoot } from "./source-files";

const LIMIT_MS = 60_000;

export type Loading = {
  /** NodeIds that node-opcua does not know after loading. */
  missing: NodeId[];
  /** All that the process printed, without the clock at the head of a line. */
  output: string;
};

export async function loadInNodeOpcua(files: readonly string[], nodeIds: readonly NodeId[]): Promise<Loading> {
  const child = fork(join(projectRoot, "tests/support/load-in-node-opcua.mjs"), {
    execArgv: [],
    silent: true,
    timeout: LIMIT_MS,
  });
  let output = "";
  child.stdout?.on("data", (chunk) => (output += String(chunk)));
  child.stderr?.on("data", (chunk) => (output += String(chunk)));
  const answer = new Promise<{ missing: NodeId[] } | undefined>((resolve) => {
    let message: { missing: NodeId[] } | undefined;
    child.once("message", (received) => (message = received as { missing: NodeId[] }));
    child.once("close", () => resolve(message));
  });
  child.send({ files, nodeIds });
  const message = await answer;
  if (!message) throw new Error(`node-opcua did not load ${files.join(", ")}:\n${output}`);
  return { missing: message.missing, output: output.replace(/^\d\d:\d\d:\d\d\.\d{3}Z /gm, "") };
}
