import fc from "fast-check";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { DeclaredReference, Node, NodeClass } from "~/domain/address-space/node";
import { numericNodeId, standardKey, toNodeKey, type NodeKey } from "~/domain/address-space/node-id";
import { isRequiredAttribute } from "~/domain/editing/attribute-names";
import type { AttributeName, Operation } from "~/domain/editing/operation";
import { makeNode, TEST_NAMESPACE } from "./small-standard";

/** What an arbitrary edit is made from: which kind, and numbers that choose among what the model then has. */
export type Choice = { kind: Operation["kind"]; a: number; b: number; c: number; text: string; flag: boolean };

export const choice: fc.Arbitrary<Choice> = fc.record({
  kind: fc.constantFrom<Operation["kind"]>(
    "addNode",
    "addNode",
    "removeNode",
    "setAttribute",
    "setAttribute",
    "renumber",
    "addReference",
    "removeReference",
    "setHeader",
    "setMapping",
  ),
  a: fc.nat(1000),
  b: fc.nat(1000),
  c: fc.nat(1000),
  text: fc.string({ maxLength: 8 }),
  flag: fc.boolean(),
});

const CLASSES: readonly NodeClass[] = [
  "Object",
  "Variable",
  "Method",
  "View",
  "ObjectType",
  "VariableType",
  "DataType",
  "ReferenceType",
];
const TYPES = [35, 46, 47, 45, 41].map(standardKey);

function pick<T>(list: readonly T[], index: number): T {
  return list[index % list.length] as T;
}

function pickKey(space: AddressSpace, number: number): NodeKey {
  const own = space.listOwnNodes().map((n) => n.key);
  return pick([...own, standardKey(85), standardKey(58), standardKey(63)], number);
}

/** An operation for the model as it is. It need not apply: strict preconditions are part of what is tested. */
export function makeOperation(space: AddressSpace, choice: Choice, idBase = 0): Operation {
  switch (choice.kind) {
    case "addNode":
      return { kind: "addNode", node: makeRandomNode(space, choice, idBase) };
    case "removeNode":
      return { kind: "removeNode", key: pickKey(space, choice.a) };
    case "setAttribute":
      return { kind: "setAttribute", key: pickKey(space, choice.a), ...makeAttribute(choice, idBase) };
    case "renumber": {
      const keys = [...new Set([pickKey(space, choice.a), pickKey(space, choice.b), pickKey(space, choice.c)])];
      const ids = keys.map((key) => space.requireNode(key).nodeId);
      const fresh = numericNodeId(TEST_NAMESPACE, idBase + 500 + choice.c);
      const changes = keys.map((key, i) => ({ key, nodeId: ids[i + 1] ?? (choice.flag ? fresh : (ids[0] ?? fresh)) }));
      return { kind: "renumber", changes };
    }
    case "addReference":
      return {
        kind: "addReference",
        source: pickKey(space, choice.a),
        type: pick(TYPES, choice.c),
        target: pickKey(space, choice.b),
        declaredAt: pick(["source", "target", "both"] as const, choice.c),
        ...(choice.flag ? { sourceIndex: choice.a % 3, targetIndex: choice.b % 3 } : {}),
      };
    case "removeReference": {
      const key = pickKey(space, choice.a);
      const edges = [...space.edgesFrom(key), ...space.edgesTo(key)];
      const edge = edges.length > 0 ? pick(edges, choice.b) : { source: key, type: standardKey(47), target: key };
      return { kind: "removeReference", ...edge };
    }
    case "setHeader":
      return choice.flag
        ? { kind: "setHeader", field: "lastModified", value: choice.text }
        : { kind: "setHeader", field: "lastModified" };
    case "setMapping": {
      const entry = { part: "binding" as const, owner: pickKey(space, choice.a), id: `role ${choice.b % 3}` };
      const value = { sourceId: "master", port: 1 + (choice.c % 8) };
      return { kind: "setMapping", ...entry, ...(choice.flag ? { value } : {}) };
    }
  }
}

function makeRandomNode(space: AddressSpace, { a, b, c, text, flag }: Choice, idBase: number): Node {
  const parent = pickKey(space, a);
  const references: DeclaredReference[] = [{ type: pick(TYPES, b), target: parent, isForward: false }];
  if (flag) references.push({ type: standardKey(37), target: standardKey(78), isForward: true });
  if (c % 5 === 0) references.push(references[0] as DeclaredReference);
  return makeNode(idBase + (c % 300), pick(CLASSES, b), {
    references,
    order: a % 40,
    description: [{ locale: "en", text }],
  });
}

function makeAttribute({ a, b, c, text, flag }: Choice, idBase: number): { attribute: AttributeName; value?: unknown } {
  const values: readonly { attribute: AttributeName; value?: unknown }[] = [
    { attribute: "displayName", value: [{ text }] },
    { attribute: "browseName", value: { namespaceUri: TEST_NAMESPACE, name: text } },
    { attribute: "nodeId", value: numericNodeId(TEST_NAMESPACE, idBase + 300 + (c % 300)) },
    { attribute: "order", value: b % 40 },
    { attribute: "isAbstract", value: flag },
    { attribute: "dataType", value: standardKey(11) },
    { attribute: "symbolicName", value: text },
    { attribute: "parent", value: toNodeKey(numericNodeId(TEST_NAMESPACE, c)) },
  ];
  const chosen = pick(values, a);
  return flag && !isRequiredAttribute(chosen.attribute) ? { attribute: chosen.attribute } : chosen;
}
