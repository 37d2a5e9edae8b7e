/**
 * The database. Calls on a file are synchronous inside libSQL, and a write that overlaps an open transaction fails at
 * once. Therefore nothing here holds a transaction across a wait: a use case reads, decides and then writes one
 * `batch`, which is atomic; `writeInTurn` keeps the use cases that read before they write from interleaving.
 */
import { join } from "node:path";
import { createClient, type Client } from "@libsql/client";
import type { BatchItem } from "drizzle-orm/batch";
import { drizzle, type LibSQLDatabase } from "drizzle-orm/libsql";
import { migrate } from "drizzle-orm/libsql/migrator";
import { getEnvironment } from "../utils/env.server";
import { findProjectRoot } from "../utils/project-root.server";
import { singleton } from "../utils/singleton.server";
import { schema } from "./schema/schema";

export type Database = LibSQLDatabase<typeof schema>;

type Connection = { client: Client; db: Database; lastWrite: Promise<unknown> };

function getConnection(): Connection {
  return singleton("database", () => {
    const client = createClient({ url: getEnvironment().databaseUrl, timeout: 5000 });
    return { client, db: drizzle(client, { schema }), lastWrite: Promise.resolve() };
  });
}

export function getDatabase(): Database {
  return getConnection().db;
}

/** Switches to the write-ahead log and brings the tables to the newest form. */
export async function migrateDatabase(): Promise<void> {
  const { client, db } = getConnection();
  if (client.protocol === "file") await client.execute("PRAGMA journal_mode = WAL");
  await migrate(db, { migrationsFolder: join(findProjectRoot(), "drizzle") });
}

/** Runs the work after all writes asked for before it, whether those went well or not. */
export function writeInTurn<T>(work: (db: Database) => Promise<T>): Promise<T> {
  const connection = getConnection();
  const turn = connection.lastWrite.then(
    () => work(connection.db),
    () => work(connection.db),
  );
  connection.lastWrite = turn.catch(() => undefined);
  return turn;
}

export type Statement = BatchItem<"sqlite">;

/** Writes all statements or none, in turn with other use cases; answers what each returned, in order. */
export function writeBatch(statements: readonly [Statement, ...Statement[]]): Promise<readonly unknown[]> {
  return writeInTurn((db) => db.batch(statements as [Statement, ...Statement[]]));
}

/** Waits for the writes in turn and closes; for shutdown. */
export async function closeDatabase(): Promise<void> {
  const connection = getConnection();
  await connection.lastWrite;
  connection.client.close();
}
