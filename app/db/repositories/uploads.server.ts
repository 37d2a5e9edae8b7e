/** NodeSets that an organisation added to its library. */
import { asc, eq } from "drizzle-orm";
import { getDatabase } from "../client.server";
import { uploadedNodeSet } from "../schema/models";

export type UploadRow = typeof uploadedNodeSet.$inferSelect;

export async function listUploads(organizationId: string): Promise<UploadRow[]> {
  return getDatabase()
    .select()
    .from(uploadedNodeSet)
    .where(eq(uploadedNodeSet.organizationId, organizationId))
    .orderBy(asc(uploadedNodeSet.modelUri), asc(uploadedNodeSet.publicationDate));
}

export async function findUpload(id: string): Promise<UploadRow | undefined> {
  const [row] = await getDatabase().select().from(uploadedNodeSet).where(eq(uploadedNodeSet.id, id));
  return row;
}

export function addUploadStatement(row: typeof uploadedNodeSet.$inferInsert) {
  return getDatabase().insert(uploadedNodeSet).values(row);
}

export function removeUploadStatement(id: string) {
  return getDatabase().delete(uploadedNodeSet).where(eq(uploadedNodeSet.id, id));
}

/** Whether some upload of the organisation names these bytes; they are its own then. */
export async function hasUploadWithPack(organizationId: string, packHash: string): Promise<boolean> {
  return (await listUploads(organizationId)).some((row) => row.packHash === packHash);
}
