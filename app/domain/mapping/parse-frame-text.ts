/**
 * Bytes as people paste them: hexadecimal pairs, a list of decimal octets, or a master's answer in JSON (JSON integration
 * for IO-Link 1.0: `getData`/`setData` with `ioLink` {valid, value}; the draft's key `iolink` is read too).
 */
import { fail, ok, problem, type Result } from "../core/result";
import type { Direction } from "../iodd/device-description";
import { parseHex } from "./bits";

export type PastedFrame = {
  readonly octets: Uint8Array;
  /** The validity flag of a master's answer; bytes alone count as valid. */
  readonly isValid: boolean;
  readonly form: "hex" | "decimal" | "answer";
};

/** No process data is longer than 32 octets; a parameter may have 232. */
const MAX_OCTETS = 232;

/** Problems: `frame.empty`, `frame.text`, `frame.octet`, `frame.answer`, `frame.answer-direction`, `frame.too-long`. */
export function parseFrameText(text: string, direction: Direction): Result<PastedFrame> {
  const trimmed = text.trim();
  if (trimmed === "") return fail(problem("frame.empty"));
  if (trimmed.length > 100_000) return fail(problem("frame.too-long", { limit: MAX_OCTETS }));
  if (trimmed.startsWith("{") || trimmed.startsWith("[")) return parseJsonFrame(trimmed, direction);
  if (/[,;]/.test(trimmed) && !/0x/i.test(trimmed)) {
    const parts = trimmed.split(/[\s,;]+/).filter((part) => part !== "");
    if (parts.every((part) => /^\d{1,3}$/.test(part))) return toFrame(parts.map(Number), "decimal", true);
  }
  const octets = parseHex(trimmed.replace(/0x/gi, " ").replace(/[,;:\-_]/g, " "));
  if (!octets) return fail(problem("frame.text"));
  return toFrame([...octets], "hex", true);
}

function toFrame(values: readonly unknown[], form: PastedFrame["form"], isValid: boolean): Result<PastedFrame> {
  if (values.length > MAX_OCTETS) return fail(problem("frame.too-long", { limit: MAX_OCTETS }));
  const wrong = values.findIndex((v) => typeof v !== "number" || !Number.isInteger(v) || v < 0 || v > 255);
  if (wrong >= 0) return fail(problem("frame.octet", { position: wrong, value: String(values[wrong]) }));
  return ok({ octets: Uint8Array.from(values as number[]), isValid, form });
}

function parseJsonFrame(text: string, direction: Direction): Result<PastedFrame> {
  const json = parseJson(text);
  if (json === undefined) return fail(problem("frame.text"));
  if (Array.isArray(json)) return toFrame(json, "decimal", true);
  const wanted = direction === "in" ? "getData" : "setData";
  const isWhole = isRecord(json) && ("getData" in json || "setData" in json);
  const side = isWhole ? json[wanted] : json;
  if (isWhole && side === undefined) return fail(problem("frame.answer-direction", { member: wanted }));
  const exchange = isRecord(side) ? (side["ioLink"] ?? side["iolink"] ?? side) : undefined;
  if (!isRecord(exchange) || !Array.isArray(exchange["value"])) return fail(problem("frame.answer"));
  return toFrame(exchange["value"], "answer", exchange["valid"] !== false);
}

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === "object" && value !== null && !Array.isArray(value);
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text) as unknown;
  } catch {
    return undefined;
  }
}
