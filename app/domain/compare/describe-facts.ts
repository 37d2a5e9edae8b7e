/** Facts of a node as short texts, for "before" and "after". */
import type { AddressSpace } from "../address-space/address-space";
import { findProperty } from "../address-space/browse";
import { hasValueAttributes, type Node } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import type { LocalizedText } from "../address-space/qualified-name";
import { findDescendant, readXmlText } from "./compare-xml";

/** The BrowseName of a node, else what is known of it. */
export function nameOf(space: AddressSpace, key: NodeKey | undefined): string | null {
  if (key === undefined) return null;
  return space.getNode(key)?.browseName.name ?? key;
}

export type UnitFact = {
  readonly unitId: string;
  readonly namespaceUri: string;
  readonly symbol: string;
  readonly name: string;
};

/** The value of the Property EngineeringUnits (OPC 10000-8 §5.6.3); undefined where there is none. */
export function findUnit(space: AddressSpace, key: NodeKey): UnitFact | undefined {
  const property = findProperty(space, key, "EngineeringUnits");
  const body = property && hasValueAttributes(property) && property.value ? readXmlText(property.value) : undefined;
  if (!body) return undefined;
  const textOf = (name: string): string => findDescendant(findDescendant(body, name), "Text")?.text ?? "";
  return {
    unitId: findDescendant(body, "UnitId")?.text.trim() ?? "",
    namespaceUri: findDescendant(body, "NamespaceUri")?.text.trim() ?? "",
    symbol: textOf("DisplayName"),
    name: textOf("Description"),
  };
}

export function formatUnit(unit: UnitFact | undefined): string | null {
  return unit ? `${unit.symbol || unit.name || "?"} (${unit.unitId})` : null;
}

/** The values of EURange, InstrumentRange or another Range Property as `low … high`. */
export function findRange(space: AddressSpace, key: NodeKey, name: string): string | undefined {
  const property = findProperty(space, key, name);
  const body = property && hasValueAttributes(property) && property.value ? readXmlText(property.value) : undefined;
  if (!body) return undefined;
  return `${findDescendant(body, "Low")?.text.trim() ?? "0"} … ${findDescendant(body, "High")?.text.trim() ?? "0"}`;
}

/** Texts by language on one line. */
export function formatTexts(texts: readonly LocalizedText[] | undefined): string | null {
  if (!texts || texts.length === 0) return null;
  return texts.map((t) => (t.locale ? `${t.locale}: ${t.text}` : t.text)).join(" · ");
}

/** The text of a Value, shortened; layout white space is taken out. */
export function formatValueText(node: Node | undefined): string | null {
  if (!node || !hasValueAttributes(node) || !node.value) return null;
  const element = readXmlText(node.value)?.children[0];
  if (!element) return node.value.xml.trim().slice(0, 200) || null;
  const parts: string[] = [];
  const collect = (e: typeof element): void => {
    if (e.children.length === 0 && e.text.trim() !== "") parts.push(e.text.trim());
    e.children.forEach(collect);
  };
  collect(element);
  return parts.join(", ").slice(0, 200);
}
