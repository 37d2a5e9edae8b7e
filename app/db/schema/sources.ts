/** Devices, sources, gateways and what is made of mappings: they belong to the organisation, not to one model. */
import { index, integer, primaryKey, sqliteTable, text, uniqueIndex } from "drizzle-orm/sqlite-core";
import type { Problem } from "../../domain/core/result";
import { organization } from "./auth";
import { contentBlob, model } from "./models";

const timestamp = (name: string) => integer(name, { mode: "timestamp_ms" });

/**
 * One main description of an uploaded file. The file is kept as it came; `description` is what was read of it, a blob
 * that can be made anew at any time. Several versions of one device stand side by side.
 */
export const deviceDescription = sqliteTable(
  "device_description",
  {
    id: text("id").primaryKey(),
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    vendorId: integer("vendor_id").notNull(),
    deviceId: integer("device_id").notNull(),
    vendorName: text("vendor_name").notNull(),
    deviceName: text("device_name").notNull(),
    productIds: text("product_ids", { mode: "json" }).$type<readonly string[]>().notNull(),
    schemaVersion: text("schema_version").notNull(),
    documentVersion: text("document_version").notNull(),
    releaseDate: text("release_date").notNull(),
    languages: text("languages", { mode: "json" }).$type<readonly string[]>().notNull(),
    /** The file as it was uploaded, and the main description's name inside it. */
    fileName: text("file_name").notNull(),
    entryName: text("entry_name").notNull(),
    fileHash: text("file_hash")
      .notNull()
      .references(() => contentBlob.hash),
    descriptionHash: text("description_hash")
      .notNull()
      .references(() => contentBlob.hash),
    pictures: text("pictures", { mode: "json" }).$type<readonly string[]>().notNull(),
    problems: text("problems", { mode: "json" }).$type<readonly Problem[]>().notNull(),
    uploadedBy: text("uploaded_by").notNull(),
    at: timestamp("at").notNull(),
  },
  (table) => [
    uniqueIndex("device_description_file").on(table.organizationId, table.fileHash, table.entryName),
    index("device_description_device").on(table.organizationId, table.vendorId, table.deviceId),
  ],
);

/** Where bytes come from. Which members of the address a kind uses stands in the domain's source schema. */
export const source = sqliteTable(
  "source",
  {
    id: text("id").primaryKey(),
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    name: text("name").notNull(),
    kind: text("kind").notNull(),
    address: text("address", { mode: "json" }).$type<Readonly<Record<string, unknown>>>().notNull(),
    note: text("note").notNull(),
    updatedBy: text("updated_by").notNull(),
    updatedAt: timestamp("updated_at").notNull(),
  },
  (table) => [uniqueIndex("source_name").on(table.organizationId, table.name)],
);

/** The plan of one port: what should be connected and how. */
export const sourcePort = sqliteTable(
  "source_port",
  {
    sourceId: text("source_id")
      .notNull()
      .references(() => source.id, { onDelete: "cascade" }),
    port: integer("port").notNull(),
    plan: text("plan", { mode: "json" }).$type<Readonly<Record<string, unknown>>>().notNull(),
    updatedBy: text("updated_by").notNull(),
    updatedAt: timestamp("updated_at").notNull(),
  },
  (table) => [primaryKey({ columns: [table.sourceId, table.port] })],
);

/** The OPC UA server on the shop floor by which machines are published. */
export const gateway = sqliteTable(
  "gateway",
  {
    id: text("id").primaryKey(),
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    name: text("name").notNull(),
    endpointUrl: text("endpoint_url"),
    note: text("note").notNull(),
    updatedBy: text("updated_by").notNull(),
    updatedAt: timestamp("updated_at").notNull(),
  },
  (table) => [uniqueIndex("gateway_name").on(table.organizationId, table.name)],
);

/** A machine is published by one gateway. */
export const gatewayMachine = sqliteTable(
  "gateway_machine",
  {
    modelId: text("model_id")
      .notNull()
      .references(() => model.id, { onDelete: "cascade" }),
    machineKey: text("machine_key").notNull(),
    gatewayId: text("gateway_id")
      .notNull()
      .references(() => gateway.id, { onDelete: "cascade" }),
  },
  (table) => [primaryKey({ columns: [table.modelId, table.machineKey] }), index("gateway_machine_gateway").on(table.gatewayId)],
);

/** Names of a controller's values as a file gave them; the tags themselves are a blob. */
export const tagList = sqliteTable(
  "tag_list",
  {
    id: text("id").primaryKey(),
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    name: text("name").notNull(),
    sourceId: text("source_id").references(() => source.id, { onDelete: "set null" }),
    fileName: text("file_name").notNull(),
    fileHash: text("file_hash").references(() => contentBlob.hash),
    tagsHash: text("tags_hash")
      .notNull()
      .references(() => contentBlob.hash),
    count: integer("count").notNull(),
    columns: text("columns", { mode: "json" }).$type<Readonly<Record<string, string>>>().notNull(),
    uploadedBy: text("uploaded_by").notNull(),
    at: timestamp("at").notNull(),
  },
  (table) => [uniqueIndex("tag_list_name").on(table.organizationId, table.name)],
);

/** Which column of a tag list means what, kept for the next list of the same make. */
export const columnTemplate = sqliteTable(
  "column_template",
  {
    id: text("id").primaryKey(),
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    name: text("name").notNull(),
    columns: text("columns", { mode: "json" }).$type<Readonly<Record<string, string>>>().notNull(),
    updatedBy: text("updated_by").notNull(),
    updatedAt: timestamp("updated_at").notNull(),
  },
  (table) => [uniqueIndex("column_template_name").on(table.organizationId, table.name)],
);

/** A text template that a team writes for one kind of gateway, with outputs that it must give. */
export const exportTemplate = sqliteTable(
  "export_template",
  {
    id: text("id").primaryKey(),
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    name: text("name").notNull(),
    gatewayType: text("gateway_type").notNull(),
    fileName: text("file_name").notNull(),
    template: text("template").notNull(),
    cases: text("cases", { mode: "json" })
      .$type<readonly { readonly name: string; readonly modelId: string; readonly machineKey: string; readonly expected: string }[]>()
      .notNull(),
    updatedBy: text("updated_by").notNull(),
    updatedAt: timestamp("updated_at").notNull(),
  },
  (table) => [uniqueIndex("export_template_name").on(table.organizationId, table.name)],
);

/** Devices that were replaced; append only. Point checks of `targets` are due until somebody has made them. */
export const deviceReplacement = sqliteTable(
  "device_replacement",
  {
    id: text("id").primaryKey(),
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    modelId: text("model_id").notNull(),
    machineKey: text("machine_key").notNull(),
    machineName: text("machine_name").notNull(),
    role: text("role").notNull(),
    kind: text("kind").$type<"same" | "compatible" | "other">().notNull(),
    before: text("before", { mode: "json" }).$type<Readonly<Record<string, unknown>>>().notNull(),
    after: text("after", { mode: "json" }).$type<Readonly<Record<string, unknown>>>().notNull(),
    reason: text("reason").notNull(),
    targets: text("targets", { mode: "json" }).$type<readonly string[]>().notNull(),
    person: text("person").notNull(),
    at: timestamp("at").notNull(),
  },
  (table) => [index("device_replacement_machine").on(table.organizationId, table.modelId, table.machineKey)],
);
