/** Elements that hold text only: what becomes of the text when they close. */
import type { DeclaredReference } from "../address-space/node";
import type { LocalizedText } from "../address-space/qualified-name";
import { nameReference, toStep } from "./leftover-path";
import { append } from "./node-builder";
import { listKept } from "./read-attributes";
import type { ReadContext } from "./read-context";
import type { Attributes } from "./xml/scan-xml";

export type Leaf =
  | "uri"
  | "server"
  | "alias"
  | "role"
  | "displayName"
  | "description"
  | "inverseName"
  | "category"
  | "documentation"
  | "reference"
  | "fieldDisplayName"
  | "fieldDescription"
  | "argumentName"
  | "argumentDescription";

/** What each element may have by the schema; what a Reference has besides is kept in the reference itself. */
const NONE: readonly string[] = [];
const LOCALE: readonly string[] = ["Locale"];
const KNOWN_ATTRIBUTES: Readonly<Record<Leaf, readonly string[] | undefined>> = {
  reference: undefined,
  uri: NONE,
  server: NONE,
  category: NONE,
  documentation: NONE,
  argumentName: NONE,
  alias: ["Alias"],
  role: ["Permissions"],
  displayName: LOCALE,
  description: LOCALE,
  inverseName: LOCALE,
  fieldDisplayName: LOCALE,
  fieldDescription: LOCALE,
  argumentDescription: LOCALE,
};
const MAX_UINT32 = 4_294_967_295;

export class LeafReader {
  readonly #context: ReadContext;
  #leaf: Leaf = "uri";
  #name = "";
  #attributes: Attributes = {};
  #offset = 0;
  #text = "";

  constructor(context: ReadContext) {
    this.#context = context;
  }

  open(leaf: Leaf, name: string, attributes: Attributes, offset: number): void {
    this.#leaf = leaf;
    this.#name = name;
    this.#attributes = attributes;
    this.#offset = offset;
    this.#text = "";
  }

  text(start: number, end: number, resolved: string | undefined): void {
    const piece = resolved ?? this.#context.cache.slice(start, end);
    this.#text = this.#text === "" ? piece : this.#text + piece;
  }

