/**
 * A device description as it is uploaded: one XML file, or a ZIP with main description, language files and pictures. A
 * ZIP may hold several main descriptions (1.0.1 and 1.1 side by side).
 */
import { unzipSync } from "fflate";
import { fail, ok, problem, type Problem, type Result } from "../core/result";
import { decodeXmlBytes } from "../nodeset/decode-xml-bytes";
import type { DeviceDescription } from "./device-description";
import { readIodd } from "./read-iodd";

export type DevicePackage = {
  /** The main descriptions, the newest schema first. */
  readonly devices: readonly { readonly fileName: string; readonly device: DeviceDescription }[];
  /** Everything that is no description: pictures, by name as in the XML. */
  readonly pictures: ReadonlyMap<string, Uint8Array>;
};

export const PACKAGE_LIMITS = { bytes: 50_000_000, entries: 500, unpackedBytes: 100_000_000 } as const;

/**
 * Problems: `limit.file-size`, `package.damaged`, `package.entries`, `package.unpacked-size`, `package.path`,
 * `package.no-description` and those of the description.
 */
export function readDevicePackage(bytes: Uint8Array, fileName: string): Result<DevicePackage> {
  if (bytes.length > PACKAGE_LIMITS.bytes) {
    return fail(problem("limit.file-size", { size: bytes.length, limit: PACKAGE_LIMITS.bytes }));
  }
  if (!isZip(bytes)) return readFiles(new Map([[fileName, bytes]]));
  const files = unpack(bytes);
  return files.ok ? readFiles(files.value) : files;
}

/** One picture of a package that was read before, by its name; undefined where it holds none. */
export function readPackagePicture(bytes: Uint8Array, name: string): Uint8Array | undefined {
  const files = isZip(bytes) ? unpack(bytes) : undefined;
  return files?.ok ? files.value.get(name) : undefined;
}

function isZip(bytes: Uint8Array): boolean {
  return bytes[0] === 0x50 && bytes[1] === 0x4b;
}

/** Sizes are checked before anything is inflated, and each file is inflated into a buffer of its stated size only. */
function unpack(bytes: Uint8Array): Result<Map<string, Uint8Array>> {
  const refused: Problem[] = [];
  let entries = 0;
  let size = 0;
  const unpacked = inflate(bytes, (name, originalSize) => {
    entries++;
    size += originalSize;
    if (!isSafePath(name)) refused.push(problem("package.path", { name }));
    if (entries > PACKAGE_LIMITS.entries) refused.push(problem("package.entries", { limit: PACKAGE_LIMITS.entries }));
    if (size > PACKAGE_LIMITS.unpackedBytes) {
      refused.push(problem("package.unpacked-size", { limit: PACKAGE_LIMITS.unpackedBytes }));
    }
    return refused.length === 0 && !name.endsWith("/");
  });
  const [first] = refused;
  if (first) return fail(first);
  if (!unpacked) return fail(problem("package.damaged"));
  return ok(new Map(Object.entries(unpacked).map(([name, content]) => [name.split("/").at(-1) ?? name, content])));
}

/** fflate throws on a damaged archive; here that becomes a value. */
function inflate(
  bytes: Uint8Array,
  accept: (name: string, originalSize: number) => boolean,
): Record<string, Uint8Array> | undefined {
  try {
    return unzipSync(bytes, { filter: (file) => accept(file.name, file.originalSize) });
  } catch {
    return undefined;
  }
}

function isSafePath(name: string): boolean {
  const isAbsolute = name.startsWith("/") || name.includes("\\") || /^[A-Za-z]:/.test(name);
  return !isAbsolute && !name.split("/").includes("..");
}

/** `…-IODD1.1.xml` is a main description, `…-IODD1.1-de.xml` a language file of it. */
const LANGUAGE_FILE = /-IODD[\d.]+-[A-Za-z]{2,3}(?:-[A-Za-z]+)?\.xml$/;

function readFiles(files: ReadonlyMap<string, Uint8Array>): Result<DevicePackage> {
  const problems: Problem[] = [];
  const pictures = new Map<string, Uint8Array>();
  const mains: (readonly [string, Uint8Array])[] = [];
  const languages: (readonly [string, Uint8Array])[] = [];
  for (const [name, content] of files) {
    if (!name.toLowerCase().endsWith(".xml") && files.size > 1) pictures.set(name, content);
    else if (LANGUAGE_FILE.test(name)) languages.push([name, content]);
    else mains.push([name, content]);
  }
  const devices: { fileName: string; device: DeviceDescription }[] = [];
  for (const [fileName, octets] of mains) {
    const stem = fileName.replace(/\.xml$/i, "");
    const device = readOne(
      octets,
      languages.filter(([name]) => name.startsWith(`${stem}-`)),
    );
    problems.push(...device.problems.map((found) => ({ ...found, at: { file: fileName, ...found.at } })));
    if (device.ok) devices.push({ fileName, device: device.value });
  }
  if (devices.length === 0)
    return fail(...problems, ...(problems.length > 0 ? [] : [problem("package.no-description")]));
  devices.sort((a, b) => (a.device.schemaVersion < b.device.schemaVersion ? 1 : -1));
  return ok({ devices, pictures }, problems);
}

function readOne(octets: Uint8Array, languages: readonly (readonly [string, Uint8Array])[]): Result<DeviceDescription> {
  const text = decodeXmlBytes(octets);
  if (!text.ok) return text;
  const problems: Problem[] = [];
  const languageFiles = languages.flatMap(([file, content]) => {
    const decoded = decodeXmlBytes(content);
    problems.push(...decoded.problems.map((found) => ({ ...found, at: { ...found.at, file } })));
    return decoded.ok ? [decoded.value] : [];
  });
  const read = readIodd(text.value, { octets, languageFiles });
  if (!read.ok) return read;
  // CR LF is how the Community's own files are written; it is no news to anybody.
  const own = text.problems.filter((found) => found.severity !== "hint");
  return ok(read.value, [...own, ...read.problems, ...problems.filter((found) => found.severity !== "hint")]);
}
