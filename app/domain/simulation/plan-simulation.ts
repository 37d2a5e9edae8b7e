/**
 * Which Variables of a model move on a test server, and how. Decided from the model alone: type definition, data type,
 * EURange, the states of an enumeration, and the name of a counter. The phase comes from the path, so that machines of one
 * type do not move in step and still every start of the server shows the same.
 */
import type { AddressSpace, Layer } from "../address-space/address-space";
import { findProperty, getPath, listEdgesTo } from "../address-space/browse";
import { getDataType, getValueRank, type VariableNode } from "../address-space/node";
import { formatNodeId, type NodeKey } from "../address-space/node-id";
import { StandardReferenceType } from "../address-space/standard-ids";
import { findBuiltInType } from "./find-built-in-type";
import { isInstance } from "./is-instance";
import { listStates } from "./list-states";
import type { BuiltInType, Motion } from "./motion";
import { INTEGER_RANGES } from "./motion";
import { readRange } from "./read-range";

export type SimulatedVariable = {
  /** `nsu=URI;…`, never an index. */
  readonly nodeId: string;
  readonly path: string;
  readonly builtInType: BuiltInType;
  /** DataType as `nsu=` text, for structures that the server constructs by their definition. */
  readonly dataType: string;
  /** Lengths of the dimensions; empty for a scalar. */
  readonly dimensions: readonly number[];
  readonly motion: Motion;
  /** The model gives a value; a static Variable then keeps it. */
  readonly hasValue: boolean;
  /** Properties describe and keep status Good when the model gives their value. */
  readonly isProperty: boolean;
};

const ARRAY_LENGTH = 4;
const MAX_ARRAY_LENGTH = 1000;
const COUNTER_NAME = /count|total|pieces|picks|cycles/i;
const LABEL_NAME = /(number|id|code|index|mode|address|version|revision)$/i;

/**
 * The plan for the instance Variables of the given layers (the own layer when none is given). Instance declarations of
 * types are left alone: nobody reads a machine there.
 */
export function planSimulation(space: AddressSpace, layers: readonly Layer[] = [space.own]): SimulatedVariable[] {
  const knownInstances = new Map<NodeKey, boolean>();
  const plan: SimulatedVariable[] = [];
  for (const layer of layers) {
    const nodes = [...layer.nodes.values()].sort((a, b) => a.order - b.order);
    for (const node of nodes) {
      if (node.nodeClass !== "Variable" || !isInstance(space, node.key, knownInstances)) continue;
      plan.push(planVariable(space, node));
    }
  }
  return plan;
}

function planVariable(space: AddressSpace, node: VariableNode): SimulatedVariable {
  const isProperty = listEdgesTo(space, node.key, StandardReferenceType.HasProperty).length > 0;
  const dataType = getDataType(node);
  const builtInType = findBuiltInType(space, dataType);
  const dataTypeNode = space.getNode(dataType);
  const path = getPath(space, node.key);
  return {
    nodeId: formatNodeId(node.nodeId),
    path,
    builtInType,
    dataType: dataTypeNode ? formatNodeId(dataTypeNode.nodeId) : dataType,
    dimensions: listDimensions(node),
    motion: isProperty ? { kind: "static" } : chooseMotion(space, node, builtInType, toPhase(path)),
    hasValue: node.value !== undefined,
    isProperty,
  };
}

function chooseMotion(space: AddressSpace, node: VariableNode, type: BuiltInType, phase: number): Motion {
  if (type === "Boolean") return { kind: "steps", values: [0, 1], secondsEach: 8 + 8 * phase, phase };
  const states = listStates(space, node);
  if (states.length > 1) return { kind: "steps", values: states, secondsEach: 6 + 6 * phase, phase };
  const isNumber = type in INTEGER_RANGES || type === "Float" || type === "Double";
  if (isNumber) return chooseNumberMotion(space, node, type, phase);
  return type === "DateTime" && node.value === undefined ? { kind: "clock" } : { kind: "static" };
}

function chooseNumberMotion(space: AddressSpace, node: VariableNode, type: BuiltInType, phase: number): Motion {
  const name = node.browseName.name;
  const range = findRange(space, node.key);
  if (range && range.high > range.low) {
    const { low, high } = clampRange(range, type);
    if (COUNTER_NAME.test(name) || isCumulative(space, node.key)) {
      return { kind: "rise", low, high, perSecond: (high - low) / 86_400, phase };
    }
    const margin = (high - low) * 0.05;
    const inner = { low: low + margin, high: high - margin, period: 30 + 90 * phase, phase };
    return Math.floor(phase * 1000) % 3 === 0 ? { kind: "ramp", ...inner } : { kind: "sine", ...inner };
  }
  const bounds = INTEGER_RANGES[type];
  if (!bounds) return { kind: "static" };
  const isWide = bounds[1] >= 4294967295;
  if (COUNTER_NAME.test(name) || (isWide && bounds[0] === 0 && !LABEL_NAME.test(name))) {
    return { kind: "count", start: Math.floor(phase * Math.min(bounds[1], 50_000)), perSecond: 1 + Math.floor(phase * 9), last: bounds[1] };
  }
  return { kind: "static" };
}

/** EURange, else InstrumentRange (OPC 10000-8 §5.3.2.2, §5.3.2.3). */
function findRange(space: AddressSpace, key: NodeKey): { low: number; high: number } | undefined {
  for (const name of ["EURange", "InstrumentRange"]) {
    const property = findProperty(space, key, name);
    const range = property?.nodeClass === "Variable" && property.value ? readRange(property.value) : undefined;
    if (range) return range;
  }
  return undefined;
}

function clampRange(range: { low: number; high: number }, type: BuiltInType): { low: number; high: number } {
  const bounds = INTEGER_RANGES[type];
  return bounds ? { low: Math.max(range.low, bounds[0]), high: Math.min(range.high, bounds[1]) } : range;
}

/** UnitIds of energies that meters add up: kW·h, W·h, MW·h, J, kJ, MJ (UNECE Rec. 20 codes as numbers, OPC 10000-8 §5.6.4.2). */
const CUMULATIVE_UNITS = new Set(["KWH", "WHR", "MWH", "JOU", "KJO", "3B"].map(toUnitId));

function isCumulative(space: AddressSpace, key: NodeKey): boolean {
  const property = findProperty(space, key, "EngineeringUnits");
  if (property?.nodeClass !== "Variable" || !property.value) return false;
  const unitId = /<(?:\w+:)?UnitId>\s*(-?\d+)\s*</.exec(property.value.xml)?.[1];
  return unitId !== undefined && CUMULATIVE_UNITS.has(Number(unitId));
}

function toUnitId(code: string): number {
  return [...code].reduce((id, letter) => id * 256 + letter.charCodeAt(0), 0);
}

function listDimensions(node: VariableNode): number[] {
  const rank = getValueRank(node);
  if (rank < 0) return [];
  const given = node.arrayDimensions?.split(",").map(Number) ?? [];
  const count = rank === 0 ? Math.max(1, given.length) : rank;
  return Array.from({ length: count }, (_, i) => {
    const length = given[i] ?? 0;
    return Number.isInteger(length) && length > 0 ? Math.min(length, MAX_ARRAY_LENGTH) : ARRAY_LENGTH;
  });
}

/** A number 0 … 1 from a path: FNV-1a, so that neighbours with like names lie far apart. */
function toPhase(path: string): number {
  let hash = 2166136261;
  for (let i = 0; i < path.length; i++) hash = Math.imul(hash ^ path.charCodeAt(i), 16777619);
  return ((hash >>> 0) % 10_000) / 10_000;
}
