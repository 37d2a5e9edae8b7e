/** The JSON of reviews and releases in /api/v1. */
import { z } from "zod";

export const reviewSchema = z
  .object({
    id: z.string(),
    number: z.int(),
    title: z.string(),
    modelId: z.string(),
    revision: z.int(),
    baseRevision: z.int(),
    state: z.enum(["open", "approved", "changes-wanted", "released", "closed"]),
    author: z.string(),
    askedAt: z.iso.datetime(),
    reviewers: z.array(
      z.object({
        userId: z.string(),
        name: z.string(),
        decision: z.enum(["approved", "changes-wanted"]).nullable(),
        decidedRevision: z.int().nullable(),
        holds: z.boolean().meta({ description: "False once the model was edited after the decision." }),
      }),
    ),
    obstacles: z.array(z.enum(["variant", "edited", "approvals", "changes-wanted", "errors", "closed"])).meta({ description: "Why it cannot be released now; empty when it can." }),
  })
  .meta({ id: "Review", description: "One question to named reviewers: may this revision be released?" });

export const reviewCommentSchema = z
  .object({
    id: z.string(),
    nodeKey: z.string().nullable(),
    change: z.string().nullable(),
    parentId: z.string().nullable(),
    author: z.string(),
    at: z.iso.datetime(),
    text: z.string(),
    suggestion: z.string().nullable(),
    appliedBy: z.string().nullable(),
    resolvedBy: z.string().nullable(),
  })
  .meta({ id: "ReviewComment" });

const act = z.object({ by: z.string(), at: z.iso.datetime() });

export const releaseJsonSchema = z
  .object({
    id: z.string(),
    modelId: z.string(),
    model: z.string(),
    version: z.string(),
    modelVersion: z.string(),
    publicationDate: z.string(),
    revision: z.int(),
    rating: z.enum(["breaking", "additive", "neutral"]).nullable(),
    bundleHash: z.string().meta({ description: "SHA-256 of the ZIP." }),
    bundleSize: z.int(),
    fileName: z.string(),
    by: z.string(),
    at: z.iso.datetime(),
    withdrawn: act.extend({ reason: z.string() }).nullable(),
  })
  .meta({ id: "Release", description: "A revision that passed review and carries a version." });

export const deliverySchema = z
  .object({
    id: z.string(),
    gateway: z.string(),
    state: z.enum(["sent", "loaded", "proved"]),
    hash: z.string(),
    note: z.string(),
    sent: act,
    loaded: act.nullable(),
    proved: act.nullable(),
  })
  .meta({ id: "Delivery", description: "A release's bundle handed to a gateway." });

export const readerJsonSchema = z
  .object({
    id: z.string(),
    name: z.string(),
    about: z.string(),
    contact: z.string(),
    nodeIds: z.array(z.string()),
    updatedBy: z.string(),
    updatedAt: z.iso.datetime(),
  })
  .meta({ id: "Reader", description: "A consumer of the machines' data that the team names." });
