/** A file that a form sends, within the limit of uploads. */
import { fail, ok, problem, type Result } from "../domain/core/result";
import { READ_LIMITS } from "../domain/nodeset/limits";
import { readBody } from "./read-body.server";

/** Room for the form around the file. */
const FORM_BYTES = 64 * 1024;

export type UploadedFile = { readonly name: string; readonly bytes: Uint8Array };

/** Problems: `limit.file-size` as soon as too much has come; `import.no-file`. */
export async function readUploadedFile(request: Request, field: string): Promise<Result<UploadedFile>> {
  const limit = READ_LIMITS.maxBytes;
  const body = await readBody(request, limit + FORM_BYTES, "limit.file-size");
  if (!body.ok) return body;
  const file = (await parseForm(body.value, request.headers.get("content-type") ?? ""))?.get(field);
  if (!(file instanceof File) || file.size === 0) return fail(problem("import.no-file"));
  if (file.size > limit) return fail(problem("limit.file-size", { size: file.size, limit }));
  return ok({ name: file.name.slice(0, 200), bytes: new Uint8Array(await file.arrayBuffer()) });
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
