/**
 * The NodeSet library: lists what there is, resolves what a model requires, and hands out layers, each read once and
 * shared by all models. The published NodeSets come with the npm package; others are passed in by whoever owns them.
 */
import { readFile } from "node:fs/promises";
import { buildLayer, type Layer } from "../domain/address-space/address-space";
import type { ModelEntry } from "../domain/address-space/model-header";
import { fail, ok, problem, type Problem, type Result } from "../domain/core/result";
import { formatProblem } from "../domain/core/problem-texts";
import type { NodeSetContent } from "../domain/nodeset/nodeset-content";
import { chooseModels, type Choice } from "./choose-models";
import type { LibraryEntry } from "./library-entry";
import { compressPack, PackStore, toPackHash } from "./pack-store.server";
import { listPublished } from "./published.server";
import { readFileBytes, type ReadFileOptions } from "./read-file.server";

export type PackFile = { readonly hash: string; readonly gzip: Uint8Array };

export type ResolveOptions = {
  /** Entries beside the published ones: uploads, folders, models of the team; they win between equally new ones. */
  readonly extra?: readonly LibraryEntry[];
  /** URI of the model that asks: named in problems, and never among the layers itself. */
  readonly requiredBy?: string;
  /** URIs that are taken from `extra` alone, whatever else is newer. */
  readonly exact?: ReadonlySet<string>;
};

type Loaded = { readonly layer: Layer; readonly problems: readonly Problem[] };

const MAX_ADDED_LAYERS = 64;

export class Library {
  readonly #published = listPublished();
  readonly #layers = new Map<string, Promise<Result<Loaded>>>();
  readonly #packs = new Map<string, Promise<PackFile>>();
  #store: PackStore | undefined;

  /** From now on packs are kept in this folder. */
  usePackFolder(folder: string): void {
    this.#store = new PackStore(folder);
  }

  /** The published NodeSets, also older versions of them. */
  list(): readonly LibraryEntry[] {
    return this.#published;
  }

  /** Which entries the required models need, in loading order, without loading any. */
  choose(required: readonly ModelEntry[], options: ResolveOptions = {}): Choice {
    const published = this.#published.filter((entry) => !options.exact?.has(entry.modelUri));
    return chooseModels(required, [options.extra ?? [], published], options.requiredBy ?? "The model");
  }

  /**
   * The layers of the required models and all that these require, the base NodeSet first. What is missing or unreadable
   * is left out and told by a problem of severity "error", so that a caller may go on with the rest or refuse.
   */
  async resolve(required: readonly ModelEntry[], options: ResolveOptions = {}): Promise<Result<Layer[]>> {
    const choice = this.choose(required, options);
    const problems: Problem[] = [...choice.problems];
    const layers: Layer[] = [];
    for (const loading of choice.entries.map((entry) => ({ entry, layer: this.load(entry) }))) {
      const layer = await loading.layer;
      if (layer.ok) layers.push(layer.value);
      else problems.push(toUnreadable(loading.entry, layer.problems));
    }
    return ok(layers, problems);
  }

  /** One layer; the same object for the same content, for as long as it is remembered. Fails when it cannot be read. */
  async load(entry: LibraryEntry): Promise<Result<Layer>> {
    if (entry.source.kind === "layer") return ok(entry.source.layer);
    let loading = this.#layers.get(entry.sha256);
    if (!loading) {
      loading = this.#read(entry);
      void loading.then((result) => {
        if (!result.ok) this.#layers.delete(entry.sha256);
      });
    }
    this.#layers.delete(entry.sha256);
    this.#layers.set(entry.sha256, loading);
    this.#forgetOldest();
    const result = await loading;
    return result.ok ? ok(result.value.layer, result.value.problems) : result;
  }

  /** The compressed pack of an entry with its name, for browsers and other processes. */
  async packOf(entry: LibraryEntry): Promise<Result<PackFile>> {
    const hash = toPackHash(entry.sha256);
    const known = this.#packs.get(hash);
    if (known) return ok(await known);
    const layer = await this.load(entry);
    if (!layer.ok) return layer;
    const making = this.#makePack(hash, layer.value);
    this.#packs.set(hash, making);
    making.catch(() => this.#packs.delete(hash));
    return ok(await making);
  }

  /** A pack by its name: of a published NodeSet, or one that was made in this process or kept in the folder. */
  async findPack(hash: string): Promise<PackFile | undefined> {
    const known = this.#packs.get(hash);
    if (known) return known;
    const entry = this.#published.find(({ sha256 }) => toPackHash(sha256) === hash);
    if (entry) {
      const pack = await this.packOf(entry);
      return pack.ok ? pack.value : undefined;
    }
    const gzip = await this.#store?.find(hash);
    return gzip && { hash, gzip };
  }

  /** Reads any NodeSet2 file with progress and cancel, away from the thread that answers requests. */
  read(bytes: Uint8Array, options: ReadFileOptions = {}): Promise<Result<NodeSetContent>> {
    return readFileBytes(bytes, options);
  }

  async #read(entry: LibraryEntry): Promise<Result<Loaded>> {
    const pack = await this.#store?.load(toPackHash(entry.sha256));
    if (pack) return ok({ layer: buildLayer(pack.header, pack.nodes), problems: [] });
    const bytes = await readSource(entry);
    if (!bytes.ok) return bytes;
    const content = await readFileBytes(bytes.value, { fileName: entry.file });
    if (!content.ok) return content;
    const layer = buildLayer(content.value.header, content.value.nodes);
    if (this.#store) await this.#keep(entry, layer);
    return ok({ layer, problems: content.problems });
  }

  /** Keeping a pack only saves time; a full disk must not keep a model from being opened. */
  async #keep(entry: LibraryEntry, layer: Layer): Promise<void> {
    const hash = toPackHash(entry.sha256);
    const making = this.#makePack(hash, layer);
    this.#packs.set(hash, making);
    await making.then((pack) => this.#store?.save(hash, pack.gzip)).catch(() => undefined);
  }

  async #makePack(hash: string, layer: Layer): Promise<PackFile> {
    const stored = await this.#store?.find(hash);
    if (stored) return { hash, gzip: stored };
    const nodes = [...layer.nodes.values()].sort((a, b) => a.order - b.order);
    return { hash, gzip: await compressPack({ header: layer.header, nodes }) };
  }

  #forgetOldest(): void {
    const limit = this.#published.length + MAX_ADDED_LAYERS;
    for (const oldest of this.#layers.keys()) {
      if (this.#layers.size <= limit) break;
      this.#layers.delete(oldest);
    }
  }
}

async function readSource(entry: LibraryEntry): Promise<Result<Uint8Array>> {
  const { source } = entry;
  if (source.kind === "bytes") return ok(source.bytes);
  if (source.kind === "layer") throw new RangeError("A layer has no bytes");
  try {
    return ok(await readFile(source.path));
  } catch (error) {
    const detail = error instanceof Error ? error.message : String(error);
    return fail(problem("library.unreadable", { file: entry.file, detail }));
  }
}

function toUnreadable(entry: LibraryEntry, problems: readonly Problem[]): Problem {
  const first = problems[0];
  return problem("library.unreadable", { file: entry.file, detail: first ? formatProblem(first) : "" }, first?.at);
}

const GLOBAL_KEY = Symbol.for("ferrule.library");

/** The one library of this process; layers stay in memory across hot reloads. */
export function getLibrary(): Library {
  const holder = globalThis as { [GLOBAL_KEY]?: Library };
  return (holder[GLOBAL_KEY] ??= new Library());
}
