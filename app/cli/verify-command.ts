/** `verify`: whether a bundle is what was released and signed. Reads nothing but the bundle and, if given, the key. */
import { createPublicKey, verify as verifySignature } from "node:crypto";
import { readFileSync } from "node:fs";
import { formatProblem } from "../domain/core/problem-texts";
import { fail, ok, problem, type Problem, type Result } from "../domain/core/result";
import { openBundle, type BundleSignature, type Manifest } from "../domain/release/bundle";
import { sha256 } from "../utils/ids.server";
import { resolvePath, type VerifyCommand } from "./parse-command-line";

type Verdict = { readonly sha256: string; readonly manifest: Manifest; readonly keyId: string | null; readonly problems: readonly Problem[] };

/** Exit status: 0 everything fits · 1 something does not · 2 unreadable. */
export function verify(command: VerifyCommand): number {
  const verdict = examine(command);
  if (!verdict.ok) return refuse(command, verdict.problems);
  const { problems, manifest, keyId, sha256: hash } = verdict.value;
  if (command.isJson) {
    const rows = problems.map(toRow);
    process.stdout.write(`${JSON.stringify({ ok: rows.length === 0, sha256: hash, keyId, model: manifest.model, files: manifest.files.length, problems: rows }, null, 2)}\n`);
  } else {
    const { model } = manifest;
    const lines = [
      `${model.name} ${model.version} (${model.namespaceUri}), revision ${model.revision}`,
      `SHA-256 of the bundle  ${hash}`,
      `Signed with key        ${keyId ?? "none"}`,
      ...problems.map((found) => `${formatProblem(found)} [${found.code}]`),
      problems.length === 0 ? `Verified: ${manifest.files.length} files and the signature fit.` : "NOT verified.",
      ...(command.key === undefined && problems.length === 0 ? ["The key came with the bundle; give --key to say whose it must be."] : []),
    ];
    process.stdout.write(`${lines.join("\n")}\n`);
  }
  return problems.length === 0 ? 0 : 1;
}

function examine({ file, key }: VerifyCommand): Result<Verdict> {
  const bytes = readFile(file);
  if (!bytes.ok) return bytes;
  const opened = openBundle(bytes.value, sha256);
  if (!opened.ok) return opened;
  const { manifest, signature, signedBytes } = opened.value;
  const problems = [...opened.problems];
  if (signature) {
    if (!isSigned(signature, signedBytes)) problems.push(problem("bundle.signature"));
    const given = key === undefined ? undefined : readKeyId(key);
    if (given && !given.ok) return given;
    const found = toKeyId(signature.publicKey);
    if (given?.ok && given.value !== found) problems.push(problem("bundle.key", { found: found ?? "", given: given.value }));
  }
  return ok({ sha256: sha256(bytes.value), manifest, keyId: signature ? (toKeyId(signature.publicKey) ?? null) : null, problems });
}

/** Ed25519 over the manifest's bytes, and the id that the signature names is that of its key. */
function isSigned({ publicKey, keyId, signature }: BundleSignature, bytes: Uint8Array): boolean {
  try {
    const key = createPublicKey(publicKey);
    if (key.asymmetricKeyType !== "ed25519" || toKeyId(publicKey) !== keyId) return false;
    return verifySignature(null, bytes, key, Buffer.from(signature, "base64"));
  } catch {
    return false;
  }
}

function toKeyId(publicKeyPem: string): string | undefined {
  try {
    return sha256(createPublicKey(publicKeyPem).export({ type: "spki", format: "der" }));
  } catch {
    return undefined;
  }
}

function readKeyId(file: string): Result<string> {
  const bytes = readFile(file);
  if (!bytes.ok) return bytes;
  const id = toKeyId(bytes.value.toString("utf8"));
  return id === undefined ? fail(problem("bundle.key-unreadable", { file })) : ok(id);
}

function readFile(file: string): Result<Buffer> {
  try {
    return ok(readFileSync(resolvePath(file)));
  } catch (error) {
    return fail(problem("bundle.unreadable", { message: error instanceof Error ? error.message : String(error) }));
  }
}

function toRow(found: Problem) {
  return { code: found.code, message: formatProblem(found) };
}

function refuse(command: VerifyCommand, problems: readonly Problem[]): number {
  if (command.isJson) process.stdout.write(`${JSON.stringify({ ok: false, problems: problems.map(toRow) }, null, 2)}\n`);
  else for (const found of problems) process.stderr.write(`${command.file}: ${formatProblem(found)} [${found.code}]\n`);
  return 2;
}
