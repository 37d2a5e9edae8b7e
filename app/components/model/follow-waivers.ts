/** Accepted findings of the open model: fetched once, and again whenever somebody accepts one or takes it back. */
import type { Finding } from "~/domain/checks/finding";
import type { ShownWaiver } from "~/presenters/waivers.server";
import { onConnectionChange, subscribeToTopic } from "../shell/event-stream";
import type { FindingStore } from "./finding-store";

/** Follows until the answered function is called. */
export function followWaivers(modelId: string, findings: FindingStore): () => void {
  const controller = new AbortController();
  const load = async (): Promise<void> => {
    const answer = await fetch(`/models/${modelId}/waivers`, { signal: controller.signal }).catch(() => undefined);
    if (answer?.ok) findings.setWaivers((await answer.json()) as ShownWaiver[]);
  };
  void load();
  const unsubscribe = subscribeToTopic(`waivers:${modelId}`, () => void load());
  const unwatch = onConnectionChange((state) => {
    if (state === "open") void load();
  });
  return () => {
    controller.abort();
    unsubscribe();
    unwatch();
  };
}

/** Answers the sentence that says why it was not accepted; undefined when it was. */
export async function acceptFinding(modelId: string, finding: Finding, reason: string): Promise<string | undefined> {
  const { rule, nodeId, attribute } = finding;
  return send(`/models/${modelId}/waivers`, "POST", {
    rule,
    nodeId,
    ...(attribute === undefined ? {} : { attribute }),
    reason,
  });
}

export function reopenFinding(modelId: string, waiverId: string): Promise<string | undefined> {
  return send(`/models/${modelId}/waivers/${waiverId}`, "DELETE");
}

async function send(path: string, method: string, body?: unknown): Promise<string | undefined> {
  const init =
    body === undefined
      ? { method }
      : { method, headers: { "content-type": "application/json" }, body: JSON.stringify(body) };
  const answer = await fetch(path, init).catch(() => undefined);
  if (answer?.ok) return undefined;
  const told = (await answer?.json().catch(() => undefined)) as { detail?: string } | undefined;
  return told?.detail ?? "The server cannot be reached just now.";
}
