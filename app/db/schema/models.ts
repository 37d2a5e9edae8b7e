/** Models and everything that hangs on their working state. */
import { sql } from "drizzle-orm";
import { blob, index, integer, primaryKey, sqliteTable, text, uniqueIndex, type AnySQLiteColumn } from "drizzle-orm/sqlite-core";
import type { Operation } from "../../domain/editing/operation";
import { organization } from "./auth";

const timestamp = (name: string) => integer(name, { mode: "timestamp_ms" });

export type ModelKind = "types" | "machines";

/** A required model as a header names it, for questions that need no contents. */
export type RequiredModelRow = { readonly modelUri: string; readonly version?: string; readonly publicationDate?: string };

/** One required model of a frozen revision: a published pack by its name, or the contents of a blob of our own. */
export type PinnedModelRow = RequiredModelRow & { readonly kept: "published" | "blob"; readonly hash: string };

/** A model of the team that a model of machines requires, held at one frozen revision. */
export type PinRow = {
  readonly modelUri: string;
  readonly modelId: string;
  readonly number: number;
  /** The contents of that revision. */
  readonly packHash: string;
  /** Machines that still follow an earlier revision, by the key of their node. */
  readonly behind: Readonly<Record<string, number>>;
};

export const model = sqliteTable(
  "model",
  {
    id: text("id").primaryKey(),
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    name: text("name").notNull(),
    kind: text("kind").$type<ModelKind>().notNull(),
    namespaceUri: text("namespace_uri").notNull(),
    version: text("version"),
    publicationDate: text("publication_date"),
    /** Sequence number of the last accepted transaction; 0 directly after revision 0. */
    headSeq: integer("head_seq").notNull().default(0),
    nodeCount: integer("node_count").notNull().default(0),
    requiredModels: text("required_models", { mode: "json" }).$type<readonly RequiredModelRow[]>().notNull(),
    /** What a model of machines stands on; absent for models of types, which stand on working states. */
    pins: text("pins", { mode: "json" }).$type<readonly PinRow[]>(),
    /** A variant is a branch of another model for a trial: it shares the namespace and is merged back or thrown away. */
    variantOf: text("variant_of"),
    /** The state that both had in common last, which a merge compares with. */
    variantBaseHash: text("variant_base_hash").references((): AnySQLiteColumn => contentBlob.hash),
    createdAt: timestamp("created_at").notNull(),
    createdBy: text("created_by").notNull(),
    updatedAt: timestamp("updated_at").notNull(),
    updatedBy: text("updated_by").notNull(),
  },
  (table) => [
    uniqueIndex("model_namespace")
      .on(table.organizationId, table.namespaceUri)
      .where(sql`${table.variantOf} is null`),
    index("model_variant").on(table.variantOf),
  ],
);

/** Bytes by their SHA-256; revisions, snapshots and uploads name them. `bytes` is gzip of what the hash was made of. */
export const contentBlob = sqliteTable("blob", {
  hash: text("hash").primaryKey(),
  bytes: blob("bytes", { mode: "buffer" }).notNull(),
  size: integer("size").notNull(),
  createdAt: timestamp("created_at").notNull(),
});

/** A frozen state: number 0 is the import or the creation, later ones are frozen by people. Never changed. */
export const revision = sqliteTable(
  "revision",
  {
    id: text("id").primaryKey(),
    modelId: text("model_id")
      .notNull()
      .references(() => model.id, { onDelete: "cascade" }),
    number: integer("number").notNull(),
    seq: integer("seq").notNull(),
    packHash: text("pack_hash")
      .notNull()
      .references(() => contentBlob.hash),
    /** The bytes of the imported file, when the revision came from one. */
    fileHash: text("file_hash").references(() => contentBlob.hash),
    fileName: text("file_name"),
    message: text("message").notNull(),
    author: text("author").notNull(),
    at: timestamp("at").notNull(),
    nodeCount: integer("node_count").notNull(),
    counts: text("counts", { mode: "json" }).$type<{ error: number; warning: number; hint: number }>(),
    /** How much changed by meaning since the revision before it. */
    changes: text("changes", { mode: "json" }).$type<{ breaking: number; additive: number; neutral: number }>(),
    /** The required models that it was frozen on, base first; absent for revision 0, which pins nothing. */
    pinned: text("pinned", { mode: "json" }).$type<readonly PinnedModelRow[]>(),
  },
  (table) => [uniqueIndex("revision_number").on(table.modelId, table.number)],
);

/** The own layer as a pack at some sequence number, so that loading replays only the tail. */
export const snapshot = sqliteTable(
  "snapshot",
  {
    modelId: text("model_id")
      .notNull()
      .references(() => model.id, { onDelete: "cascade" }),
    seq: integer("seq").notNull(),
    packHash: text("pack_hash")
      .notNull()
      .references(() => contentBlob.hash),
  },
  (table) => [primaryKey({ columns: [table.modelId, table.seq] })],
);

