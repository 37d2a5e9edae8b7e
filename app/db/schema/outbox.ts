/** What leaves the house: e-mails and webhooks, queued until the other side has taken them. */
import { index, integer, sqliteTable, text } from "drizzle-orm/sqlite-core";
import { organization } from "./auth";

const timestamp = (name: string) => integer(name, { mode: "timestamp_ms" });

export type OutboxState = "waiting" | "sent" | "failed";

export const mail = sqliteTable(
  "mail",
  {
    id: text("id").primaryKey(),
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    kind: text("kind").notNull(),
    toAddress: text("to_address").notNull(),
    toName: text("to_name").notNull(),
    subject: text("subject").notNull(),
    text: text("text").notNull(),
    html: text("html").notNull(),
    unsubscribeUrl: text("unsubscribe_url").notNull(),
    state: text("state").$type<OutboxState>().notNull(),
    attempts: integer("attempts").notNull(),
    nextAttemptAt: timestamp("next_attempt_at").notNull(),
    lastError: text("last_error"),
    createdAt: timestamp("created_at").notNull(),
    sentAt: timestamp("sent_at"),
  },
  (table) => [index("mail_due").on(table.state, table.nextAttemptAt), index("mail_organization").on(table.organizationId, table.createdAt)],
);

export const webhook = sqliteTable(
  "webhook",
  {
    id: text("id").primaryKey(),
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    url: text("url").notNull(),
    /** The key of the signature, sealed with the installation's secret. */
    sealedSecret: text("sealed_secret").notNull(),
    createdBy: text("created_by").notNull(),
    createdAt: timestamp("created_at").notNull(),
  },
  (table) => [index("webhook_organization").on(table.organizationId)],
);

export const webhookDelivery = sqliteTable(
  "webhook_delivery",
  {
    id: text("id").primaryKey(),
    webhookId: text("webhook_id")
      .notNull()
      .references(() => webhook.id, { onDelete: "cascade" }),
    event: text("event").notNull(),
    body: text("body").notNull(),
    state: text("state").$type<OutboxState>().notNull(),
    attempts: integer("attempts").notNull(),
    nextAttemptAt: timestamp("next_attempt_at").notNull(),
    lastStatus: integer("last_status"),
    lastError: text("last_error"),
    createdAt: timestamp("created_at").notNull(),
    deliveredAt: timestamp("delivered_at"),
  },
  (table) => [index("webhook_delivery_due").on(table.state, table.nextAttemptAt), index("webhook_delivery_webhook").on(table.webhookId)],
);
