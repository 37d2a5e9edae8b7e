/**
 * Watch boards: tiles with live values, made of one machine of a type, for all machines of that type. A tile names its
 * Variable by the browse path below the machine, so that a switch of the machine is a change of NodeIds and of nothing else.
 */
import { z } from "zod";
import type { AddressSpace } from "../address-space/address-space";
import { findProperty, findTypeDefinition, getDisplayName, listChildren, listEdgesFrom } from "../address-space/browse";
import { toPathKey } from "../address-space/instance-declarations";
import { getDataType, hasValueAttributes, type Node, type VariableNode } from "../address-space/node";
import { formatNodeId, type NodeKey } from "../address-space/node-id";
import type { QualifiedName } from "../address-space/qualified-name";
import { StandardReferenceType, StandardType } from "../address-space/standard-ids";
import { isSubtypeOf } from "../address-space/type-hierarchy";
import { SpaceDataTypes } from "../nodeset/values/data-type-shapes";
import { readValue } from "../nodeset/values/read-value";
import { findEuInformation } from "../nodeset/values/standard-values";
import { readRange } from "../simulation/read-range";

/** Meanings of colours after IEC 60073: red danger, yellow abnormal, green normal, blue an act is asked for, white neutral. */
export const lampColours = ["red", "yellow", "green", "blue", "white"] as const;
export type LampColour = (typeof lampColours)[number];

const text = z.string().max(500);

export const boardTileSchema = z.strictObject({
  /** Browse path below the machine, as `toPathKey` writes it. */
  path: z.string().min(1).max(2_000),
  section: text,
  title: text,
  kind: z.enum(["bar", "state", "counter", "value"]),
  unit: z.string().max(100),
  range: z.strictObject({ low: z.number(), high: z.number() }).nullable(),
  /** Of a state: what each number says, and which lamp it lights. */
  states: z.array(z.strictObject({ value: z.number().int(), text, lamp: z.enum(lampColours) })).max(200),
  hasTrend: z.boolean(),
  isWide: z.boolean(),
  isHidden: z.boolean(),
});
export type BoardTile = z.infer<typeof boardTileSchema>;

export const boardContentSchema = z.strictObject({ tiles: z.array(boardTileSchema).max(500) });
export type BoardContent = z.infer<typeof boardContentSchema>;

const MAX_DEPTH = 6;
const COUNTER_NAME = /count|total|pieces|picks|cycles|hours/i;

/** A board of one machine: sections are its Objects, tiles its Variables in the order of the model; Properties stay out. */
export function makeBoard(space: AddressSpace, machine: NodeKey): BoardContent {
  const tiles: BoardTile[] = [];
  const types = new SpaceDataTypes(space);
  const seen = new Set<NodeKey>([machine]);
  const walk = (owner: NodeKey, path: readonly QualifiedName[], section: string): void => {
    if (path.length >= MAX_DEPTH) return;
    const properties = new Set(listEdgesFrom(space, owner, StandardReferenceType.HasProperty).map((e) => e.target));
    for (const child of listChildren(space, owner)) {
      if (seen.has(child.key) || properties.has(child.key)) continue;
      seen.add(child.key);
      const at = [...path, child.browseName];
      if (child.nodeClass === "Object") walk(child.key, at, path.length === 0 ? getDisplayName(child) : section);
      if (child.nodeClass === "Variable") tiles.push(makeTile(space, types, child, toPathKey(at), section));
    }
  };
  walk(machine, [], "");
  return { tiles: tiles.slice(0, 500) };
}

function makeTile(space: AddressSpace, types: SpaceDataTypes, node: VariableNode, path: string, section: string): BoardTile {
  const range = findRangeOf(space, node.key);
  const states = listStateTexts(space, types, node);
  const isAnalog = range !== null && states.length === 0;
  const isCounter = !isAnalog && states.length === 0 && COUNTER_NAME.test(node.browseName.name);
  return {
    path,
    section,
    title: getDisplayName(node),
    kind: states.length > 0 ? "state" : isAnalog ? "bar" : isCounter ? "counter" : "value",
    unit: findUnitText(space, types, node.key),
    range,
    states,
    hasTrend: isAnalog,
    isWide: false,
    isHidden: false,
  };
}

