/** What all parts of the IODD reader share: problems with places, texts by id, checked attributes. */
import { problem, type Problem } from "../core/result";
import { findChild, type XmlElement } from "../core/xml-tree";
import type { IoddTexts } from "./device-description";

/** More problems than this are not collected: a damaged file repeats one mistake thousands of times. */
const MAX_PROBLEMS = 1_000;

export type TextTables = ReadonlyMap<string, ReadonlyMap<string, string>>;

export class IoddContext {
  readonly problems: Problem[] = [];
  /** Language tag → text id → text, primary language first. */
  readonly texts: TextTables;

  constructor(texts: TextTables) {
    this.texts = texts;
  }

  report(found: Problem, element?: XmlElement): void {
    if (this.problems.length >= MAX_PROBLEMS) return;
    this.problems.push(element ? { ...found, at: { line: element.line, column: element.column, ...found.at } } : found);
  }

  /** The attribute's text; reports `iodd.missing-attribute` when it is absent. */
  requireAttribute(element: XmlElement, attribute: string): string {
    const value = element.attributes[attribute];
    if (value === undefined)
      this.report(problem("iodd.missing-attribute", { element: element.name, attribute }), element);
    return value ?? "";
  }

  /** A whole number within limits; reports `iodd.bad-number` and answers the lower limit otherwise. */
  requireInteger(element: XmlElement, attribute: string, lower: number, upper: number): number {
    const text = this.requireAttribute(element, attribute).trim();
    const value = Number(text);
    if (/^-?\d+$/.test(text) && value >= lower && value <= upper) return value;
    if (element.attributes[attribute] !== undefined) {
      this.report(problem("iodd.bad-number", { attribute, value: text, element: element.name, lower, upper }), element);
    }
    return lower;
  }

  /** The texts of a child such as Name or Description, in every language that has it. */
  findTexts(parent: XmlElement | undefined, childName: string): IoddTexts | undefined {
    const child = findChild(parent, childName);
    const id = child?.attributes.textId;
    if (!child || id === undefined) return undefined;
    const found: Record<string, string> = {};
    for (const [language, table] of this.texts) {
      const value = table.get(id);
      if (value !== undefined) found[language] = value;
    }
    if (Object.keys(found).length > 0) return found;
    // Standard texts (STD_…) live in the Community's definition files and are not part of an IODD.
    if (!id.startsWith("STD_")) this.report(problem.warning("iodd.missing-text", { id }), child);
    return undefined;
  }
}

/** Reads the texts of an ExternalTextCollection, or of an external language file's Language element. */
export function readTextTables(documents: readonly XmlElement[]): Map<string, Map<string, string>> {
  const tables = new Map<string, Map<string, string>>();
  const isLanguage = (e: XmlElement): boolean => e.name === "PrimaryLanguage" || e.name === "Language";
  for (const root of documents) {
    const holders = [root, findChild(root, "ExternalTextCollection")].flatMap(
      (e) => e?.children.filter(isLanguage) ?? [],
    );
    for (const holder of holders) {
      const language = holder.attributes["xml:lang"] ?? "en";
      const table = tables.get(language) ?? new Map<string, string>();
      for (const text of holder.children) {
        const id = text.attributes.id;
        if ((text.name === "Text" || text.name === "TextRedefine") && id !== undefined)
          table.set(id, text.attributes.value ?? "");
      }
      tables.set(language, table);
    }
  }
  return tables;
}
