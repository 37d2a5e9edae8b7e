/** Reviews, releases, deliveries and readers: what hangs on frozen revisions. Names are kept as they were at the time. */
import { index, integer, primaryKey, sqliteTable, text, uniqueIndex } from "drizzle-orm/sqlite-core";
import type { Operation } from "../../domain/editing/operation";
import { organization, user } from "./auth";
import { contentBlob, model } from "./models";

const timestamp = (name: string) => integer(name, { mode: "timestamp_ms" });

export type ReviewState = "open" | "approved" | "changes-wanted" | "released" | "closed";

/** One question to named reviewers: may this revision be released? It follows the model when its author freezes anew. */
export const review = sqliteTable(
  "review",
  {
    id: text("id").primaryKey(),
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    modelId: text("model_id")
      .notNull()
      .references(() => model.id, { onDelete: "cascade" }),
    /** Counted within the organisation, for people. */
    number: integer("number").notNull(),
    title: text("title").notNull(),
    /** The revision that is looked at now, and the one that it is compared with. */
    revision: integer("revision").notNull(),
    baseRevision: integer("base_revision").notNull(),
    state: text("state").$type<ReviewState>().notNull(),
    authorId: text("author_id").notNull(),
    author: text("author").notNull(),
    askedAt: timestamp("asked_at").notNull(),
    closedAt: timestamp("closed_at"),
  },
  (table) => [uniqueIndex("review_number").on(table.organizationId, table.number), index("review_model").on(table.modelId)],
);

export type Decision = "approved" | "changes-wanted";

/** A reviewer who was asked or who decided; a decision is void once the model is edited after it. */
export const reviewer = sqliteTable(
  "reviewer",
  {
    reviewId: text("review_id")
      .notNull()
      .references(() => review.id, { onDelete: "cascade" }),
    userId: text("user_id").notNull(),
    name: text("name").notNull(),
    decision: text("decision").$type<Decision>(),
    decidedAt: timestamp("decided_at"),
    decidedRevision: integer("decided_revision"),
    voidedAt: timestamp("voided_at"),
    /** Whose edit made it void. */
    voidedBy: text("voided_by"),
  },
  (table) => [primaryKey({ columns: [table.reviewId, table.userId] })],
);

/** Operations that a commenter proposes; the author applies them with one key. */
export type Suggestion = { readonly label: string; readonly text: string; readonly operations: readonly Operation[] };

/** A remark on a node, a change or the review as a whole; it hangs on the node and so outlives the review. */
export const reviewComment = sqliteTable(
  "review_comment",
  {
    id: text("id").primaryKey(),
    reviewId: text("review_id")
      .notNull()
      .references(() => review.id, { onDelete: "cascade" }),
    modelId: text("model_id")
      .notNull()
      .references(() => model.id, { onDelete: "cascade" }),
    nodeKey: text("node_key"),
    /** Kind and detail of the change that it is about, as the comparison names them. */
    change: text("change"),
    parentId: text("parent_id"),
    authorId: text("author_id").notNull(),
    author: text("author").notNull(),
    at: timestamp("at").notNull(),
    text: text("text").notNull(),
    suggestion: text("suggestion", { mode: "json" }).$type<Suggestion>(),
    appliedAt: timestamp("applied_at"),
    appliedBy: text("applied_by"),
    resolvedAt: timestamp("resolved_at"),
    resolvedBy: text("resolved_by"),
  },
  (table) => [index("review_comment_review").on(table.reviewId), index("review_comment_node").on(table.modelId, table.nodeKey)],
);

/** A required model as a release pins it. */
export type ReleasedRequirement = {
  readonly modelUri: string;
  readonly version?: string;
  readonly modelVersion?: string;
  readonly publicationDate?: string;
  readonly sha256: string;
};