function findRangeOf(space: AddressSpace, key: NodeKey): BoardTile["range"] {
  const property = findProperty(space, key, "EURange");
  const range = property && hasValueAttributes(property) && property.value ? readRange(property.value) : undefined;
  return range && range.high > range.low ? range : null;
}

function findUnitText(space: AddressSpace, types: SpaceDataTypes, key: NodeKey): string {
  const property = findProperty(space, key, "EngineeringUnits");
  const value = property && hasValueAttributes(property) && property.value ? readValue(property.value, types) : undefined;
  return (value?.ok ? findEuInformation(value.value)?.displayName.text : undefined) ?? "";
}

function listStateTexts(space: AddressSpace, types: SpaceDataTypes, node: VariableNode): BoardTile["states"] {
  const names = types.findEnumerationNames(getDataType(node));
  if (names) return [...names].map(([value, name]) => ({ value, text: name, lamp: proposeLamp(name) }));
  const type = findTypeDefinition(space, node.key);
  if (type === undefined || !isSubtypeOf(space, type, StandardType.TwoStateDiscreteType)) return [];
  return ([1, 0] as const).map((value) => {
    const property = findProperty(space, node.key, value === 1 ? "TrueState" : "FalseState");
    const read = property && hasValueAttributes(property) && property.value ? readValue(property.value, types) : undefined;
    const shown = read?.ok && read.value.type === "LocalizedText" && read.value.shape === "scalar" ? (read.value.value?.text ?? "") : "";
    const name = shown || (value === 1 ? "true" : "false");
    return { value, text: name, lamp: proposeLamp(name) };
  });
}

/** A first guess by the word of the state (common practice, no source); people choose otherwise on the board. */
export function proposeLamp(state: string): LampColour {
  if (/emergency|fault|fail|alarm|error|broken|trip/i.test(state)) return "red";
  if (/warn|maintenance|(?:out.?of|off).?spec|limit|abnormal|check.?function/i.test(state)) return "yellow";
  if (/wait|reset|acknowledge|manual|set.?up|hold/i.test(state)) return "blue";
  if (/run|produc|execut|operat|normal|good|ok\b|ready|automatic/i.test(state)) return "green";
  return "white";
}

/** The NodeId text of each tile's Variable at a machine, by path; a tile that the machine has not is left out. */
export function resolveBoard(space: AddressSpace, machine: NodeKey, { tiles }: BoardContent): Record<string, string> {
  const wanted = new Set(tiles.map((tile) => tile.path));
  const found: Record<string, string> = {};
  const seen = new Set<NodeKey>([machine]);
  const walk = (owner: NodeKey, path: readonly QualifiedName[]): void => {
    if (path.length >= MAX_DEPTH) return;
    for (const child of listChildren(space, owner)) {
      if (seen.has(child.key)) continue;
      seen.add(child.key);
      const at = [...path, child.browseName];
      const key = toPathKey(at);
      if (wanted.has(key)) found[key] = formatNodeId(child.nodeId);
      if (child.nodeClass === "Object") walk(child.key, at);
    }
  };
  walk(machine, []);
  return found;
}

/** Whether two machines are of one type, by its NodeId. */
export function isOfType(space: AddressSpace, machine: Node, typeNodeId: string): boolean {
  const type = findTypeDefinition(space, machine.key);
  const node = type === undefined ? undefined : space.getNode(type);
  return node !== undefined && formatNodeId(node.nodeId) === typeNodeId;
}

/** Puts a tile before another one of the list, or at the end of its section. */
export function moveTile({ tiles }: BoardContent, path: string, by: -1 | 1): BoardContent {
  const at = tiles.findIndex((tile) => tile.path === path);
  const section = tiles[at]?.section;
  const peers = tiles.map((tile, index) => ({ tile, index })).filter(({ tile }) => tile.section === section);
  const place = peers.findIndex(({ index }) => index === at);
  const other = peers[place + by];
  if (at < 0 || !other) return { tiles };
  const next = [...tiles];
  [next[at], next[other.index]] = [other.tile, tiles[at] as BoardTile];
  return { tiles: next };
}

export function changeTile({ tiles }: BoardContent, path: string, change: Partial<BoardTile>): BoardContent {
  return { tiles: tiles.map((tile) => (tile.path === path ? { ...tile, ...change } : tile)) };
}

