import { createHash, randomBytes } from "node:crypto";

/** An opaque id for a row: 20 characters, 100 bits of chance, safe in addresses (no ending that a router could misread). */
export function newId(): string {
  const alphabet = "0123456789abcdefghjkmnpqrstvwxyz";
  return Array.from(randomBytes(20), (byte) => alphabet[byte & 31]).join("");
}

export function sha256(data: Uint8Array | string): string {
  return createHash("sha256").update(data).digest("hex");
}
