/** `device`: what was read of an IODD. `decode`: one frame of its process data. */
import { readFile, stat } from "node:fs/promises";
import { fail, problem, type Result } from "../domain/core/result";
import type { DeviceDescription, IoddDatatype, ProcessDataImage } from "../domain/iodd/device-description";
import { findIoddUnit } from "../domain/iodd/iodd-units";
import { PACKAGE_LIMITS, readDevicePackage } from "../domain/iodd/read-package";
import { parseHex } from "../domain/mapping/bits";
import { chooseLayout } from "../domain/mapping/choose-layout";
import { decodeFrame, planFrame } from "../domain/mapping/decode-frame";
import { reportFrame, type FieldReport } from "../domain/mapping/report-frame";
import { resolvePath, type DecodeCommand, type DeviceCommand } from "./parse-command-line";
import { formatProblemLine, refuse, toProblemRow } from "./print-problems";

export async function device(command: DeviceCommand): Promise<number> {
  const read = await readDevice(command.file);
  if (!read.ok) return refuse(command, command.file, read.problems);
  if (command.isJson) {
    const problems = read.problems.map((found) => toProblemRow(command.file, found));
    process.stdout.write(`${JSON.stringify({ device: read.value, problems }, null, 2)}\n`);
    return 0;
  }
  process.stdout.write(formatDevice(read.value));
  for (const found of read.problems) process.stdout.write(`${formatProblemLine(command.file, found)}\n`);
  return 0;
}

export async function decode(command: DecodeCommand): Promise<number> {
  const read = await readDevice(command.file);
  if (!read.ok) return refuse(command, command.file, read.problems);
  const fields = decodeHex(read.value, command);
  if (!fields.ok) return refuse(command, command.file, fields.problems);
  process.stdout.write(
    command.isJson ? `${JSON.stringify({ fields: fields.value }, null, 2)}\n` : formatFields(fields.value),
  );
  return 0;
}

function decodeHex(description: DeviceDescription, command: DecodeCommand): Result<FieldReport[]> {
  const octets = parseHex(command.hex);
  if (!octets) return fail(problem("decode.hex", { text: command.hex }));
  const image = chooseLayout(description, command.direction, command.condition);
  if (!image.ok) return image;
  const plan = planFrame(image.value, { profileCharacteristic: description.profileCharacteristic });
  const values = decodeFrame(plan, octets);
  return values.ok ? { ...values, value: reportFrame(plan, values.value) } : values;
}

async function readDevice(file: string): Promise<Result<DeviceDescription>> {
  let bytes: Uint8Array;
  try {
    const path = resolvePath(file);
    const { size } = await stat(path);
    if (size > PACKAGE_LIMITS.bytes) return fail(problem("limit.file-size", { size, limit: PACKAGE_LIMITS.bytes }));
    bytes = await readFile(path);
  } catch (error) {
    return fail(problem("file.unreadable", { file, detail: error instanceof Error ? error.message : String(error) }));
  }
  const read = readDevicePackage(bytes, file);
  if (!read.ok) return read;
  const [first] = read.value.devices;
  if (!first) throw new RangeError("A package without a description was read");
  return { ok: true, value: first.device, problems: read.problems };
}

function formatDevice(description: DeviceDescription): string {
  const { vendorId, deviceId, vendorName, schemaVersion, documentVersion, releaseDate } = description;
  const name = Object.values(description.deviceName ?? {})[0] ?? "";
  const lines = [
    `${name}`,
    `vendor ${vendorId} (${vendorName}), device ${deviceId}, IODD ${schemaVersion}, ${documentVersion} of ${releaseDate}`,
    `variants: ${description.variants.map((v) => v.productId).join(", ")}`,
    `languages: ${description.languages.join(", ")}`,
    `${description.variables.length} variables, ${description.events.length} events, ${description.menus.length} menus`,
  ];
  for (const data of description.processData) {
    const when = data.condition ? ` when ${data.condition.variableId} = ${data.condition.value}` : "";
    if (data.in) lines.push(`process data in ${data.in.id}, ${data.in.bitLength} bit${when}`, ...formatImage(data.in));
    if (data.out)
      lines.push(`process data out ${data.out.id}, ${data.out.bitLength} bit${when}`, ...formatImage(data.out));
  }
  return `${lines.join("\n")}\n`;
}

function formatImage(image: ProcessDataImage): string[] {
  return planFrame(image).fields.map((field) => {
    const scaling = field.gradient === 1 && field.offset === 0 ? "" : ` × ${field.gradient} + ${field.offset}`;
    const info = image.info[field.subindex];
    const symbol = info?.unitCode === undefined ? "" : ` ${findIoddUnit(info.unitCode)?.symbol ?? info.unitCode}`;
    return `  ${String(field.subindex).padStart(3)}  bit ${field.bitOffset} … ${field.bitOffset + field.bitLength - 1}  ${formatType(field.type)}  ${field.id}${scaling}${symbol}`;
  });
}

function formatType(type: IoddDatatype): string {
  return "bitLength" in type ? `${type.kind} ${type.bitLength}` : type.kind;
}

function formatFields(fields: readonly FieldReport[]): string {
  const rows = fields.map((f) => {
    const value = f.value === null ? "–" : `${String(f.value)}${f.unit ? ` ${f.unit.symbol}` : ""}`;
    return `${f.id}: ${value}${f.text === null ? "" : ` (${f.text})`}  ${f.status} ${f.quality}`;
  });
  return `${rows.join("\n")}\n`;
}
