/**
 * Files between the preview and the import: kept on disk for an hour, outside the database, so that a refused or
 * forgotten import leaves no row behind.
 */
import { mkdirSync, readdirSync, rmSync, statSync } from "node:fs";
import { readFile, writeFile } from "node:fs/promises";
import { join } from "node:path";
import { z } from "zod";
import { getEnvironment } from "../utils/env.server";
import { newId } from "../utils/ids.server";

const KEPT_MS = 3600_000;

const pendingSchema = z.object({ organizationId: z.string(), userId: z.string(), fileName: z.string() });
export type PendingUpload = z.infer<typeof pendingSchema> & { readonly bytes: Uint8Array };

function getFolder(): string {
  const folder = join(getEnvironment().dataFolder, "uploads", "pending");
  mkdirSync(folder, { recursive: true });
  return folder;
}

export async function keepPendingUpload(upload: PendingUpload): Promise<string> {
  removeOldUploads();
  const id = newId();
  const { bytes, ...about } = upload;
  await writeFile(join(getFolder(), `${id}.xml`), bytes);
  await writeFile(join(getFolder(), `${id}.json`), JSON.stringify(about));
  return id;
}

/** The upload, when it is still there and was made by this person in this organisation. */
export async function findPendingUpload(id: string, organizationId: string, userId: string): Promise<PendingUpload | undefined> {
  if (!/^[a-z0-9]{20}$/.test(id)) return undefined;
  try {
    const about = pendingSchema.parse(JSON.parse(await readFile(join(getFolder(), `${id}.json`), "utf8")));
    if (about.organizationId !== organizationId || about.userId !== userId) return undefined;
    return { ...about, bytes: await readFile(join(getFolder(), `${id}.xml`)) };
  } catch {
    return undefined;
  }
}

export function removePendingUpload(id: string): void {
  for (const ending of ["xml", "json"]) rmSync(join(getFolder(), `${id}.${ending}`), { force: true });
}

/** Removes what waited too long; all of it when the limit is 0. */
export function removeOldUploads(keptMs = KEPT_MS): void {
  const folder = getFolder();
  const oldest = Date.now() - keptMs;
  for (const name of readdirSync(folder)) {
    const file = join(folder, name);
    if ((statSync(file, { throwIfNoEntry: false })?.mtimeMs ?? 0) <= oldest) rmSync(file, { force: true });
  }
}
