/** Writes XmlText back into a file: its prefixes are declared where the file's root does not, URIs become indices. */
import type { XmlText } from "../address-space/node";
import { OPC_UA_NAMESPACE } from "../address-space/node-id";
import type { IdWriter } from "./id-writer";
import { escapeAttribute, escapeText, unescapeXml } from "./xml/escape";

/** Prefix → namespace, as declared by the root and by the node that is written. */
export type Declared = Readonly<Record<string, string>>;

/** The text of a whole element, with the declarations that it needs. */
export function writeWholeElement(text: XmlText, declared: Declared): string {
  const missing = listMissing(text, declared);
  return missing === "" ? text.xml : insertIntoFirstTag(text.xml, missing);
}

/** An element around the text. `isValue` says that URIs inside stand for namespace indices. */
export function writeAround(element: string, text: XmlText, declared: Declared, ids: IdWriter | undefined): string {
  let { xml } = text;
  if (ids) xml = writeIndices(xml, ids);
  let head = element;
  for (const [name, value] of Object.entries(text.attributes ?? {})) head += ` ${name}="${escapeAttribute(value)}"`;
  for (const [prefix, uri] of Object.entries(text.prefixes ?? {})) {
    if (declared[prefix] === uri) continue;
    // Without prefix the declaration would also change the meaning of the element around.
    if (prefix === "" && !element.includes(":")) xml = insertIntoFirstTag(xml, ` xmlns="${escapeAttribute(uri)}"`);
    else head += declaration(prefix, uri);
  }
  return xml === "" ? `<${head} />` : `<${head}>${xml}</${element}>`;
}

function listMissing(text: XmlText, declared: Declared): string {
  let missing = "";
  for (const [prefix, uri] of Object.entries(text.prefixes ?? {})) {
    if (declared[prefix] !== uri) missing += declaration(prefix, uri);
  }
  return missing;
}

function declaration(prefix: string, uri: string): string {
  return ` xmlns${prefix === "" ? "" : `:${prefix}`}="${escapeAttribute(uri)}"`;
}

/** Behind the name of the first tag; comments and text may stand before it. */
const FIRST_TAG = /^(?:[^<]|<!--[^]*?-->|<!\[CDATA\[[^]*?\]\]>|<\?[^]*?\?>)*<[^\s!?/>][^\s/>]*/;

function insertIntoFirstTag(xml: string, text: string): string {
  return xml.replace(FIRST_TAG, (head) => head + text);
}

const IDENTIFIER = /(<(?:[^\s<>/:]+:)?Identifier(?:\s[^<>]*)?>)(svr=\d+;)?nsu=([^;<]*);/g;
const NAMESPACE_INDEX = /(<(?:[^\s<>/:]+:)?NamespaceIndex(?:\s[^<>]*)?>)([^<]*[^<\s\d][^<]*)(?=<)/g;

/** Replaces the URIs in the text of a Value by indices of the file. */
function writeIndices(xml: string, ids: IdWriter): string {
  let out = xml;
  if (out.includes("nsu=")) {
    out = out.replace(IDENTIFIER, (_whole, tag: string, server: string | undefined, uri: string) => {
      const namespaceUri = unescapeXml(uri).replace(/%3B/gi, ";").replace(/%25/g, "%");
      const index = namespaceUri === OPC_UA_NAMESPACE ? "" : `ns=${ids.indexOf(namespaceUri)};`;
      return tag + (server ?? "") + index;
    });
  }
  if (out.includes("NamespaceIndex>") || out.includes("NamespaceIndex ")) {
    out = out.replace(NAMESPACE_INDEX, (_whole, tag: string, uri: string) => {
      return tag + escapeText(String(ids.indexOf(unescapeXml(uri.trim()))));
    });
  }
  return out;
}
