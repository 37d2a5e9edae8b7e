/** One file that a request brings: as the body itself, or as the field `file` of a form. */
import type { Result } from "../domain/core/result";
import { ok } from "../domain/core/result";
import { getMediaType, readBody } from "./read-body.server";
import { readUploadedFile, type UploadedFile } from "./uploaded-file.server";

/** `name` is that of a bare body; a form's file tells its own. Problems: `limit.file-size`, `request.body-empty`, `import.no-file`. */
export async function readFileBody(request: Request, { name, limit }: { name: string; limit: number }): Promise<Result<UploadedFile>> {
  if (getMediaType(request) === "multipart/form-data") return readUploadedFile(request, "file");
  const body = await readBody(request, limit, "limit.file-size");
  return body.ok ? ok({ name, bytes: body.value }) : body;
}
