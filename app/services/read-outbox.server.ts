/** Reads for the pages of the outbox and of what an organisation sets about releases and mail. */
import { listMail, listRefusals, listWebhookDeliveries, listWebhooks, type MailRow } from "../db/repositories/outbox.server";
import { findNeededApprovals, findSigningKey } from "../db/repositories/releases.server";
import { getEnvironment } from "../utils/env.server";
import { listReceivedMail, type ReceivedMail } from "./local-mail-server.server";

const MAX_MAIL = 100;
const MAX_DELIVERIES = 50;

export type MailLine = {
  readonly id: string;
  readonly kind: string;
  readonly to: string;
  readonly subject: string;
  readonly text: string;
  readonly html: string;
  readonly state: MailRow["state"];
  readonly attempts: number;
  readonly lastError: string | null;
  readonly nextAttemptAt: string | null;
  readonly createdAt: string;
  readonly sentAt: string | null;
  /** What the mail server of this host received, when that is the one in use. */
  readonly received: ReceivedMail | null;
};

export type OutboxPage = {
  /** `local` for the mail server of this host, which delivers nothing; null for none. */
  readonly server: string | null;
  readonly from: string;
  readonly mail: readonly MailLine[];
};

export async function readOutbox(organizationId: string): Promise<OutboxPage> {
  const { smtpUrl, mailFrom } = getEnvironment();
  const received = new Map(smtpUrl === "local" ? listReceivedMail().map((mail) => [mail.mailId, mail]) : []);
  const rows = await listMail(organizationId, MAX_MAIL);
  return {
    server: smtpUrl === undefined || smtpUrl === "local" ? (smtpUrl ?? null) : new URL(smtpUrl).host,
    from: mailFrom,
    mail: rows.map((row) => ({
      id: row.id,
      kind: row.kind,
      to: `${row.toName} <${row.toAddress}>`,
      subject: row.subject,
      text: row.text,
      html: row.html,
      state: row.state,
      attempts: row.attempts,
      lastError: row.lastError,
      nextAttemptAt: row.state === "waiting" ? row.nextAttemptAt.toISOString() : null,
      createdAt: row.createdAt.toISOString(),
      sentAt: row.sentAt?.toISOString() ?? null,
      received: received.get(row.id) ?? null,
    })),
  };
}

export type WebhookLine = {
  readonly id: string;
  readonly url: string;
  readonly createdBy: string;
  readonly deliveries: readonly {
    readonly id: string;
    readonly event: string;
    readonly state: MailRow["state"];
    readonly attempts: number;
    readonly lastStatus: number | null;
    readonly lastError: string | null;
    readonly createdAt: string;
    readonly deliveredAt: string | null;
  }[];
};

export type SettingsPage = {
  readonly approvals: number;
  readonly key: { readonly id: string; readonly createdAt: string } | null;
  readonly webhooks: readonly WebhookLine[];
  /** Kinds of mail that the caller refuses. */
  readonly refusals: readonly string[];
};

export async function readSettings(userId: string, organizationId: string): Promise<SettingsPage> {
  const [approvals, key, hooks, refusals] = await Promise.all([
    findNeededApprovals(organizationId),
    findSigningKey(organizationId),
    listWebhooks(organizationId),
    listRefusals(userId),
  ]);
  const deliveries = await listWebhookDeliveries(hooks.map((hook) => hook.id), MAX_DELIVERIES);
  return {
    approvals,
    key: key ? { id: key.id, createdAt: key.createdAt.toISOString() } : null,
    webhooks: hooks.map(({ id, url, createdBy }) => ({
      id,
      url,
      createdBy,
      deliveries: deliveries
        .filter((call) => call.webhookId === id)
        .map((call) => ({
          id: call.id,
          event: call.event,
          state: call.state,
          attempts: call.attempts,
          lastStatus: call.lastStatus,
          lastError: call.lastError,
          createdAt: call.createdAt.toISOString(),
          deliveredAt: call.deliveredAt?.toISOString() ?? null,
        })),
    })),
    refusals,
  };
}
