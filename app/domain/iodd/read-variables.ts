/** VariableCollection: the device's parameters by index. */
import { problem } from "../core/result";
import { listChildren, type XmlElement } from "../core/xml-tree";
import type { IoddDatatype, IoddVariable } from "./device-description";
import type { IoddContext } from "./iodd-context";
import type { DatatypeReader } from "./read-datatypes";
import type { ShownVariables } from "./read-menus";
import { findStandardVariable } from "./standard-definitions";

export function readVariables(
  context: IoddContext,
  datatypes: DatatypeReader,
  collection: XmlElement | undefined,
  shown: ShownVariables,
): IoddVariable[] {
  const variables = new Map<string, IoddVariable>();
  for (const element of collection?.children ?? []) {
    const variable =
      element.name === "StdVariableRef" || element.name === "StdDirectParameterRef"
        ? readStandardVariable(context, element)
        : element.name === "Variable"
          ? readVariable(context, datatypes, element)
          : undefined;
    if (!variable) continue;
    if (variables.has(variable.id)) {
      context.report(problem.warning("iodd.duplicate-id", { id: variable.id }), element);
      continue;
    }
    const shownAs = shown.get(variable.id) ?? [];
    variables.set(variable.id, { ...variable, shownAs });
    reportDifferentScalings(context, variable.id, shownAs, element);
  }
  return [...variables.values()];
}

function readStandardVariable(context: IoddContext, element: XmlElement): IoddVariable | undefined {
  const id = context.requireAttribute(element, "id");
  const standard = findStandardVariable(id);
  if (!standard) {
    context.report(problem.warning("iodd.unknown-standard-variable", { id }), element);
    return undefined;
  }
  const { defaultValue, fixedLengthRestriction } = element.attributes;
  return {
    ...standard,
    type: withSingleValues(withLength(standard.type, fixedLengthRestriction), context, element),
    ...(defaultValue === undefined ? {} : { defaultValue }),
  };
}

/** fixedLengthRestriction wins over the standard's length (OPC 30120 §12.2.4); on an array it restricts the count. */
function withLength(type: IoddDatatype, restriction: string | undefined): IoddDatatype {
  const length = Number(restriction);
  if (restriction === undefined || !Number.isInteger(length) || length < 1) return type;
  if (type.kind === "StringT" || type.kind === "OctetStringT") return { ...type, fixedLength: length };
  return type.kind === "ArrayT" ? { ...type, count: length } : type;
}

/** StdSingleValueRef chooses among the standard's values, SingleValue adds the device's own. */
function withSingleValues(type: IoddDatatype, context: IoddContext, element: XmlElement): IoddDatatype {
  if (!("singleValues" in type)) return type;
  const chosen = new Set(listChildren(element, "StdSingleValueRef").map((e) => Number(e.attributes.value)));
  const own = listChildren(element, "SingleValue").map((single) => {
    const name = context.findTexts(single, "Name");
    return { value: Number(single.attributes.value), ...(name ? { name } : {}) };
  });
  if (chosen.size === 0 && own.length === 0) return type;
  const kept = type.singleValues.filter((s) => chosen.size === 0 || chosen.has(Number(s.value)));
  return { ...type, singleValues: [...kept, ...own] };
}

const ACCESS_RIGHTS = ["ro", "rw", "wo"] as const;

function readVariable(context: IoddContext, datatypes: DatatypeReader, element: XmlElement): IoddVariable {
  const name = context.findTexts(element, "Name");
  const description = context.findTexts(element, "Description");
  const { defaultValue } = element.attributes;
  const itemDefaults: Record<number, string> = {};
  for (const item of listChildren(element, "RecordItemInfo")) {
    if (item.attributes.defaultValue === undefined) continue;
    itemDefaults[context.requireInteger(item, "subindex", 1, 255)] = item.attributes.defaultValue;
  }
  return {
    id: context.requireAttribute(element, "id"),
    index: context.requireInteger(element, "index", 0, 65_535),
    accessRights: ACCESS_RIGHTS.find((a) => a === element.attributes.accessRights) ?? "ro",
    type: datatypes.readOf(element),
    isStandard: false,
    ...(defaultValue === undefined ? {} : { defaultValue }),
    ...(Object.keys(itemDefaults).length === 0 ? {} : { itemDefaults }),
    ...(name ? { name } : {}),
    ...(description ? { description } : {}),
    ...flag(element, "dynamic"),
    ...flag(element, "modifiesOtherVariables"),
    ...flag(element, "excludedFromDataStorage"),
    shownAs: [],
  };
}

function flag<K extends string>(element: XmlElement, key: K): Partial<Record<K, boolean>> {
  const text = element.attributes[key];
  return text === undefined ? {} : ({ [key]: text === "true" || text === "1" } as Record<K, boolean>);
}

function reportDifferentScalings(
  context: IoddContext,
  id: string,
  shownAs: IoddVariable["shownAs"],
  element: XmlElement,
): void {
  const bySubindex = new Map<number, Set<string>>();
  for (const { subindex, gradient, offset, unitCode } of shownAs) {
    if (gradient === undefined && offset === undefined && unitCode === undefined) continue;
    const scalings = bySubindex.get(subindex) ?? new Set<string>();
    scalings.add(`${gradient ?? 1}/${offset ?? 0}/${unitCode ?? ""}`);
    bySubindex.set(subindex, scalings);
  }
  for (const [subindex, scalings] of bySubindex) {
    if (scalings.size < 2) continue;
    context.report(
      problem.hint("iodd.several-gradients", { id: subindex === 0 ? id : `${id}, subindex ${subindex}` }),
      element,
    );
  }
}
