/**
 * What is open of better-auth under /api/auth: signing in and out, and reading one's own session. Everything else that it
 * brings along, above all the endpoints that change organisations and know nothing of our permissions, does not exist.
 */
import { getAuth } from "~/auth/auth.server";
import { isFromOwnOrigin } from "~/auth/same-origin.server";
import { endSession } from "~/auth/session.server";
import { signIn, signInSchema } from "~/services/sign-in.server";
import { requireJson } from "~/utils/parse-request.server";
import { failWith, problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/auth";

const MAX_SIGN_IN_BYTES = 10_000;

export async function loader({ request, params }: Route.LoaderArgs): Promise<Response> {
  if (params["*"] === "get-session") return getAuth().handler(request);
  throw failWith(404, "request.not-found");
}

export async function action({ request, params }: Route.ActionArgs): Promise<Response> {
  const path = params["*"];
  if (request.method !== "POST" || (path !== "sign-in/email" && path !== "sign-out")) throw failWith(404, "request.not-found");
  if (!isFromOwnOrigin(request)) throw failWith(403, "auth.foreign-origin");
  if (path === "sign-out") return answerWithCookies({ success: true }, await endSession(request));
  const result = await signIn(request, await requireJson(request, signInSchema, MAX_SIGN_IN_BYTES));
  if (result.ok) return answerWithCookies({ redirect: false, user: result.value.user }, result.value.headers);
  const seconds = result.problems[0]?.data?.seconds;
  if (seconds === undefined) throw problemResponse(401, result.problems);
  throw problemResponse(429, result.problems, { headers: { "retry-after": String(seconds) } });
}

function answerWithCookies(body: object, from: Headers): Response {
  const headers = new Headers({ "cache-control": "no-store" });
  for (const cookie of from.getSetCookie()) headers.append("set-cookie", cookie);
  return Response.json(body, { headers });
}
