/** Starts the process of the made-up IO-Link master and tells it process data; ends it when the caller closes it. */
import { fork } from "node:child_process";
import { existsSync } from "node:fs";
import { fromFakeMasterSchema, type ToFakeMaster } from "./messages";

export type FakeMaster = {
  readonly endpointUrl: string;
  setFrames(frames: Extract<ToFakeMaster, { kind: "frames" }>["frames"]): void;
  close(): Promise<void>;
};

const START_LIMIT_MS = 30_000;

/**
 * `entry` is the bundle of main.ts; `onForked` gets the end of the process at once, since loading takes seconds in which
 * the application may be told to end. Throws when the process does not start; the demo then goes on without it.
 */
export async function startFakeMaster(
  entry: string,
  config: Omit<Extract<ToFakeMaster, { kind: "start" }>, "kind">,
  onForked: (close: () => Promise<void>) => void = () => undefined,
): Promise<FakeMaster> {
  if (!existsSync(entry)) throw new Error(`${entry} is not built`);
  const child = fork(entry, [], { execArgv: [], silent: true });
  const gone = new Promise<void>((resolve) => child.once("exit", () => resolve()));
  const send = (message: ToFakeMaster): void => {
    if (child.connected) child.send(message, () => undefined);
  };
  let isReady = false;
  const close = async (): Promise<void> => {
    send({ kind: "stop" });
    // While it loads it hears nothing, and it has nothing to lose.
    const kill = setTimeout(() => child.kill("SIGKILL"), isReady ? 2_000 : 0);
    await gone;
    clearTimeout(kill);
  };
  onForked(close);
  const endpointUrl = await new Promise<string>((resolve, reject) => {
    const timer = setTimeout(() => reject(new Error("The fake master did not start in time")), START_LIMIT_MS);
    child.once("exit", () => reject(new Error("The fake master ended while it started")));
    child.on("message", (raw) => {
      const message = fromFakeMasterSchema.parse(raw);
      clearTimeout(timer);
      isReady = message.kind === "ready";
      if (message.kind === "ready") resolve(message.endpointUrl);
      else reject(new Error(message.detail));
    });
    send({ kind: "start", ...config });
  }).catch(async (error: unknown) => {
    await close();
    throw error;
  });
  return { endpointUrl, setFrames: (frames) => send({ kind: "frames", frames }), close };
}
