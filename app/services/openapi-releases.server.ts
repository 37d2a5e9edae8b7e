/** Reviews, releases, deliveries, readers and variants in the OpenAPI document. */
import { askReviewSchema } from "./ask-review.server";
import { branchSchema, mergeSchema } from "./branch-model.server";
import { commentSchema } from "./comment-review.server";
import { decisionSchema } from "./decide-review.server";
import { deliverSchema } from "./deliver-release.server";
import { readerSchema } from "./manage-readers.server";
import { inputOf, json, organization, pathId, problems, refTo } from "./openapi-parts.server";
import { releaseSchema, withdrawSchema } from "./release-revision.server";

const revisionNumber = { name: "number", in: "path", required: true, schema: { type: "integer", minimum: 0 } };
const zipBody = { "application/zip": { schema: { type: "string", contentMediaType: "application/zip" } } };
const operationCount = { type: "object", required: ["operations"], properties: { operations: { type: "integer" } } };

export const releasePaths = {
  "/models/{modelId}/revisions/{number}/restore": {
    parameters: [pathId("modelId"), revisionNumber],
    post: {
      operationId: "restoreRevision",
      summary: "Make the working state what a revision is, as one edit",
      responses: { 200: json(operationCount, "How many operations it took"), ...problems(401, 403, 404, 409) },
    },
  },
  "/models/{modelId}/variants": {
    parameters: [pathId("modelId")],
    get: {
      operationId: "listVariants",
      summary: "The variants of a model",
      responses: { 200: json({ type: "array", items: refTo("Model") }, "The variants"), ...problems(401, 403, 404) },
    },
    post: {
      operationId: "branchModel",
      summary: "A variant of a revision, for a trial",
      requestBody: inputOf(branchSchema),
      responses: { 201: json(refTo("Model"), "The variant"), ...problems(400, 401, 403, 404, 415, 422) },
    },
  },
  "/models/{modelId}/merge": {
    parameters: [pathId("modelId")],
    get: {
      operationId: "previewMerge",
      summary: "What merging a variant would do, with its conflicts",
      parameters: [{ name: "direction", in: "query", required: false, schema: { type: "string", enum: ["into-model", "into-variant"] } }],
      responses: { 200: json({ type: "object" }, "Both sides, the conflicts and the number of operations"), ...problems(401, 403, 404, 409) },
    },
    post: {
      operationId: "mergeVariant",
      summary: "Merge with a choice at every conflict",
      requestBody: inputOf(mergeSchema),
      responses: { 200: json(operationCount, "How many operations it took"), ...problems(400, 401, 403, 404, 409, 415) },
    },
  },
  "/models/{modelId}/reviews": {
    parameters: [pathId("modelId")],
    get: {
      operationId: "listReviews",
      summary: "The reviews of a model, newest first",
      responses: { 200: json({ type: "array", items: refTo("Review") }, "The reviews"), ...problems(401, 403, 404) },
    },
    post: {
      operationId: "askReview",
      summary: "Freeze the working state and ask for a review",
      requestBody: inputOf(askReviewSchema),
      responses: { 201: json(refTo("Review"), "The review"), ...problems(400, 401, 403, 404, 409, 415, 422) },
    },
  },
  "/reviews/{reviewId}": {
    parameters: [pathId("reviewId")],
    get: { operationId: "getReview", summary: "One review", responses: { 200: json(refTo("Review"), "The review"), ...problems(401, 403, 404) } },
  },
  "/reviews/{reviewId}/decision": {
    parameters: [pathId("reviewId")],
    post: {
      operationId: "decideReview",
      summary: "Approve, or ask for changes; nobody approves their own work",
      requestBody: inputOf(decisionSchema),
      responses: { 200: json(refTo("Review"), "The review"), ...problems(400, 401, 403, 404, 409, 415) },
    },
  },
  "/reviews/{reviewId}/comments": {
    parameters: [pathId("reviewId")],
    get: {
      operationId: "listReviewComments",
      summary: "Comments of a review, and open ones of the model's earlier reviews",
      responses: { 200: json({ type: "array", items: refTo("ReviewComment") }, "The comments"), ...problems(401, 403, 404) },
    },
    post: {
      operationId: "commentReview",
      summary: "Comment on a node or a change, or reply",
      requestBody: inputOf(commentSchema),
      responses: { 201: json(refTo("ReviewComment"), "The comment"), ...problems(400, 401, 403, 404, 415, 422) },
    },
  },
  "/reviews/{reviewId}/release": {
    parameters: [pathId("reviewId")],
    post: {
      operationId: "releaseRevision",
      summary: "Release the approved revision; the bundle is built once, signed and kept",
      requestBody: inputOf(releaseSchema),
      responses: { 201: json(refTo("Release"), "The release"), ...problems(400, 401, 403, 404, 409, 415) },
    },
  },
  "/models/{modelId}/releases": {
    parameters: [pathId("modelId")],
    get: {
      operationId: "listReleases",
      summary: "The releases of a model, newest first",
      responses: { 200: json({ type: "array", items: refTo("Release") }, "The releases"), ...problems(401, 403, 404) },
    },
  },
  "/releases/{releaseId}": {
    parameters: [pathId("releaseId")],
    get: { operationId: "getRelease", summary: "One release", responses: { 200: json(refTo("Release"), "The release"), ...problems(401, 403, 404) } },
  },
  "/releases/{releaseId}/bundle": {
    parameters: [pathId("releaseId")],
    get: {
      operationId: "getBundle",
      summary: "The bundle of a release, as it was built",
      responses: { 200: { description: "The ZIP", content: zipBody }, ...problems(401, 403, 404) },
    },
  },
  "/releases/{releaseId}/withdrawal": {
    parameters: [pathId("releaseId")],
    post: {
      operationId: "withdrawRelease",
      summary: "Withdraw a release; it stays visible as withdrawn",
      requestBody: inputOf(withdrawSchema),
      responses: { 204: { description: "Withdrawn" }, ...problems(400, 401, 403, 404, 409, 415) },
    },
  },
  "/releases/{releaseId}/deliveries": {
    parameters: [pathId("releaseId")],
    get: {
      operationId: "listDeliveries",
      summary: "Where the bundle went",
      responses: { 200: json({ type: "array", items: refTo("Delivery") }, "The deliveries"), ...problems(401, 403, 404) },
    },
    post: {
      operationId: "deliverRelease",
      summary: "Note that the bundle was sent to a gateway",
      requestBody: inputOf(deliverSchema),
      responses: { 201: json(refTo("Delivery"), "The delivery"), ...problems(400, 401, 403, 404, 409, 415, 422) },
    },
  },
  "/releases/{releaseId}/deliveries/{deliveryId}": {
    parameters: [pathId("releaseId"), pathId("deliveryId")],
    post: {
      operationId: "advanceDelivery",
      summary: "Note that the gateway has loaded the bundle",
      requestBody: { required: true, content: { "application/json": { schema: { type: "object", required: ["state"], properties: { state: { const: "loaded" } } } } } },
      responses: { 204: { description: "Noted" }, ...problems(400, 401, 403, 404, 409, 415) },
    },
  },
  "/readers": {
    get: {
      operationId: "listReaders",
      summary: "Readers with the nodes that they read",
      parameters: [organization],
      responses: { 200: json({ type: "array", items: refTo("Reader") }, "The readers"), ...problems(400, 401, 403, 404) },
    },
    put: {
      operationId: "saveReader",
      summary: "Name a reader, or change one",
      parameters: [organization],
      requestBody: inputOf(readerSchema),
      responses: { 200: json(refTo("Reader"), "The reader"), ...problems(400, 401, 403, 404, 415, 422) },
    },
  },
  "/signing-key": {
    get: {
      operationId: "getSigningKey",
      summary: "The organisation's public key, PEM",
      parameters: [organization],
      responses: {
        200: { description: "The key", content: { "application/x-pem-file": { schema: { type: "string" } } } },
        ...problems(400, 401, 403, 404),
      },
    },
  },
} as const;
