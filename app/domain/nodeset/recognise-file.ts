/** What a file is, told by its first bytes, in plain words: people choose the wrong file more often than a broken one. */
import { findRootMeaning } from "./root-meanings";

export type FileKind = {
  readonly kind:
    "nodeset" | "xml" | "html" | "json" | "zip" | "gzip" | "pdf" | "office" | "image" | "binary" | "text" | "csv";
  /** Completes "it is …". */
  readonly what: string;
  readonly isXml: boolean;
};

const HEAD = 4096;

const SIGNATURES: readonly (readonly [bytes: readonly number[], kind: FileKind["kind"], what: string])[] = [
  [[0x50, 0x4b, 0x03, 0x04], "zip", "a ZIP archive; unpack it and take the .xml file in it"],
  [[0x50, 0x4b, 0x05, 0x06], "zip", "an empty ZIP archive"],
  [[0x1f, 0x8b], "gzip", "a gzip archive; unpack it first"],
  [[0x37, 0x7a, 0xbc, 0xaf], "zip", "a 7z archive; unpack it first"],
  [[0x25, 0x50, 0x44, 0x46], "pdf", "a PDF document"],
  [[0xd0, 0xcf, 0x11, 0xe0], "office", "an office document"],
  [[0x89, 0x50, 0x4e, 0x47], "image", "a picture (PNG)"],
  [[0xff, 0xd8, 0xff], "image", "a picture (JPEG)"],
  [[0x47, 0x49, 0x46, 0x38], "image", "a picture (GIF)"],
];

/** Looks at the first 4 KB only. XML that is no NodeSet2 has the meaning of its root element in `what`. */
export function recogniseFile(bytes: Uint8Array): FileKind {
  for (const [signature, kind, what] of SIGNATURES) {
    if (signature.every((byte, i) => bytes[i] === byte)) return { kind, what, isXml: false };
  }
  const head = readHead(bytes);
  const first = head.trimStart();
  if (first.startsWith("<")) return recogniseMarkup(first);
  if (/^[[{]/.test(first)) return { kind: "json", what: "a JSON file", isXml: false };
  if (head.includes("\u0000")) return { kind: "binary", what: "a binary file", isXml: false };
  if (/^[^\n<]*[;,\t][^\n<]*\r?\n[^\n<]*[;,\t]/.test(first))
    return { kind: "csv", what: "a table in text form (CSV)", isXml: false };
  return { kind: "text", what: "a text file without XML", isXml: false };
}

function recogniseMarkup(head: string): FileKind {
  const body = head.replace(/<\?[^]*?\?>|<!--[^]*?-->/g, "").trimStart();
  if (/^<!doctype\s+html/i.test(body)) return { kind: "html", what: "a web page", isXml: false };
  const match = /<(?:([^\s<>/!:]+):)?([^\s<>/!?:]+)([^<>]*)/.exec(body);
  if (!match) return { kind: "xml", what: "an XML document", isXml: true };
  const [, prefix, local = "", attributes = ""] = match;
  if (local.toLowerCase() === "html") return { kind: "html", what: "a web page", isXml: false };
  if (local === "UANodeSet") return { kind: "nodeset", what: "a NodeSet2 file", isXml: true };
  const declaration = prefix === undefined ? "xmlns" : `xmlns:${prefix}`;
  const uri = new RegExp(`${escapePattern(declaration)}\\s*=\\s*["']([^"']*)["']`).exec(attributes)?.[1] ?? "";
  return { kind: "xml", what: findRootMeaning(local, uri), isXml: true };
}

function escapePattern(text: string): string {
  return text.replace(/[.*+?^${}()|[\]\\]/g, "\\$&");
}

/** The first characters; UTF-16 is thinned to its ASCII part, which is enough to recognise a file. */
function readHead(bytes: Uint8Array): string {
  const start = bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf ? 3 : hasUtf16Mark(bytes) ? 2 : 0;
  const head = bytes.subarray(start, start + HEAD);
  const isWide = start === 2 || (head[0] === 0x3c && head[1] === 0) || (head[0] === 0 && head[1] === 0x3c);
  return String.fromCharCode(...(isWide ? head.filter((byte) => byte !== 0) : head));
}

function hasUtf16Mark(bytes: Uint8Array): boolean {
  return (bytes[0] === 0xff && bytes[1] === 0xfe) || (bytes[0] === 0xfe && bytes[1] === 0xff);
}
