/** The log: one JSON line an entry in the data folder; what an operator must see at once also goes to standard error. */
import { mkdirSync } from "node:fs";
import { join } from "node:path";
import { destination, pino, type Logger } from "pino";
import { getEnvironment } from "./env.server";
import { newId } from "./ids.server";
import { singleton } from "./singleton.server";

export function getLog(): Logger {
  return singleton("log", () => {
    const folder = join(getEnvironment().dataFolder, "logs");
    mkdirSync(folder, { recursive: true });
    return pino({ base: null }, destination({ dest: join(folder, "ferrule.log"), sync: true }));
  });
}

/** Records an unexpected error and answers the id under which it stands in the log. */
export function logError(error: unknown, where: string): string {
  const id = newId();
  getLog().error({ id, where, err: error instanceof Error ? { message: error.message, stack: error.stack } : String(error) });
  console.error(`Ferrule error ${id} at ${where}: ${error instanceof Error ? error.message : String(error)}`);
  return id;
}
