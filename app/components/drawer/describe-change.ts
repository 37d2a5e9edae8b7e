/** One change of a node as people read it: `description: “Speed” → “Speed of the spindle”`. Pure. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { formatNodeId, type NodeId, type NodeKey } from "~/domain/address-space/node-id";
import type { XmlText } from "~/domain/address-space/node";
import type { NodeChange } from "~/domain/editing/node-changes";
import { formatValue } from "~/domain/nodeset/values/format-value";
import { readValue } from "~/domain/nodeset/values/read-value";
import { formatValueRank, getNodeName } from "../model/member-facts";
import { getDataTypes } from "../model/read-typed-value";

const MOST = 90;

export function describeChange(space: AddressSpace, change: NodeChange): string {
  switch (change.kind) {
    case "created":
      return "created";
    case "deleted":
      return "deleted";
    case "reference-added":
    case "reference-removed": {
      const word = change.kind === "reference-added" ? "added" : "removed";
      const arrow = change.isForward ? "to" : "from";
      return `${getNodeName(space, change.type)} ${arrow} ${getNodeName(space, change.other)} ${word}`;
    }
    case "attribute": {
      const name = WORDS[change.attribute] ?? splitWords(change.attribute);
      if (!("from" in change) && !("to" in change)) return `${name} changed`;
      return `${name}: ${describe(space, change.attribute, change.from)} → ${describe(space, change.attribute, change.to)}`;
    }
  }
}

const WORDS: Readonly<Partial<Record<string, string>>> = {
  browseName: "BrowseName",
  displayName: "DisplayName",
  nodeId: "NodeId",
  dataType: "DataType",
  valueRank: "rank",
};

function splitWords(name: string): string {
  return name.replace(/[A-Z]/g, (letter) => ` ${letter.toLowerCase()}`);
}

function describe(space: AddressSpace, attribute: string, value: unknown): string {
  if (value === undefined) return "nothing";
  const text = toText(space, attribute, value);
  return text.length > MOST ? `${text.slice(0, MOST)}…` : text;
}

type Texts = readonly { readonly locale?: string; readonly text: string }[];

function toText(space: AddressSpace, attribute: string, value: unknown): string {
  switch (attribute) {
    case "displayName":
    case "description":
    case "inverseName":
      return (
        (value as Texts).map(({ locale, text }) => `“${text}”${locale ? ` ${locale}` : ""}`).join(", ") || "nothing"
      );
    case "browseName":
      return (value as { readonly name: string }).name;
    case "nodeId":
      return formatNodeId(value as NodeId);
    case "dataType":
    case "parent":
    case "methodDeclaration":
      return getNodeName(space, value as NodeKey);
    case "valueRank":
      return formatValueRank(value as number);
    case "value":
      return describeValue(space, value as XmlText);
    case "definition":
      return `${(value as { readonly fields: readonly unknown[] }).fields.length} fields`;
    case "rolePermissions":
      return (value as readonly { readonly role: NodeKey }[]).map(({ role }) => getNodeName(space, role)).join(", ");
    default:
      return typeof value === "object" ? JSON.stringify(value) : String(value);
  }
}

function describeValue(space: AddressSpace, value: XmlText): string {
  const types = getDataTypes(space);
  const read = readValue(value, types);
  return read.ok ? formatValue(read.value, types, { maxItems: 5 }) : "XML";
}