export const transaction = sqliteTable(
  "model_transaction",
  {
    modelId: text("model_id")
      .notNull()
      .references(() => model.id, { onDelete: "cascade" }),
    seq: integer("seq").notNull(),
    base: integer("base").notNull(),
    clientId: text("client_id").notNull(),
    clientSeq: integer("client_seq").notNull(),
    authorId: text("author_id").notNull(),
    author: text("author").notNull(),
    at: text("at").notNull(),
    label: text("label").notNull(),
    operations: text("operations", { mode: "json" }).$type<readonly Operation[]>().notNull(),
    inverse: text("inverse", { mode: "json" }).$type<readonly Operation[]>().notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.modelId, table.seq] }),
    uniqueIndex("transaction_client").on(table.modelId, table.clientId, table.clientSeq),
  ],
);

/** The highest numeric identifier ever given in a namespace; kept when the model is deleted. */
export const nodeIdLedger = sqliteTable(
  "node_id_ledger",
  {
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    namespaceUri: text("namespace_uri").notNull(),
    highest: integer("highest").notNull(),
  },
  (table) => [primaryKey({ columns: [table.organizationId, table.namespaceUri] })],
);

/**
 * NodeIds that a node has given up, by deletion or by a new number. Only the same node may have one back, which is what
 * undo asks for; nobody else ever gets it.
 */
export const retiredNodeId = sqliteTable(
  "retired_node_id",
  {
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    nodeId: text("node_id").notNull(),
    nodeKey: text("node_key").notNull(),
    /** What the node was when it was deleted; absent when it lives on under another number. */
    nodeClass: text("node_class"),
    browseName: text("browse_name"),
  },
  (table) => [primaryKey({ columns: [table.organizationId, table.nodeId] })],
);

/** Blocks of numeric identifiers, each leased to one editing window. */
export const nodeIdLease = sqliteTable(
  "node_id_lease",
  {
    id: text("id").primaryKey(),
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    namespaceUri: text("namespace_uri").notNull(),
    clientId: text("client_id").notNull(),
    userId: text("user_id").notNull(),
    from: integer("from_id").notNull(),
    to: integer("to_id").notNull(),
    at: timestamp("at").notNull(),
  },
  (table) => [index("node_id_lease_namespace").on(table.organizationId, table.namespaceUri)],
);

export type SheetLayout = {
  readonly positions: Readonly<Record<string, { readonly x: number; readonly y: number }>>;
  readonly [part: string]: unknown;
};

export const sheet = sqliteTable(
  "sheet",
  {
    id: text("id").primaryKey(),
    modelId: text("model_id")
      .notNull()
      .references(() => model.id, { onDelete: "cascade" }),
    name: text("name").notNull(),
    position: integer("position").notNull(),
    layout: text("layout", { mode: "json" }).$type<SheetLayout>().notNull(),
    version: integer("version").notNull().default(1),
    updatedAt: timestamp("updated_at").notNull(),
    updatedBy: text("updated_by").notNull(),
  },
  (table) => [index("sheet_model").on(table.modelId)],
);

/** NodeSets that the organisation added to its library; read only, beside the published ones. */
export const uploadedNodeSet = sqliteTable(
  "uploaded_node_set",
  {
    id: text("id").primaryKey(),
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    modelUri: text("model_uri").notNull(),
    version: text("version"),
    publicationDate: text("publication_date"),
    fileName: text("file_name").notNull(),
    fileHash: text("file_hash")
      .notNull()
      .references(() => contentBlob.hash),
    packHash: text("pack_hash")
      .notNull()
      .references(() => contentBlob.hash),
    nodeCount: integer("node_count").notNull(),
    requiredModels: text("required_models", { mode: "json" }).$type<readonly RequiredModelRow[]>().notNull(),
    uploadedBy: text("uploaded_by").notNull(),
    at: timestamp("at").notNull(),
  },
  (table) => [
    uniqueIndex("uploaded_node_set_file").on(table.organizationId, table.fileHash),
    index("uploaded_node_set_model").on(table.organizationId, table.modelUri),
  ],
);

/** A finding that somebody accepted with a reason; it holds while the node stays as it was. */
export const findingWaiver = sqliteTable(
  "finding_waiver",
  {
    id: text("id").primaryKey(),
    modelId: text("model_id")
      .notNull()
      .references(() => model.id, { onDelete: "cascade" }),
    rule: text("rule").notNull(),
    /** With `nsu=`; empty for the model as a whole. */
    nodeId: text("node_id").notNull(),
    attribute: text("attribute").notNull(),
    reason: text("reason").notNull(),
    person: text("person").notNull(),
    at: timestamp("at").notNull(),
    /** Of the node as it was accepted. */
    fingerprint: text("fingerprint").notNull(),
  },
  (table) => [uniqueIndex("finding_waiver_place").on(table.modelId, table.rule, table.nodeId, table.attribute)],
);
