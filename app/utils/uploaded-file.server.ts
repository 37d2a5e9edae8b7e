/** A file that a form sends, within the limit of uploads. */
import { fail, ok, problem, type Result } from "../domain/core/result";
import { READ_LIMITS } from "../domain/nodeset/limits";
import { readBody } from "./read-body.server";

/** Room for the form around the file. */
const FORM_BYTES = 64 * 1024;

/** Chosen at random by the page, so that nobody else listens. */
const PROGRESS_NAME = /^[0-9a-f]{32}$/;

export type UploadedFile = {
  readonly name: string;
  readonly bytes: Uint8Array;
  /** By which name the sender listens for the progress of reading it. */
  readonly progress?: string;
};

/** Problems: `limit.file-size` as soon as too much has come; `import.no-file`. */
export async function readUploadedFile(request: Request, field: string): Promise<Result<UploadedFile>> {
  const limit = READ_LIMITS.maxBytes;
  const body = await readBody(request, limit + FORM_BYTES, "limit.file-size");
  if (!body.ok) return body;
  const form = await parseForm(body.value, request.headers.get("content-type") ?? "");
  const file = form?.get(field);
  if (!(file instanceof File) || file.size === 0) return fail(problem("import.no-file"));
  if (file.size > limit) return fail(problem("limit.file-size", { size: file.size, limit }));
  const progress = form?.get("progress");
  return ok({
    name: file.name.slice(0, 200),
    bytes: new Uint8Array(await file.arrayBuffer()),
    ...(typeof progress === "string" && PROGRESS_NAME.test(progress) ? { progress } : {}),
  });
}

async function parseForm(bytes: Uint8Array, contentType: string): Promise<FormData | undefined> {
  try {
    return await new Response(bytes as Uint8Array<ArrayBuffer>, {
      headers: { "content-type": contentType },
    }).formData();
  } catch {
    return undefined;
  }
}
