/**
 * What an edit touches. A unit is a text: `attribute␟key␟name`, `reference␟source␟type␟target`, `node␟key`,
 * `id␟NodeId`, `header␟field`, `mapping␟owner␟part␟id`. An edit *changes* units and *needs* others to stay: setting an attribute changes the
 * attribute and needs the node, adding a reference needs both ends. Two edits conflict when one changes what the other
 * changes or needs; two that merely need the same node do not. Removing a node changes the node, so it conflicts with
 * every edit at it, and nobody's work is thrown away unseen.
 */
import { formatNodeId, type NodeId, type NodeKey } from "../address-space/node-id";
import type { Node } from "../address-space/node";
import { assertNever } from "../core/result";
import type { Operation } from "./operation";

export type ConflictUnits = { readonly changes: ReadonlySet<string>; readonly needs: ReadonlySet<string> };

const SEPARATOR = "\u001f";
const unit = (...parts: string[]): string => parts.join(SEPARATOR);
const nodeUnit = (key: NodeKey): string => unit("node", key);

/** The units of one operation; see the head of this file. */
export function listConflictUnits(operation: Operation): { changes: string[]; needs: string[] } {
  switch (operation.kind) {
    case "addNode": {
      const { node } = operation;
      return { changes: [nodeUnit(node.key), unit("id", formatNodeId(node.nodeId))], needs: listNeeds(node) };
    }
    case "removeNode":
      return { changes: [nodeUnit(operation.key)], needs: [] };
    case "setAttribute": {
      const { key, attribute, value } = operation;
      const changes = [unit("attribute", key, attribute)];
      if (attribute === "nodeId") changes.push(unit("id", formatNodeId(value as NodeId)));
      return { changes, needs: [nodeUnit(key), ...listNamedNodes(attribute, value)] };
    }
    case "renumber": {
      const { changes } = operation;
      return {
        changes: changes.flatMap(({ key, nodeId }) => [
          unit("attribute", key, "nodeId"),
          unit("id", formatNodeId(nodeId)),
        ]),
        needs: changes.map(({ key }) => nodeUnit(key)),
      };
    }
    case "addReference":
    case "removeReference": {
      const { kind, source, type, target } = operation;
      const needs = kind === "addReference" ? [source, type, target].map(nodeUnit) : [];
      return { changes: [unit("reference", source, type, target)], needs };
    }
    case "setHeader":
      return { changes: [unit("header", operation.field)], needs: [] };
    case "setMapping": {
      const { part, owner, id, value } = operation;
      return { changes: [unit("mapping", owner, part, id)], needs: value === undefined ? [] : [nodeUnit(owner)] };
    }
    default:
      return assertNever(operation);
  }
}

function listNeeds(node: Node): string[] {
  const keys = node.references.flatMap((r) => (r.serverUri === undefined ? [r.type, r.target] : [r.type]));
  if ("dataType" in node && node.dataType !== undefined) keys.push(node.dataType);
  if ("methodDeclaration" in node && node.methodDeclaration !== undefined) keys.push(node.methodDeclaration);
  return keys.filter((key) => key !== node.key).map(nodeUnit);
}

function listNamedNodes(attribute: string, value: unknown): string[] {
  const namesNode = attribute === "dataType" || attribute === "parent" || attribute === "methodDeclaration";
  return namesNode && typeof value === "string" ? [nodeUnit(value as NodeKey)] : [];
}

/** Transactions never change, and the history asks for their units with each edit of somebody else. */
const known = new WeakMap<readonly Operation[], ConflictUnits>();

/** The units of a transaction as a whole. */
export function collectConflictUnits(operations: readonly Operation[]): ConflictUnits {
  let units = known.get(operations);
  if (!units) {
    units = makeConflictUnits(operations);
    known.set(operations, units);
  }
  return units;
}

function makeConflictUnits(operations: readonly Operation[]): ConflictUnits {
  const changes = new Set<string>();
  const needs = new Set<string>();
  for (const operation of operations) {
    const units = listConflictUnits(operation);
    for (const changed of units.changes) changes.add(changed);
    for (const needed of units.needs) needs.add(needed);
  }
  return { changes, needs };
}

/** The first unit at which two edits meet, undefined where they do not conflict. */
export function findConflict(a: ConflictUnits, b: ConflictUnits): string | undefined {
  for (const changed of a.changes) if (b.changes.has(changed) || b.needs.has(changed)) return changed;
  for (const changed of b.changes) if (a.needs.has(changed)) return changed;
  return undefined;
}

/** A unit for people: what it is about and which node it belongs to (undefined for the header). */
export function describeUnit(text: string): { kind: string; node?: NodeKey; attribute: string } {
  const [kind = "", first = "", second = ""] = text.split(SEPARATOR);
  switch (kind) {
    case "attribute":
      return { kind, node: first as NodeKey, attribute: second };
    case "reference":
      return { kind, node: first as NodeKey, attribute: "reference" };
    case "node":
      return { kind, node: first as NodeKey, attribute: "node" };
    case "id":
      return { kind, node: first as NodeKey, attribute: "nodeId" };
    case "mapping":
      return { kind, node: first as NodeKey, attribute: second };
    default:
      return { kind, attribute: first };
  }
}
