import { and, asc, eq } from "drizzle-orm";
import { getDatabase, type Statement } from "../client.server";
import { watchBoard } from "../schema/live";

export type WatchBoardRow = typeof watchBoard.$inferSelect;

export async function listWatchBoards(organizationId: string): Promise<WatchBoardRow[]> {
  return getDatabase().select().from(watchBoard).where(eq(watchBoard.organizationId, organizationId)).orderBy(asc(watchBoard.name));
}

export async function findWatchBoard(id: string): Promise<WatchBoardRow | undefined> {
  return getDatabase().query.watchBoard.findFirst({ where: eq(watchBoard.id, id) });
}

export async function findBoardOfType(modelId: string, typeNodeId: string): Promise<WatchBoardRow | undefined> {
  return getDatabase().query.watchBoard.findFirst({ where: and(eq(watchBoard.modelId, modelId), eq(watchBoard.typeNodeId, typeNodeId)) });
}

export function addWatchBoardStatement(row: typeof watchBoard.$inferInsert): Statement {
  return getDatabase().insert(watchBoard).values(row);
}

export function changeWatchBoardStatement(id: string, change: Partial<Omit<WatchBoardRow, "id">>): Statement {
  return getDatabase().update(watchBoard).set(change).where(eq(watchBoard.id, id));
}

export function removeWatchBoardStatement(id: string): Statement {
  return getDatabase().delete(watchBoard).where(eq(watchBoard.id, id));
}
