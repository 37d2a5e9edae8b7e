/** What differs between two states of a model, node by node and attribute by attribute: the preview of an edit. */
import type { AddressSpace } from "../address-space/address-space";
import { getPath } from "../address-space/browse";
import type { DeclaredReference, Node } from "../address-space/node";
import { formatNodeId, type NodeId, type NodeKey } from "../address-space/node-id";
import { formatQualifiedName, type LocalizedText, type QualifiedName } from "../address-space/qualified-name";
import { formatTexts, formatValueText, nameOf } from "../compare/describe-facts";

export type ChangeDetail = {
  /** An attribute as the standard writes it, or a reference. */
  readonly label: string;
  readonly before?: string;
  readonly after?: string;
};

export type NodeChange = {
  readonly kind: "added" | "removed" | "changed";
  readonly key: NodeKey;
  readonly name: string;
  readonly nodeClass: Node["nodeClass"];
  readonly path: string;
  readonly details: readonly ChangeDetail[];
};

/** Own nodes that differ, in the order of the model; last what differs in the header. */
export function listChanges(before: AddressSpace, after: AddressSpace): NodeChange[] {
  const keys = before.own.nodes.listChangedKeys(after.own.nodes) as NodeKey[];
  return keys
    .flatMap((key) => describe(before, after, key))
    .sort((a, b) => a.order - b.order)
    .map(({ change }) => change);
}

/** Fields of the header that differ. */
export function listHeaderChanges(before: AddressSpace, after: AddressSpace): ChangeDetail[] {
  return listDetails(before.own.header, after.own.header, (value) => JSON.stringify(value));
}

function describe(
  before: AddressSpace,
  after: AddressSpace,
  key: NodeKey,
): { readonly order: number; readonly change: NodeChange }[] {
  const [old, node] = [before.own.nodes.get(key), after.own.nodes.get(key)];
  const shown = node ?? old;
  if (!shown) return [];
  const kind = old && node ? "changed" : node ? "added" : "removed";
  const space = node ? after : before;
  const details = listNodeDetails(before, after, old, node);
  const { nodeClass, browseName, order } = shown;
  return [{ order, change: { kind, key, name: browseName.name, nodeClass, path: getPath(space, key), details } }];
}

/** Attributes that tell nothing to a reader, or that stand above the details anyway. */
const LEFT_OUT: ReadonlySet<string> = new Set(["key", "order", "nodeClass", "references"]);

/** Of a node that comes or goes its name and path say this much. */
const TOLD_BY_NAME: ReadonlySet<string> = new Set(["nodeId", "browseName", "displayName", "parent"]);

function listNodeDetails(
  before: AddressSpace,
  after: AddressSpace,
  old: Node | undefined,
  node: Node | undefined,
): ChangeDetail[] {
  const isWhole = !old || !node;
  const names = new Set(
    [...Object.keys(old ?? {}), ...Object.keys(node ?? {})].filter(
      (name) => !LEFT_OUT.has(name) && !(isWhole && TOLD_BY_NAME.has(name)),
    ),
  );
  const attributes = [...names].flatMap((name) => {
    const text = old && formatAttribute(before, old, name);
    const next = node && formatAttribute(after, node, name);
    return text === next ? [] : [toDetail(toLabel(name), text, next)];
  });
  const had = (old?.references ?? []).map((r) => formatReference(before, r));
  const has = (node?.references ?? []).map((r) => formatReference(after, r));
  const gone = had.filter((text) => !has.includes(text)).map((text) => toDetail("Reference", text, undefined));
  const come = has.filter((text) => !had.includes(text)).map((text) => toDetail("Reference", undefined, text));
  return [...attributes, ...gone, ...come];
}

function listDetails<T extends object>(old: T, next: T, format: (value: unknown) => string): ChangeDetail[] {
  const [before, after] = [old, next].map((side) => new Map<string, unknown>(Object.entries(side)));
  const names = new Set([...(before?.keys() ?? []), ...(after?.keys() ?? [])]);
  return [...names].flatMap((name) => {
    const [a, b] = [before?.get(name), after?.get(name)].map((v) => (v === undefined ? undefined : format(v)));
    return a === b ? [] : [toDetail(toLabel(name), a, b)];
  });
}

function toDetail(label: string, before: string | undefined, after: string | undefined): ChangeDetail {
  return { label, ...(before === undefined ? {} : { before }), ...(after === undefined ? {} : { after }) };
}

function formatAttribute(space: AddressSpace, node: Node, name: string): string | undefined {
  const value = new Map<string, unknown>(Object.entries(node)).get(name);
  if (value === undefined) return undefined;
  switch (name) {
    case "browseName":
      return formatQualifiedName(value as QualifiedName);
    case "nodeId":
      return formatNodeId(value as NodeId);
    case "displayName":
    case "description":
    case "inverseName":
      return formatTexts(value as readonly LocalizedText[]) ?? "";
    case "value":
      return formatValueText(node) ?? "";
    case "parent":
    case "dataType":
    case "methodDeclaration":
      return nameOf(space, value as NodeKey) ?? undefined;
    default:
      return typeof value === "object" ? JSON.stringify(value).slice(0, 300) : String(value).replace("-", "−");
  }
}

function formatReference(space: AddressSpace, { type, target, isForward }: DeclaredReference): string {
  const [reference, other] = [nameOf(space, type) ?? type, nameOf(space, target) ?? target];
  return isForward ? `${reference} to ${other}` : `${reference} from ${other}`;
}

/** `displayName` → `DisplayName`, as the standard writes attributes; `parent` is ParentNodeId in files. */
function toLabel(name: string): string {
  if (name === "parent") return "ParentNodeId";
  return name.charAt(0).toUpperCase() + name.slice(1);
}
