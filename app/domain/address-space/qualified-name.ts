/** Names of nodes. Inside the domain a BrowseName carries its namespace URI, never an index. */
import { fail, ok, problem, type Result } from "../core/result";
import { OPC_UA_NAMESPACE } from "./node-id";

/** OPC 10000-3 §8.3. */
export type QualifiedName = { readonly namespaceUri: string; readonly name: string };

/** OPC 10000-3 §8.5. `locale` is absent where the file gives none; an empty locale that was written stays "". */
export type LocalizedText = { readonly locale?: string; readonly text: string };

export function qualifiedName(namespaceUri: string, name: string): QualifiedName {
  return { namespaceUri, name };
}

export function isSameQualifiedName(a: QualifiedName, b: QualifiedName): boolean {
  return a.name === b.name && a.namespaceUri === b.namespaceUri;
}

/** Text with the namespace URI: `Name` in namespace 0, else `nsu=URI;Name` (OPC 10000-6 §5.1.13 QualifiedName form). */
export function formatQualifiedName(name: QualifiedName): string {
  return name.namespaceUri === OPC_UA_NAMESPACE ? name.name : `nsu=${name.namespaceUri};${name.name}`;
}

/**
 * Reads `N:Name` as in files; a name without digits and colon belongs to namespace 0. Only the first colon divides, so
 * `2:3:Name` is the name `3:Name` in namespace 2. Problem: `qualified-name.namespace-index`.
 */
export function parseQualifiedName(text: string, namespaceUris: readonly string[]): Result<QualifiedName> {
  const match = /^(\d{1,5}):/.exec(text);
  if (!match) return ok({ namespaceUri: OPC_UA_NAMESPACE, name: text });
  const index = Number(match[1]);
  const namespaceUri = index === 0 ? OPC_UA_NAMESPACE : namespaceUris[index];
  if (namespaceUri === undefined) {
    return fail(problem("qualified-name.namespace-index", { text, index, count: namespaceUris.length }));
  }
  return ok({ namespaceUri, name: text.slice(match[0].length) });
}

/** The text in the wanted language: exact locale, then its language, then the one without locale, then the first. */
export function findText(texts: readonly LocalizedText[], locale = "en"): string | undefined {
  const language = locale.split("-")[0] ?? locale;
  const found =
    texts.find((t) => t.locale === locale) ??
    texts.find((t) => t.locale?.split("-")[0] === language) ??
    texts.find((t) => t.locale === undefined || t.locale === "") ??
    texts[0];
  return found?.text;
}
