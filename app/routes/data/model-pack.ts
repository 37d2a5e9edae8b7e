import { requireModel } from "~/auth/require-model.server";
import { getModelPack } from "~/services/model-pack.server";
import { answerGzip } from "~/utils/answer-gzip.server";
import { failWith } from "~/utils/problem-response.server";
import type { Route } from "./+types/model-pack";

/** `GET /models/:modelId/pack?seq=N`: the own layer; with `seq` it never changes. */
export async function loader({ request, params }: Route.LoaderArgs): Promise<Response> {
  const { model } = await requireModel(request, params.modelId, "read");
  const asked = new URL(request.url).searchParams.get("seq");
  if (asked !== null && !/^\d{1,12}$/.test(asked)) throw failWith(400, "request.field", { field: "seq", message: "must be a whole number" });
  const pack = await getModelPack(model.id, asked === null ? undefined : Number(asked));
  if (!pack) throw failWith(404, "request.not-found");
  const caching = asked === null ? "no-cache" : "private, max-age=31536000, immutable";
  return answerGzip(request, pack.gzip, { "cache-control": caching, "x-ferrule-seq": String(pack.seq), vary: "cookie, accept-encoding" });
}
