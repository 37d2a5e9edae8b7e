/** What changed in the mapping that a model keeps beside its nodes. */
import type { AddressSpace } from "../address-space/address-space";
import { getPath } from "../address-space/browse";
import { listMappingEntries, toMappingKey, type MappingEntry, type MappingPart } from "../address-space/mapping-entry";
import { formatNodeId, type NodeKey } from "../address-space/node-id";
import { toRowTarget } from "../mapping/type-mapping";
import type { Change, ChangeKind } from "./change";
import { isSameJson } from "./merge/model-state";
import { ratings, type Rating } from "./ratings";

const PART_NAMES: Readonly<Record<MappingPart, string>> = {
  role: "role",
  row: "row",
  "check-case": "check case",
  signal: "surveyed signal",
  binding: "binding",
  exception: "exception",
};

/** Rows feed members, so their coming and going is felt by readers; the other parts tell how. */
export function compareMappings(
  before: AddressSpace,
  after: AddressSpace,
  toAfter: (key: NodeKey) => NodeKey,
): Change[] {
  const old = toTable(before, toAfter);
  const now = toTable(after, (key) => key);
  return [...new Set([...old.keys(), ...now.keys()])].flatMap((id): Change[] => {
    const [left, right] = [old.get(id), now.get(id)];
    if (left && right && isSameJson(left.value, right.value)) return [];
    return [toChange(right ? after : before, left, right)];
  });
}

function toTable(space: AddressSpace, toAfter: (key: NodeKey) => NodeKey): Map<string, MappingEntry> {
  const rename = (entry: MappingEntry): string => {
    const [target = ""] = toRowTarget(entry.id).split("\n");
    const isOfMember = entry.part === "row" || entry.part === "exception";
    const id = isOfMember ? entry.id.replace(target, toAfter(target as NodeKey)) : entry.id;
    return toMappingKey({ part: entry.part, owner: toAfter(entry.owner), id });
  };
  return new Map(listMappingEntries(space.own.mapping).map((entry) => [rename(entry), entry]));
}

function toChange(space: AddressSpace, old: MappingEntry | undefined, now: MappingEntry | undefined): Change {
  const entry = (now ?? old) as MappingEntry;
  const kind: ChangeKind = !old ? "mapping-added" : !now ? "mapping-removed" : "mapping-changed";
  const [target = "", ...below] = toRowTarget(entry.id).split("\n");
  const isOfMember = entry.part === "row" || entry.part === "exception";
  const member = isOfMember ? space.getNode(target as NodeKey) : undefined;
  const node = member ?? space.getNode(entry.owner);
  const path = member ? [getPath(space, member.key), ...below].join("/") : getPath(space, entry.owner);
  return {
    kind,
    ...(node ? { key: node.key, nodeId: formatNodeId(node.nodeId) } : {}),
    path,
    detail: member ? PART_NAMES[entry.part] : `${PART_NAMES[entry.part]} ${entry.id}`,
    ...rate(entry.part, kind),
    before: formatEntry(space, old),
    after: formatEntry(space, now),
  };
}

function rate(part: MappingPart, kind: ChangeKind): Rating {
  if (part !== "row") return ratings.mappingAround;
  return kind === "mapping-added"
    ? ratings.rowAdded
    : kind === "mapping-removed"
      ? ratings.rowRemoved
      : ratings.rowChanged;
}

/** The plain values of an entry on one line, names before them: `role creel sensor, subindex 1`. */
function formatEntry(space: AddressSpace, entry: MappingEntry | undefined): string | null {
  if (!entry) return null;
  const parts: string[] = [];
  const collect = (name: string, value: unknown): void => {
    if (parts.length >= 12) return;
    if (Array.isArray(value)) value.forEach((item) => collect(name, item));
    else if (typeof value === "object" && value !== null)
      Object.entries(value).forEach(([key, inner]) => collect(key, inner));
    else if (value !== undefined && value !== null && value !== "")
      parts.push(name === "kind" ? String(value) : `${name} ${nameIn(space, value)}`);
  };
  collect("", entry.value);
  return parts.join(", ").slice(0, 300);
}

/** Members are named by key in a mapping; people read their names. */
function nameIn(space: AddressSpace, value: unknown): string {
  return (typeof value === "string" && space.getNode(value as NodeKey)?.browseName.name) || String(value);
}
