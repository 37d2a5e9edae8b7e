/** From the bytes of a file to its text: size, kind and encoding (XML 1.0 §4.3.3 and Appendix F). */
import { fail, ok, problem, type Problem, type Result } from "../core/result";
import { READ_LIMITS } from "./limits";
import { recogniseFile } from "./recognise-file";

// A decoder is part of every platform that this code runs on; the domain's own types know none of the platforms.
declare const TextDecoder: new (label: string, options?: { fatal?: boolean }) => { decode(bytes: Uint8Array): string };

/** Labels that are read beside UTF-8; "iso-8859-1" is read as its superset, as browsers do. */
const ENCODINGS: ReadonlyMap<string, string> = new Map([
  ["iso-8859-1", "windows-1252"],
  ["latin1", "windows-1252"],
  ["windows-1252", "windows-1252"],
  ["iso-8859-15", "iso-8859-15"],
  ["us-ascii", "windows-1252"],
  ["ascii", "windows-1252"],
  ["utf-16", "utf-16le"],
  ["utf-16le", "utf-16le"],
  ["utf-16be", "utf-16be"],
]);

/**
 * Decodes by byte order mark, else by the encoding of the XML declaration, else as UTF-8. Another encoding than UTF-8 is
 * read with a warning. Fails with `limit.file-size`, `file.empty`, `file.other-kind` (ZIP, JSON, PDF …),
 * `encoding.unknown`, or `encoding.invalid` with the place of the first wrong byte.
 */
export function decodeXmlBytes(bytes: Uint8Array, maxBytes: number = READ_LIMITS.maxBytes): Result<string> {
  if (bytes.length > maxBytes) return fail(problem("limit.file-size", { size: bytes.length, limit: maxBytes }));
  const start = { line: 1, column: 1 };
  if (bytes.length === 0) return fail(problem("file.empty", undefined, start));
  const kind = recogniseFile(bytes);
  if (!kind.isXml) return fail(problem("file.other-kind", { kind: kind.kind, what: kind.what }, start));
  const { encoding, declared, isMislabelled } = findEncoding(bytes);
  if (encoding === undefined) return fail(problem("encoding.unknown", { encoding: declared }, start));
  const warnings: Problem[] = [];
  if (encoding !== "utf-8") warnings.push(problem.warning("encoding.declared", { encoding: declared }, start));
  if (isMislabelled) warnings.push(problem.warning("encoding.mislabelled", undefined, start));
  try {
    return ok(new TextDecoder(encoding, { fatal: true }).decode(bytes), warnings);
  } catch {
    return fail(problem("encoding.invalid", { encoding: declared }, findInvalid(bytes, encoding)));
  }
}

type FoundEncoding = {
  readonly encoding: string | undefined;
  readonly declared: string;
  readonly isMislabelled?: boolean;
};

function findEncoding(bytes: Uint8Array): FoundEncoding {
  const [a, b, c, d] = bytes;
  if (a === 0xef && b === 0xbb && c === 0xbf) return { encoding: "utf-8", declared: "UTF-8" };
  if (a === 0xff && b === 0xfe && !(c === 0 && d === 0)) return { encoding: "utf-16le", declared: "UTF-16" };
  if (a === 0xfe && b === 0xff) return { encoding: "utf-16be", declared: "UTF-16" };
  if ((a === 0 && b === 0) || (a === 0xff && b === 0xfe)) return { encoding: undefined, declared: "UTF-32" };
  if (a === 0x3c && b === 0) return { encoding: "utf-16le", declared: "UTF-16" };
  if (a === 0 && b === 0x3c) return { encoding: "utf-16be", declared: "UTF-16" };
  const match = /^\s*<\?xml[^>]*?\sencoding\s*=\s*["']([A-Za-z0-9._-]+)["']/.exec(toAscii(bytes, 256));
  const declared = match?.[1] ?? "UTF-8";
  const name = declared.toLowerCase();
  if (name === "utf-8" || name === "utf8") return { encoding: "utf-8", declared };
  // Bytes that show an encoding of one byte a character cannot be UTF-16, whatever the declaration says.
  if (name.startsWith("utf-16")) return { encoding: "utf-8", declared: "UTF-8", isMislabelled: true };
  return { encoding: ENCODINGS.get(name), declared };
}

function toAscii(bytes: Uint8Array, length: number): string {
  return String.fromCharCode(...bytes.subarray(0, length));
}

/** Line and column of the first byte that is not UTF-8; the start of the file for other encodings. */
function findInvalid(bytes: Uint8Array, encoding: string): { line: number; column: number } {
  let line = 1;
  let column = 1;
  if (encoding !== "utf-8") return { line, column };
  for (let i = 0; i < bytes.length;) {
    const length = sequenceLength(bytes, i);
    if (length === 0) break;
    if (bytes[i] === 0x0a) {
      line++;
      column = 1;
    } else column += length === 4 ? 2 : 1;
    i += length;
  }
  return { line, column };
}

/** Length of the well-formed UTF-8 sequence at `i`, 0 when there is none (Unicode, Table 3-7). */
function sequenceLength(bytes: Uint8Array, i: number): number {
  const first = bytes[i] ?? 0;
  if (first < 0x80) return 1;
  if (first < 0xc2 || first > 0xf4) return 0;
  const length = first < 0xe0 ? 2 : first < 0xf0 ? 3 : 4;
  const second = bytes[i + 1] ?? 0;
  const least = first === 0xe0 ? 0xa0 : first === 0xf0 ? 0x90 : 0x80;
  const greatest = first === 0xed ? 0x9f : first === 0xf4 ? 0x8f : 0xbf;
  if (second < least || second > greatest) return 0;
  for (let k = 2; k < length; k++) if (((bytes[i + k] ?? 0) & 0xc0) !== 0x80) return 0;
  return length;
}
