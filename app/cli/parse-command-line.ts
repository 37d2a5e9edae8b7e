/** The command line as a value. */
import { resolve } from "node:path";
import { parseArgs } from "node:util";
import type { Severity } from "../domain/core/result";
import { securityModes } from "../opcua/client/endpoint-settings";

export type CheckCommand = {
  readonly name: "check";
  readonly file: string;
  readonly folders: readonly string[];
  readonly format: ReportFormat;
  /** The lowest severity that is listed and, where it is given, that counts for the exit code; errors count always. */
  readonly severity: Severity | undefined;
  readonly waivers: string | undefined;
  readonly conventions: string | undefined;
  /** A mapping document of one of the model's machine types; its check cases run, too. */
  readonly mapping: string | undefined;
};
export type ReportFormat = "text" | "json" | "sarif";
export type RulesCommand = { readonly name: "rules"; readonly id: string | undefined; readonly isJson: boolean };
export type RoundtripCommand = {
  readonly name: "roundtrip";
  readonly input: string;
  readonly output: string;
  readonly isCanonical: boolean;
  readonly folders: readonly string[];
};
export type CompareCommand = {
  readonly name: "compare";
  readonly before: string;
  readonly after: string;
  readonly folders: readonly string[];
  readonly isJson: boolean;
};
export type VerifyCommand = {
  readonly name: "verify";
  readonly file: string;
  /** PEM file of the public key that must have signed. */
  readonly key: string | undefined;
  readonly isJson: boolean;
};
export type DeviceCommand = { readonly name: "device"; readonly file: string; readonly isJson: boolean };
export type DecodeCommand = {
  readonly name: "decode";
  readonly file: string;
  readonly hex: string;
  readonly direction: "in" | "out";
  readonly condition?: string;
  readonly isJson: boolean;
};
export type MapCommand = {
  readonly name: "map";
  readonly file: string;
  /** `SOURCE=HEX`, one for each frame. */
  readonly frames: readonly string[];
  readonly isJson: boolean;
};
export type AsBuiltCommand = {
  readonly name: "as-built";
  readonly file: string;
  readonly endpoint: string;
  readonly folders: readonly string[];
  readonly watchSeconds: number;
  /** Patterns over paths and NodeIds. */
  readonly ignored: readonly string[];
  readonly security: (typeof securityModes)[number] | undefined;
  readonly fingerprint: string | undefined;
  readonly user: string | undefined;
  readonly password: string | undefined;
  /** Folder of the client's own certificate; a new one for each call when absent. */
  readonly pki: string | undefined;
  readonly isJson: boolean;
};
export type Command =
  | { readonly name: "help" }
  | CheckCommand
  | RulesCommand
  | RoundtripCommand
  | CompareCommand
  | VerifyCommand
  | DeviceCommand
  | DecodeCommand
  | MapCommand
  | AsBuiltCommand;

/** npm runs scripts in the project's folder; paths mean the folder that the user stands in. */
export function resolvePath(path: string): string {
  const { npm_lifecycle_event: script, INIT_CWD: startedIn } = process.env;
  return script === "ferrule" && startedIn !== undefined ? resolve(startedIn, path) : resolve(path);
}

/** Wrong usage; its message says what is wrong. */
export class UsageError extends Error {}

