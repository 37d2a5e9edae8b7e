/** One NodeSet that the library can load: where it comes from and what its head says. */
import type { Layer } from "../domain/address-space/address-space";
import type { ModelEntry } from "../domain/address-space/model-header";

/** `published`: from the npm package; `added`: uploaded or found in a folder; `team`: a model of the team itself. */
export type LibraryOrigin = "published" | "added" | "team";

export type LibraryEntry = {
  readonly origin: LibraryOrigin;
  readonly title: string;
  /** File name, for people. */
  readonly file: string;
  readonly modelUri: string;
  readonly version?: string;
  readonly modelVersion?: string;
  readonly publicationDate?: string;
  readonly requiredModels: readonly ModelEntry[];
  /** Undefined where only the head was read. */
  readonly nodeCount?: number;
  /** SHA-256 of the file's bytes, in hex: the identity of the content. */
  readonly sha256: string;
  /** Name of the NodeSet in the npm package, which node-opcua's loader knows too. */
  readonly key?: string;
  readonly source: LibrarySource;
};

export type LibrarySource =
  | { readonly kind: "file"; readonly path: string }
  | { readonly kind: "bytes"; readonly bytes: Uint8Array }
  | { readonly kind: "layer"; readonly layer: Layer };
