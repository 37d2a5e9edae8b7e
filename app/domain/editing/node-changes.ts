/** What transactions did to one node, for its history: attributes with what stood there before, references, birth and end. */
import type { NodeKey } from "../address-space/node-id";
import type { AttributeName, Operation, Transaction } from "./operation";

export type NodeChange =
  | { readonly kind: "created" }
  | { readonly kind: "deleted" }
  | { readonly kind: "attribute"; readonly attribute: AttributeName; readonly from?: unknown; readonly to?: unknown }
  /** `isForward`: the node is the source. */
  | {
      readonly kind: "reference-added" | "reference-removed";
      readonly type: NodeKey;
      readonly other: NodeKey;
      readonly isForward: boolean;
    };

/** In the order in which they were done. A node that came with a reference to this one counts as a reference. */
export function listNodeChanges(
  { operations, inverse }: Pick<Transaction, "operations" | "inverse">,
  key: NodeKey,
): NodeChange[] {
  const before = collectAttributes(inverse, key);
  return operations.flatMap((operation) => listChanges(operation, key, before));
}

/** What the inverse puts back is what stood there. */
function collectAttributes(inverse: readonly Operation[], key: NodeKey): ReadonlyMap<AttributeName, unknown> {
  const values = new Map<AttributeName, unknown>();
  for (const operation of inverse) {
    if (operation.kind === "setAttribute" && operation.key === key) values.set(operation.attribute, operation.value);
    const number = operation.kind === "renumber" ? operation.changes.find((c) => c.key === key) : undefined;
    if (number) values.set("nodeId", number.nodeId);
  }
  return values;
}

function listChanges(operation: Operation, key: NodeKey, before: ReadonlyMap<AttributeName, unknown>): NodeChange[] {
  switch (operation.kind) {
    case "addNode":
      if (operation.node.key === key) return [{ kind: "created" }];
      return operation.node.references
        .filter((reference) => reference.target === key)
        .map(({ type, isForward }) => ({
          kind: "reference-added",
          type,
          other: operation.node.key,
          isForward: !isForward,
        }));
    case "removeNode":
      return operation.key === key ? [{ kind: "deleted" }] : [];
    case "setAttribute":
      return operation.key === key ? [makeAttributeChange(operation.attribute, before, operation.value)] : [];
    case "renumber": {
      const number = operation.changes.find((change) => change.key === key);
      return number ? [makeAttributeChange("nodeId", before, number.nodeId)] : [];
    }
    case "addReference":
    case "removeReference": {
      const { source, type, target } = operation;
      if (source !== key && target !== key) return [];
      const kind = operation.kind === "addReference" ? "reference-added" : "reference-removed";
      return [{ kind, type, other: source === key ? target : source, isForward: source === key }];
    }
    default:
      return [];
  }
}

function makeAttributeChange(
  attribute: AttributeName,
  before: ReadonlyMap<AttributeName, unknown>,
  to: unknown,
): NodeChange {
  const from = before.get(attribute);
  return { kind: "attribute", attribute, ...(from === undefined ? {} : { from }), ...(to === undefined ? {} : { to }) };
}
