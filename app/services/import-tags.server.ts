/** Tag lists of controllers: looked at first, then imported with the columns that a person matched; the match is kept as a template. */
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import { writeBatch, type Statement } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import { addBlobStatement, findBlob, toBlob } from "../db/repositories/blobs.server";
import {
  findTagList,
  listColumnTemplates,
  listTagLists,
  removeTagListStatement,
  saveColumnTemplateStatement,
  saveTagListStatement,
} from "../db/repositories/tags.server";
import { fail, ok, problem, type Problem, type Result } from "../domain/core/result";
import { guessColumns, readTags, tagColumns, type ColumnMatch, type TagReading } from "../domain/mapping/read-tags";
import type { Tag } from "../domain/mapping/tag";
import { newId } from "../utils/ids.server";
import { readTable } from "../utils/read-table.server";

const SHOWN_ROWS = 20;

export type TagFile = { readonly bytes: Uint8Array; readonly fileName: string };

export type TagPreview = {
  readonly columns: readonly string[];
  readonly rows: readonly (readonly string[])[];
  readonly count: number;
  readonly guessed: ColumnMatch;
  /** Templates of the team whose columns are all there. */
  readonly templates: readonly { readonly name: string; readonly columns: ColumnMatch }[];
};

const header = z.string().max(500).optional();
export const tagReadingSchema = z.strictObject({
  columns: z.strictObject(Object.fromEntries(tagColumns.map((name) => [name, header])) as Record<(typeof tagColumns)[number], typeof header>),
  addressing: z.enum(["wire", "one-based", "prefixed"]).default("wire"),
  table: z.enum(["coil", "discrete-input", "holding-register", "input-register"]).default("holding-register"),
  order: z.enum(["ABCD", "CDAB", "BADC", "DCBA"]).default("ABCD"),
});

export const tagImportSchema = z.strictObject({
  name: z.string().trim().min(1).max(100),
  sourceId: z.string().max(50).optional(),
  reading: tagReadingSchema,
  /** Keeps the match of the columns under this name. */
  template: z.string().trim().max(100).optional(),
});
export type TagImportIntent = z.infer<typeof tagImportSchema>;

/** Problems: those of `readTable`. */
export async function previewTags(organizationId: string, file: TagFile): Promise<Result<TagPreview>> {
  const table = await readTable(file.bytes, file.fileName);
  if (!table.ok) return table;
  const { head, rows } = table.value;
  const templates = (await listColumnTemplates(organizationId)).filter((t) => Object.values(t.columns).every((name) => head.includes(name)));
  return ok({
    columns: head,
    rows: rows.slice(0, SHOWN_ROWS).map((row) => row.fields),
    count: rows.length,
    guessed: guessColumns(head),
    templates: templates.map(({ name, columns }) => ({ name, columns })),
  });
}

export type ImportedTags = { readonly id: string; readonly count: number; readonly problems: readonly Problem[] };

/** All lines or nothing: a line that cannot be read is told, and nothing is imported. Problems: `tags.line` and those of the table. */
export async function importTags(caller: Caller, organizationId: string, file: TagFile, intent: TagImportIntent): Promise<Result<ImportedTags>> {
  const table = await readTable(file.bytes, file.fileName);
  if (!table.ok) return table;
  const tags = readTags(table.value, intent.reading as TagReading);
  if (!tags.ok) return tags;
  if (tags.problems.length > 0) return fail(...tags.problems.map((p) => ({ ...p, severity: "error" as const })));
  if (tags.value.length === 0) return fail(problem("tags.empty"));
  const now = new Date();
  const [fileBlob, tagBlob] = [await toBlob(file.bytes), await toBlob(JSON.stringify(tags.value))];
  const before = (await listTagLists(organizationId)).find((row) => row.name === intent.name);
  const id = before?.id ?? newId();
  const columns = Object.fromEntries(Object.entries(intent.reading.columns).filter((entry): entry is [string, string] => entry[1] !== undefined));
  const statements: [Statement, ...Statement[]] = [
    addBlobStatement(fileBlob, now),
    addBlobStatement(tagBlob, now),
    saveTagListStatement({
      id,
      organizationId,
      name: intent.name,
      sourceId: intent.sourceId ?? null,
      fileName: file.fileName.slice(0, 200),
      fileHash: fileBlob.hash,
      tagsHash: tagBlob.hash,
      count: tags.value.length,
      columns,
      uploadedBy: caller.name,
      at: now,
    }),
    addAuditStatement({
      organizationId,
      userId: caller.userId,
      userName: caller.name,
      action: "tags.import",
      subject: { kind: "tag-list", id, name: intent.name },
      details: { count: tags.value.length, file: file.fileName },
    }),
  ];
  if (intent.template) statements.push(saveColumnTemplateStatement({ id: newId(), organizationId, name: intent.template, columns, updatedBy: caller.name, updatedAt: now }));
  await writeBatch(statements);
  return ok({ id, count: tags.value.length, problems: tags.problems });
}

export type TagListSummary = { readonly id: string; readonly name: string; readonly sourceId: string | null; readonly fileName: string; readonly count: number; readonly by: string; readonly at: string };

export async function listTags(organizationId: string): Promise<TagListSummary[]> {
  return (await listTagLists(organizationId)).map(({ id, name, sourceId, fileName, count, uploadedBy, at }) => ({ id, name, sourceId, fileName, count, by: uploadedBy, at: at.toISOString() }));
}

/** Problem: `request.not-found`. */
export async function readTagList(organizationId: string, id: string): Promise<Result<Tag[]>> {
  const row = await findTagList(id);
  const bytes = row?.organizationId === organizationId ? await findBlob(row.tagsHash) : undefined;
  return bytes ? ok(JSON.parse(bytes.toString("utf8")) as Tag[]) : fail(problem("request.not-found"));
}

/** Problem: `request.not-found`. */
export async function removeTagList(organizationId: string, id: string): Promise<Result<null>> {
  const row = await findTagList(id);
  if (row?.organizationId !== organizationId) return fail(problem("request.not-found"));
  await writeBatch([removeTagListStatement(id)]);
  return ok(null);
}