/** A revision that passed review, with its version and the bundle that was built once. */
export const release = sqliteTable(
  "release",
  {
    id: text("id").primaryKey(),
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    modelId: text("model_id")
      .notNull()
      .references(() => model.id, { onDelete: "cascade" }),
    reviewId: text("review_id"),
    revision: integer("revision").notNull(),
    version: text("version").notNull(),
    modelVersion: text("model_version").notNull(),
    publicationDate: text("publication_date").notNull(),
    rating: text("rating").$type<"breaking" | "additive" | "neutral">(),
    /** The release before it, which the change report compares with. */
    previousId: text("previous_id"),
    /** Own layer with the version written in. */
    packHash: text("pack_hash")
      .notNull()
      .references(() => contentBlob.hash),
    bundleHash: text("bundle_hash")
      .notNull()
      .references(() => contentBlob.hash),
    bundleSize: integer("bundle_size").notNull(),
    fileName: text("file_name").notNull(),
    files: text("files", { mode: "json" }).$type<readonly { path: string; size: number; sha256: string }[]>().notNull(),
    required: text("required", { mode: "json" }).$type<readonly ReleasedRequirement[]>().notNull(),
    keyId: text("key_id").notNull(),
    notes: text("notes").notNull(),
    releasedBy: text("released_by").notNull(),
    at: timestamp("at").notNull(),
    withdrawnAt: timestamp("withdrawn_at"),
    withdrawnBy: text("withdrawn_by"),
    withdrawnReason: text("withdrawn_reason"),
  },
  (table) => [uniqueIndex("release_version").on(table.modelId, table.version), index("release_organization").on(table.organizationId)],
);

export type DeliveryState = "sent" | "loaded" | "proved";

/** A bundle handed to a gateway; the gateway's name is kept, should it be taken away. */
export const delivery = sqliteTable(
  "delivery",
  {
    id: text("id").primaryKey(),
    releaseId: text("release_id")
      .notNull()
      .references(() => release.id, { onDelete: "cascade" }),
    gatewayId: text("gateway_id").notNull(),
    gatewayName: text("gateway_name").notNull(),
    bundleHash: text("bundle_hash").notNull(),
    state: text("state").$type<DeliveryState>().notNull(),
    sentBy: text("sent_by").notNull(),
    sentAt: timestamp("sent_at").notNull(),
    loadedBy: text("loaded_by"),
    loadedAt: timestamp("loaded_at"),
    provedBy: text("proved_by"),
    provedAt: timestamp("proved_at"),
    note: text("note").notNull(),
  },
  (table) => [index("delivery_release").on(table.releaseId), index("delivery_gateway").on(table.gatewayId)],
);

/** A consumer of the machines' data that the team names, with the nodes that it reads (NodeId text with `nsu=`). */
export const reader = sqliteTable(
  "reader",
  {
    id: text("id").primaryKey(),
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    name: text("name").notNull(),
    about: text("about").notNull(),
    contact: text("contact").notNull(),
    nodeIds: text("node_ids", { mode: "json" }).$type<readonly string[]>().notNull(),
    updatedBy: text("updated_by").notNull(),
    updatedAt: timestamp("updated_at").notNull(),
  },
  (table) => [uniqueIndex("reader_name").on(table.organizationId, table.name)],
);

/** What an organisation asks of its releases. */
export const releasePolicy = sqliteTable("release_policy", {
  organizationId: text("organization_id")
    .primaryKey()
    .references(() => organization.id, { onDelete: "cascade" }),
  approvals: integer("approvals").notNull(),
  updatedBy: text("updated_by").notNull(),
  updatedAt: timestamp("updated_at").notNull(),
});

/** The Ed25519 key that signs bundles; the private half is sealed with the installation's secret. */
export const signingKey = sqliteTable(
  "signing_key",
  {
    /** SHA-256 of the public key's SPKI bytes. */
    id: text("id").primaryKey(),
    organizationId: text("organization_id")
      .notNull()
      .references(() => organization.id, { onDelete: "cascade" }),
    publicKey: text("public_key").notNull(),
    sealedPrivateKey: text("sealed_private_key").notNull(),
    createdAt: timestamp("created_at").notNull(),
    retiredAt: timestamp("retired_at"),
  },
  (table) => [index("signing_key_organization").on(table.organizationId)],
);

/** Who does not want which kind of mail. */
export const mailRefusal = sqliteTable(
  "mail_refusal",
  {
    userId: text("user_id")
      .notNull()
      .references(() => user.id, { onDelete: "cascade" }),
    kind: text("kind").notNull(),
    at: timestamp("at").notNull(),
  },
  (table) => [primaryKey({ columns: [table.userId, table.kind] })],
);
