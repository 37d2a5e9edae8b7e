/** Secrets that the database keeps: sealed with a key made from the installation's secret (AES-256-GCM, RFC 5116). */
import { createCipheriv, createDecipheriv, createHmac, hkdfSync, randomBytes, timingSafeEqual } from "node:crypto";
import { getEnvironment } from "./env.server";

const VERSION = "v1";
const IV_BYTES = 12;
const TAG_BYTES = 16;

function deriveKey(purpose: string): Buffer {
  return Buffer.from(hkdfSync("sha256", getEnvironment().secret, "ferrule", purpose, 32));
}

/** `purpose` binds the text to its use: what was sealed for one cannot be opened for another. */
export function sealText(text: string, purpose: string): string {
  const iv = randomBytes(IV_BYTES);
  const cipher = createCipheriv("aes-256-gcm", deriveKey(purpose), iv);
  const sealed = Buffer.concat([cipher.update(text, "utf8"), cipher.final()]);
  return `${VERSION}.${Buffer.concat([iv, cipher.getAuthTag(), sealed]).toString("base64url")}`;
}

/** Throws when the text was sealed with another secret or for another purpose. */
export function openSealed(sealed: string, purpose: string): string {
  const bytes = Buffer.from(sealed.slice(VERSION.length + 1), "base64url");
  const decipher = createDecipheriv("aes-256-gcm", deriveKey(purpose), bytes.subarray(0, IV_BYTES));
  decipher.setAuthTag(bytes.subarray(IV_BYTES, IV_BYTES + TAG_BYTES));
  return Buffer.concat([decipher.update(bytes.subarray(IV_BYTES + TAG_BYTES)), decipher.final()]).toString("utf8");
}

/** A mark that only this installation can make, for addresses that act without a sign-in. */
export function makeMark(text: string, purpose: string): string {
  return createHmac("sha256", deriveKey(purpose)).update(text).digest("base64url");
}

export function isMark(mark: string, text: string, purpose: string): boolean {
  const [given, expected] = [Buffer.from(mark), Buffer.from(makeMark(text, purpose))];
  return given.length === expected.length && timingSafeEqual(given, expected);
}
