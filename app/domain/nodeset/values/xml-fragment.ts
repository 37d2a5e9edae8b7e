/** A Value's XML as a small tree that remembers its source text, so that a part that is not understood can be kept as it is. */
import type { XmlText } from "../../address-space/node";
import { fail, ok, type Result } from "../../core/result";
import { READ_LIMITS } from "../limits";
import { escapeAttribute } from "../xml/escape";
import { getLocalName, NamespaceScopes } from "../xml/namespace-scopes";
import { scanXml, type Attributes } from "../xml/scan-xml";

export type FragmentElement = {
  /** Name without prefix. */
  readonly name: string;
  readonly namespaceUri: string;
  readonly attributes: Attributes;
  readonly children: readonly FragmentElement[];
  /** Character data directly inside, as written. */
  readonly text: string;
  readonly isNil: boolean;
  /** What stands between the tags, with the prefixes that are declared further out. */
  readonly content: XmlText;
};

const XSI = "http://www.w3.org/2001/XMLSchema-instance";

type Open = { -readonly [K in keyof Omit<FragmentElement, "children" | "content">]: FragmentElement[K] } & {
  children: FragmentElement[];
  openEnd: number;
  prefixes: Readonly<Record<string, string>>;
};

/** The elements of a Value; none for an empty one. Problems as `scanXml`. */
export function readFragment(value: XmlText): Result<readonly FragmentElement[]> {
  const declared = Object.entries(value.prefixes ?? {});
  const head = declared
    .map(([prefix, uri]) => ` ${prefix === "" ? "xmlns" : `xmlns:${prefix}`}="${escapeAttribute(uri)}"`)
    .join("");
  const source = `<v${head}>${value.xml}</v>`;
  const builder = new FragmentBuilder(source);
  const stopped = scanXml(source, builder, { limits: READ_LIMITS });
  return stopped ? fail(stopped) : ok(builder.root);
}

class FragmentBuilder {
  readonly #source: string;
  readonly #scopes = new NamespaceScopes();
  readonly #open: Open[] = [];
  root: readonly FragmentElement[] = [];

  constructor(source: string) {
    this.#source = source;
  }

  open(name: string, attributes: Attributes, _start: number, end: number): void {
    const depth = this.#open.length + 1;
    this.#scopes.declare(depth, attributes);
    this.#open.push({
      name: getLocalName(name),
      namespaceUri: this.#scopes.uriOf(name),
      attributes,
      children: [],
      text: "",
      isNil: this.#isNil(attributes),
      openEnd: end,
      prefixes: { ...this.#open.at(-1)?.prefixes, ...listDeclarations(attributes) },
    });
  }

  text(start: number, end: number, resolved: string | undefined): void {
    const element = this.#open.at(-1);
    if (element) element.text += resolved ?? this.#source.slice(start, end);
  }

  mark(): void {
    // Comments inside values say nothing about the value.
  }

  close(_name: string, start: number): void {
    const element = this.#open.pop();
    this.#scopes.leave(this.#open.length + 1);
    if (!element) return;
    const { openEnd, prefixes, ...rest } = element;
    const xml = start > openEnd ? this.#source.slice(openEnd, start) : "";
    const closed: FragmentElement = { ...rest, content: makeContent(xml, prefixes) };
    const parent = this.#open.at(-1);
    if (parent) parent.children.push(closed);
    else this.root = closed.children;
  }

  #isNil(attributes: Attributes): boolean {
    for (const name in attributes) {
      if (!name.endsWith(":nil") || (attributes[name] !== "true" && attributes[name] !== "1")) continue;
      if (this.#scopes.uriOf(name) === XSI) return true;
    }
    return false;
  }
}

function listDeclarations(attributes: Attributes): Record<string, string> {
  const declared: Record<string, string> = {};
  for (const name in attributes) {
    if (name === "xmlns") declared[""] = attributes[name] ?? "";
    else if (name.startsWith("xmlns:")) declared[name.slice(6)] = attributes[name] ?? "";
  }
  return declared;
}

/** Only the prefixes that the content uses; the default namespace is used by every name without one. */
function makeContent(xml: string, prefixes: Readonly<Record<string, string>>): XmlText {
  const used = Object.entries(prefixes).filter(([prefix]) =>
    prefix === "" ? /<[^:/!?>\s]+[\s/>]/.test(xml) : xml.includes(`${prefix}:`),
  );
  return used.length === 0 ? { xml } : { xml, prefixes: Object.fromEntries(used) };
}
