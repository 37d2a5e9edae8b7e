/**
 * Webhooks: a signed POST for each release, tried again until it is taken. Signature after the Standard Webhooks
 * specification: HMAC-SHA256 over `id.timestamp.body`, base64, as `v1,…`; the receiver compares and looks at the time.
 */
import { createHmac } from "node:crypto";
import { writeBatch, type Statement } from "../db/client.server";
import {
  addWebhookDeliveryStatement,
  claimWebhookDelivery,
  findWebhook,
  listDueWebhookDeliveries,
  listWebhooks,
  updateWebhookDeliveryStatement,
  type WebhookDeliveryRow,
} from "../db/repositories/outbox.server";
import { newId } from "../utils/ids.server";
import { nextAttempt } from "../utils/next-attempt";
import { openSealed } from "../utils/seal.server";

const BATCH = 20;
const CLAIM_MS = 60_000;
const TIMEOUT_MS = 10_000;
export const WEBHOOK_PURPOSE = "webhook";

/** Statements for the batch of the act itself. */
export async function listWebhookStatements(organizationId: string, event: string, data: Readonly<Record<string, unknown>>): Promise<Statement[]> {
  const now = new Date();
  return (await listWebhooks(organizationId)).map((hook) =>
    addWebhookDeliveryStatement({
      id: newId(),
      webhookId: hook.id,
      event,
      body: JSON.stringify({ type: event, timestamp: now.toISOString(), data }),
      state: "waiting",
      attempts: 0,
      nextAttemptAt: now,
      createdAt: now,
    }),
  );
}

/** Answers how many were taken. */
export async function callDueWebhooks(now: Date): Promise<number> {
  let taken = 0;
  for (const call of await listDueWebhookDeliveries(now, BATCH)) {
    if (!(await claimWebhookDelivery(call, new Date(now.getTime() + CLAIM_MS)))) continue;
    if (await deliver(call, now)) taken++;
  }
  return taken;
}

async function deliver(call: WebhookDeliveryRow, now: Date): Promise<boolean> {
  const attempts = call.attempts + 1;
  const answer = await post(call);
  if (answer.status !== undefined && answer.status >= 200 && answer.status < 300) {
    await writeBatch([updateWebhookDeliveryStatement(call.id, { state: "sent", attempts, lastStatus: answer.status, lastError: null, deliveredAt: new Date() })]);
    return true;
  }
  const next = nextAttempt(attempts, now);
  const outcome = { attempts, lastStatus: answer.status ?? null, lastError: answer.error ?? null };
  await writeBatch([updateWebhookDeliveryStatement(call.id, next ? { ...outcome, nextAttemptAt: next } : { ...outcome, state: "failed" })]);
  return false;
}

/** Redirects are not followed and the answer's body is not read: only whether it was taken counts. */
async function post(call: WebhookDeliveryRow): Promise<{ status?: number; error?: string }> {
  const hook = await findWebhook(call.webhookId);
  if (!hook) return { error: "The webhook is gone." };
  const timestamp = String(Math.floor(Date.now() / 1000));
  try {
    const response = await fetch(hook.url, {
      method: "POST",
      redirect: "manual",
      signal: AbortSignal.timeout(TIMEOUT_MS),
      headers: {
        "content-type": "application/json",
        "webhook-id": call.id,
        "webhook-timestamp": timestamp,
        "webhook-signature": signWebhook(openSealed(hook.sealedSecret, WEBHOOK_PURPOSE), call.id, timestamp, call.body),
      },
      body: call.body,
    });
    await response.body?.cancel();
    return { status: response.status };
  } catch (error) {
    const cause = error instanceof Error && error.cause instanceof Error ? `: ${error.cause.message}` : "";
    return { error: `${error instanceof Error ? error.message : String(error)}${cause}`.slice(0, 500) };
  }
}

/** `secret` is the text behind `whsec_`, base64. */
export function signWebhook(secret: string, id: string, timestamp: string, body: string): string {
  const key = Buffer.from(secret.replace(/^whsec_/, ""), "base64");
  return `v1,${createHmac("sha256", key).update(`${id}.${timestamp}.${body}`).digest("base64")}`;
}
