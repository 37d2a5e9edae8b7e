/** Namespace declarations in force while elements open and close (Namespaces in XML 1.0). */
import type { Attributes } from "./scan-xml";

type Binding = { readonly depth: number; readonly prefix: string; readonly uri: string };

export class NamespaceScopes {
  readonly #bindings: Binding[] = [{ depth: 0, prefix: "xml", uri: "http://www.w3.org/XML/1998/namespace" }];
  /** The namespace of names without prefix. */
  defaultUri = "";

  /** Takes the declarations among the attributes of the element at `depth`. */
  declare(depth: number, attributes: Attributes): void {
    for (const name in attributes) {
      if (name === "xmlns") this.#bind(depth, "", attributes[name] ?? "");
      else if (name.startsWith("xmlns:")) this.#bind(depth, name.slice(6), attributes[name] ?? "");
    }
  }

  /** Forgets what the element at `depth` declared; to be called when it closes. */
  leave(depth: number): void {
    const bindings = this.#bindings;
    if ((bindings.at(-1)?.depth ?? 0) < depth) return;
    while ((bindings.at(-1)?.depth ?? 0) >= depth) bindings.pop();
    this.defaultUri = this.find("")?.uri ?? "";
  }

  /** The binding of a prefix with the depth of the element that declared it. */
  find(prefix: string): Binding | undefined {
    for (let i = this.#bindings.length - 1; i >= 0; i--) {
      const binding = this.#bindings[i];
      if (binding?.prefix === prefix) return binding;
    }
    return undefined;
  }

  /** The namespace of an element's name as written; "" where there is none. */
  uriOf(name: string): string {
    const colon = name.indexOf(":");
    return colon < 0 ? this.defaultUri : (this.find(name.slice(0, colon))?.uri ?? "");
  }

  /**
   * The prefix of an element's or attribute's name that nobody declared; such a name means nothing (Namespaces in XML 1.0
   * §5). Undefined when all is well.
   */
  findUndeclaredPrefix(name: string): string | undefined {
    const colon = name.indexOf(":");
    if (colon < 0) return undefined;
    const prefix = name.slice(0, colon);
    return prefix === "xmlns" || this.find(prefix) !== undefined ? undefined : prefix;
  }

  #bind(depth: number, prefix: string, uri: string): void {
    this.#bindings.push({ depth, prefix, uri });
    if (prefix === "") this.defaultUri = uri;
  }
}

export function getLocalName(name: string): string {
  const colon = name.indexOf(":");
  return colon < 0 ? name : name.slice(colon + 1);
}
