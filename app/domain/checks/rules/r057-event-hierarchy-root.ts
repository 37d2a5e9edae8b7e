import type { NodeKey } from "../../address-space/node-id";
import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { makeLookup } from "../check-context";
import { addReference, findSubject, notPossible } from "../fixes";
import { ok } from "../../core/result";
import { findTypeAbove, ofType } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { StandardNode as N } from "../standard-nodes";

export const r057: NodeRule = {
  id: "R057",
  title: "Event hierarchy begins at the Server object",
  severity: "warning",
  clause: clause(9, "§6.2"),
  priority: 2,
  concerns: ["Object"],
  condition:
    "An Object that has event sources is linked by HasNotifier or HasEventSource up to the Server object (i=2253).",
  why: "Most clients subscribe to events at the Server object only; an island is never heard.",
  check(node, ctx, report) {
    const sources = ofType(ctx, ctx.childEdges(node.key), R.HasEventSource);
    const above = ofType(ctx, ctx.parentEdges(node.key), R.HasEventSource);
    if (
      sources.length === 0 ||
      above.length > 0 ||
      findTypeAbove(ctx, node.key) !== undefined ||
      ctx.lookUp(reachesServer, node.key)
    )
      return;
    report({
      attribute: "references",
      message: `The events below ${node.browseName.name} do not reach the Server object.`,
      facts: [`Event sources below it: ${sources.length}`, "HasNotifier references to it: 0"],
    });
  },
  fix: {
    label: "Add HasNotifier from the Server object",
    apply(space, finding) {
      const node = findSubject(space, finding);
      if (node?.nodeClass !== "Object" || ((node.eventNotifier ?? 0) & 1) === 0 || !space.getNode(N.Server))
        return notPossible(finding);
      return ok([addReference(space, N.Server, R.HasNotifier, node.key)]);
    },
  },
  examples: {
    good: {
      text: "Linked to the Server object.",
      build: (m) => {
        const area = m.object("Area", { set: { eventNotifier: 1 } });
        m.reference(N.Server, R.HasNotifier, area);
        m.reference(area, R.HasEventSource, m.object("Tank1"));
        return undefined;
      },
    },
    bad: {
      text: "An island.",
      build: (m) => {
        const area = m.object("Area", { set: { eventNotifier: 1 } });
        m.reference(area, R.HasEventSource, m.object("Tank1"));
        return area;
      },
    },
  },
};

const reachesServer = makeLookup<boolean>((ctx, key) => {
  const seen = new Set<NodeKey>([key]);
  for (const at of seen) {
    if (at === N.Server) return true;
    for (const { source } of ofType(ctx, ctx.parentEdges(at), R.HasEventSource)) seen.add(source);
  }
  return false;
});