  close(): void {
    const { node, field, argument, header } = this.#context;
    const text = this.#text;
    switch (this.#leaf) {
      case "reference":
        this.#addReference(text);
        break;
      case "displayName":
        if (node) node.displayName = append(node.displayName, this.#toLocalizedText());
        break;
      case "description":
        if (node) node.description = append(node.description, this.#toLocalizedText());
        break;
      case "inverseName":
        if (node) node.inverseName = append(node.inverseName, this.#toLocalizedText());
        break;
      case "fieldDisplayName":
        if (field) field.displayName = append(field.displayName, this.#toLocalizedText());
        break;
      case "fieldDescription":
        if (field) field.description = append(field.description, this.#toLocalizedText());
        break;
      case "argumentDescription":
        argument?.description.push(this.#toLocalizedText());
        break;
      case "argumentName":
        if (argument) argument.name = text;
        break;
      case "category":
        if (node) node.category = append(node.category, text);
        break;
      case "documentation":
        if (node) node.fields.documentation = text;
        break;
      case "uri":
        header.addNamespace(text.trim(), this.#offset);
        break;
      case "server":
        header.serverUris.push(text.trim());
        break;
      case "role":
        this.#addRole(text);
        break;
      case "alias":
        this.#addAlias(text);
        break;
    }
  }

  /** Attributes of the element that closed which the schema does not know. */
  listUnknownAttributes(): Readonly<Record<string, string>> | undefined {
    const known = KNOWN_ATTRIBUTES[this.#leaf];
    return known && listKept(this.#attributes, known);
  }

  /** What the element that closed is called in leftovers. */
  toStep(): string {
    const [name, nth] = this.#identify();
    return toStep(this.#name, name, nth);
  }

  #identify(): [name: string | undefined, nth: number] {
    const { node, field, argument, header, models, siblings } = this.#context;
    const text = this.#text.trim();
    const itself = (one: string): string => one;
    const byLocale = (texts: readonly LocalizedText[] | undefined): [string | undefined, number] => {
      const locale = this.#attributes["Locale"];
      return [locale, siblings.count(texts ?? [], (one) => one.locale, locale)];
    };
    switch (this.#leaf) {
      case "reference": {
        const last = node?.references.at(-1);
        const name = last && nameReference(last);
        return [name, siblings.count(node?.references ?? [], nameReference, name)];
      }
      case "displayName":
        return byLocale(node?.displayName);
      case "description":
        return byLocale(node?.description);
      case "inverseName":
        return byLocale(node?.inverseName);
      case "fieldDisplayName":
        return byLocale(field?.displayName);
      case "fieldDescription":
        return byLocale(field?.description);
      case "argumentDescription":
        return byLocale(argument?.description);
      case "category":
        return [this.#text, siblings.count(node?.category ?? [], itself, this.#text)];
      case "uri":
        return [text, siblings.count(header.namespaceUris, itself, text)];
      case "server":
        return [text, siblings.count(header.serverUris, itself, text)];
      case "role": {
        const roles = models.at(-1)?.roles ?? node?.rolePermissions ?? [];
        return [undefined, roles.length];
      }
      case "alias":
        return [this.#attributes["Alias"], 1];
      case "argumentName":
      case "documentation":
        return [undefined, 1];
    }
  }

  #toLocalizedText(): LocalizedText {
    const locale = this.#attributes["Locale"];
    return locale === undefined ? { text: this.#text } : { locale, text: this.#text };
  }

  #addReference(text: string): void {
    const { ids, node } = this.#context;
    const typeText = this.#attributes["ReferenceType"];
    if (typeText === undefined) this.#context.reportMissing("Reference", "ReferenceType", this.#offset);
    const type = typeText === undefined ? undefined : this.#context.toKey(typeText, this.#offset, "ReferenceType");
    const isForward = this.#readIsForward();
    const known = ids.findKnown(text);
    const target = known === undefined ? this.#context.take(ids.resolveTarget(text), this.#offset) : undefined;
    const key = known ?? target?.key;
    if (!node) return;
    if (type === undefined || key === undefined) this.#context.isWhole = false;
    else node.references.push(this.#withRarities({ type, target: key, isForward }, target?.serverUri));
  }

  #withRarities(reference: DeclaredReference, serverUri: string | undefined): DeclaredReference {
    let others: Record<string, string> | undefined;
    for (const name in this.#attributes) {
      if (name === "ReferenceType" || name === "xmlns") continue;
      if (name === "IsForward" && this.#attributes[name] === "false") continue;
      (others ??= {})[name] = this.#attributes[name] ?? "";
    }
    if (others === undefined && serverUri === undefined) return reference;
    return {
      ...reference,
      ...(serverUri !== undefined ? { serverUri } : {}),
      ...(others ? { otherAttributes: others } : {}),
    };
  }

  #readIsForward(): boolean {
    const text = this.#attributes["IsForward"];
    if (text === undefined || text === "true") return true;
    if (text === "false") return false;
    const trimmed = text.trim();
    if (trimmed === "false" || trimmed === "0") return false;
    if (trimmed !== "true" && trimmed !== "1") {
      this.#context.reportValue("IsForward", text, "true or false", this.#offset);
      this.#context.isWhole = false;
    }
    return true;
  }

  #addRole(text: string): void {
    const written = this.#attributes["Permissions"] ?? "0";
    const permissions = /^\s*\d{1,10}\s*$/.test(written) ? Number(written) : Number.NaN;
    if (!(permissions <= MAX_UINT32)) {
      this.#context.reportValue("Permissions", written, `a whole number 0 … ${MAX_UINT32}`, this.#offset);
      this.#context.isWhole = false;
      return;
    }
    const model = this.#context.models.at(-1);
    if (model) {
      model.roles?.push({ text, permissions, offset: this.#offset });
      return;
    }
    const role = this.#context.toKey(text, this.#offset);
    if (role === undefined) this.#context.isWhole = false;
    else this.#context.node?.rolePermissions?.push({ role, permissions });
  }

  #addAlias(text: string): void {
    const alias = this.#attributes["Alias"];
    if (alias === undefined) this.#context.reportMissing("Alias", "Alias", this.#offset);
    else this.#context.header.addAlias(alias, text.trim(), this.#offset);
  }
}
