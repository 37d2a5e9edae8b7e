/**
 * Values as element trees, each read once: values are immutable and shared by all states of a model. Values of the same text
 * (a unit, a usual range) share one tree.
 */
import type { XmlText } from "../address-space/node";
import { findChild, readValueElements, type ValueElement } from "./value-element";

export type ValueTree =
  /** One element, as the schema demands. */
  | { readonly kind: "value"; readonly root: ValueElement }
  | { readonly kind: "empty" }
  /** No well-formed XML, or several elements. */
  | { readonly kind: "broken" };

const trees = new WeakMap<XmlText, ValueTree>();

/** The texts met last; short ones, since long ones hardly repeat. */
const byText = new Map<string, ValueTree>();
const MAX_TEXTS = 2_000;
const MAX_LENGTH = 2_000;

export function readValueTree(value: XmlText): ValueTree {
  let tree = trees.get(value);
  if (!tree) trees.set(value, (tree = findTree(value)));
  return tree;
}

function findTree(value: XmlText): ValueTree {
  if (value.xml.length > MAX_LENGTH) return makeTree(value);
  let text = value.xml;
  for (const prefix in value.prefixes) text += `\n${prefix}=${value.prefixes[prefix] ?? ""}`;
  let tree = byText.get(text);
  if (tree) return tree;
  tree = makeTree(value);
  if (byText.size >= MAX_TEXTS) byText.clear();
  byText.set(text, tree);
  return tree;
}

/** Asks something of values, once of each tree. `compute` depends on nothing else. */
export function makeTreeQuestion<T>(absent: T, compute: (root: ValueElement) => T): (value: XmlText | undefined) => T {
  const answers = new WeakMap<ValueElement, { readonly answer: T }>();
  return (value) => {
    const root = findValueRoot(value);
    if (!root) return absent;
    let known = answers.get(root);
    if (!known) answers.set(root, (known = { answer: compute(root) }));
    return known.answer;
  };
}

/** The element of a value that is there and well formed. */
export function findValueRoot(value: XmlText | undefined): ValueElement | undefined {
  if (!value) return undefined;
  const tree = readValueTree(value);
  return tree.kind === "value" ? tree.root : undefined;
}

function makeTree(value: XmlText): ValueTree {
  const elements = readValueElements(value.xml, value.prefixes);
  if (!elements) return { kind: "broken" };
  const [root, second] = elements;
  if (!root) return { kind: "empty" };
  return second ? { kind: "broken" } : { kind: "value", root };
}

/** Whether the element says that it is null: `xsi:nil="true"`. */
export function isNil(element: ValueElement): boolean {
  for (const name in element.attributes) {
    const text = element.attributes[name];
    if ((text === "true" || text === "1") && /(?:^|:)nil$/.test(name)) return true;
  }
  return false;
}

/** Name of the element type of a list: `ListOfString` → `String`; undefined for anything else. */
export function listItemType(element: ValueElement): string | undefined {
  return element.name.startsWith("ListOf") ? element.name.slice(6) : undefined;
}

/** The ExtensionObjects of a value: the value itself, the items of a list, the elements of a matrix. */
export function listExtensionObjects(root: ValueElement | undefined): ValueElement[] {
  if (!root) return [];
  if (root.name === "ExtensionObject") return [root];
  const holder = root.name === "Matrix" ? findChild(root, "Elements") : root;
  return (holder?.children ?? []).filter((c) => c.name === "ExtensionObject");
}

/** The one element in an ExtensionObject's Body. */
export function findBody(extensionObject: ValueElement): ValueElement | undefined {
  return findChild(extensionObject, "Body")?.children[0];
}

export function findTypeId(extensionObject: ValueElement): string | undefined {
  return findChild(extensionObject, "TypeId", "Identifier")?.text.trim();
}

/** Bodies named after a standard structure, wherever they stand in the value. */
export function listBodies(value: XmlText | undefined, name: string): ValueElement[] {
  return listBodiesBelow(findValueRoot(value), name);
}

export function listBodiesBelow(root: ValueElement | undefined, name: string): ValueElement[] {
  return listExtensionObjects(root).flatMap((e) => {
    const body = findBody(e);
    return body?.name === name ? [body] : [];
  });
}

/** Trimmed text of a field, "" where it is left out. */
export function textOf(element: ValueElement | undefined, ...path: readonly string[]): string {
  return findChild(element, ...path)?.text.trim() ?? "";
}
