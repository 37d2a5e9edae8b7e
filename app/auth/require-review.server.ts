/** The review or release of a route together with its model and who asks; what is not theirs does not exist. */
import { findModel, type ModelRow } from "../db/repositories/models.server";
import { findRelease, type ReleaseRow } from "../db/repositories/releases.server";
import { findReview, type ReviewRow } from "../db/repositories/reviews.server";
import { assertMay, requireCaller, requireUser, type Caller } from "./caller.server";
import type { Action } from "./permissions";

export type ReviewAccess = { readonly caller: Caller; readonly review: ReviewRow; readonly model: ModelRow };
export type ReleaseAccess = { readonly caller: Caller; readonly release: ReleaseRow; readonly model: ModelRow };

/** For data routes and the API: 401, 404 or 403 are thrown as problem documents. */
export async function requireReview(request: Request, reviewId: string | undefined, action: Action): Promise<ReviewAccess> {
  return accessReview(await requireCaller(request), reviewId, action);
}

/** For pages: the same, but whoever is not signed in is led to the sign-in page and back. */
export async function requireReviewForPage(request: Request, reviewId: string | undefined, action: Action): Promise<ReviewAccess> {
  return accessReview(await requireUser(request), reviewId, action);
}

async function accessReview(caller: Caller, reviewId: string | undefined, action: Action): Promise<ReviewAccess> {
  const review = reviewId === undefined ? undefined : await findReview(reviewId);
  assertMay(caller, action, review?.organizationId);
  return { caller, review: review as ReviewRow, model: await loadModel(review?.modelId) };
}

export async function requireRelease(request: Request, releaseId: string | undefined, action: Action): Promise<ReleaseAccess> {
  return accessRelease(await requireCaller(request), releaseId, action);
}

export async function requireReleaseForPage(request: Request, releaseId: string | undefined, action: Action): Promise<ReleaseAccess> {
  return accessRelease(await requireUser(request), releaseId, action);
}

async function accessRelease(caller: Caller, releaseId: string | undefined, action: Action): Promise<ReleaseAccess> {
  const release = releaseId === undefined ? undefined : await findRelease(releaseId);
  assertMay(caller, action, release?.organizationId);
  return { caller, release: release as ReleaseRow, model: await loadModel(release?.modelId) };
}

/** Rows of reviews and releases go with their model. */
async function loadModel(modelId: string | undefined): Promise<ModelRow> {
  const model = modelId === undefined ? undefined : await findModel(modelId);
  if (!model) throw new Error(`The model ${modelId ?? ""} of a review or release is missing`);
  return model;
}
