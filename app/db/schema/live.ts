/** Servers that the team looks at, what it watches there, and what it proved. */
import { index, integer, real, sqliteTable, text, uniqueIndex } from "drizzle-orm/sqlite-core";
import { organization } from "./auth";
import { contentBlob, model } from "./models";

const timestamp = (name: string) => integer(name, { mode: "timestamp_ms" });

/** Any OPC UA server that the team may look at. `secret` is encrypted; it never leaves the server's process. */
export const endpoint = sqliteTable(
  "endpoint",
  {
    id: text("id").primaryKey(),
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    name: text("name").notNull(),
    url: text("url").notNull(),
    securityMode: text("security_mode").notNull(),
    securityPolicy: text("security_policy").notNull(),
    tokenKind: text("token_kind").notNull(),
    userName: text("user_name"),
    /** Password or private key, AES-256-GCM with the application's secret. */
    secret: text("secret"),
    /** The user's certificate, DER in base64. */
    userCertificate: text("user_certificate"),
    /** The server's certificate that was trusted, DER in base64: no other server is talked to. */
    serverCertificate: text("server_certificate"),
    gatewayId: text("gateway_id"),
    note: text("note").notNull(),
    updatedBy: text("updated_by").notNull(),
    updatedAt: timestamp("updated_at").notNull(),
  },
  (table) => [uniqueIndex("endpoint_name").on(table.organizationId, table.name)],
);

/** Hosts and ports that Ferrule may connect to; without a row nothing but this host's own test servers. */
export const endpointAllowance = sqliteTable(
  "endpoint_allowance",
  {
    id: text("id").primaryKey(),
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    host: text("host").notNull(),
    portFrom: integer("port_from").notNull(),
    portTo: integer("port_to").notNull(),
    note: text("note").notNull(),
    addedBy: text("added_by").notNull(),
    addedAt: timestamp("added_at").notNull(),
  },
  (table) => [uniqueIndex("endpoint_allowance_place").on(table.organizationId, table.host, table.portFrom, table.portTo)],
);

/** Tiles with live values, made of a type or a machine and arranged by hand. */
export const watchBoard = sqliteTable(
  "watch_board",
  {
    id: text("id").primaryKey(),
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    modelId: text("model_id")
      .notNull()
      .references(() => model.id, { onDelete: "cascade" }),
    name: text("name").notNull(),
    /** NodeId text of the type whose machines it shows. */
    typeNodeId: text("type_node_id").notNull(),
    content: text("content", { mode: "json" }).$type<Readonly<Record<string, unknown>>>().notNull(),
    version: integer("version").notNull().default(1),
    updatedBy: text("updated_by").notNull(),
    updatedAt: timestamp("updated_at").notNull(),
  },
  (table) => [index("watch_board_model").on(table.modelId)],
);

/** A comparison of a live server with a release; the evidence is a blob that is never changed. */
export const asBuiltReport = sqliteTable(
  "as_built_report",
  {
    id: text("id").primaryKey(),
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    modelId: text("model_id")
      .notNull()
      .references(() => model.id, { onDelete: "cascade" }),
    number: integer("number").notNull(),
    /** Revision of the model that was compared, and the release that carries it, when there is one. */
    revisionNumber: integer("revision_number").notNull(),
    releaseId: text("release_id"),
    deliveryId: text("delivery_id"),
    /** An endpoint's id, or that of a test server. */
    targetId: text("target_id").notNull(),
    targetName: text("target_name").notNull(),
    endpointUrl: text("endpoint_url").notNull(),
    verdict: text("verdict").notNull(),
    counted: integer("counted").notNull(),
    ignored: integer("ignored").notNull(),
    bodyHash: text("body_hash")
      .notNull()
      .references(() => contentBlob.hash),
    /** Ed25519 over the body's hash with the organisation's key; base64. */
    signature: text("signature"),
    madeBy: text("made_by").notNull(),
    at: timestamp("at").notNull(),
  },
  (table) => [uniqueIndex("as_built_report_number").on(table.modelId, table.number), index("as_built_report_organization").on(table.organizationId, table.at)],
);

/** One signal of one machine proved by hand. */
export const pointCheck = sqliteTable(
  "point_check",
  {
    id: text("id").primaryKey(),
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    modelId: text("model_id")
      .notNull()
      .references(() => model.id, { onDelete: "cascade" }),
    machineKey: text("machine_key").notNull(),
    /** NodeId text of the Variable. */
    nodeId: text("node_id").notNull(),
    path: text("path").notNull(),
    stimulus: text("stimulus").notNull(),
    localReading: real("local_reading").notNull(),
    shownValue: real("shown_value").notNull(),
    unit: text("unit").notNull(),
    tolerance: real("tolerance").notNull(),
    isWithin: integer("is_within", { mode: "boolean" }).notNull(),
    note: text("note").notNull(),
    checkedBy: text("checked_by").notNull(),
    at: timestamp("at").notNull(),
    /** Set when a replaced device, or a changed mapping, makes the check due again. */
    dueSince: timestamp("due_since"),
  },
  (table) => [index("point_check_machine").on(table.modelId, table.machineKey, table.at)],
);

/** An as-built report that is made again and again. */
export const asBuiltSchedule = sqliteTable(
  "as_built_schedule",
  {
    id: text("id").primaryKey(),
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    modelId: text("model_id")
      .notNull()
      .references(() => model.id, { onDelete: "cascade" }),
    endpointId: text("endpoint_id")
      .notNull()
      .references(() => endpoint.id, { onDelete: "cascade" }),
    everyMinutes: integer("every_minutes").notNull(),
    nextAt: timestamp("next_at").notNull(),
    lastVerdict: text("last_verdict"),
    lastAt: timestamp("last_at"),
    madeBy: text("made_by").notNull(),
  },
  (table) => [uniqueIndex("as_built_schedule_pair").on(table.modelId, table.endpointId), index("as_built_schedule_next").on(table.nextAt)],
);
