/** Packs of the library on disk, so that a NodeSet's XML is read once in the life of a data folder. */
import { createHash, randomUUID } from "node:crypto";
import { mkdir, readFile, rename, rm, writeFile } from "node:fs/promises";
import { join } from "node:path";
import { promisify } from "node:util";
import { gunzip, gzip } from "node:zlib";
import { PACK_FORMAT, readPack, writePack, type PackContent } from "../domain/nodeset/pack";

const compress = promisify(gzip);
const decompress = promisify(gunzip);
const HASH = /^[0-9a-f]{64}$/;

/** The name of a pack: of the content it was made from and of the form of packs, so that old forms are not found. */
export function toPackHash(sha256: string): string {
  return createHash("sha256").update(`${PACK_FORMAT}\n${sha256}`).digest("hex");
}

export function compressPack(content: PackContent): Promise<Buffer> {
  return compress(writePack(content), { level: 6 });
}

export class PackStore {
  readonly #folder: string;

  constructor(folder: string) {
    this.#folder = folder;
  }

  /** The compressed bytes, undefined when there is no such pack. */
  async find(hash: string): Promise<Buffer | undefined> {
    if (!HASH.test(hash)) return undefined;
    return readFile(this.#path(hash)).catch(() => undefined);
  }

  /** The content; a damaged pack is removed and counts as absent. */
  async load(hash: string): Promise<PackContent | undefined> {
    const bytes = await this.find(hash);
    if (!bytes) return undefined;
    const text = await decompress(bytes).then(
      (plain) => plain.toString("utf8"),
      () => "",
    );
    const pack = readPack(text);
    if (pack.ok) return pack.value;
    await rm(this.#path(hash), { force: true });
    return undefined;
  }

  /** Written beside and renamed: a reader never sees half a pack. */
  async save(hash: string, bytes: Uint8Array): Promise<void> {
    await mkdir(this.#folder, { recursive: true });
    const temporary = join(this.#folder, `${hash}.${randomUUID()}.part`);
    await writeFile(temporary, bytes);
    await rename(temporary, this.#path(hash));
  }

  #path(hash: string): string {
    return join(this.#folder, `${hash}.json.gz`);
  }
}
