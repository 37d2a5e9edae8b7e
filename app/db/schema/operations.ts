/** What the running application records: audit, event sequence, test servers. */
import { index, integer, sqliteTable, text } from "drizzle-orm/sqlite-core";
import type { Problem } from "../../domain/core/result";
import { organization } from "./auth";
import { model } from "./models";

const timestamp = (name: string) => integer(name, { mode: "timestamp_ms" });

/** Who did what when; append only. Names are kept as they were, so that the row outlives person and subject. */
export const auditEntry = sqliteTable(
  "audit_entry",
  {
    id: integer("id").primaryKey({ autoIncrement: true }),
    organizationId: text("organization_id").notNull(),
    at: timestamp("at").notNull(),
    userId: text("user_id"),
    userName: text("user_name").notNull(),
    action: text("action").notNull(),
    subjectKind: text("subject_kind").notNull(),
    subjectId: text("subject_id").notNull(),
    subjectName: text("subject_name").notNull(),
    details: text("details", { mode: "json" }).$type<Readonly<Record<string, unknown>>>().notNull(),
  },
  (table) => [index("audit_entry_organization").on(table.organizationId, table.id)],
);

/** One global sequence over the topics that can be resumed; `reference` leads to the row with the contents. */
export const eventEntry = sqliteTable(
  "event_entry",
  {
    seq: integer("seq").primaryKey({ autoIncrement: true }),
    topic: text("topic").notNull(),
    reference: integer("reference").notNull(),
    at: timestamp("at").notNull(),
  },
  (table) => [index("event_entry_topic").on(table.topic, table.seq)],
);

export type TestServerState = "starting" | "running" | "stopping" | "stopped" | "failed" | "lost";

/** Test servers and the process that owns each: two application processes never start the same one twice. */
export const testServer = sqliteTable(
  "test_server",
  {
    id: text("id").primaryKey(),
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    modelId: text("model_id")
      .notNull()
      .references(() => model.id, { onDelete: "cascade" }),
    state: text("state").$type<TestServerState>().notNull(),
    endpointUrl: text("endpoint_url"),
    options: text("options", { mode: "json" }).$type<Readonly<Record<string, unknown>>>().notNull(),
    problems: text("problems", { mode: "json" }).$type<readonly Problem[]>().notNull(),
    /** Process of the application that owns the child: its id and its host. */
    ownerPid: integer("owner_pid").notNull(),
    ownerHost: text("owner_host").notNull(),
    startedBy: text("started_by").notNull(),
    startedAt: timestamp("started_at").notNull(),
    /** The owner writes here now and then; a row whose owner has fallen silent is marked lost. */
    heartbeatAt: timestamp("heartbeat_at").notNull(),
    endedAt: timestamp("ended_at"),
  },
  (table) => [index("test_server_model").on(table.modelId)],
);
