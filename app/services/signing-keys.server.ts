/** The organisation's Ed25519 key pair: made when first asked for, its private half sealed with the installation's secret. */
import { createPrivateKey, createPublicKey, generateKeyPairSync, sign } from "node:crypto";
import type { Caller } from "../auth/caller.server";
import { writeBatch } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import { addSigningKeyStatement, findSigningKey, findSigningKeyById, type SigningKeyRow } from "../db/repositories/releases.server";
import type { BundleSignature } from "../domain/release/bundle";
import { sha256 } from "../utils/ids.server";
import { openSealed, sealText } from "../utils/seal.server";

const PURPOSE = "signing-key";

/** The key that signs now; made and noted in the audit when the organisation has none. */
export async function requireSigningKey(author: Caller, organizationId: string): Promise<SigningKeyRow> {
  const known = await findSigningKey(organizationId);
  if (known) return known;
  const pair = generateKeyPairSync("ed25519");
  const publicKey = pair.publicKey.export({ type: "spki", format: "pem" }).toString();
  const key: SigningKeyRow = {
    id: toKeyId(publicKey),
    organizationId,
    publicKey,
    sealedPrivateKey: sealText(pair.privateKey.export({ type: "pkcs8", format: "pem" }).toString(), PURPOSE),
    createdAt: new Date(),
    retiredAt: null,
  };
  await writeBatch([
    addSigningKeyStatement(key),
    addAuditStatement({
      organizationId,
      userId: author.userId,
      userName: author.name,
      action: "signing-key.create",
      subject: { kind: "signing-key", id: key.id, name: key.id.slice(0, 16) },
    }),
  ]);
  return key;
}

/** SHA-256 of the public key in its SPKI form (RFC 8410), in hex. */
export function toKeyId(publicKeyPem: string): string {
  return sha256(createPublicKey(publicKeyPem).export({ type: "spki", format: "der" }));
}

/** Ed25519 is deterministic: the same bytes and key give the same signature (RFC 8032 §5.1.6). */
export async function signManifest(keyId: string, manifest: string): Promise<BundleSignature> {
  const key = await findSigningKeyById(keyId);
  if (!key) throw new Error(`There is no signing key ${keyId}`);
  const privateKey = createPrivateKey(openSealed(key.sealedPrivateKey, PURPOSE));
  const signature = sign(null, Buffer.from(manifest, "utf8"), privateKey).toString("base64");
  return { algorithm: "Ed25519", keyId: key.id, publicKey: key.publicKey, signature };
}

/** The public key that signs now, in PEM; undefined before the first release. */
export async function findPublicKey(organizationId: string): Promise<string | undefined> {
  return (await findSigningKey(organizationId))?.publicKey;
}
