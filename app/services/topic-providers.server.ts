/** The topics that concern models: who may listen, and how a tab gets what it missed. */
import { isMember, mayDo, type Caller } from "../auth/caller.server";
import { findModel, findTransaction, listEventsAfter } from "../db/repositories/models.server";
import { registerTopicProvider } from "./event-hub.server";
import { joinPresence, leavePresence } from "./presence.server";

const MAX_REPLAYED = 5_000;

const restOf = (topic: string): string => topic.slice(topic.indexOf(":") + 1);

async function mayReadModel(caller: Caller, topic: string): Promise<boolean> {
  const model = await findModel(restOf(topic));
  return model !== undefined && mayDo(caller, "read", model.organizationId);
}

async function replayTransactions(topic: string, afterSeq: number): Promise<{ seq: number; data: unknown }[]> {
  const events = await listEventsAfter(topic, afterSeq, MAX_REPLAYED);
  const missed: { seq: number; data: unknown }[] = [];
  for (const { seq, reference } of events) {
    const data = await findTransaction(restOf(topic), reference);
    if (data) missed.push({ seq, data });
  }
  return missed;
}

/** Registers once at the start. */
export function registerModelTopics(): void {
  registerTopicProvider("model", { authorise: mayReadModel, replay: replayTransactions });
  registerTopicProvider("sheet", { authorise: mayReadModel });
  registerTopicProvider("waivers", { authorise: mayReadModel });
  registerTopicProvider("models", { authorise: (caller, topic) => isMember(caller, restOf(topic)) });
  // The name of the topic is a secret that the page made for itself.
  registerTopicProvider("import", { authorise: () => true, keepsNewestOnly: true });
  registerTopicProvider("presence", {
    authorise: mayReadModel,
    keepsNewestOnly: true,
    joined: (topic, listener) => joinPresence(restOf(topic), listener),
    left: (topic, listener) => leavePresence(restOf(topic), listener),
  });
}
