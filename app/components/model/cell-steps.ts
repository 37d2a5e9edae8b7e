/** What the register's cells mean as edits: a column and a text become a command. Pure. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { getAccessLevel, type Node } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { setAttribute } from "~/domain/editing/commands/set-attribute";
import { setDataType } from "~/domain/editing/commands/set-data-type";
import { setModellingRule } from "~/domain/editing/commands/set-modelling-rule";
import { setText } from "~/domain/editing/commands/set-text";
import { setRange, setUnit } from "~/domain/editing/commands/set-unit";
import { setValue } from "~/domain/editing/commands/set-value";
import { setValueRank } from "~/domain/editing/commands/set-value-rank";
import { findUnitOf } from "./analog-facts";
import { getLanguage, isDescription, type CellChange } from "./cell-change";
import type { EditStep } from "./edit-steps";
import { findTypes } from "./find-types";
import { parseRangeIn, toOwnUnit } from "./number-with-unit";
import { findSpokenUnit } from "./unit-lookup";
import { formatValueRank, RULE_KEYS, VALUE_RANKS, type RuleName } from "./member-facts";
import { toRenameStep } from "./rename-steps";
import { setTypeDefinition } from "./set-type-definition";
import { parseValueText } from "./value-text";

/** The step for one cell; undefined where the column cannot be changed by a text. */
export function toCellStep(change: CellChange): EditStep | undefined {
  const { key, column, text } = change;
  const trimmed = text.trim();
  if (isDescription(column)) {
    const locale = getLanguage(column);
    return (space, context) => setText(space, context, { node: key, attribute: "description", text: trimmed, ...(locale === "" ? {} : { locale }) });
  }
  switch (column) {
    case "name":
      return toRenameStep(key, trimmed);
    case "dataType":
      return (space, context) => {
        const dataType = findExactType(space, "DataType", trimmed);
        return dataType === undefined ? `No DataType is called “${trimmed}”.` : setDataType(space, context, { node: key, dataType });
      };
    case "type":
      return (space, context) => {
        const isObject = space.getNode(key)?.nodeClass === "Object";
        const type = findExactType(space, isObject ? "ObjectType" : "VariableType", trimmed);
        return type === undefined ? `No type is called “${trimmed}”.` : setTypeDefinition(space, context, { node: key, type });
      };
    case "rank":
      return (space, context) => {
        const valueRank = VALUE_RANKS.find((rank) => formatValueRank(rank).toLowerCase() === trimmed.toLowerCase()) ?? toInteger(trimmed);
        return valueRank === undefined ? `“${trimmed}” is no value rank.` : setValueRank(space, context, { node: key, valueRank });
      };
    case "unit":
      return (space, context) => {
        if (trimmed === "" || trimmed === "–") return setUnit(space, context, { variable: key });
        const unit = findSpokenUnit(trimmed);
        return unit === undefined ? `No unit is called “${trimmed}”.` : setUnit(space, context, { variable: key, unit: unit.information });
      };
    case "range":
      return (space, context) => {
        if (trimmed === "" || trimmed === "–") return setRange(space, context, { variable: key });
        const range = parseRangeIn(findUnitOf(space, key), trimmed);
        return range === undefined ? `“${trimmed}” is no range. Write min … max.` : setRange(space, context, { variable: key, range });
      };
    case "rule":
      return (space, context) => {
        if (trimmed === "") return setModellingRule(space, context, { node: key });
        const rule = findRule(trimmed);
        return rule === undefined ? `“${trimmed}” is no modelling rule.` : setModellingRule(space, context, { node: key, rule });
      };
    case "access":
      return (space, context) => {
        const level = parseAccess(trimmed, space.getNode(key));
        return level === undefined ? `“${trimmed}” is no access. Write R, W, RW or RWH.` : setAttribute(space, context, { node: key, attribute: "accessLevel", ...(level === 1 ? {} : { value: level }) });
      };
    case "value":
      return (space, context) => {
        const node = space.getNode(key);
        if (trimmed === "") return setValue(space, context, { node: key });
        const value = node && parseValueText(space, node, toOwnUnit(findUnitOf(space, key), trimmed));
        return value === undefined ? `“${trimmed}” is no value of ${node?.browseName.name ?? key}.` : setValue(space, context, { node: key, value });
      };
    case "source":
    case "nodeId":
    case "finding":
      return undefined;
  }
}

function findExactType(space: AddressSpace, kind: "DataType" | "ObjectType" | "VariableType", name: string): NodeKey | undefined {
  const [hit] = findTypes(space, { kind }, name, 1);
  return hit && hit.name.toLowerCase() === name.toLowerCase() ? hit.key : undefined;
}

function toInteger(text: string): number | undefined {
  const value = Number(text.replace("−", "-"));
  return text !== "" && Number.isInteger(value) ? value : undefined;
}

/** Short forms as the specifications abbreviate them: M, O, MP, OP. */
const SHORT_RULES: Readonly<Record<string, RuleName>> = { m: "Mandatory", o: "Optional", mp: "MandatoryPlaceholder", op: "OptionalPlaceholder", "1": "Mandatory", "0..1": "Optional", "0..n": "OptionalPlaceholder", "1..n": "MandatoryPlaceholder" };

function findRule(text: string): NodeKey | undefined {
  const name = SHORT_RULES[text.toLowerCase()] ?? (Object.keys(RULE_KEYS) as RuleName[]).find((rule) => rule.toLowerCase() === text.toLowerCase());
  return name && RULE_KEYS[name];
}

/** Sets the bits for read, write and history read; the others stay as they are (OPC 10000-3 §8.57). */
function parseAccess(text: string, node: Node | undefined): number | undefined {
  if (node?.nodeClass !== "Variable" || !/^[rwh]*$/i.test(text)) return undefined;
  const bits = (/r/i.test(text) ? 1 : 0) | (/w/i.test(text) ? 2 : 0) | (/h/i.test(text) ? 4 : 0);
  return (getAccessLevel(node) & ~7) | bits;
}
