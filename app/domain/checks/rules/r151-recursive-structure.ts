import { getDataType, getValueRank, type DataTypeNode } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import { StandardDataType as D } from "../../address-space/standard-ids";
import { makeLookup, type CheckContext } from "../check-context";
import { listFields } from "../data-types";
import { clause, type NodeRule } from "../rule";
import { addStructure, isStructure } from "../structures";

export const r151: NodeRule = {
  id: "R151",
  title: "No structure contains itself without end",
  severity: "error",
  clause: `${clause(6, "§5.3.5")} (inferred)`,
  priority: 2,
  concerns: ["DataType"],
  condition:
    "Following scalar, mandatory fields never leads from a Structure back to itself; lists, optional fields, Unions and fields of Structure itself end the way.",
  why: "A default value would have no end: stacks run out of memory when they make one.",
  check(node, ctx, report) {
    if (node.nodeClass !== "DataType" || !node.definition || !isStructure(ctx, node.key)) return;
    const path = ctx.lookUp(wayBack, node.key);
    if (!path || !path.every((key) => key >= node.key || !ctx.isOwn(key))) return;
    report({
      attribute: "definition",
      message: `${node.browseName.name} contains itself without end.`,
      facts: [`The way round: ${[...path, node.key].map((key) => ctx.nameOf(key)).join(" → ")}`],
    });
  },
  examples: {
    good: {
      text: "A tree with a list of children.",
      build: (m) => {
        const node = addStructure(m, "BranchDataType", [{ name: "Name", dataType: D.String }]);
        m.set(node, {
          definition: { name: m.name("BranchDataType"), fields: [{ name: "Children", dataType: node, valueRank: 1 }] },
        });
        return node;
      },
    },
    bad: {
      text: "A field of its own type.",
      build: (m) => {
        const node = addStructure(m, "BranchDataType", [{ name: "Name", dataType: D.String }]);
        m.set(node, { definition: { name: m.name("BranchDataType"), fields: [{ name: "Child", dataType: node }] } });
        return node;
      },
    },
  },
};

const wayBack = makeLookup<readonly NodeKey[] | undefined>((ctx, start) => {
  const from = new Map<NodeKey, NodeKey>();
  const open: NodeKey[] = [start];
  for (const at of open) {
    for (const inner of listInner(ctx, at)) {
      if (inner === start) return listWay(start, at, from);
      if (from.has(inner)) continue;
      from.set(inner, at);
      open.push(inner);
    }
  }
  return undefined;
});

function listInner(ctx: CheckContext, key: NodeKey): NodeKey[] {
  const node = ctx.node(key);
  if (node?.nodeClass !== "DataType" || isUnion(node)) return [];
  return listFields(ctx, key)
    .filter(
      (f) =>
        !f.isOptional && getValueRank(f) === -1 && getDataType(f) !== D.Structure && isStructure(ctx, getDataType(f)),
    )
    .map(getDataType);
}

function isUnion(node: DataTypeNode): boolean {
  return node.definition?.isUnion === true;
}

function listWay(start: NodeKey, last: NodeKey, from: ReadonlyMap<NodeKey, NodeKey>): NodeKey[] {
  const way: NodeKey[] = [];
  for (let at: NodeKey | undefined = last; at !== undefined && at !== start; at = from.get(at)) way.unshift(at);
  return [start, ...way];
}
