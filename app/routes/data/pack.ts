import { requireCaller } from "~/auth/caller.server";
import { findPackFor } from "~/services/find-pack.server";
import { answerGzip } from "~/utils/answer-gzip.server";
import { failWith } from "~/utils/problem-response.server";
import type { Route } from "./+types/pack";

/** `GET /packs/:hash`: a required model, named by its contents, so that it never changes. */
export async function loader({ request, params }: Route.LoaderArgs): Promise<Response> {
  const caller = await requireCaller(request);
  const organizationIds = caller.memberships.map((m) => m.organizationId);
  const gzip = /^[0-9a-f]{64}$/.test(params.hash) ? await findPackFor(organizationIds, params.hash) : undefined;
  if (!gzip) throw failWith(404, "request.not-found");
  return answerGzip(request, gzip, { "cache-control": "private, max-age=31536000, immutable", vary: "cookie, accept-encoding" });
}