export function parseCommandLine(args: readonly string[]): Command {
  const { values, positionals } = parse(args);
  const [name, ...rest] = positionals;
  const folders = values.with ?? [];
  if (values.help || name === "help") return { name: "help" };
  if (name === "check") {
    const [file] = requireCount(rest, 1, "check takes one FILE.");
    const format = requireOneOf(
      values.format ?? (values.json ? "json" : "text"),
      FORMATS,
      "--format is text, json or sarif.",
    );
    const severity =
      values.severity === undefined
        ? undefined
        : requireOneOf(values.severity, SEVERITIES, "--severity is error, warning or hint.");
    return {
      name,
      file: file ?? "",
      folders,
      format,
      severity,
      waivers: values.waivers,
      conventions: values.conventions,
      mapping: values.mapping,
    };
  }
  if (name === "rules") {
    if (rest.length > 1) throw new UsageError("rules takes one RULE at most.");
    return { name, id: rest[0]?.toUpperCase(), isJson: values.json ?? false };
  }
  if (name === "roundtrip") {
    if (values.json) throw new UsageError("roundtrip knows no --json.");
    const [input, output] = requireCount(rest, 2, "roundtrip takes two files, IN and OUT.");
    return { name, input: input ?? "", output: output ?? "", isCanonical: values.canonical ?? false, folders };
  }
  if (name === "compare") {
    const [before, after] = requireCount(rest, 2, "compare takes two files, OLD and NEW.");
    return { name, before: before ?? "", after: after ?? "", folders, isJson: values.json ?? false };
  }
  if (name === "verify") {
    const [file] = requireCount(rest, 1, "verify takes one BUNDLE.");
    return { name, file: file ?? "", key: values.key, isJson: values.json ?? false };
  }
  if (name === "device") {
    const [file] = requireCount(rest, 1, "device takes one FILE.");
    return { name, file: file ?? "", isJson: values.json ?? false };
  }
  if (name === "decode") {
    const [file, ...hex] = rest;
    if (file === undefined || hex.length === 0) throw new UsageError("decode takes a FILE and the frame as HEX.");
    const direction = values.direction ?? "in";
    if (direction !== "in" && direction !== "out") throw new UsageError("--direction is in or out.");
    const condition = values.condition === undefined ? {} : { condition: values.condition };
    return { name, file, hex: hex.join(" "), direction, ...condition, isJson: values.json ?? false };
  }
  if (name === "map") {
    const [file] = requireCount(rest, 1, "map takes one DOCUMENT.");
    return { name, file: file ?? "", frames: values.frame ?? [], isJson: values.json ?? false };
  }
  if (name === "as-built") return toAsBuilt(rest, values);
  throw new UsageError(name === undefined ? "Which command?" : `There is no command “${name}”.`);
}

function toAsBuilt(rest: readonly string[], values: ReturnType<typeof parse>["values"]): AsBuiltCommand {
  const [file = "", endpoint = ""] = requireCount(rest, 2, "as-built takes a FILE and an ENDPOINT.");
  if (!/^opc\.tcp:\/\/[^\s/]+/i.test(endpoint)) throw new UsageError("ENDPOINT begins with opc.tcp://");
  const watchSeconds = Number(values.watch ?? 0);
  if (!(watchSeconds >= 0 && watchSeconds <= 600)) throw new UsageError("--watch is a number of seconds, 0 … 600.");
  const security = values.security === undefined ? undefined : requireOneOf(values.security, securityModes, "--security is none, sign or sign-and-encrypt.");
  if (security === "none" && values.user !== undefined) throw new UsageError("--user sends a password; it asks for a protected connection.");
  const { FERRULE_PASSWORD: password } = process.env;
  if (values.user !== undefined && password === undefined) throw new UsageError("--user takes the password from the environment, FERRULE_PASSWORD.");
  return {
    name: "as-built",
    file,
    endpoint,
    folders: values.with ?? [],
    watchSeconds,
    ignored: values.ignore ?? [],
    security,
    fingerprint: values.fingerprint,
    user: values.user,
    password,
    pki: values.pki,
    isJson: values.json ?? false,
  };
}

function parse(args: readonly string[]) {
  try {
    return parseArgs({
      args: [...args],
      allowPositionals: true,
      options: {
        with: { type: "string", multiple: true },
        json: { type: "boolean" },
        format: { type: "string" },
        severity: { type: "string" },
        waivers: { type: "string" },
        conventions: { type: "string" },
        mapping: { type: "string" },
        direction: { type: "string" },
        condition: { type: "string" },
        canonical: { type: "boolean" },
        frame: { type: "string", multiple: true },
        key: { type: "string" },
        watch: { type: "string" },
        ignore: { type: "string", multiple: true },
        security: { type: "string" },
        fingerprint: { type: "string" },
        user: { type: "string" },
        pki: { type: "string" },
        help: { type: "boolean", short: "h" },
      },
    });
  } catch (error) {
    throw new UsageError(error instanceof Error ? error.message : String(error));
  }
}

const FORMATS: readonly ReportFormat[] = ["text", "json", "sarif"];
const SEVERITIES: readonly Severity[] = ["error", "warning", "hint"];

function requireOneOf<T extends string>(value: string, allowed: readonly T[], message: string): T {
  const found = allowed.find((one) => one === value);
  if (found === undefined) throw new UsageError(message);
  return found;
}

function requireCount(values: readonly string[], count: number, message: string): readonly string[] {
  if (values.length !== count) throw new UsageError(message);
  return values;
}
