/** The environment, parsed once. Every setting is optional; a wrong one stops the start with a list of what is wrong. */
import { chmodSync, existsSync, mkdirSync, readFileSync, writeFileSync } from "node:fs";
import { randomBytes } from "node:crypto";
import { join, resolve } from "node:path";
import { z } from "zod";
import { singleton } from "./singleton.server";

const environmentSchema = z.object({
  PORT: z.coerce.number().int().min(1).max(65535).default(3000),
  HOST: z.string().min(1).default("127.0.0.1"),
  FERRULE_DATA: z.string().min(1).default("./data"),
  DATABASE_URL: z
    .string()
    .regex(/^(file|libsql|https?|wss?):/, "must start with file:, libsql:, http: or ws:")
    .optional(),
  FERRULE_SECRET: z.string().min(32, "must have at least 32 characters").optional(),
  FERRULE_DEMO: z.enum(["0", "1"]).default("0"),
  FERRULE_SMTP_URL: z
    .string()
    .regex(/^(local$|smtps?:\/\/)/, "must start with smtp:// or smtps://, or be the word local")
    .optional(),
  FERRULE_MAIL_FROM: z.string().min(3).max(320).default("Ferrule <ferrule@localhost>"),
  FERRULE_ORIGIN: z.url("must be an address such as https://ferrule.example").optional(),
});

export type Environment = {
  readonly port: number;
  readonly host: string;
  /** Absolute path of the data folder; made when absent. */
  readonly dataFolder: string;
  readonly databaseUrl: string;
  readonly secret: string;
  readonly isDemo: boolean;
  /** The address that browsers use when a proxy stands before the application. */
  readonly publicOrigin: string | undefined;
  /** The mail server; `local` for one that this process runs and that shows what it received; undefined for none. */
  readonly smtpUrl: string | undefined;
  readonly mailFrom: string;
};

export class EnvironmentError extends Error {}

/**
 * Reads the settings. The demo lives in a folder of its own below the data folder and ignores DATABASE_URL, so that
 * resetting it can never touch another database.
 */
export function readEnvironment(variables: Readonly<Record<string, string | undefined>>): Environment {
  const present = Object.fromEntries(Object.entries(variables).filter(([, value]) => value !== undefined && value !== ""));
  const parsed = environmentSchema.safeParse(present);
  if (!parsed.success) {
    const lines = parsed.error.issues.map((issue) => `  ${issue.path.join(".")}: ${issue.message}`);
    throw new EnvironmentError(`The environment has settings that cannot be used:\n${lines.join("\n")}`);
  }
  const { data } = parsed;
  const isDemo = data.FERRULE_DEMO === "1";
  const dataFolder = isDemo ? join(resolve(data.FERRULE_DATA), "demo") : resolve(data.FERRULE_DATA);
  mkdirSync(dataFolder, { recursive: true });
  const ownDatabase = `file:${join(dataFolder, "ferrule.db")}`;
  return {
    port: data.PORT,
    host: data.HOST,
    dataFolder,
    databaseUrl: isDemo ? ownDatabase : (data.DATABASE_URL ?? ownDatabase),
    secret: data.FERRULE_SECRET ?? keepSecret(join(dataFolder, "secret")),
    isDemo,
    smtpUrl: data.FERRULE_SMTP_URL ?? (isDemo ? "local" : undefined),
    mailFrom: data.FERRULE_MAIL_FROM,
    publicOrigin: data.FERRULE_ORIGIN ? new URL(data.FERRULE_ORIGIN).origin : undefined,
  };
}

/** The secret of this data folder: made once, readable by its owner only. */
function keepSecret(file: string): string {
  if (!existsSync(file)) {
    writeFileSync(file, randomBytes(32).toString("base64url"), { mode: 0o600 });
    chmodSync(file, 0o600);
  }
  return readFileSync(file, "utf8").trim();
}

export function getEnvironment(): Environment {
  return singleton("environment", () => readEnvironment(process.env));
}
