/** Sessions and passwords: all that the services ask better-auth for. */
import { APIError } from "better-auth/api";
import { hashPassword as hash } from "better-auth/crypto";
import { getAuth } from "./auth.server";

export type SignedIn = { readonly headers: Headers; readonly user: { id: string; name: string; email: string } };

/** Opens a session and answers the headers that set its cookie; undefined when e-mail and password do not belong together. */
export async function openSession(request: Request, email: string, password: string): Promise<SignedIn | undefined> {
  try {
    const answer = await getAuth().api.signInEmail({
      body: { email, password },
      headers: request.headers,
      returnHeaders: true,
    });
    const { id, name, email: kept } = answer.response.user;
    return { headers: answer.headers, user: { id, name, email: kept } };
  } catch (error) {
    if (error instanceof APIError) return undefined;
    throw error;
  }
}

/** Answers the headers that end the session. */
export async function endSession(request: Request): Promise<Headers> {
  const answer = await getAuth().api.signOut({ headers: request.headers, returnHeaders: true });
  return answer.headers;
}

export function hashPassword(password: string): Promise<string> {
  return hash(password);
}
