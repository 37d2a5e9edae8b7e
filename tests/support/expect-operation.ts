import { expect } from "vitest";
import { buildLayer, type AddressSpace, type Layer } from "~/domain/address-space/address-space";
import { listMappingEntries } from "~/domain/address-space/mapping-entry";
import { applyOperation } from "~/domain/editing/apply-operation";
import { applyWithInverse } from "~/domain/editing/invert-operation";
import type { Operation } from "~/domain/editing/operation";
import { operationSchema } from "~/domain/editing/operation-schema";

/** The own layer as plain data: what must be equal after an edit and its inverse. */
export function snapshotOwn(layer: Layer): unknown {
  return {
    header: layer.header,
    nodes: new Map(layer.nodes.entries()),
    ids: new Map(layer.keysByNodeId.entries()),
    outgoing: toPlain(layer.outgoing),
    incoming: toPlain(layer.incoming),
    mapping: listMappingEntries(layer.mapping),
  };
}

function toPlain(index: Layer["outgoing"]): Map<string, unknown> {
  const plain = new Map<string, unknown>();
  for (const [key, { edges, declarers, distinct }] of index.entries()) plain.set(key, { edges, declarers, distinct });
  return plain;
}

/** The own layer's indexes are those of a fresh build: no edit leaves a trace in them. */
export function expectFreshIndexes(space: AddressSpace): void {
  expect(snapshotOwn(space.own)).toEqual(snapshotOwn(buildLayer(space.own.header, space.listOwnNodes(), listMappingEntries(space.own.mapping))));
}

/** An operation passes the schema and JSON unchanged. */
export function expectJsonForm(operation: Operation): void {
  expect(operationSchema.parse(JSON.parse(JSON.stringify(operation)))).toEqual(operation);
}

/**
 * Proves the laws of an operation that applies: it has its JSON form, its inverse restores the own layer exactly, the
 * inverse of the inverse does it again, and the old address space is untouched. Answers the new address space.
 */
export function expectOperation(space: AddressSpace, operation: Operation): AddressSpace {
  return expectOperations(space, [operation]);
}

/** The same for a list of operations that apply as a whole. */
export function expectOperations(space: AddressSpace, operations: readonly Operation[]): AddressSpace {
  const before = snapshotOwn(space.own);
  const applied = applyWithInverse(space, operations);
  if (!applied.ok) throw new Error(`Did not apply: ${JSON.stringify(applied.problems)}`);
  const after = snapshotOwn(applied.value.space.own);
  expect(snapshotOwn(space.own)).toEqual(before);
  expectFreshIndexes(applied.value.space);
  const undone = applyWithInverse(applied.value.space, applied.value.inverse);
  if (!undone.ok) throw new Error(`The inverse did not apply: ${JSON.stringify(undone.problems)}`);
  expect(snapshotOwn(undone.value.space.own)).toEqual(before);
  const redone = applyWithInverse(undone.value.space, undone.value.inverse);
  if (!redone.ok) throw new Error(`The inverse of the inverse did not apply: ${JSON.stringify(redone.problems)}`);
  expect(snapshotOwn(redone.value.space.own)).toEqual(after);
  for (const operation of [...operations, ...applied.value.inverse]) expectJsonForm(operation);
  return applied.value.space;
}

/** An operation is refused with these codes and passes the schema all the same. */
export function expectRefused(space: AddressSpace, operation: Operation, ...codes: string[]): void {
  const result = applyOperation(space, operation);
  expect(result.ok ? "applied" : result.problems.map((p) => p.code)).toEqual(codes);
  for (const problem of result.problems) expect(problem.severity).toBe("error");
}
