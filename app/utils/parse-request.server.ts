/** The beginning of data routes and API routes: method, media type, body, fields. Each refusal is thrown as an answer. */
import type { z } from "zod";
import { problem, type Problem } from "../domain/core/result";
import { failWith, problemResponse } from "./problem-response.server";
import { getMediaType, readBody } from "./read-body.server";

const MAX_JSON_BYTES = 16 * 1024 * 1024;

export function requireMethod(request: Request, ...allowed: readonly string[]): void {
  if (allowed.includes(request.method)) return;
  throw failWith(405, "request.method", { method: request.method }, { allow: allowed.join(", ") });
}

export function requireMediaType(request: Request, ...allowed: readonly string[]): void {
  const given = getMediaType(request);
  if (!allowed.includes(given)) {
    throw failWith(415, "request.content-type", { expected: allowed.join(" or "), given: given === "" ? "nothing" : given });
  }
}

/** The JSON body after the schema. Throws 415, 413, 400 (not JSON) and 422 (fields). */
export async function requireJson<T extends z.ZodType>(request: Request, schema: T, limit = MAX_JSON_BYTES): Promise<z.infer<T>> {
  requireMediaType(request, "application/json");
  const body = await readBody(request, limit);
  if (!body.ok) throw problemResponse(body.problems[0]?.code === "request.body-size" ? 413 : 400, body.problems);
  let json: unknown;
  try {
    json = JSON.parse(new TextDecoder("utf-8", { fatal: true }).decode(body.value));
  } catch {
    throw failWith(400, "request.body-json");
  }
  return requireFields(schema, json);
}

/** The same for a body that may be left out altogether; the schema then judges `{}`. */
export async function requireOptionalJson<T extends z.ZodType>(request: Request, schema: T): Promise<z.infer<T>> {
  return hasNoBody(request) ? requireFields(schema, {}) : requireJson(request, schema);
}

/** The server's adapter gives every POST a stream, so the headers must tell whether something comes. */
function hasNoBody(request: Request): boolean {
  if (request.body === null || request.headers.get("content-length") === "0") return true;
  return ["content-length", "transfer-encoding", "content-type"].every((name) => !request.headers.has(name));
}

/** Values after the schema, else 422 with one problem a field. */
export function requireFields<T extends z.ZodType>(schema: T, value: unknown): z.infer<T> {
  const parsed = schema.safeParse(value);
  if (!parsed.success) throw problemResponse(422, toFieldProblems(parsed.error));
  return parsed.data;
}

function toFieldProblems(error: z.ZodError): Problem[] {
  return error.issues.slice(0, 50).map((issue) => {
    const field = issue.path.join(".");
    return problem("request.field", { field: field === "" ? "body" : field, message: issue.message }, { attribute: field });
  });
}
