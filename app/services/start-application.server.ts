/** Start and end of the application inside its process; asked once by server.ts, or by the entry in development. */
import { join } from "node:path";
import { closeDatabase, migrateDatabase } from "../db/client.server";
import { removeUnusedBlobs } from "../db/repositories/blobs.server";
import { getEnvironment } from "../utils/env.server";
import { onShutdown, runShutdown } from "../utils/shutdown.server";
import { singleton } from "../utils/singleton.server";
import { getLibrary } from "../library/library.server";
import { startSchedules } from "./schedule-as-built.server";
import { startOutbox } from "./run-outbox.server";
import { removeOldUploads } from "./pending-uploads.server";
import { followOtherProcesses } from "./follow-other-processes.server";
import { startDemoSources } from "./demo-sources.server";
import { DEMO_SLUG, seedDemo } from "./seed-demo.server";
import { registerSourceTopics } from "./source-topics.server";
import { keepSetUpCode, needsSetUp } from "./set-up-organization.server";
import { registerLiveTopics } from "./live-topics.server";
import { registerModelTopics } from "./topic-providers.server";

const SHUTDOWN_LIMIT_MS = 4000;

/** What the console says before the line that the application is ready. */
export type StartReport = { readonly lines: readonly string[] };

export function startApplication(): Promise<StartReport> {
  return singleton("start", start);
}

async function start(): Promise<StartReport> {
  await migrateDatabase();
  onShutdown("database", closeDatabase);
  await removeUnusedBlobs();
  removeOldUploads();
  getLibrary().usePackFolder(join(getEnvironment().dataFolder, "packs"));
  registerModelTopics();
  registerSourceTopics();
  await registerLiveTopics();
  startOutbox();
  startSchedules();
  followOtherProcesses();
  const { isDemo, dataFolder } = getEnvironment();
  if (isDemo) return { lines: [...(await seedDemo()), await startDemoSources(DEMO_SLUG)] };
  if (!(await needsSetUp())) return { lines: [`Data folder: ${dataFolder}`] };
  return {
    lines: [
      `Data folder: ${dataFolder}`,
      "Nobody is here yet. Open the address below and create the first administrator.",
      `Set-up code: ${keepSetUpCode()}`,
    ],
  };
}

/** Ends streams, children and the database; answers the names of those that did not end in time. */
export function stopApplication(): Promise<string[]> {
  return runShutdown(SHUTDOWN_LIMIT_MS);
}
