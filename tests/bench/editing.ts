/** One edit of a model with 50 000 own nodes, applied and undone, against building the whole model anew. */
import { AddressSpace, buildLayer } from "~/domain/address-space/address-space";
import type { Node } from "~/domain/address-space/node";
import { numericNodeId, standardKey, toNodeKey } from "~/domain/address-space/node-id";
import { getValue } from "~/domain/core/result";
import { applyWithInverse } from "~/domain/editing/invert-operation";
import type { Operation } from "~/domain/editing/operation";
import { compare, median, type BenchResult } from "./result";

const COUNT = 50_000;
const NAMESPACE = "http://merrow.example/bench/";

export function measureEditing(): Promise<BenchResult[]> {
  const nodes = makeNodes();
  const header = { namespaceUris: [NAMESPACE], models: [{ modelUri: NAMESPACE, requiredModels: [] }] };
  const rebuild = time(5, () => {
    const layer = buildLayer(header, nodes);
    // Indexes are made when they are first asked for.
    if (layer.outgoing.size + layer.incoming.size + layer.keysByNodeId.size < COUNT) throw new Error("Not indexed");
  });
  const space = AddressSpace.of([], buildLayer(header, nodes));
  const middle = nodes[COUNT / 2];
  if (!middle) throw new RangeError("No node");
  const operation: Operation = {
    kind: "setAttribute",
    key: middle.key,
    attribute: "displayName",
    value: [{ text: "New" }],
  };
  const edit = time(200, () => {
    const applied = getValue(applyWithInverse(space, [operation]));
    getValue(applyWithInverse(applied.space, applied.inverse));
  });
  return Promise.resolve([compare("edit one of 50 000 nodes and undo it", "ms", edit, rebuild, 1 / 500)]);
}

/** Objects with ten Variables each. */
function makeNodes(): Node[] {
  let owner = toNodeKey(numericNodeId(NAMESPACE, 1));
  return Array.from({ length: COUNT }, (_, order): Node => {
    const nodeId = numericNodeId(NAMESPACE, order + 1);
    const key = toNodeKey(nodeId);
    const common = {
      key,
      nodeId,
      order,
      browseName: { namespaceUri: NAMESPACE, name: `N${order}` },
      displayName: [{ text: `N${order}` }],
    };
    const type = (id: number) => ({ type: standardKey(40), target: standardKey(id), isForward: true });
    if (order % 11 === 0) {
      owner = key;
      return { ...common, nodeClass: "Object", references: [type(58)] };
    }
    return {
      ...common,
      nodeClass: "Variable",
      references: [{ type: standardKey(47), target: owner, isForward: false }, type(63)],
    };
  });
}

function time(rounds: number, work: () => void): number {
  return median(
    Array.from({ length: rounds }, () => {
      const since = performance.now();
      work();
      return performance.now() - since;
    }),
  );
}
