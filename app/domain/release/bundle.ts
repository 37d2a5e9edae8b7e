/**
 * The bundle of a release: a ZIP whose manifest names every file with its SHA-256, and a signature over the manifest. The
 * same contents make the same bytes: fixed order, fixed times, fixed compression.
 */
import { strFromU8, strToU8, unzipSync, zipSync, type Zippable } from "fflate";
import { z } from "zod";
import { fail, ok, problem, type Problem, type Result } from "../core/result";

export const MANIFEST_FILE = "manifest.json";
export const SIGNATURE_FILE = "signature.json";
export const BUNDLE_FORMAT = "ferrule-bundle-1";

export type BundleFile = { readonly path: string; readonly bytes: Uint8Array };

const required = z.strictObject({
  modelUri: z.string(),
  version: z.string().optional(),
  modelVersion: z.string().optional(),
  publicationDate: z.string().optional(),
  sha256: z.string(),
});

export const manifestSchema = z.strictObject({
  format: z.literal(BUNDLE_FORMAT),
  model: z.strictObject({
    name: z.string(),
    namespaceUri: z.string(),
    version: z.string(),
    modelVersion: z.string(),
    publicationDate: z.string(),
    revision: z.int().min(0),
    /** SHA-256 of the frozen contents that the release was made of. */
    contents: z.string(),
    /** The version before, null for the first one. */
    previous: z.string().nullable(),
    rating: z.enum(["breaking", "additive", "neutral"]).nullable(),
  }),
  requiredModels: z.array(required),
  files: z.array(
    z.strictObject({ path: z.string(), size: z.int().min(0), sha256: z.string().regex(/^[0-9a-f]{64}$/) }),
  ),
});
export type Manifest = z.infer<typeof manifestSchema>;

export const signatureSchema = z.strictObject({
  algorithm: z.literal("Ed25519"),
  /** SHA-256 of the public key's SPKI bytes. */
  keyId: z.string(),
  /** PEM. */
  publicKey: z.string(),
  /** Base64, over the bytes of the manifest. */
  signature: z.string(),
});
export type BundleSignature = z.infer<typeof signatureSchema>;

type Sha256 = (bytes: Uint8Array) => string;

/** Files by path; the manifest's own text ends with a line break. */
export function makeManifest(
  about: Omit<Manifest, "format" | "files">,
  files: readonly BundleFile[],
  sha256: Sha256,
): Manifest {
  const rows = inOrder(files).map(({ path, bytes }) => ({ path, size: bytes.length, sha256: sha256(bytes) }));
  return { format: BUNDLE_FORMAT, ...about, files: rows };
}

export function writeManifest(manifest: Manifest): string {
  return `${JSON.stringify(manifest, null, 2)}\n`;
}

/** By the code units of their paths, so that no machine's language changes the order. */
function inOrder(files: readonly BundleFile[]): BundleFile[] {
  return [...files].sort((a, b) => (a.path < b.path ? -1 : a.path > b.path ? 1 : 0));
}

/** ZIP counts years from 1980 in local time; its first day at noon is one and the same in every zone. */
const FIXED_TIME = "1980-01-01T12:00:00";

export function packBundle(files: readonly BundleFile[], manifest: string, signature: BundleSignature): Uint8Array {
  const all: BundleFile[] = [
    { path: MANIFEST_FILE, bytes: strToU8(manifest) },
    { path: SIGNATURE_FILE, bytes: strToU8(`${JSON.stringify(signature, null, 2)}\n`) },
    ...inOrder(files),
  ];
  const entries: Zippable = {};
  for (const { path, bytes } of all) entries[path] = bytes;
  return zipSync(entries, { level: 6, mtime: FIXED_TIME });
}

export const BUNDLE_LIMITS = { bytes: 200_000_000, unpacked: 500_000_000, entries: 2_000 } as const;

export type OpenedBundle = {
  readonly manifest: Manifest;
  readonly signature: BundleSignature | undefined;
  readonly signedBytes: Uint8Array;
  readonly files: readonly BundleFile[];
};

/**
 * Opens a bundle and holds every file against the manifest. Problems: `bundle.unreadable`, `bundle.too-large`,
 * `bundle.no-manifest`, `bundle.manifest`; what does not fit is told beside the value: `bundle.file-missing`,
 * `bundle.file-unknown`, `bundle.file-changed`, `bundle.no-signature`.
 */
export function openBundle(bytes: Uint8Array, sha256: Sha256): Result<OpenedBundle> {
  const unpacked = unpack(bytes);
  if (!unpacked.ok) return unpacked;
  const entries = unpacked.value;
  const signedBytes = entries[MANIFEST_FILE];
  if (!signedBytes) return fail(problem("bundle.no-manifest", { file: MANIFEST_FILE }));
  const manifest = parse(signedBytes, manifestSchema);
  if (!manifest.ok) return manifest;
  const problems: Problem[] = [];
  const signatureBytes = entries[SIGNATURE_FILE];
  const signature = signatureBytes ? parse(signatureBytes, signatureSchema) : undefined;
  if (!signature?.ok) problems.push(problem("bundle.no-signature", { file: SIGNATURE_FILE }));
  const named = new Map(manifest.value.files.map((file) => [file.path, file]));
  const files = Object.entries(entries).flatMap(([path, content]) =>
    path === MANIFEST_FILE || path === SIGNATURE_FILE ? [] : [{ path, bytes: content }],
  );
  for (const { path, bytes: content } of files) {
    const row = named.get(path);
    if (!row) problems.push(problem("bundle.file-unknown", { path }));
    else if (row.size !== content.length || row.sha256 !== sha256(content))
      problems.push(problem("bundle.file-changed", { path }));
    named.delete(path);
  }
  for (const path of named.keys()) problems.push(problem("bundle.file-missing", { path }));
  return ok(
    { manifest: manifest.value, signature: signature?.ok ? signature.value : undefined, signedBytes, files },
    problems,
  );
}

function unpack(bytes: Uint8Array): Result<Record<string, Uint8Array>> {
  if (bytes.length > BUNDLE_LIMITS.bytes) return fail(problem("bundle.too-large", { limit: BUNDLE_LIMITS.bytes }));
  let total = 0;
  let count = 0;
  const isWithin = (size: number): boolean =>
    (total += size) <= BUNDLE_LIMITS.unpacked && ++count <= BUNDLE_LIMITS.entries;
  try {
    const entries = unzipSync(bytes, { filter: (file) => isWithin(file.originalSize) });
    return isWithin(0) ? ok(entries) : fail(problem("bundle.too-large", { limit: BUNDLE_LIMITS.unpacked }));
  } catch (error) {
    return fail(problem("bundle.unreadable", { message: error instanceof Error ? error.message : String(error) }));
  }
}

function parse<T>(bytes: Uint8Array, schema: z.ZodType<T>): Result<T> {
  try {
    const checked = schema.safeParse(JSON.parse(strFromU8(bytes)));
    if (checked.success) return ok(checked.data);
    return fail(problem("bundle.manifest", { message: checked.error.issues[0]?.message ?? "" }));
  } catch (error) {
    return fail(problem("bundle.manifest", { message: error instanceof Error ? error.message : String(error) }));
  }
}
