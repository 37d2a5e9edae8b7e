/** The one worker of the queue: wakes every few seconds, and at once when something was put in. */
import { logError } from "../utils/log.server";
import { onShutdown } from "../utils/shutdown.server";
import { singleton } from "../utils/singleton.server";
import { callDueWebhooks } from "./call-webhooks.server";
import { sendDueMail } from "./send-mail.server";

const EVERY_MS = 5_000;

type Worker = { running: Promise<void> | undefined; isAskedAgain: boolean; timer: NodeJS.Timeout | undefined };
const getWorker = () => singleton<Worker>("outbox", () => ({ running: undefined, isAskedAgain: false, timer: undefined }));

export function startOutbox(): void {
  const worker = getWorker();
  worker.timer ??= setInterval(wakeOutbox, EVERY_MS);
  worker.timer.unref();
  onShutdown("outbox", async () => {
    clearInterval(worker.timer);
    worker.timer = undefined;
    worker.isAskedAgain = false;
    await worker.running;
  });
  wakeOutbox();
}

/** Sends soon; what fails stays in the queue. */
export function wakeOutbox(): void {
  const worker = getWorker();
  if (worker.timer === undefined) return;
  if (worker.running) {
    worker.isAskedAgain = true;
    return;
  }
  worker.running = runOnce()
    .catch((error: unknown) => void logError(error, "outbox"))
    .finally(() => {
      worker.running = undefined;
      if (!worker.isAskedAgain) return;
      worker.isAskedAgain = false;
      wakeOutbox();
    });
}

async function runOnce(): Promise<void> {
  await sendDueMail(new Date());
  await callDueWebhooks(new Date());
}
