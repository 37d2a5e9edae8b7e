/**
 * An IO-Link master behind the JSON integration for IO-Link (order no. 10.222, version 1.0; the draft's other key is read
 * too). Reads only. Every wait has a limit; answers are checked and limited in size.
 */
import { z } from "zod";
import { problem, type Problem } from "../domain/core/result";
import { StatusCode } from "../domain/mapping/status";
import type { Reading } from "../domain/mapping/live-source";

export type RestMasterAddress = {
  /** `http://192.0.2.1` or with the path of a proxy; `/iolink/v1` is added. */
  readonly baseUrl: string;
  readonly timeoutMs?: number;
};

export type ProcessDataFrame = {
  readonly octets: Uint8Array;
  readonly isValid: boolean;
};

const DEFAULT_TIMEOUT_MS = 2_000;
const MAX_ANSWER_BYTES = 1_000_000;

const octetsSchema = z.array(z.number().int().min(0).max(255)).max(32);
const ioLinkSchema = z.object({ valid: z.boolean(), value: octetsSchema });
/** The published file mixes the keys `ioLink` and `iolink`. */
const directionSchema = z.object({ ioLink: ioLinkSchema.optional(), iolink: ioLinkSchema.optional() });
const processDataSchema = z.object({ getData: directionSchema.optional(), setData: directionSchema.optional() });
const errorSchema = z.object({ code: z.number(), message: z.string() });
const portsSchema = z
  .array(z.object({ portNumber: z.number().int(), statusInfo: z.string(), deviceAlias: z.string().optional() }))
  .max(64);
const identificationSchema = z.object({
  vendorId: z.number().int(),
  deviceId: z.number().int(),
  serialNumber: z.string().optional(),
  productName: z.string().optional(),
});

export type DeviceIdentification = z.infer<typeof identificationSchema>;

/** Both directions of one device's process data, as octets in the order of transmission. */
export async function readProcessData(
  master: RestMasterAddress,
  alias: string,
): Promise<Reading<{ readonly in?: ProcessDataFrame; readonly out?: ProcessDataFrame }>> {
  const answer = await askMaster(
    master,
    `/devices/${encodeURIComponent(alias)}/processdata/value?format=byteArray`,
    processDataSchema,
  );
  if (!answer.ok) return answer;
  const input = toFrame(answer.value.getData);
  const output = toFrame(answer.value.setData);
  return { ...answer, value: { ...(input ? { in: input } : {}), ...(output ? { out: output } : {}) } };
}

function toFrame(direction: z.infer<typeof directionSchema> | undefined): ProcessDataFrame | undefined {
  const data = direction?.ioLink ?? direction?.iolink;
  return data && { octets: Uint8Array.from(data.value), isValid: data.valid };
}

/** One parameter's octets. Slow on the wire (an ISDU exchange); asked on demand, never cyclically. */
export async function readParameter(
  master: RestMasterAddress,
  alias: string,
  index: number,
  subindex = 0,
): Promise<Reading<Uint8Array>> {
  const path = subindex === 0 ? `/parameters/${index}/value` : `/parameters/${index}/subindices/${subindex}/value`;
  const answer = await askMaster(
    master,
    `/devices/${encodeURIComponent(alias)}${path}?format=byteArray`,
    z.array(z.number().int().min(0).max(255)).max(232),
  );
  return answer.ok ? { ...answer, value: Uint8Array.from(answer.value) } : answer;
}

const eventsSchema = z.array(z.object({ message: z.object({ code: z.number().int(), mode: z.string().optional() }) })).max(10_000);

/** Codes that have appeared and not disappeared since; a single shot is over when it is told. */
export async function readActiveEvents(master: RestMasterAddress, alias: string): Promise<Reading<number[]>> {
  const answer = await askMaster(master, `/devices/${encodeURIComponent(alias)}/events`, eventsSchema);
  if (!answer.ok) return answer;
  const active = new Set<number>();
  for (const { message } of answer.value) {
    if (message.mode === "APPEARS") active.add(message.code);
    else if (message.mode === "DISAPPEARS") active.delete(message.code);
  }
  return { ...answer, value: [...active] };
}

export function readPorts(master: RestMasterAddress, masterNumber = 1): Promise<Reading<z.infer<typeof portsSchema>>> {
  return askMaster(master, `/masters/${masterNumber}/ports`, portsSchema);
}

export function readIdentification(master: RestMasterAddress, alias: string): Promise<Reading<DeviceIdentification>> {
  return askMaster(master, `/devices/${encodeURIComponent(alias)}/identification`, identificationSchema);
}

function askMaster<T>(master: RestMasterAddress, path: string, schema: z.ZodType<T>): Promise<Reading<T>> {
  return getJson(`${master.baseUrl.replace(/\/+$/, "")}/iolink/v1${path}`, master.timeoutMs, schema);
}

/** One GET within limits of time and size; follows no redirect. */
export async function getJson<T>(url: string, timeoutMs = DEFAULT_TIMEOUT_MS, schema: z.ZodType<T>): Promise<Reading<T>> {
  const failed = (status: number, found: Problem): Reading<T> => ({
    ok: false,
    status,
    problem: found,
    time: Date.now(),
  });
  try {
    const response = await fetch(url, {
      signal: AbortSignal.timeout(timeoutMs),
      redirect: "error",
      headers: { accept: "application/json" },
    });
    const time = Date.now();
    const body = await readLimited(response);
    if (body === undefined)
      return failed(
        StatusCode.Bad_NoCommunication,
        problem("source.answer-too-large", { url, limit: MAX_ANSWER_BYTES }),
      );
    const json: unknown = JSON.parse(body);
    if (!response.ok) return failed(toStatus(json), describeError(url, response.status, json));
    const checked = schema.safeParse(json);
    if (checked.success) return { ok: true, value: checked.data, time };
    const [issue] = checked.error.issues;
    return failed(
      StatusCode.Bad_ConfigurationError,
      problem("source.answer-unexpected", {
        url,
        message: `${issue?.path.join("/") ?? ""} ${issue?.message ?? ""}`.trim(),
      }),
    );
  } catch (error) {
    const isNoJson = error instanceof SyntaxError;
    const status = isNoJson ? StatusCode.Bad_ConfigurationError : StatusCode.Bad_NoCommunication;
    const message = error instanceof Error ? error.message : String(error);
    return failed(status, problem(isNoJson ? "source.no-json" : "source.unreachable", { url, message }));
  }
}

async function readLimited(response: Response): Promise<string | undefined> {
  const chunks: Uint8Array[] = [];
  let size = 0;
  for await (const chunk of response.body ?? []) {
    size += chunk.length;
    if (size > MAX_ANSWER_BYTES) return undefined;
    chunks.push(chunk);
  }
  return Buffer.concat(chunks).toString("utf8");
}

/** 307 port not in IO-Link mode, 308 device not accessible (JSON integration 1.0, error codes). */
function toStatus(json: unknown): number {
  const { data } = errorSchema.safeParse(json);
  if (data?.code === 308) return StatusCode.Bad_NoCommunication;
  return data?.code === 307 || data?.code === 304 ? StatusCode.Bad_ConfigurationError : StatusCode.Bad;
}

function describeError(url: string, httpStatus: number, json: unknown): Problem {
  const { data } = errorSchema.safeParse(json);
  return problem("source.refused", { url, httpStatus, code: data?.code ?? 0, message: data?.message ?? "" });
}
