/** What an organisation sets about approvals, webhooks and mails. */
import { randomBytes } from "node:crypto";
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import { writeBatch } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import {
  addRefusalStatement,
  addWebhookStatement,
  findMail,
  findWebhook,
  listWebhooks,
  removeRefusalStatement,
  removeWebhookStatement,
  updateMailStatement,
} from "../db/repositories/outbox.server";
import { savePolicyStatement } from "../db/repositories/releases.server";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { newId } from "../utils/ids.server";
import { isMailKind, type MailKind } from "../utils/mail-kinds";
import { isMark, sealText } from "../utils/seal.server";
import { WEBHOOK_PURPOSE } from "./call-webhooks.server";
import { UNSUBSCRIBE_PURPOSE } from "./queue-mail.server";
import { wakeOutbox } from "./run-outbox.server";

export const policySchema = z.object({ approvals: z.coerce.number("Write a number").int("A whole number").min(1, "At least one").max(5, "At most five") });

export async function setReleasePolicy(author: Caller, organizationId: string, approvals: number): Promise<void> {
  await writeBatch([
    savePolicyStatement({ organizationId, approvals, updatedBy: author.name, updatedAt: new Date() }),
    audit(author, organizationId, "organization.set-approvals", { kind: "organization", id: organizationId, name: "approvals" }, { approvals }),
  ]);
}

export const webhookSchema = z.object({ url: z.url("Write an address that begins with https:// or http://").max(1000, "That is too long") });

const MAX_WEBHOOKS = 20;

/** Answers the secret once. Problems: `webhook.url`, `webhook.too-many`. */
export async function addWebhook(author: Caller, organizationId: string, url: string): Promise<Result<{ id: string; secret: string }>> {
  const parsed = URL.parse(url);
  if (!parsed || !["http:", "https:"].includes(parsed.protocol) || parsed.username !== "") return fail(problem("webhook.url"));
  if ((await listWebhooks(organizationId)).length >= MAX_WEBHOOKS) return fail(problem("webhook.too-many", { limit: MAX_WEBHOOKS }));
  const secret = `whsec_${randomBytes(32).toString("base64")}`;
  const id = newId();
  await writeBatch([
    addWebhookStatement({ id, organizationId, url, sealedSecret: sealText(secret, WEBHOOK_PURPOSE), createdBy: author.name, createdAt: new Date() }),
    audit(author, organizationId, "webhook.add", { kind: "webhook", id, name: parsed.host }),
  ]);
  return ok({ id, secret });
}

/** Problem: `request.not-found`. */
export async function removeWebhook(author: Caller, organizationId: string, id: string): Promise<Result<null>> {
  const hook = await findWebhook(id);
  if (hook?.organizationId !== organizationId) return fail(problem("request.not-found"));
  await writeBatch([removeWebhookStatement(id), audit(author, organizationId, "webhook.remove", { kind: "webhook", id, name: new URL(hook.url).host })]);
  return ok(null);
}

/** Tries a mail again that was given up. Problem: `request.not-found`. */
export async function retryMail(organizationId: string, id: string): Promise<Result<null>> {
  const mail = await findMail(id);
  if (mail?.organizationId !== organizationId || mail.state === "sent") return fail(problem("request.not-found"));
  await writeBatch([updateMailStatement(id, { state: "waiting", attempts: 0, nextAttemptAt: new Date() })]);
  wakeOutbox();
  return ok(null);
}

export async function setMailRefusal(userId: string, kind: MailKind, isRefused: boolean): Promise<void> {
  await writeBatch([isRefused ? addRefusalStatement(userId, kind, new Date()) : removeRefusalStatement(userId, kind)]);
}

/** The link of a mail: it acts without a sign-in, by a mark that only this installation makes. Undefined for a false one. */
export async function unsubscribeByMark(user: string, kind: string, mark: string): Promise<MailKind | undefined> {
  if (!isMailKind(kind) || !isMark(mark, `${user} ${kind}`, UNSUBSCRIBE_PURPOSE)) return undefined;
  await setMailRefusal(user, kind, true);
  return kind;
}

type Subject = { readonly kind: string; readonly id: string; readonly name: string };

function audit(author: Caller, organizationId: string, action: string, subject: Subject, details: Readonly<Record<string, unknown>> = {}) {
  return addAuditStatement({ organizationId, userId: author.userId, userName: author.name, action, subject, details });
}
