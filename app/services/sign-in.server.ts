/** Signing in. The answer to a wrong pair never tells which part was wrong. */
import { z } from "zod";
import { openSession, type SignedIn } from "../auth/session.server";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { getClientAddress } from "../utils/client-address.server";
import { noteFailure, noteSuccess, secondsUntilAllowed } from "./sign-in-limiter.server";

export const signInSchema = z.object({ email: z.string().min(1).max(320), password: z.string().min(1).max(200) });
export type SignInIntent = z.infer<typeof signInSchema>;

/** Answers the headers that set the session's cookie. Problems: `auth.wrong-credentials`, `auth.too-many-attempts`. */
export async function signIn(request: Request, intent: SignInIntent): Promise<Result<SignedIn>> {
  const address = getClientAddress(request);
  const seconds = secondsUntilAllowed(intent.email, address);
  if (seconds > 0) return fail(problem("auth.too-many-attempts", { seconds }));
  // Counted before the slow comparison, so that a burst of parallel guesses does not slip through.
  noteFailure(intent.email, address);
  const signedIn = await openSession(request, intent.email.trim(), intent.password);
  if (!signedIn) return fail(problem("auth.wrong-credentials"));
  noteSuccess(intent.email, address);
  return ok(signedIn);
}
