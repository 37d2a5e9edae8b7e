/** Rows of test servers: who owns which child, and whether the owner still lives. */
import { and, eq, inArray, lt } from "drizzle-orm";
import { getDatabase, writeBatch, type Statement } from "../client.server";
import { testServer, type TestServerState } from "../schema/operations";

const liveStates: TestServerState[] = ["starting", "running", "stopping"];

/** The row and its entry in the audit, both or none. */
export async function saveNewTestServer(row: typeof testServer.$inferInsert, audit: Statement): Promise<void> {
  await writeBatch([getDatabase().insert(testServer).values(row), audit]);
}

export async function saveTestServer(id: string, change: Partial<Omit<typeof testServer.$inferInsert, "id">>): Promise<void> {
  await writeBatch([getDatabase().update(testServer).set(change).where(eq(testServer.id, id))]);
}

/** Marks as lost what claims to run although its owner has not been heard of since `silentSince`; answers the ids. */
export async function saveLostTestServers(silentSince: Date, now: Date): Promise<string[]> {
  const db = getDatabase();
  const lost = await db
    .select({ id: testServer.id })
    .from(testServer)
    .where(and(inArray(testServer.state, liveStates), lt(testServer.heartbeatAt, silentSince)));
  const ids = lost.map((row) => row.id);
  if (ids.length > 0) await writeBatch([db.update(testServer).set({ state: "lost", endedAt: now }).where(inArray(testServer.id, ids))]);
  return ids;
}
