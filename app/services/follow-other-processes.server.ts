/**
 * Edits that another process on the same database stored reach the tabs of this one: the sequence of events is read now and
 * then, and what this process did not publish itself is published. A tab drops what it has seen already.
 */
import { findHighestEvent, findTransaction, listAllEventsAfter } from "../db/repositories/models.server";
import { logError } from "../utils/log.server";
import { onShutdown } from "../utils/shutdown.server";
import { hasListeners, publish } from "./event-hub.server";

const EVERY_MS = 1_000;
const MOST_AT_ONCE = 500;
const PREFIX = "model:";

export function followOtherProcesses(): void {
  let last: number | undefined;
  let isReading = false;
  const read = async (): Promise<void> => {
    if (last === undefined) {
      last = await findHighestEvent();
      return;
    }
    for (const { seq, topic, reference } of await listAllEventsAfter(last, MOST_AT_ONCE)) {
      last = seq;
      if (!topic.startsWith(PREFIX) || !hasListeners(topic)) continue;
      const transaction = await findTransaction(topic.slice(PREFIX.length), reference);
      if (transaction) publish(topic, transaction, seq);
    }
  };
  const timer = setInterval(() => {
    if (isReading) return;
    isReading = true;
    read()
      .catch((error: unknown) => logError(error, "events of other processes"))
      .finally(() => (isReading = false));
  }, EVERY_MS);
  timer.unref();
  onShutdown("events of other processes", () => clearInterval(timer));
}
