/** Tag lists and the column templates of a team. */
import { asc, eq } from "drizzle-orm";
import { getDatabase } from "../client.server";
import { columnTemplate, tagList } from "../schema/sources";

export type TagListRow = typeof tagList.$inferSelect;
export type ColumnTemplateRow = typeof columnTemplate.$inferSelect;

export async function listTagLists(organizationId: string): Promise<TagListRow[]> {
  return getDatabase().select().from(tagList).where(eq(tagList.organizationId, organizationId)).orderBy(asc(tagList.name));
}

export async function findTagList(id: string): Promise<TagListRow | undefined> {
  const [row] = await getDatabase().select().from(tagList).where(eq(tagList.id, id));
  return row;
}

/** A list of the same name is replaced. */
export function saveTagListStatement(row: TagListRow) {
  const { id: _id, organizationId: _organization, name: _name, ...set } = row;
  return getDatabase()
    .insert(tagList)
    .values(row)
    .onConflictDoUpdate({ target: [tagList.organizationId, tagList.name], set });
}

export function removeTagListStatement(id: string) {
  return getDatabase().delete(tagList).where(eq(tagList.id, id));
}

export async function listColumnTemplates(organizationId: string): Promise<ColumnTemplateRow[]> {
  return getDatabase().select().from(columnTemplate).where(eq(columnTemplate.organizationId, organizationId)).orderBy(asc(columnTemplate.name));
}

export function saveColumnTemplateStatement(row: ColumnTemplateRow) {
  const { columns, updatedBy, updatedAt } = row;
  return getDatabase()
    .insert(columnTemplate)
    .values(row)
    .onConflictDoUpdate({ target: [columnTemplate.organizationId, columnTemplate.name], set: { columns, updatedBy, updatedAt } });
}
