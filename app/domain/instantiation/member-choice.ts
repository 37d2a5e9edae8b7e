/**
 * Which optional members an instance gets and which nodes stand for placeholders. A member is named by its browse path
 * below the instance: either the exact key of `toPathKey`, or the plain names joined by `/` (`Process/PicksCounter`).
 * Choosing a member chooses the optional ones above it.
 */
import { toPathKey } from "../address-space/instance-declarations";
import type { NodeKey } from "../address-space/node-id";
import type { QualifiedName } from "../address-space/qualified-name";

/** A node that stands for a placeholder; `path` is the placeholder's, of several with one path each makes a node. */
export type NamedPlaceholder = {
  readonly path: string;
  readonly name: string;
  readonly namespaceUri?: string;
  /** A subtype of the placeholder's type definition, where it is abstract or a closer one is wanted. */
  readonly typeDefinition?: NodeKey;
};

/** Remembers which wishes were met, so that a misspelt one is noticed. One choice serves one command. */
export class MemberChoice {
  readonly #optional: readonly string[];
  readonly #named: readonly NamedPlaceholder[];
  readonly #met = new Set<string>();

  constructor(optional: readonly string[] = [], named: readonly NamedPlaceholder[] = []) {
    this.#optional = optional;
    this.#named = named;
  }

  /** Whether the path was asked for, or stands above one that was. */
  wants(path: readonly QualifiedName[]): boolean {
    const forms = toForms(path);
    for (const form of forms) if (this.#optional.includes(form)) this.#met.add(form);
    const asked = [...this.#optional, ...this.#named.map((n) => n.path)];
    return asked.some((text) => forms.some((form) => text === form || text.startsWith(`${form}/`)));
  }

  /** The nodes that stand for the placeholder at the path. */
  listNamed(path: readonly QualifiedName[]): NamedPlaceholder[] {
    const forms = toForms(path);
    const found = this.#named.filter((named) => forms.includes(named.path));
    for (const named of found) this.#met.add(named.path);
    return found;
  }

  /** What was asked for and met nothing. */
  listUnmet(): string[] {
    return [...this.#optional, ...this.#named.map((n) => n.path)].filter((asked) => !this.#met.has(asked));
  }
}

function toForms(path: readonly QualifiedName[]): [string, string] {
  return [toPathKey(path), path.map((name) => name.name).join("/")];
}
